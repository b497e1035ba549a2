using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Catalog.Tests;

/// <summary>The campaign of published designs, through the stores, against R on its own copy of the data (tests/reference/published-designs.R): blocks, specimens, every test and every follow-up.</summary>
public sealed class ShippedDesignsTests
{
    private const string Name = "published-designs";

    /// <summary>R fits on doubles by orthogonal rotations: about 12 digits of F here, 10 of p where p is as small as 1e-86.</summary>
    private const double StatisticByR = 1e-10;
    private const double PByR = 1e-9;

    /// <summary>R integrates the studentized range on a fixed grid: p to about 1e-5 absolutely, quantiles to 1e-5 relatively.</summary>
    private const double RangePByR = 1e-5;
    private const double IntervalByR = 2e-5;

    /// <summary>The nested integrals of the script are asked for 8 digits of Dunnett's law.</summary>
    private const double DunnettByR = 1e-6;

    private static readonly string[] ByStudentizedRange = ["tukey-kramer", "games-howell"];

    [Fact]
    public void Every_test_and_comparison_agrees_with_the_table_that_R_made()
    {
        using var catalog = new TestCatalog();
        AssertAgrees(ReferenceTable.Read("published-designs.csv"), catalog);
    }

    [Fact]
    public void Every_test_and_comparison_agrees_with_R_in_the_same_run()
    {
        RProgram.SkipIfAbsent();
        string script = File.ReadAllText(Path.Combine(ReferenceTable.Folder(), "published-designs.R"));
        using var catalog = new TestCatalog();
        AssertAgrees(ReferenceTable.Of(RProgram.Run(script, "").Split('\n')), catalog);
    }

    [Fact]
    public void The_measurement_files_are_what_R_writes_from_its_data_sets()
    {
        RProgram.SkipIfAbsent();
        using var place = new TestFolder();
        string from = Path.Combine(place.Path, "tests", "reference");
        Directory.CreateDirectory(from);
        RProgram.Run($"setwd('{from.Replace('\\', '/')}')\n" + File.ReadAllText(Path.Combine(ReferenceTable.Folder(), "published-designs-data.R")), "");
        string[] written = Directory.GetFiles(Path.Combine(place.Path, "campaigns", Name, "measurements"));
        string shipped = Path.Combine(ShippedCampaign.Folder(Name), "measurements");
        Assert.Equal(Directory.GetFiles(shipped).Select(Path.GetFileName).Order(StringComparer.Ordinal), written.Select(Path.GetFileName).Order(StringComparer.Ordinal));
        Assert.All(written, f => Assert.Equal(File.ReadAllText(f), File.ReadAllText(Path.Combine(shipped, Path.GetFileName(f)))));
    }

    [Fact]
    public void The_campaign_shows_every_test_and_every_follow_up()
    {
        using var catalog = new TestCatalog();
        CampaignStanding standing = ShippedCampaign.Run(catalog, Name);
        Assert.Equal(GroupTestRegistry.All.Select(t => t.Key).Order(StringComparer.Ordinal), standing.Experiments.Select(e => e.Plan.Test).Distinct().Order(StringComparer.Ordinal));
        Assert.Equal(FollowUpKeys.All.Order(StringComparer.Ordinal), standing.Experiments.Select(e => e.Plan.FollowUp).Distinct().Order(StringComparer.Ordinal));
    }

    private static void AssertAgrees(ReferenceTable table, TestCatalog catalog)
    {
        CampaignStanding standing = ShippedCampaign.Run(catalog, Name);
        ReferenceRow[] tests = [.. table.Rows.Where(r => !r.Has("group_a"))];
        Assert.Equal(tests.Select(r => r.Text("experiment")), standing.Experiments.Select(e => e.Plan.Code));
        Assert.All(tests.Zip(standing.Experiments), pair => AssertTest(pair.First, pair.Second));

        ReferenceRow[] pairs = [.. table.Rows.Where(r => r.Has("group_a"))];
        ExperimentComparison[] comparisons = [.. new ComparisonReader(catalog.Catalog).All(standing)];
        Assert.Equal(
            pairs.Select(r => (r.Text("experiment"), r.Text("group_a"), r.Text("group_b"))),
            comparisons.Select(c => (c.Experiment.Plan.Code, c.GroupA, c.GroupB)));
        Assert.All(pairs.Zip(comparisons), pair => AssertComparison(pair.First, pair.Second));
    }

    private static void AssertTest(ReferenceRow row, ExperimentResult result)
    {
        Assert.Equal(ExperimentStatus.Tested, result.Status);
        Assert.Equal(row.Integer("observations"), result.ObservationCount);
        Near(row.Number("statistic"), result.Statistic!.Value, StatisticByR);
        AssertDegrees(row, "df1", result.Df1);
        AssertDegrees(row, "df2", result.Df2);
        double p = row.Number("p");
        if (result.Resampling is { } drawn)
        {
            // Both are shares of random draws: five standard deviations of R's, which has the fewer.
            Assert.Equal(p, result.P!.Value.Value, 5 * Math.Sqrt(p * (1 - p) / 20_000));
            Assert.True(drawn.Arrangements > 20_000);
            return;
        }

        Near(p, result.P!.Value.Value, PByR);
        Near(row.Number("ln_p"), result.P.Value.Log, PByR);
        Near(row.Number("bh"), result.AdjustedP!.Value.Value, PByR);
        Assert.Equal(row.Number("bh") <= 0.05, result.Survives);
    }

    private static void AssertDegrees(ReferenceRow row, string column, double? degrees)
    {
        Assert.Equal(row.Has(column), degrees is not null);
        if (degrees is { } df)
        {
            Near(row.Number(column), df, StatisticByR);
        }
    }

    private static void AssertComparison(ReferenceRow row, ExperimentComparison line)
    {
        double width = row.Number("upper") - row.Number("lower");
        Assert.Equal(row.Number("difference"), line.Comparison.Difference, 1e-11 * width);
        Assert.Equal(row.Number("lower"), line.Comparison.Lower!.Value, IntervalByR * width);
        Assert.Equal(row.Number("upper"), line.Comparison.Upper!.Value, IntervalByR * width);
        Near(row.Number("statistic"), line.Comparison.Statistic!.Value, StatisticByR);
        Near(row.Number("df2"), line.Comparison.DegreesOfFreedom!.Value, StatisticByR);
        double p = row.Number("p");
        if (ByStudentizedRange.Contains(line.Experiment.Plan.FollowUp))
        {
            Assert.Equal(p, line.Comparison.P!.Value.Value, RangePByR);
        }
        else
        {
            Near(p, line.Comparison.P!.Value.Value, line.Experiment.Plan.FollowUp == "dunnett" ? DunnettByR : PByR);
        }
    }

    private static void Near(double expected, double actual, double relative) =>
        Assert.True(Math.Abs(actual - expected) <= relative * Math.Abs(expected), FormattableString.Invariant($"expected {expected:R}, got {actual:R}"));
}
