using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain.Tests;

/// <summary>The familywise error rate over families behind gates, by simulation: true nulls are uniform, effects have p = 0, so that every gate is as open as it can be.</summary>
public sealed class FamilyGateSimulationTests
{
    private const int Runs = 20_000;
    private const double Level = 0.1;

    // A letter a family, then its experiments: 0 for a true null, 1 for an effect. With 20,000 runs the standard error at 0.1 is 0.0021; the bound allows three and a half of them.
    [Theory]
    [InlineData("a b<<a", "a:00 b:00")]
    [InlineData("a b<<a", "a:11 b:00")]
    [InlineData("a b<<a", "a:01 b:000")]
    [InlineData("a b<a", "a:01 b:00")]
    [InlineData("a b<a c<<b", "a:10 b:1 c:00")]
    [InlineData("a b<<a c<<a d<b", "a:1 b:10 c:0 d:00")]
    [InlineData("a b<<a c<<b d", "a:0 b:1 c:00 d:00")]
    [InlineData("a=0.06 b<a c<<a d<<c", "a:1 b:0 c:1 d:0")]
    public void Is_at_most_the_level(string families, string truth)
    {
        (double rate, _) = Simulate(families, truth, disjoint: false);
        Assert.True(rate <= Level + (3.5 * Math.Sqrt(Level * (1 - Level) / Runs)), FormattableString.Invariant($"{rate}"));
    }

    // Each of these spends its level, so that a recursion that gave more would be found out: disjoint rejections of the nulls of families that are all open.
    [Theory]
    [InlineData("a b<a", "a:10 b:0")]
    [InlineData("a b<<a", "a:1 b:0")]
    [InlineData("a b<<a c<<a", "a:1 b:0 c:0")]
    public void Is_reached_where_gates_are_open_and_rejections_disjoint(string families, string truth)
    {
        (double rate, double open) = Simulate(families, truth, disjoint: true);
        Assert.Equal(1, open);
        Assert.InRange(rate, Level - (3.5 * Math.Sqrt(Level * (1 - Level) / Runs)), Level + (3.5 * Math.Sqrt(Level * (1 - Level) / Runs)));
    }

    // What the cost of an "any" gate is for: without it both families would stand at 0.1, and the rate at 0.19.
    [Fact]
    public void Would_be_above_the_level_if_a_gate_that_any_effect_opens_were_free()
    {
        Campaign campaign = Campaign("a b") with { ErrorRate = ErrorRate.FalseDiscovery };
        Assert.InRange(Rate(campaign, "a:10 b:0", disjoint: false).Rate, 0.17, 0.21);
    }

    private static (double Rate, double Open) Simulate(string families, string truth, bool disjoint) => Rate(Campaign(families), truth, disjoint);

    // Disjoint: the true nulls share one uniform number, shifted around the unit interval, so that at most one of them is small at a time.
    private static (double Rate, double Open) Rate(Campaign campaign, string truth, bool disjoint)
    {
        (string Family, bool IsNull)[] hypotheses = [.. truth.Split(' ').SelectMany(f => f[2..].Select(c => (f[..1], c == '0')))];
        int nulls = hypotheses.Count(h => h.IsNull);
        var random = new Random(20261201);
        int wrong = 0, open = 0;
        for (int run = 0; run < Runs; run++)
        {
            var tally = new FamilyTally(campaign);
            double shared = random.NextDouble();
            int at = 0;
            foreach ((string family, bool isNull) in hypotheses)
            {
                double p = !isNull ? 0 : disjoint ? (shared + ((double)at++ / nulls)) % 1 : random.NextDouble();
                tally.Add(family, null, null, PValue.FromValue(p));
            }

            CampaignVerdict verdict = FamilyVerdict.Judge(campaign, tally.Members(testedOnly: false));
            wrong += hypotheses.Where((h, i) => h.IsNull && verdict.Survives[i]).Any() ? 1 : 0;
            open += verdict.Families.All(f => f.IsOpen) ? 1 : 0;
        }

        return ((double)wrong / Runs, (double)open / Runs);
    }

    private static Campaign Campaign(string families) => SeveralFamiliesTests.Sealed(families) with { Level = new SignificanceLevel(Level) };
}
