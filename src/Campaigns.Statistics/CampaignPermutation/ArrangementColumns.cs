using System.Collections.Concurrent;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Permutation;

namespace Campaigns.Statistics.CampaignPermutation;

/// <summary>Sets whose arrangements are numbered together: either all arrangements of one set, or random draws of several, in each of which every set gets an arrangement of its own. Gives the shares of a response under all of them as a column.</summary>
/// <remarks>
/// Number 0 of draws is the observed arrangement. Draws are cut into pieces, each with its own stream of the seed, and each set has streams of its own: columns do not depend on the number of threads, nor on which are asked for together, so that what does not fit into memory is computed when its turn comes.
/// </remarks>
internal sealed class ArrangementColumns
{
    private const int PlacesInBatch = 1 << 14;

    private readonly IReadOnlyList<SpecimenSet> _sets;
    private readonly RandomDraws? _draws;

    private ArrangementColumns(IReadOnlyList<SpecimenSet> sets, RandomDraws? draws)
    {
        _sets = sets;
        _draws = draws;
        Length = draws is { } random ? random.Count + 1 : (int)sets[0].Design.Distinct!.Value;
    }

    /// <summary>Arrangements: all distinct ones, or the draws and the observed one.</summary>
    public int Length { get; }

    /// <summary>Seed of the draws; null where all arrangements are looked at.</summary>
    public ulong? Seed => _draws?.Seed;

    public static ArrangementColumns AllOf(SpecimenSet set) => new([set], null);

    public static ArrangementColumns Drawn(IReadOnlyList<SpecimenSet> sets, RandomDraws draws) => new(sets, draws);

    /// <summary>Fills columns.</summary>
    /// <param name="wanted">Set and response of each column.</param>
    /// <param name="columns">The columns, of <see cref="Length"/>.</param>
    /// <param name="threads">Threads to work.</param>
    /// <param name="done">Told of every piece how many shares were computed.</param>
    /// <param name="stop">Ends the work after a piece.</param>
    public void Fill(IReadOnlyList<(SpecimenSet Set, ExactResponse Response)> wanted, double[][] columns, int threads, Action<long> done, CancellationToken stop)
    {
        for (int number = 0; number < _sets.Count; number++)
        {
            SpecimenSet set = _sets[number];
            (ExactResponse Response, double[] Column)[] own = [.. wanted.Select((w, i) => (w.Set, w.Response, Column: columns[i])).Where(w => w.Set == set).Select(w => (w.Response, w.Column))];
            if (own.Length > 0)
            {
                var shares = new ShareColumns(set.Design, own);
                InParallel(_draws is { } draws ? Drawn(set, (ulong)number << 32, draws, shares, own.Length) : All(set, shares, own.Length), threads, done, stop);
            }
        }
    }

    private static void InParallel(IEnumerable<Func<long>> pieces, int threads, Action<long> done, CancellationToken stop)
    {
        if (threads == 1)
        {
            foreach (Func<long> piece in pieces)
            {
                stop.ThrowIfCancellationRequested();
                done(piece());
            }

            return;
        }

        // Without buffering: enumerated arrangements are made as they are asked for.
        Parallel.ForEach(
            Partitioner.Create(pieces, EnumerablePartitionerOptions.NoBuffering),
            new ParallelOptions { MaxDegreeOfParallelism = threads, CancellationToken = stop },
            piece => done(piece()));
    }

    private static IEnumerable<Func<long>> Drawn(SpecimenSet set, ulong firstStream, RandomDraws draws, ShareColumns shares, int columns)
    {
        yield return () =>
        {
            shares.Fill(set.Design.Observed, 0);
            return columns;
        };
        for (int drawn = 0; drawn < draws.Count; drawn += RandomArrangements.DrawsPerPiece)
        {
            int from = drawn;
            yield return () =>
            {
                int count = Math.Min(RandomArrangements.DrawsPerPiece, draws.Count - from);
                Draw(set.Design, new RandomNumbers(draws.Seed, firstStream + ((ulong)from / RandomArrangements.DrawsPerPiece)), from + 1, count, shares);
                return (long)columns * count;
            };
        }
    }

    private static void Draw(ArrangedDesign design, RandomNumbers random, int start, int count, ShareColumns shares)
    {
        int places = design.Count;
        var orders = new int[Batch(places, count) * places];
        int[] order = [.. design.Observed];
        for (int done = 0; done < count;)
        {
            int batch = Math.Min(orders.Length / places, count - done);
            for (int i = 0; i < batch; i++)
            {
                design.Shuffle(order, ref random);
                order.CopyTo(orders, i * places);
            }

            shares.Fill(orders.AsSpan(0, batch * places), start + done);
            done += batch;
        }
    }

    private static IEnumerable<Func<long>> All(SpecimenSet set, ShareColumns shares, int columns)
    {
        int places = set.Count;
        int most = Batch(places, RandomArrangements.DrawsPerPiece) * places;
        int[] orders = new int[most];
        int filled = 0;
        int start = 0;
        foreach (int[] order in set.Design.All())
        {
            order.CopyTo(orders, filled);
            filled += places;
            if (filled == most)
            {
                yield return Piece(orders, filled, start);
                start += filled / places;
                filled = 0;
                orders = new int[most];
            }
        }

        yield return Piece(orders, filled, start);

        Func<long> Piece(int[] batch, int length, int from) => () =>
        {
            shares.Fill(batch.AsSpan(0, length), from);
            return (long)columns * (length / places);
        };
    }

    private static int Batch(int places, int count) => Math.Clamp(PlacesInBatch / places, 1, count);
}
