using System.Numerics;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Permutation;

namespace Campaigns.Statistics.Tests.Permutation;

public sealed class RandomArrangementsTests
{
    /// <summary>Designs on each side of every change of method: listed subsets, subsets member by member, one to eight tables, shuffles.</summary>
    public static TheoryData<int[]> Designs => new(
        [4, 4], [1, 9], [2, 3, 4], [1, 1, 1, 5], [6, 6, 6, 6], [8, 17], [12, 13], [10, 10, 10, 10, 10], [16, 16], [3, 4, 5, 6, 7, 8], [31, 33], [20, 20, 24], [13, 52], [40, 40]);

    [Theory]
    [MemberData(nameof(Designs))]
    public void Counts_of_random_arrangements_agree_with_comparing_each_exactly(int[] sizes)
    {
        // Exact comparison of the very arrangements is not to be had from outside; so of as many, drawn by the framework's own generator: the two shares agree within 4 standard errors of their difference.
        PermutationScores scores = Scores(sizes, seed: 3, spread: 50);
        const int Draws = 20_000;
        long counted = Count(scores, new RandomDraws(11, Draws));
        var random = new Random(17);
        int[] order = [.. Enumerable.Range(0, scores.Design.Count)];
        int expected = 0;
        for (int i = 0; i < Draws; i++)
        {
            random.Shuffle(order);
            expected += scores.IsAsExtreme(order) ? 1 : 0;
        }

        double share = (counted + expected) / (2.0 * Draws);
        Assert.InRange(share, 0.01, 0.99);
        Assert.InRange(counted - expected, -4 * Math.Sqrt(2 * Draws * share * (1 - share)), 4 * Math.Sqrt(2 * Draws * share * (1 - share)));
    }

    [Theory]
    [MemberData(nameof(Designs))]
    public void Threads_and_company_change_no_count(int[] sizes)
    {
        var draws = new RandomDraws(5, (3 * RandomArrangements.DrawsPerPiece) + 77);

        // Some exact in doubles, some too wide for that, some far too wide, with many ties or few.
        PermutationScores[] experiments = [.. Enumerable.Range(0, 11).Select(i => Scores(sizes, i, (i % 4) switch { 0 => 3, 1 => 100_000, 2 => 2_000_000_000_000, _ => 3 }, i % 4 == 3 ? BigInteger.Pow(10, 40) : 1))];
        long[] alone = [.. experiments.Select(e => Count(e, draws))];
        Assert.Equal(alone, Count(experiments, draws));
        Assert.Equal(alone, Count(experiments, draws, 2));
        Assert.Equal(alone[1], Count(experiments[1], draws, 3));
        Assert.Equal(alone[..9], Count(experiments[..9], draws));
        Assert.NotEqual(alone, experiments.Select(e => Count(e, draws with { Seed = 6 })));
    }

    [Fact]
    public void Every_arrangement_is_as_likely_as_any_other()
    {
        // 2 + 2 + 1 values that are powers of two: S tells the arrangement, up to an exchange of the equal groups. Its 15 classes are drawn evenly: count those at least as extreme as each.
        int[] labels = [0, 0, 1, 1, 2];
        const int Draws = 150_000;
        var shares = new List<(long Exact, long Drawn)>();
        foreach (int[] order in Orders(5))
        {
            long[] values = [.. order.Select(i => 1L << (3 * i))];
            var sample = new GroupedSample(values, 0, [.. labels.Select(l => (ushort)l)], 3);
            (long asExtreme, long all) = BruteForce.Count([.. values.Select(v => (BigInteger)v)], labels);
            shares.Add((asExtreme * Draws / all, Count(PermutationScores.Of(sample), new RandomDraws(9, Draws))));
        }

        (long Exact, long Drawn)[] steps = [.. shares.Distinct().OrderBy(s => s.Exact)];
        Assert.Equal(15, steps.Length);
        for (int i = 0; i < steps.Length; i++)
        {
            long drawn = steps[i].Drawn - (i == 0 ? 0 : steps[i - 1].Drawn);
            Assert.InRange(drawn, 10_000 - 400, 10_000 + 400); // 4 standard errors of 97
        }
    }

    [Fact]
    public void Work_can_be_stopped()
    {
        using var stop = new CancellationTokenSource();
        stop.Cancel();
        PermutationScores scores = Scores([6, 6, 6, 6], 1, 100);
        Assert.ThrowsAny<OperationCanceledException>(() => RandomArrangements.CountAsExtreme(scores, RandomDraws.Usual, 1, stop.Token));
        Assert.ThrowsAny<OperationCanceledException>(() => RandomArrangements.CountAsExtreme(scores, RandomDraws.Usual, 2, stop.Token));
    }

    [Fact]
    public void Bad_requests_are_refused()
    {
        PermutationScores scores = Scores([6, 6, 6, 6], 1, 100);
        Assert.Throws<ArgumentOutOfRangeException>(() => Count(scores, new RandomDraws(1, 0)));
        Assert.Throws<ArgumentOutOfRangeException>(() => Count(scores, RandomDraws.Usual, 0));
        Assert.Throws<ArgumentException>(() => Count([scores, Scores([5, 6], 1, 100)], RandomDraws.Usual));
        Assert.Throws<ArgumentException>(() => scores.IsAsExtreme([0, 1]));
        Assert.Empty(Count([], RandomDraws.Usual));
        Assert.Throws<ArgumentException>(() => PermutationScores.Of(new GroupedSample([1L, 2], 0, [0, 2], 2)));
    }

    private static long Count(PermutationScores scores, RandomDraws draws, int threads = 1) =>
        RandomArrangements.CountAsExtreme(scores, draws, threads, TestContext.Current.CancellationToken);

    private static long[] Count(PermutationScores[] experiments, RandomDraws draws, int threads = 1) =>
        RandomArrangements.CountAsExtreme(experiments, draws, threads, TestContext.Current.CancellationToken);

    private static PermutationScores Scores(int[] sizes, int seed, long spread, BigInteger? factor = null)
    {
        var random = new Random(seed);
        ushort[] groups = [.. sizes.SelectMany((n, g) => Enumerable.Repeat((ushort)g, n))];
        BigInteger[] values = [.. groups.Select(_ => ((random.NextInt64(spread) + (BigInteger)random.NextInt64(spread)) * (factor ?? 1)) + random.Next(2))];
        return PermutationScores.Of(new GroupedSample(values, 0, groups, sizes.Length));
    }

    private static IEnumerable<int[]> Orders(int count) =>
        count == 0 ? [[]] : Orders(count - 1).SelectMany(o => Enumerable.Range(0, count).Select(at => (int[])[.. o[..at], count - 1, .. o[at..]]));
}
