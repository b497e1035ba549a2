using System.Numerics;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;
using Campaigns.Statistics.Units;

namespace Campaigns.Statistics.Tests.Units;

/// <summary>Several readings of a specimen against exact fractions (blocks.py).</summary>
public sealed class SpecimenMeansTests
{
    private static readonly Dictionary<string, DesignedSample> Data = DesignedSample.Read("experiment/specimens_data.csv", blocks: false);

    public static TheoryData<string> Experiments => [.. Data.Keys];

    [Theory]
    [MemberData(nameof(Experiments))]
    public void The_means_of_specimens_are_tested(string name)
    {
        ReferenceRow expected = ReferenceTable.Read("experiment/specimens_exact.csv").Rows.Single(r => r.Text("experiment") == name);
        Tested tested = Assert.IsType<Tested>(ExperimentalUnits.Test(new FTest(), Data[name].Sample, RandomDraws.Usual));
        Assert.Equal(expected.Integer("n"), tested.ObservationCount);
        Assert.Equal(expected.Integer("specimens"), tested.SpecimenCount);
        Assert.Equal((expected.Number("df1"), expected.Number("df2")), (tested.Df1, tested.Df2));
        Relative.AssertNear(expected.Number("f_of_means"), tested.Statistic, 2.3e-16, name + " F");
        Relative.AssertNear(expected.Number("log_p"), tested.P.Log, 1e-13, name + " ln p");
        Assert.Equal(tested, ExperimentalUnits.Test(new FTest(), Data[name].Wide, RandomDraws.Usual));
        Assert.Equal(tested, ExperimentalUnits.Test(new FTest(), Data[name].Shuffled(3).Sample, RandomDraws.Usual));
    }

    [Theory]
    [MemberData(nameof(Experiments))]
    public void The_variation_of_specimens_and_readings_is_that_of_exact_fractions(string name)
    {
        ReferenceRow expected = ReferenceTable.Read("experiment/specimens_exact.csv").Rows.Single(r => r.Text("experiment") == name);
        SpecimenVariation variation = SpecimenVariation.Of(Data[name].Sample)!;
        Assert.Equal(variation, SpecimenVariation.Of(Data[name].Wide));
        Assert.Equal((expected.Integer("specimens"), expected.Integer("n"), 0), (variation.SpecimenCount, variation.ReadingCount, variation.UnmarkedCount));
        Assert.Equal((expected.Integer("fewest"), expected.Integer("most")), (variation.FewestReadings, variation.MostReadings));
        Assert.Equal((expected.Integer("df_between"), expected.Integer("df_within")), (variation.BetweenSpecimens.DegreesOfFreedom, variation.WithinSpecimens.DegreesOfFreedom));
        Relative.AssertNear(expected.Number("ss_between"), variation.BetweenSpecimens.SumOfSquares, 2.3e-16, name + " between");
        Relative.AssertNear(expected.Number("ss_within"), variation.WithinSpecimens.SumOfSquares, 2.3e-16, name + " within");
        Relative.AssertNear(expected.Number("raw_component"), variation.RawComponent!.Value, 1e-15, name + " component");
        Assert.Equal(Math.Max(0, variation.RawComponent.Value), variation.Component);
    }

    [Fact]
    public void A_component_below_zero_is_shown_as_zero_and_kept_as_it_is()
    {
        // Two specimens a group with equal means and readings 1 apart: MSB = 0, MSW = 1/2, n0 = 2.
        SpecimenVariation variation = SpecimenVariation.Of(new GroupedSample([1L, 2, 2, 1, 4, 5, 5, 4], 0, [0, 0, 0, 0, 1, 1, 1, 1], 2) { Specimens = [0, 0, 1, 1, 2, 2, 3, 3] })!;
        Assert.Equal((-0.25, 0, 0.5), (variation.RawComponent, variation.Component, variation.ReadingComponent));
    }

    [Fact]
    public void One_specimen_a_group_leaves_no_component()
    {
        SpecimenVariation variation = SpecimenVariation.Of(new GroupedSample([1L, 2, 4, 5], 0, [0, 0, 1, 1], 2) { Specimens = [0, 0, 1, 1] })!;
        Assert.Equal(new VariationLine(0, 0, 0), variation.BetweenSpecimens);
        Assert.Null(variation.RawComponent);
        Assert.Null(variation.Component);
        TestOutcome outcome = ExperimentalUnits.Test(new FTest(), new GroupedSample([1L, 2, 4, 5], 0, [0, 0, 1, 1], 2) { Specimens = [0, 0, 1, 1] }, RandomDraws.Usual);
        Assert.Equal(NotTestableReason.NoReplication, Assert.IsType<NotTestable>(outcome).Reason);
    }

    [Fact]
    public void Readings_without_a_specimen_stand_for_themselves()
    {
        var sample = new GroupedSample([10L, 14, 11, 20, 26, 21], 1, [0, 0, 0, 1, 1, 1], 2) { Specimens = [5, 5, -1, 9, -1, -1] };
        SpecimenMeans means = SpecimenMeans.Of(sample)!;
        Assert.Equal([2, 1, 1, 1, 1], means.ReadingCounts);
        Assert.Equal([24, 22, 40, 52, 42], means.Sample.Mantissas.ToArray());
        Assert.Equal((BigInteger)2, means.Sample.Divisor);
        Assert.Equal([0, 0, 1, 1, 1], means.Sample.Groups.ToArray());
        Assert.Equal(3, SpecimenVariation.Of(sample)!.UnmarkedCount);
    }

    [Fact]
    public void Nothing_is_averaged_where_no_specimen_is_read_twice()
    {
        Assert.Null(SpecimenMeans.Of(new GroupedSample([1L, 2], 0, [0, 1], 2)));
        Assert.Null(SpecimenMeans.Of(new GroupedSample([1L, 2, 3], 0, [0, 1, 1], 2) { Specimens = [3, 4, -1] }));
        Assert.Null(SpecimenVariation.Of(new GroupedSample([1L, 2, 3], 0, [0, 1, 1], 2) { Specimens = [3, 4, -1] }));
        TestOutcome outcome = ExperimentalUnits.Test(new FTest(), new GroupedSample([1L, 2, 3], 0, [0, 1, 1], 2) { Specimens = [3, 4, -1] }, RandomDraws.Usual);
        Assert.Equal(3, outcome.SpecimenCount);
        Assert.Null(outcome.Specimens);
    }

    [Fact]
    public void Blocks_and_run_order_come_along()
    {
        SpecimenMeans means = SpecimenMeans.Of(new GroupedSample([1L, 3, 5, 6, 8], 0, [0, 0, 1, 1, 1], 2) { Specimens = [0, 0, 1, 1, 2], Blocks = [4, 4, 5, -1, 6], Orders = [9, 7, 1, 2, 3] })!;
        Assert.False(means.InSeveralBlocks);
        Assert.Equal([4, -1, 6], means.Sample.Blocks.ToArray());
        Assert.Equal([7L, 1, 3], means.Sample.Orders.ToArray());
        SpecimenMeans plain = SpecimenMeans.Of(new GroupedSample([1L, 3, 5], 0, [0, 0, 1], 2) { Specimens = [0, 0, 1] })!;
        Assert.True(plain.Sample.Blocks.IsEmpty);
        Assert.True(plain.Sample.Orders.IsEmpty);
    }

    [Fact]
    public void A_specimen_in_two_groups_is_a_reason_and_one_in_two_blocks_where_blocks_are_used()
    {
        var twoGroups = new GroupedSample([1L, 2, 3, 4, 6], 0, [0, 1, 0, 0, 0], 2) { Specimens = [0, 0, 1, 1, 2] };
        NotTestable refused = Assert.IsType<NotTestable>(ExperimentalUnits.Test(new FTest(), twoGroups, RandomDraws.Usual));
        Assert.Equal((NotTestableReason.SpecimenInSeveralGroups, 2, 5, 3), (refused.Reason, refused.GroupCount, refused.ObservationCount, refused.SpecimenCount));
        Assert.Null(refused.Specimens);

        var twoBlocks = new GroupedSample([1L, 2, 3, 4, 6, 9, 7, 3], 0, [0, 0, 0, 0, 1, 1, 1, 1], 2) { Specimens = [0, 0, 1, 1, 2, 2, 3, 3], Blocks = [0, 1, 1, 1, 0, 0, 1, 1] };
        Assert.Equal(NotTestableReason.SpecimenInSeveralBlocks, Assert.IsType<NotTestable>(ExperimentalUnits.Test(new BlockFTest(), twoBlocks, RandomDraws.Usual)).Reason);
        Assert.IsType<Tested>(ExperimentalUnits.Test(new FTest(), twoBlocks, RandomDraws.Usual));
    }

    [Fact]
    public void Specimens_are_tested_within_their_blocks()
    {
        // Two readings a specimen, the pair of means of each block 1, 3, 2 apart: t = 2/(1/sqrt(3)), F = t^2 = 12.
        long[] values = [0, 2, 1, 3, 10, 10, 14, 12, 5, 7, 9, 7];
        var sample = new GroupedSample(values, 0, [0, 0, 1, 1, 0, 0, 1, 1, 0, 0, 1, 1], 2) { Specimens = [0, 0, 1, 1, 2, 2, 3, 3, 4, 4, 5, 5], Blocks = [0, 0, 0, 0, 1, 1, 1, 1, 2, 2, 2, 2] };
        Tested tested = Assert.IsType<Tested>(ExperimentalUnits.Test(new BlockFTest(), sample, RandomDraws.Usual));
        Assert.Equal((12, 1.0, 2.0, 6), (tested.Statistic, tested.Df1, tested.Df2, tested.SpecimenCount));
    }

    [Fact]
    public void A_hundred_thousand_readings_and_the_widest_integers_are_averaged_exactly()
    {
        const int Count = 100_000;
        long[] values = [.. Enumerable.Range(0, Count).Select(i => i % 3 == 0 ? long.MaxValue : long.MinValue + i)];
        ushort[] groups = [.. values.Select((_, i) => (ushort)(i / 2 % 2))];
        int[] specimens = [.. values.Select((_, i) => i / 2)];
        SpecimenMeans means = SpecimenMeans.Of(new GroupedSample(values, 0, groups, 2) { Specimens = specimens })!;
        Assert.Equal(Count / 2, means.Count);
        Assert.True(means.Sample.IsWide);
        Assert.All(Enumerable.Range(0, 1000), j => Assert.Equal((BigInteger)values[2 * j] + values[(2 * j) + 1], means.Sample.MantissaOf(j)));
        SpecimenVariation variation = SpecimenVariation.Of(new GroupedSample(values, 0, groups, 2) { Specimens = specimens })!;
        Assert.Equal(variation, SpecimenVariation.Of(new GroupedSample(values.Select(v => (BigInteger)v).ToArray(), 0, groups, 2) { Specimens = specimens }));
        Assert.Equal(Count / 2, variation.WithinSpecimens.DegreesOfFreedom);
    }
}
