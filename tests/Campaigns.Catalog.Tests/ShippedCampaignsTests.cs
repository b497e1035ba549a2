using Campaigns.Domain;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Catalog.Tests;

/// <summary>The campaigns that ship, through the stores, against the table that R made (tests/reference/shipped-campaigns.R) and the results certified by NIST.</summary>
public sealed class ShippedCampaignsTests
{
    /// <summary>
    /// R reads doubles and forms sums in extended precision; on the data sets of R and the invented ones, with at most three constant leading digits, that keeps about 12 digits.
    /// The values certified by NIST have 15 digits, and ours are exact.
    /// </summary>
    private const double FByR = 1e-11;
    private const double FByNist = 1e-14;

    /// <summary>A relative error of F shows in ln p about df2/2 times as large at most.</summary>
    private const double PByR = 1e-10;

    [Theory]
    [InlineData("adhesion-screen", 48, 46)]
    [InlineData("nist-one-way", 11, 11)]
    [InlineData("published-classics", 10, 10)]
    public void Every_result_agrees_with_R_and_NIST(string name, int planned, int tested)
    {
        using var catalog = new TestCatalog();
        CampaignStanding standing = ShippedCampaign.Run(catalog, name);
        Assert.Equal((planned, planned, tested), (standing.Experiments.Count, standing.FamilySize, standing.TestedCount));
        ReferenceRow[] rows = [.. ReferenceTable.Read("shipped-campaigns.csv").Rows.Where(r => r.Text("campaign") == name)];
        Assert.Equal(rows.Select(r => r.Text("experiment")), standing.Experiments.Select(e => e.Plan.Code));
        Assert.All(rows.Zip(standing.Experiments), pair => AssertAgrees(pair.First, pair.Second));

        string column = standing.Campaign.Correction;
        Assert.All(rows.Zip(standing.Experiments).Where(p => p.First.Has("p")), pair =>
        {
            Near(pair.First.Number(column), pair.Second.AdjustedP!.Value.Value, PByR);
            Assert.Equal(pair.First.Number(column) <= 0.05, pair.Second.Survives);
        });
    }

    [Theory]
    [InlineData("none", 20)]
    [InlineData("bh", 14)]
    [InlineData("by", 8)]
    [InlineData("hommel", 8)]
    [InlineData("holm", 8)]
    [InlineData("bonferroni", null)]
    public void The_demo_keeps_as_many_survivors_as_R_counts_under_every_correction(string correction, int? counted)
    {
        using var catalog = new TestCatalog();
        CampaignStanding standing = ShippedCampaign.Run(catalog, "adhesion-screen");
        ReferenceRow[] rows = [.. ReferenceTable.Read("shipped-campaigns.csv").Rows.Where(r => r.Text("campaign") == "adhesion-screen")];
        string column = correction == "none" ? "p" : correction;
        string[] byR = [.. rows.Where(r => r.Has(column) && r.Number(column) <= 0.05).Select(r => r.Text("experiment"))];
        IReadOnlyList<ExperimentResult> judged = FamilyVerdict.Apply(standing.Campaign with { Correction = correction }, standing.Experiments);
        Assert.Equal(byR, judged.Where(e => e.Survives == true).Select(e => e.Plan.Code));
        Assert.Equal(counted ?? byR.Length, byR.Length);
    }

    private static void AssertAgrees(ReferenceRow row, ExperimentResult result)
    {
        Assert.Equal(row.Integer("observations"), result.ObservationCount);
        switch (row.Text("source"))
        {
            case "no data":
                Assert.Equal(ExperimentStatus.Planned, result.Status);
                return;
            case "no variation within groups":
                Assert.Equal(ExperimentStatus.ZeroWithinVariation, result.Status);
                return;
            default:
                Assert.Equal(ExperimentStatus.Tested, result.Status);
                break;
        }

        Near(row.Number("F"), result.Statistic!.Value, row.Text("source") == "R" ? FByR : FByNist);
        Assert.Equal(row.Number("df1"), result.Df1);
        Assert.Equal(row.Number("df2"), result.Df2);
        Near(row.Number("p"), result.P!.Value.Value, PByR);
        Near(row.Number("ln_p"), result.P.Value.Log, PByR);
    }

    private static void Near(double expected, double actual, double relative) =>
        Assert.True(Math.Abs(actual - expected) <= relative * Math.Abs(expected), FormattableString.Invariant($"expected {expected:R}, got {actual:R}"));
}
