using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Domain.Tests;

public sealed class CampaignBoundsTests
{
    private static readonly SignificanceLevel Five = new(0.05);

    [Fact]
    public void Untested_experiments_count_as_one_wherever_they_stand_in_the_plan()
    {
        // The published fifteen p-values with untested experiments in between; a bound never depends on the order of the plan.
        double[] p = [.. ReferenceTable.Read("campaign/pvectors.csv").Rows.Where(r => r.Text("set") == "m15_bh1995").Select(r => r.Number("p"))];
        ExperimentResult[] experiments = [Untested(), .. p.SelectMany(v => new[] { Tested(v), Untested() })];
        CampaignBounds bounds = CampaignBounds.Of(experiments, Five);
        ExperimentResult[] untestedLast = [.. p.Select(Tested), .. Enumerable.Repeat(Untested(), 16)];
        CampaignBounds other = CampaignBounds.Of(untestedLast, Five);
        for (int k = 0; k <= 15; k++)
        {
            MarkedBound mixed = bounds.Mark([0, .. Enumerable.Range(0, k).Select(i => 1 + (2 * i))]);
            MarkedBound last = other.Mark([15, .. Enumerable.Range(0, k)]);
            Assert.Equal(last, mixed);
            Assert.Equal(1, mixed.Untested);
            Assert.Equal(mixed.Marked, mixed.RealAtLeast + mixed.FalseAtMost);
        }
    }

    [Fact]
    public void The_curve_follows_the_table_and_names_the_experiments_by_their_p()
    {
        double[] p = [.. ReferenceTable.Read("campaign/pvectors.csv").Rows.Where(r => r.Text("set") == "m100").Select(r => r.Number("p"))];
        CampaignBounds bounds = CampaignBounds.Of([.. p.Select(Tested)], Five);
        int[] expected = [.. ReferenceTable.Read("campaign/closed_testing_curve.csv").Rows.Where(r => r.Text("set") == "m100" && r.Number("alpha") < 0.1).Select(r => r.Integer("d_lower_true_discoveries"))];
        (ExperimentResult Experiment, MarkedBound Bound)[] curve = [.. bounds.Curve()];
        Assert.Equal(expected[1..], curve.Select(c => c.Bound.RealAtLeast));
        Assert.Equal(p.Order(), curve.Select(c => c.Experiment.P!.Value.Value));
    }

    [Fact]
    public void Confidence_is_one_less_the_level_as_it_is_written()
    {
        Assert.Equal([0.95, 0.93, 0.999, 0.7], new[] { 0.05, 0.07, 0.001, 0.3 }.Select(level => CampaignBounds.ConfidenceOf(new SignificanceLevel(level))));
        Assert.Equal(1, CampaignBounds.ConfidenceOf(new SignificanceLevel(1e-300)));
    }

    private static ExperimentResult Tested(double p) => Untested() with { Status = ExperimentStatus.Tested, P = PValue.FromValue(p) };

    private static ExperimentResult Untested() => new() { Plan = new PlannedExperiment { Code = "E", Test = "f", FollowUp = "none" }, Position = 1, Status = ExperimentStatus.Planned };
}
