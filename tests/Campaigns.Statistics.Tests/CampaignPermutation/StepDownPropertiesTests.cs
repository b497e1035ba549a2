using System.Numerics;
using Campaigns.Statistics.CampaignPermutation;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.CampaignPermutation;

public sealed class StepDownPropertiesTests
{
    private static readonly PermutationRun Nothing = new(RandomDraws.Usual);

    [Fact]
    public void One_response_gets_the_p_of_the_permutation_test_whatever_its_digits()
    {
        int[] groups = [0, 0, 0, 0, 1, 1, 1, 2, 2, 2];
        string[][] experiments =
        [
            ["1", "2", "3", "2", "3", "4", "4", "5", "4", "6"],
            ["1e-300", "2e-300", "3e-300", "0", "1e-300", "4e-300", "4e-300", "5e-301", "1e-300", "6e-300"],
            ["1e300", "2e300", "3e300", "0", "1e300", "4e300", "4e300", "5e299", "1.5e300", "6e300"],
            ["1000000000000.1", "1000000000000.2", "1000000000000.3", "1000000000000.1", "1000000000000.4", "1000000000000.5", "1000000000000.4", "1000000000000.1", "1000000000000.2", "1000000000000.2"],
            ["0.123456789012345", "0.2", "0.3", "0.123456789012346", "0.7", "0.9", "0.5", "0.2", "0.55", "0.31"],
        ];
        foreach (string[] typed in experiments)
        {
            (BigInteger Mantissa, int Exponent)[] decimals = [.. typed.Select(TypedSample.ExactDecimal)];
            int lowest = decimals.Min(d => d.Exponent);
            BigInteger[] values = [.. decimals.Select(d => d.Mantissa * BigInteger.Pow(10, d.Exponent - lowest))];
            ushort[] labels = [.. groups.Select(g => (ushort)g)];
            var tested = (Tested)new PermutationTest().Test(new GroupedSample(values, -lowest, labels, 3), RandomDraws.Usual);
            StepDownResult result = StepDownPermutation.MaxT([SetBuilder.Set(groups, values)], Nothing)[0];
            Assert.Equal(tested.P, result.P);
            Assert.Equal(tested.P, result.AdjustedP);
            Assert.Equal(tested.Resampling, result.Resampling);
            Assert.Equal(tested.P, StepDownPermutation.MinP([SetBuilder.Set(groups, values)], Nothing)[0].AdjustedP);
        }
    }

    [Fact]
    public void Shares_that_no_double_tells_apart_count_as_equal_which_only_makes_p_larger()
    {
        // 600 decades in one experiment: the permutation test tells arrangements apart that differ in the 600th digit.
        int[] groups = [0, 0, 0, 0, 1, 1, 1, 2, 2, 2];
        BigInteger huge = BigInteger.Pow(10, 600);
        BigInteger[] values = [1, 2, 30 * huge, 0, 10 * huge, 40 * huge, 40 * huge, 5 * huge, 1, 6];
        ushort[] labels = [.. groups.Select(g => (ushort)g)];
        var tested = (Tested)new PermutationTest().Test(new GroupedSample(values, 0, labels, 3), RandomDraws.Usual);
        StepDownResult result = StepDownPermutation.MaxT([SetBuilder.Set(groups, values)], Nothing)[0];
        Assert.InRange(result.P.Value, tested.P.Value, tested.P.Value + 0.001);
    }

    [Fact]
    public void The_rest_of_the_family_is_granted_p_each()
    {
        SpecimenSet set = SetBuilder.Set([0, 0, 0, 0, 1, 1, 1, 1], SetBuilder.Whole(1, 2, 3, 4, 11, 12, 13, 15), SetBuilder.Whole(1, 5, 3, 4, 6, 2, 7, 8));
        StepDownResult[] alone = StepDownPermutation.MinP([set], Nothing);
        StepDownResult[] waiting = StepDownPermutation.MinP([set], Nothing with { Others = 3 });
        Assert.Equal(alone[0].AdjustedP.Value + (3 * alone[0].P.Value), waiting[0].AdjustedP.Value, 1e-15);
        Assert.Equal(alone[0].P, waiting[0].P);
        Assert.Equal(1, StepDownPermutation.MinP([set], Nothing with { Others = 1000 })[1].AdjustedP.Value);
    }

    [Fact]
    public void Who_waits_costs_more_than_who_has_come()
    {
        // What minP rejects while others wait, it rejects when they have come, whatever they bring.
        var random = new Random(11);
        int[] groups = [0, 0, 0, 0, 1, 1, 1, 1];
        for (int trial = 0; trial < 50; trial++)
        {
            BigInteger[][] values = [.. Enumerable.Range(0, 5).Select(_ => groups.Select(g => (BigInteger)(random.Next(7) + (g * random.Next(8)))).ToArray())];
            if (values.Any(v => v.Distinct().Count() == 1))
            {
                continue;
            }

            StepDownResult[] first = StepDownPermutation.MinP([SetBuilder.Set(groups, values[..2])], Nothing with { Others = 3 });
            StepDownResult[] all = StepDownPermutation.MinP([SetBuilder.Set(groups, values)], Nothing);
            Assert.True(first[0].AdjustedP >= all[0].AdjustedP && first[1].AdjustedP >= all[1].AdjustedP);
        }
    }

    [Fact]
    public void Given_p_values_below_the_range_of_doubles_stay_above_0_and_in_order()
    {
        IReadOnlyList<PValue>[] given = [[PValue.FromLog(-2000)], [PValue.FromLog(-1000), PValue.FromValue(0.5)]];
        SpecimenSet set = SetBuilder.Set([0, 0, 1, 1], SetBuilder.Whole(1, 2, 3, 4));
        StepDownResult[] results = StepDownPermutation.ExactMinP([set], given, Nothing with { Others = 2 });
        Assert.Equal(-2000 + Math.Log(5), results[1].AdjustedP.Log, 1e-9);
        Assert.Equal(-1000 + Math.Log(4), results[2].AdjustedP.Log, 1e-9);
        Assert.True(results[0].AdjustedP >= results[0].P);
    }

    [Fact]
    public void The_order_of_responses_and_a_change_of_units_change_nothing()
    {
        int[] groups = [0, 0, 0, 1, 1, 1, 2, 2];
        BigInteger[][] values = [SetBuilder.Whole(3, 1, 4, 1, 5, 9, 2, 6), SetBuilder.Whole(1, 1, 2, 5, 6, 6, 9, 9), SetBuilder.Whole(2, 7, 1, 8, 2, 8, 1, 8)];
        StepDownResult[] plain = StepDownPermutation.MaxT([SetBuilder.Set(groups, values)], Nothing);
        StepDownResult[] other = StepDownPermutation.MaxT([SetBuilder.Set(groups, [.. values.Reverse().Select(r => r.Select(v => (v * 1000) + BigInteger.Pow(10, 40)).ToArray())])], Nothing);
        Assert.Equal(plain, other.Reverse());
    }

    [Fact]
    public void The_familywise_error_rate_is_held_where_some_hypotheses_are_false()
    {
        // Three true hypotheses with correlated responses beside two false ones, 10 units; 0.05 plus three standard errors of 600 campaigns is 0.077.
        var random = new Random(99);
        int[] groups = [0, 0, 0, 0, 0, 1, 1, 1, 1, 1];
        int falseMaxT = 0;
        int falseMinP = 0;
        int found = 0;
        const int campaigns = 600;
        for (int c = 0; c < campaigns; c++)
        {
            double[] common = [.. groups.Select(_ => Normal(random))];
            BigInteger[][] values = [.. Enumerable.Range(0, 5).Select(j => groups.Select((g, i) => (BigInteger)Math.Round(1000 * (common[i] + Normal(random) + (j >= 3 ? 4 * g : 0)))).ToArray())];
            SpecimenSet set = SetBuilder.Set(groups, values);
            StepDownResult[] maxT = StepDownPermutation.MaxT([set], Nothing);
            falseMaxT += maxT.Take(3).Any(r => r.AdjustedP.Value <= 0.05) ? 1 : 0;
            falseMinP += StepDownPermutation.MinP([set], Nothing).Take(3).Any(r => r.AdjustedP.Value <= 0.05) ? 1 : 0;
            found += maxT.Skip(3).Count(r => r.AdjustedP.Value <= 0.05);
        }

        Assert.InRange(falseMaxT / (double)campaigns, 0.005, 0.077);
        Assert.InRange(falseMinP / (double)campaigns, 0.005, 0.077);
        Assert.True(found > campaigns);
    }

    [Fact]
    public void What_cannot_be_permuted_is_refused()
    {
        Assert.Throws<ArgumentException>(() => StepDownPermutation.MaxT([], Nothing));
        Assert.Throws<ArgumentException>(() => StepDownPermutation.MaxT([SetBuilder.Set([0, 0, 1, 1])], Nothing));
        Assert.Throws<ArgumentException>(() => SetBuilder.Set([0, 0, 0, 0], SetBuilder.Whole(1, 2, 3, 4)));
        Assert.Throws<ArgumentException>(() => SetBuilder.Set([0, 0, 1, 1], SetBuilder.Whole(3, 3, 3, 3)));
        Assert.Throws<ArgumentException>(() => SetBuilder.Set([0, 1, 0, 1], [], (SetBuilder.Whole(1, 2, 3, 4), PermutedStatistic.WithinBlocks)));
        Assert.Throws<ArgumentException>(() => SetBuilder.Set([0, 1, 0, 1], [0, 0, 1, 1], (SetBuilder.Whole(1, 1, 4, 4), PermutedStatistic.WithinBlocks)));
        Assert.Throws<ArgumentException>(() => SetBuilder.Set([0, 1, 0, 1], [0, 0, -1, 0], (SetBuilder.Whole(1, 1, 4, 4), PermutedStatistic.Values)));
        Assert.Throws<ArgumentException>(() => SetBuilder.Set([0, 1, 0, 1], [0, 0, 2, 2], (SetBuilder.Whole(1, 2, 4, 4), PermutedStatistic.Values)));
        int[] many = [.. Enumerable.Range(0, 40).Select(i => i % 2)];
        SpecimenSet drawn = SetBuilder.Set(many, [.. many.Select((g, i) => (BigInteger)i)]);
        Assert.Throws<ArgumentException>(() => StepDownPermutation.ExactMinP([drawn], [], Nothing));
        Assert.Throws<ArgumentException>(() => StepDownPermutation.MaxT([drawn], new PermutationRun(new RandomDraws(1, PermutationRun.MostDraws + 1))));
        Assert.Throws<ArgumentOutOfRangeException>(() => new PermutationRun(RandomDraws.Usual) { Threads = 0 });
    }

    private static double Normal(Random random) => Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());
}
