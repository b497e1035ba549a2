namespace Campaigns.Statistics.CampaignPermutation;

/// <summary>Which arrangements of specimens over groups there are: places group by group, and the specimens that may change places with each other.</summary>
/// <remarks>An arrangement is written as the specimen at every place. Groups stand in ascending order of size, so that the last, whose sums follow from the totals, is the largest. With blocks, specimens change places within their block only.</remarks>
internal sealed class ArrangedDesign
{
    /// <summary>Up to this many distinct arrangements, all are looked at.</summary>
    public const long MostEnumerated = 1_000_000;

    private readonly int[] _blockOf;
    private readonly int[] _groupOf;
    private readonly int[][] _places;
    private readonly int[] _chosen;
    private readonly int[] _alike;

    /// <param name="groups">For each specimen its group, numbered in any way.</param>
    /// <param name="blocks">For each specimen its block, 0 and up; empty where specimens change places freely.</param>
    public ArrangedDesign(ReadOnlySpan<ushort> groups, ReadOnlySpan<int> blocks)
    {
        ushort[] observed = groups.ToArray();
        ushort[] labels = [.. observed.GroupBy(g => g).OrderBy(g => g.Count()).ThenBy(g => g.Key).Select(g => g.Key)];
        _groupOf = [.. observed.Select(g => Array.IndexOf(labels, g))];
        _blockOf = blocks.IsEmpty ? new int[observed.Length] : blocks.ToArray();
        Sizes = new int[labels.Length];
        Cells = [.. Enumerable.Range(0, _blockOf.Max() + 1).Select(_ => new int[labels.Length])];
        for (int i = 0; i < observed.Length; i++)
        {
            Sizes[_groupOf[i]]++;
            Cells[_blockOf[i]][_groupOf[i]]++;
        }

        Observed = [.. Enumerable.Range(0, observed.Length).OrderBy(i => _groupOf[i]).ThenBy(i => i)];
        _places = [.. Cells.Select((_, block) => Enumerable.Range(0, Count).Where(place => _blockOf[Observed[place]] == block).ToArray())];
        _chosen = [.. Cells.Select(cell => cell.Sum() - cell[^1])];
        _alike = [.. Sizes.Select((_, g) => Enumerable.Range(0, g).LastOrDefault(before => Cells.All(cell => cell[before] == cell[g]), -1))];
        Arrangements = CountAll();
    }

    /// <summary>Specimens.</summary>
    public int Count => _groupOf.Length;

    /// <summary>Specimens of each group, ascending.</summary>
    public int[] Sizes { get; }

    /// <summary>For each block the specimens of each group.</summary>
    public int[][] Cells { get; }

    /// <summary>For each specimen its block; all 0 without blocks.</summary>
    public ReadOnlySpan<int> Blocks => _blockOf;

    /// <summary>The observed arrangement.</summary>
    public int[] Observed { get; }

    /// <summary>All arrangements; null above 2^63 - 1.</summary>
    public long? Arrangements { get; }

    /// <summary>Arrangements that differ by more than an exchange of whole groups that stand alike in every block, which changes no share; null where <see cref="Arrangements"/> is.</summary>
    public long? Distinct => Arrangements / Exchanges();

    /// <summary>Whether all arrangements can be looked at.</summary>
    public bool IsEnumerable => Distinct <= MostEnumerated;

    /// <summary>Moves on to the next random arrangement: Fisher and Yates's shuffle within every block, without the places of the largest group, which takes the rest.</summary>
    public void Shuffle(Span<int> order, ref Permutation.RandomNumbers random)
    {
        for (int block = 0; block < _places.Length; block++)
        {
            int[] places = _places[block];
            for (int i = 0; i < _chosen[block]; i++)
            {
                int other = i + (int)random.Below((uint)(places.Length - i));
                (order[places[i]], order[places[other]]) = (order[places[other]], order[places[i]]);
            }
        }
    }

    /// <summary>Goes through all distinct arrangements, each named by the one in which groups that stand alike come in order.</summary>
    /// <returns>The same array again and again: read it before moving on.</returns>
    public IEnumerable<int[]> All()
    {
        int[] units = [.. Enumerable.Range(0, Count).OrderBy(i => _blockOf[i]).ThenBy(i => i)];
        int[][] free = [.. Cells.Select(cell => cell.ToArray())];
        int[] next = Starts();
        int[] starts = Starts();
        var order = new int[Count];
        var choice = new int[Count + 1];
        Array.Fill(choice, -1);
        for (int depth = 0; depth >= 0;)
        {
            if (depth == Count)
            {
                yield return order;
                depth--;
                continue;
            }

            int unit = units[depth];
            int[] left = free[_blockOf[unit]];
            int group = choice[depth];
            if (group >= 0)
            {
                next[group]--;
                left[group]++;
            }

            do
            {
                group++;
            }
            while (group < left.Length && (left[group] == 0 || IsOutOfTurn(group, next, starts)));
            choice[depth] = group < left.Length ? group : -1;
            if (group == left.Length)
            {
                depth--;
                continue;
            }

            left[group]--;
            order[next[group]++] = unit;
            depth++;
        }
    }

    /// <summary>Whether a group that nobody is in yet would come before one that stands alike.</summary>
    private bool IsOutOfTurn(int group, int[] next, int[] starts) =>
        _alike[group] >= 0 && next[group] == starts[group] && next[_alike[group]] == starts[_alike[group]];

    private int[] Starts()
    {
        var starts = new int[Sizes.Length];
        for (int g = 1; g < starts.Length; g++)
        {
            starts[g] = starts[g - 1] + Sizes[g - 1];
        }

        return starts;
    }

    /// <summary>Ways to exchange groups that stand alike; it divides the number of arrangements, so it fits where that does.</summary>
    private long Exchanges()
    {
        long ways = 1;
        var run = new int[_alike.Length];
        for (int g = 0; g < _alike.Length && Arrangements is not null; g++)
        {
            run[g] = _alike[g] < 0 ? 1 : run[_alike[g]] + 1;
            ways *= run[g];
        }

        return ways;
    }

    private long? CountAll()
    {
        UInt128 ways = 1;
        foreach (int[] cell in Cells)
        {
            int[] filled = [.. cell.Where(n => n > 0)];
            long? own = filled.Length < 2 ? 1 : Permutation.PermutationDesign.Of(filled).Arrangements;
            ways *= (UInt128)(own ?? 0);
            if (own is null || ways > long.MaxValue)
            {
                return null;
            }
        }

        return (long)ways;
    }
}
