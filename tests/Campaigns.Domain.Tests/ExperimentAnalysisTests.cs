using Campaigns.Statistics.Checks;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Units;

namespace Campaigns.Domain.Tests;

public sealed class ExperimentAnalysisTests
{
    private static readonly string[] Labels = ["a", "b"];
    private static readonly long[] Calm = [10, 12, 11, 13, 12, 20, 22, 21, 23, 22];
    private static readonly long[] Wild = [1000, 1001, 999, 1000, 1002, 998, 1001, 999, 1200, 700, 1500, 900, 400, 1900, 1100, 300];

    [Fact]
    public void An_experiment_with_a_result_has_effects_letters_and_what_it_could_have_found()
    {
        ExperimentAnalysis analysis = Of("f", Calm);

        // By hand: means 11.6 and 21.6, within 5.2 + 5.2 on 8; between 5 x 50 = 250 on 1.
        Assert.Equal(250 / 260.4, analysis.Effects!.EtaSquared, 1e-15);
        Assert.Equal(Math.Sqrt(250 / 10.4), analysis.Effects.CohenF, 1e-13);
        Assert.Equal(10, Assert.Single(analysis.Comparisons).Difference, 1e-13);
        Assert.Equal(2, analysis.Letters!.Distinct().Count());
        Assert.True(analysis.DetectableAtStrictest > analysis.Detectable);
        Assert.Equal(CheckRegistry.All.Select(c => c.Key).Distinct(), analysis.Checks.Select(c => c.Key).Distinct());
        Assert.Null(analysis.Beside);
        Assert.Null(analysis.UnitsNote);
        Assert.Null(analysis.Specimens);
    }

    [Theory]
    [InlineData("f", true)]
    [InlineData("brown-forsythe", true)]
    [InlineData("kruskal-wallis", true)]
    [InlineData("welch", false)]
    public void Welchs_test_stands_beside_another_one_where_spreads_differ(string test, bool beside)
    {
        ExperimentAnalysis analysis = Of(test, Wild);
        Assert.Contains(analysis.Checks, c => c.Finding.Verdict == CheckVerdict.Warns && c.Key is "equal-spread" or "spread-ratio");
        Assert.Equal(beside, analysis.Beside is not null);
        if (beside)
        {
            Assert.Equal(new WelchTest().Test(Sample(Wild)), analysis.Beside);
        }
    }

    [Fact]
    public void Without_a_result_nothing_is_compared_and_checks_still_speak()
    {
        ExperimentAnalysis analysis = ExperimentAnalysis.Of(Plan("f"), Labels, Sample(Calm), Campaign(0.05), 3, tested: null);
        Assert.Empty(analysis.Comparisons);
        Assert.Null(analysis.Letters);
        Assert.Null(analysis.Effects);
        Assert.Null(analysis.Detectable);
        Assert.NotEmpty(analysis.Checks);
    }

    [Fact]
    public void Without_values_there_is_nothing_to_check()
    {
        ExperimentAnalysis analysis = ExperimentAnalysis.Of(Plan("f"), Labels, new GroupedSample(ReadOnlySpan<long>.Empty, 0, [], 2), Campaign(0.05), 3, tested: null);
        Assert.Empty(analysis.Checks);
        Assert.Null(analysis.UnitsNote);
    }

    [Fact]
    public void A_level_of_one_half_or_more_leaves_no_interval_of_confidence_one_less_twice_the_level()
    {
        ExperimentAnalysis analysis = Of("f", Calm, 0.5);
        Assert.Null(analysis.Effects);
        Assert.NotNull(analysis.Detectable);
        Assert.Null(Of("f", Calm, 0.9).Detectable);
    }

    [Fact]
    public void Several_readings_of_a_specimen_are_told_with_their_numbers()
    {
        var readings = new GroupedSample(Calm, 0, [0, 0, 0, 0, 0, 1, 1, 1, 1, 1], 2) { Specimens = new[] { 0, 0, 1, 1, 1, 2, 2, 3, 3, 3 } };
        ExperimentAnalysis untested = ExperimentAnalysis.Of(Plan("f"), Labels, readings, Campaign(0.05), 1, tested: null);
        Assert.StartsWith("Readings of one specimen are not independent, so an analysis would run on the means of 4", untested.UnitsNote, StringComparison.Ordinal);
        var tested = (Tested)ExperimentalUnits.Test(new FTest(), readings, RandomDraws.Usual);
        ExperimentAnalysis analysis = ExperimentAnalysis.Of(Plan("f"), Labels, readings, Campaign(0.05), 1, tested);
        Assert.Equal("Readings of one specimen are not independent, so the analysis runs on the means of 4 specimens (10 readings, 2 to 3 a specimen).", analysis.UnitsNote);
        Assert.Equal((4, 10, 2, 3), (analysis.Specimens!.SpecimenCount, analysis.Specimens.ReadingCount, analysis.Specimens.FewestReadings, analysis.Specimens.MostReadings));
    }

    [Fact]
    public void Many_times_the_planned_values_without_specimens_bring_a_warning()
    {
        ExperimentAnalysis analysis = ExperimentAnalysis.Of(Plan("f") with { Replicates = 2 }, Labels, Sample([.. Calm[..4], .. Calm[5..9]]), Campaign(0.05), 1, tested: null);
        Assert.StartsWith("Warning: 8 values where 2 in each group were planned look like repeated readings", analysis.UnitsNote, StringComparison.Ordinal);
    }

    private static ExperimentAnalysis Of(string test, long[] values, double level = 0.05)
    {
        var tested = (Tested)GroupTestRegistry.Find(test)!.Test(Sample(values));
        return ExperimentAnalysis.Of(Plan(test), Labels, Sample(values), Campaign(level), 10, tested);
    }

    private static GroupedSample Sample(long[] values) =>
        new(values, 0, Enumerable.Range(0, values.Length).Select(i => (ushort)(i < values.Length / 2 ? 0 : 1)).ToArray(), 2);

    private static PlannedExperiment Plan(string test) => new() { Code = "E", Test = test, FollowUp = "tukey-kramer" };

    private static Campaign Campaign(double level) => new()
    {
        Code = "C",
        ErrorRate = ErrorRate.FalseDiscovery,
        Level = new SignificanceLevel(level),
        Correction = "bh",
        OpenedAt = DateTimeOffset.UnixEpoch,
    };
}
