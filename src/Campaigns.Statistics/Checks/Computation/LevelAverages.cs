namespace Campaigns.Statistics.Checks.Computation;

/// <summary>The projector P on the averages of a factor's levels.</summary>
internal sealed class LevelAverages
{
    public LevelAverages(ReadOnlySpan<int> levels)
    {
        int n = levels.Length;
        long[] counts = RunNeighbours.Counts(levels);
        var products = new Dictionary<(int, int), long>();
        var squares = new long[counts.Length];
        for (int i = 0; i < n; i++)
        {
            int level = levels[i];
            int before = i > 0 ? levels[i - 1] : -1;
            int after = i < n - 1 ? levels[i + 1] : -1;

            // Row i of A times the indicators of the levels that meet there.
            int own = RunNeighbours.Degree(i, n) - (before == level ? 1 : 0) - (after == level ? 1 : 0);
            squares[level] += own * own;
            Add(products, level, level, own);
            if (before >= 0 && before != level)
            {
                int entry = after == before ? -2 : -1;
                squares[before] += entry * entry;
                Add(products, level, before, entry);
            }

            if (after >= 0 && after != level && after != before)
            {
                squares[after]++;
                Add(products, level, after, -1);
            }
        }

        Levels = counts.Count(c => c > 0);
        foreach (((int a, int b), long product) in products)
        {
            double share = (double)product / counts[a];
            Trace += a == b ? share : 0;
            SquareTrace += share * product / counts[b];
        }

        for (int level = 0; level < counts.Length; level++)
        {
            TraceOfSquare += counts[level] > 0 ? (double)squares[level] / counts[level] : 0;
        }
    }

    public int Levels { get; }

    /// <summary>tr(PA).</summary>
    public double Trace { get; }

    /// <summary>tr(PA^2).</summary>
    public double TraceOfSquare { get; }

    /// <summary>tr(PAPA).</summary>
    public double SquareTrace { get; }

    private static void Add(Dictionary<(int, int), long> products, int a, int b, int entry) =>
        products[(a, b)] = products.GetValueOrDefault((a, b)) + entry;
}
