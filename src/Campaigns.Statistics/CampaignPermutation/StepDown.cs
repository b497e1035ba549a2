using System.Buffers;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.CampaignPermutation;

/// <summary>One step-down adjustment at work.</summary>
/// <remarks>
/// Evidence is a number that is larger the more extreme: the share of variation for maxT, minus the p-value of the share for minP. From the last hypothesis in order to the first, every column of evidence is taken into the running maximum over its world's later columns, and the maximum is compared with the observed evidence of every hypothesis for which these columns are the later ones.
/// Memory: <see cref="MostCells"/> doubles of columns, and a few columns more for each thread.
/// </remarks>
internal sealed class StepDown
{
    private const int MostCells = 1 << 24;
    private const int FewQuestions = 8;
    private const double LeastLog = -690;

    private readonly List<World> _worlds = [];
    private readonly List<Hypothesis> _hypotheses = [];
    private readonly IReadOnlyList<IReadOnlyList<PValue>> _given;
    private readonly PermutationRun _run;
    private readonly bool _byP;
    private readonly Lock _reporting = new();
    private readonly long _work;
    private long _done;
    private double[][] _columns = [];

    public StepDown(IReadOnlyList<(ArrangementColumns Columns, IReadOnlyList<SpecimenSet> Sets)> worlds, IReadOnlyList<IReadOnlyList<PValue>> given, PermutationRun run, bool byP)
    {
        foreach ((ArrangementColumns columns, IReadOnlyList<SpecimenSet> sets) in worlds)
        {
            var world = new World(columns);
            _worlds.Add(world);
            foreach (SpecimenSet set in sets)
            {
                foreach (ExactResponse response in set.Responses)
                {
                    world.Members.Add(new Hypothesis { Set = set, Response = response, Evidence = response.Share(set.Design.Observed, set.Design.Sizes) });
                }
            }

            _hypotheses.AddRange(world.Members);
            _work += (byP ? 2L : 1L) * world.Members.Count * columns.Length;
        }

        _given = given;
        _hypotheses.AddRange(given.SelectMany(group => group).Select(p => new Hypothesis { P = p, Evidence = -p.Value }));
        _run = run;
        _byP = byP;
    }

    public StepDownResult[] Adjust()
    {
        if (_byP)
        {
            foreach (World world in _worlds)
            {
                CountOwn(world);
            }
        }

        // A stable order: ties keep the order in which they were given, and get the same adjusted p. Given p-values may lie below the range of doubles.
        Hypothesis[] ordered = [.. _hypotheses.OrderByDescending(h => h.Evidence).ThenBy(h => h.Resampling is null && _byP ? h.P.Log : 0)];
        for (int k = 0; k < ordered.Length; k++)
        {
            ordered[k].Position = k;
        }

        var shares = new double[ordered.Length];
        foreach (World world in _worlds)
        {
            Join(world, ordered, shares);
        }

        JoinGiven(ordered, shares);
        PValue largest = ordered[0].P;
        for (int k = 0; k < ordered.Length; k++)
        {
            PValue own = OverFamily(ordered, k, shares[k]);
            largest = own > largest ? own : largest;
            ordered[k].Adjusted = largest;
        }

        return [.. _hypotheses.Select(h => new StepDownResult(h.P, h.Adjusted, h.Resampling))];
    }

    /// <summary>Counts for every member of a world the arrangements at least as extreme, which makes its p-value and, for minP, its evidence.</summary>
    private void CountOwn(World world)
    {
        foreach (Hypothesis[] some in Blocks(world.Members, world))
        {
            double[][] columns = Compute(world, some);
            for (int i = 0; i < some.Length; i++)
            {
                some[i].Evidence = -(Count(world, some[i], columns[i]) / (double)world.Columns.Length);
            }
        }
    }

    private void Join(World world, Hypothesis[] ordered, double[] shares)
    {
        Hypothesis[] members = [.. world.Members.OrderByDescending(h => h.Position)];
        double[]? running = null;
        int at = 0;
        foreach (Hypothesis[] some in Blocks(members, world))
        {
            double[][] columns = Compute(world, some);
            if (_byP)
            {
                Parallel.For(0, columns.Length, new ParallelOptions { MaxDegreeOfParallelism = _run.Threads, CancellationToken = _run.Draws.Stop }, i => ToEvidence(columns[i]));
            }

            for (int i = 0; i < some.Length; i++)
            {
                if (!_byP)
                {
                    Count(world, some[i], columns[i]);
                }

                running = running is null ? [.. columns[i]] : Maximum(running, columns[i]);
                at++;
                int first = at < members.Length ? members[at].Position + 1 : 0;
                Ask(running, ordered.AsSpan(first, some[i].Position + 1 - first), shares.AsSpan(first));
            }
        }
    }

    /// <summary>Joins to the shares of some hypotheses how often the running maximum reaches their evidence.</summary>
    private static void Ask(double[] running, ReadOnlySpan<Hypothesis> asked, Span<double> shares)
    {
        double[]? sorted = null;
        if (asked.Length > FewQuestions)
        {
            sorted = [.. running];
            Array.Sort(sorted);
        }

        for (int k = 0; k < asked.Length; k++)
        {
            int reached = sorted is null ? CountFrom(running, asked[k].Evidence) : sorted.Length - FirstFrom(sorted, asked[k].Evidence);
            shares[k] = EitherOf(shares[k], reached / (double)running.Length);
        }
    }

    /// <summary>Given p-values are taken for uniform: of each group, the sum over its later members.</summary>
    private void JoinGiven(Hypothesis[] ordered, double[] shares)
    {
        int next = _hypotheses.Count - _given.Sum(group => group.Count);
        foreach (IReadOnlyList<PValue> group in _given)
        {
            int[] positions = [.. _hypotheses.Skip(next).Take(group.Count).Select(h => h.Position)];
            next += group.Count;
            for (int k = 0; k < ordered.Length; k++)
            {
                shares[k] = EitherOf(shares[k], Math.Min(1, positions.Count(position => position >= k) * ordered[k].P.Value));
            }
        }
    }

    /// <summary>Adds the part of the hypotheses that are not permuted.</summary>
    /// <remarks>Where a given p-value is so small that its double is of few digits or 0, no arrangement reaches it, and the sum over the given ones is formed in logarithms.</remarks>
    private PValue OverFamily(Hypothesis[] ordered, int k, double share)
    {
        PValue p = ordered[k].P;
        if (p.Log > LeastLog)
        {
            return PValue.FromValue(Math.Max(p.Value, Math.Min(1, share + (_run.Others * p.Value))));
        }

        int later = ordered.Skip(k).Count(h => h.Resampling is null);
        return PValue.FromLog(p.Log + Math.Log(later + (double)_run.Others));
    }

    /// <summary>The probability that at least one of two independent events happens; exact where one cannot.</summary>
    private static double EitherOf(double a, double b) => a + (b * (1 - a));

    /// <summary>Counts the arrangements that reach the observed share, which make the p-value.</summary>
    private static int Count(World world, Hypothesis hypothesis, double[] shares)
    {
        int reached = CountFrom(shares, hypothesis.Evidence);
        hypothesis.Resampling = world.Resampling(reached, hypothesis.Set!.Design);
        hypothesis.P = hypothesis.Resampling.P;
        return reached;
    }

    private double[][] Compute(World world, Hypothesis[] some)
    {
        // The columns of the block before are used again: they are the larger part of all memory.
        if (_columns.Length < some.Length || _columns[0].Length != world.Columns.Length)
        {
            _columns = [];
            _columns = [.. some.Select(_ => new double[world.Columns.Length])];
        }

        double[][] columns = _columns[..some.Length];
        world.Columns.Fill([.. some.Select(h => (h.Set!, h.Response!))], columns, _run.Threads, Report, _run.Draws.Stop);
        return columns;
    }

    private void Report(long cells)
    {
        if (_run.Progress is { } progress)
        {
            lock (_reporting)
            {
                progress(_done += cells, _work);
            }
        }
    }

    private static IEnumerable<Hypothesis[]> Blocks(IReadOnlyList<Hypothesis> members, World world) => members.Chunk(Math.Max(1, MostCells / world.Columns.Length));

    /// <summary>Replaces every share by minus its p-value: how many of all arrangements reach it.</summary>
    private static void ToEvidence(double[] shares)
    {
        double[] sortedMemory = ArrayPool<double>.Shared.Rent(shares.Length);
        int[] numbersMemory = ArrayPool<int>.Shared.Rent(shares.Length);
        Span<double> sorted = sortedMemory.AsSpan(0, shares.Length);
        Span<int> numbers = numbersMemory.AsSpan(0, shares.Length);
        for (int i = 0; i < numbers.Length; i++)
        {
            numbers[i] = i;
        }

        shares.CopyTo(sorted);
        sorted.Sort(numbers);
        for (int end = sorted.Length; end > 0;)
        {
            int first = end - 1;
            while (first > 0 && sorted[first - 1] == sorted[end - 1])
            {
                first--;
            }

            double evidence = -((sorted.Length - first) / (double)sorted.Length);
            foreach (int i in numbers[first..end])
            {
                shares[i] = evidence;
            }

            end = first;
        }

        ArrayPool<double>.Shared.Return(sortedMemory);
        ArrayPool<int>.Shared.Return(numbersMemory);
    }

    private static double[] Maximum(double[] running, double[] column)
    {
        for (int i = 0; i < running.Length && i < column.Length; i++)
        {
            running[i] = column[i] > running[i] ? column[i] : running[i];
        }

        return running;
    }

    private static int CountFrom(double[] values, double least)
    {
        int count = 0;
        foreach (double value in values)
        {
            count += value >= least ? 1 : 0;
        }

        return count;
    }

    /// <summary>Where in ascending values those begin that are at least a given one.</summary>
    private static int FirstFrom(double[] sorted, double least)
    {
        (int from, int to) = (0, sorted.Length);
        while (from < to)
        {
            int middle = (from + to) / 2;
            (from, to) = sorted[middle] >= least ? (from, middle) : (middle + 1, to);
        }

        return from;
    }
}
