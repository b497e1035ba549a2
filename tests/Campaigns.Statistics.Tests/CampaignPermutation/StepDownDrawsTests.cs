using System.Numerics;
using Campaigns.Statistics.CampaignPermutation;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Permutation;

namespace Campaigns.Statistics.Tests.CampaignPermutation;

/// <summary>Random arrangements: the definitions written out over the arrangements that a seed gives.</summary>
public sealed class StepDownDrawsTests
{
    private const ulong Seed = 20261201;

    // More than a million distinct arrangements, so that they are drawn.
    private static readonly int[] Groups = [.. Enumerable.Range(0, 18).Select(i => i < 4 ? 0 : i < 9 ? 1 : 2)];

    [Theory]
    [InlineData(false, 9)]
    [InlineData(true, 9)]
    [InlineData(false, 1_000_000_000_000_000)]
    [InlineData(true, 1_000_000_000_000_000)]
    public void Drawn_arrangements_are_counted_as_the_definitions_say(bool byP, long range)
    {
        // 300 draws of values from few numbers (ties everywhere) and of values with 15 digits, two responses alike.
        BigInteger[][] values = Responses(6, range);
        values[5] = [.. values[2].Select(v => (3 * v) - 7)];
        var run = new PermutationRun(new RandomDraws(Seed, 300));
        SpecimenSet set = SetBuilder.Set(Groups, values);
        StepDownResult[] results = byP ? StepDownPermutation.MinP([set], run) : StepDownPermutation.MaxT([set], run);

        int[] expected = StepDownOracle.Adjust(values, [Groups, .. Draws(300)], byP);
        Assert.Equal(expected.Select(c => c / 301.0), results.Select(r => r.AdjustedP.Value));
        Assert.All(results, r => Assert.Equal((300L, Seed), (r.Resampling!.Arrangements, r.Resampling.Seed)));
        Assert.Equal(results[2], results[5]);
    }

    [Fact]
    public void Threads_change_nothing()
    {
        SpecimenSet[] sets = [SetBuilder.Set(Groups, Responses(9, 30)), SetBuilder.Set([.. Groups.Reverse()], Responses(3, 1_000_000_000_000_000))];
        var run = new PermutationRun(new RandomDraws(Seed, 5000));
        Assert.Equal(StepDownPermutation.MaxT(sets, run), StepDownPermutation.MaxT(sets, run with { Threads = 2 }));
        Assert.Equal(StepDownPermutation.MinP(sets, run), StepDownPermutation.MinP(sets, run with { Threads = 2 }));

        SpecimenSet few = SetBuilder.Set([0, 0, 0, 0, 0, 1, 1, 1, 1, 1, 2, 2, 2], [.. Responses(9, 30).Select(r => r[..13])]);
        Assert.True(few.IsEnumerable);
        Assert.Equal(StepDownPermutation.MaxT([few], run), StepDownPermutation.MaxT([few], run with { Threads = 2 }));
        Assert.Equal(StepDownPermutation.MinP([few], run), StepDownPermutation.MinP([few], run with { Threads = 2 }));
    }

    [Fact]
    public void Columns_that_do_not_fit_into_memory_together_give_the_same()
    {
        // 8 columns of 2,000,001 fit, 9 do not. A copy of the last response in order changes nothing for the others.
        BigInteger[][] values = Responses(8, 1000);
        var run = new PermutationRun(new RandomDraws(Seed, 2_000_000)) { Threads = 2 };
        StepDownResult[] eight = StepDownPermutation.MaxT([SetBuilder.Set(Groups, values)], run);
        int last = Enumerable.Range(0, 8).MaxBy(j => eight[j].P.Value);
        StepDownResult[] nine = StepDownPermutation.MaxT([SetBuilder.Set(Groups, [.. values, values[last]])], run);
        Assert.Equal([.. eight, eight[last]], nine);
    }

    [Fact]
    public void Draws_come_near_the_exact_law()
    {
        // All arrangements of two sets are joined by a product; drawing both sets in each draw must come to the same. The third set makes the program draw and is far from extreme.
        SpecimenSet[] few = [SetBuilder.Set([0, 0, 0, 0, 1, 1, 1, 1], SetBuilder.Whole(1, 2, 3, 4, 5, 6, 7, 9), SetBuilder.Whole(4, 1, 3, 2, 5, 9, 2, 6)), SetBuilder.Set([0, 0, 0, 1, 1, 1, 1, 1], SetBuilder.Whole(9, 8, 8, 1, 2, 3, 4, 5))];
        StepDownResult[] exact = StepDownPermutation.MinP(few, default);
        int[] many = [.. Enumerable.Range(0, 40).Select(i => i % 2)];
        SpecimenSet dull = SetBuilder.Set(many, [.. many.Select((g, i) => (BigInteger)(i / 2 * (i / 2)))]);
        StepDownResult[] drawn = StepDownPermutation.MinP([.. few, dull], new PermutationRun(new RandomDraws(Seed, 200_000)));
        Assert.Equal(1, drawn[3].P.Value);

        // The dull response joins every minimum: what it adds to a share s at p = x is (1 - s) x.
        for (int i = 0; i < exact.Length; i++)
        {
            Assert.Equal(exact[i].P.Value, drawn[i].P.Value, 0.004);
        }

        double first = exact[0].AdjustedP.Value + ((1 - exact[0].AdjustedP.Value) * exact[0].P.Value);
        Assert.Equal(first, drawn[0].AdjustedP.Value, 0.005);
    }

    [Fact]
    public void Work_stops_when_it_is_asked_to_and_says_how_far_it_is()
    {
        SpecimenSet set = SetBuilder.Set(Groups, Responses(5, 100));
        using var source = new CancellationTokenSource();
        var reports = new List<(long Done, long Total)>();
        var run = new PermutationRun(new RandomDraws(Seed, 10_000) { Stop = source.Token }) { Progress = (done, total) => reports.Add((done, total)) };
        StepDownPermutation.MinP([set], run);
        Assert.True(reports.Count > 10);
        Assert.Equal((2 * 5 * 10_001L, 2 * 5 * 10_001L), reports[^1]);

        source.Cancel();
        Assert.ThrowsAny<OperationCanceledException>(() => StepDownPermutation.MaxT([set], run));
        Assert.ThrowsAny<OperationCanceledException>(() => StepDownPermutation.MinP([set], run with { Threads = 2 }));
    }

    /// <summary>Group of every unit in the first draws of the seed: Fisher and Yates's shuffle of units that stand group by group, the smallest first, without the places of the largest group.</summary>
    private static List<int[]> Draws(int count)
    {
        int[] order = [.. Enumerable.Range(0, Groups.Length)];
        var random = new RandomNumbers(Seed, 0);
        var drawn = new List<int[]>();
        for (int draw = 0; draw < count; draw++)
        {
            for (int i = 0; i < 9; i++)
            {
                int other = i + (int)random.Below((uint)(order.Length - i));
                (order[i], order[other]) = (order[other], order[i]);
            }

            var labels = new int[order.Length];
            for (int place = 0; place < order.Length; place++)
            {
                labels[order[place]] = Groups[place];
            }

            drawn.Add(labels);
        }

        return drawn;
    }

    private static BigInteger[][] Responses(int count, long range)
    {
        var random = new Random(7);
        return [.. Enumerable.Range(0, count).Select(j => Groups.Select(g => (BigInteger)random.NextInt64(range) + (j == 1 ? g * range / 3 : 0)).ToArray())];
    }
}
