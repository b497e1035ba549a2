using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Planning;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Planning;

public sealed class CampaignPowerTests
{
    private static readonly SignificanceLevel Usual = new(0.05);
    private static readonly string[] Exact = ["none", "bonferroni", "sidak", "holm", "holm-sidak", "hochberg", "bh", "by"];

    public static TheoryData<string> ExactKeys => [.. Exact];

    internal static CampaignDesign Campaign(int m, RealEffects real, int groups, int replicates, double f)
    {
        var design = OneWayDesign.Balanced(groups, replicates);
        return new CampaignDesign(m, real, design, OneWayPower.Noncentrality(design, f));
    }

    private static CampaignExpectation Expect(string key, CampaignDesign campaign, SignificanceLevel? level = null) =>
        CampaignPower.Exact(campaign, CorrectionRegistry.Find(key)!, level ?? Usual, TestContext.Current.CancellationToken);

    /// <remarks>planning.csv: SciPy, Benjamini-Hochberg by the counts of all other experiments, a formula that the product does not use, in ten digits; and simulated means with their standard errors, for Holm too.</remarks>
    [Fact]
    public void The_expected_survivors_equal_the_reference()
    {
        IReadOnlyList<ReferenceRow> rows = ReferenceTable.Read("experiment/planning.csv").Rows;
        Assert.Equal(54, rows.Count);
        double worst = 0;
        foreach (ReferenceRow row in rows)
        {
            CampaignDesign campaign = Of(row);
            string what = FormattableString.Invariant($"m = {campaign.Experiments}, share {campaign.ShareReal}, lambda {campaign.Noncentrality}");
            CampaignExpectation bh = Expect("bh", campaign);
            Relative.AssertNear(row.Number("bh_true_exact"), bh.TrueSurvivors, 2e-9, what + " bh true");
            Relative.AssertNear(row.Number("bh_false_exact"), bh.FalseSurvivors, 2e-9, what + " bh false");
            Relative.AssertNear(0.05 * campaign.ShareNull, bh.FalseShare, 1e-12, what + " false discovery rate");
            Relative.AssertNear(row.Number("bonferroni_true_exact"), Expect("bonferroni", campaign).TrueSurvivors, 2e-9, what + " bonferroni");
            worst = Math.Max(worst, Math.Abs(row.Number("holm_true_mc") - Expect("holm", campaign).TrueSurvivors) / row.Number("holm_true_mc_se"));
            worst = Math.Max(worst, Math.Abs(row.Number("bh_true_mc") - bh.TrueSurvivors) / row.Number("bh_true_mc_se"));
        }

        // The greatest of 108 standard normal distances exceeds this with probability 0.001.
        Assert.InRange(worst, 0, 4.4);
    }

    /// <remarks>Root finding in 40-digit arithmetic (mpmath 1.3.0), planning_level.py.</remarks>
    [Theory]
    [InlineData(4, 10, 0.25, 0.1, 1.2517734583141628e-13)]
    [InlineData(4, 10, 0.25, 0.3, 1.1672333549758657e-7)]
    [InlineData(6, 10, 0.25, 0.1, 1.1168049049762671e-8)]
    public void The_level_of_large_campaigns_is_right_to_the_last_digits(int groups, int replicates, double f, double share, double level) =>
        Relative.AssertNear(level, LargeCampaign.EffectiveLevel(Campaign(20, RealEffects.OfShare(share), groups, replicates, f), Usual), 1e-10, "level");

    /// <remarks>planning.csv: SciPy, whose quantiles lose digits at tiny levels.</remarks>
    [Fact]
    public void The_approximation_and_the_least_effect_equal_the_reference()
    {
        foreach (ReferenceRow row in ReferenceTable.Read("experiment/planning.csv").Rows)
        {
            CampaignDesign campaign = Of(row);
            string what = FormattableString.Invariant($"m = {campaign.Experiments}, share {campaign.ShareReal}, lambda {campaign.Noncentrality}");
            Relative.AssertNear(row.Number("slope0"), LargeCampaign.SlopeAtZero(campaign.Experiment, campaign.Noncentrality), 1e-9, what + " slope");
            Relative.AssertNear(row.Number("critical_slope"), LargeCampaign.CriticalSlope(campaign, Usual), 1e-9, what + " critical slope");
            Assert.Equal(row.Number("slope0") > row.Number("critical_slope"), LargeCampaign.SizeHelps(campaign, Usual));
            double tolerance = row.Number("bh_t_fixed") is > 0 and < 1e-10 ? 2e-3 : 1e-6;
            Relative.AssertNear(row.Number("bh_t_fixed"), LargeCampaign.EffectiveLevel(campaign, Usual), tolerance, what + " level");
            (double trueOnes, double falseOnes) = LargeCampaign.Approximate(campaign, Usual);
            Relative.AssertNear(row.Number("bh_true_fixed"), trueOnes, tolerance, what + " true");
            Relative.AssertNear(row.Number("bh_false_fixed"), falseOnes, tolerance, what + " false");
        }
    }

    /// <remarks>Every outcome is tried, the correction itself deciding each.</remarks>
    [Theory]
    [MemberData(nameof(ExactKeys))]
    public void Small_campaigns_equal_a_count_over_every_outcome(string key)
    {
        Correction correction = CorrectionRegistry.Find(key)!;
        for (int m = 1; m <= 6; m++)
        {
            foreach ((double level, double f) in m == 6 ? [(0.3, 0.4)] : new[] { (0.3, 0.4), (0.05, 1.1) })
            {
                var q = new SignificanceLevel(level);
                CampaignDesign Of(RealEffects real) => Campaign(m, real, 3, 4, f);
                double[] cuts = [.. Cuts(key, m, level).Distinct().Order()];
                double[] found = [.. cuts.Select(t => OneWayPower.Power(Of(RealEffects.OfShare(0)).Experiment, new SignificanceLevel(t), Of(RealEffects.OfShare(0)).Noncentrality))];
                foreach (double share in m == 6 ? [0.35] : new[] { 0, 0.35, 0.9, 1 })
                {
                    AssertSame(EveryOutcome.Of(correction, q, m, cuts, found, share, null), Expect(key, Of(RealEffects.OfShare(share)), q), $"{key}, m = {m}, share {share}");
                }

                for (int number = m == 6 ? 3 : 0; number <= (m == 6 ? 3 : m); number++)
                {
                    AssertSame(EveryOutcome.Of(correction, q, m, cuts, found, null, number), Expect(key, Of(RealEffects.OfNumber(number)), q), $"{key}, m = {m}, {number} real");
                }
            }
        }
    }

    /// <remarks>A draw of campaigns is independent of the laws. The greatest of 192 standard normal distances exceeds 4.7 with probability 0.0005.</remarks>
    [Fact]
    public void Drawn_campaigns_agree_with_every_exact_law()
    {
        foreach ((CampaignDesign campaign, int draws) in new[]
        {
            (Campaign(40, RealEffects.OfShare(0.3), 3, 5, 0.8), 8_000), (Campaign(40, RealEffects.OfNumber(12), 3, 5, 0.8), 8_000),
            (Campaign(300, RealEffects.OfShare(0.1), 4, 10, 0.5), 1_500), (Campaign(300, RealEffects.OfNumber(30), 2, 9, 0.7), 1_500),
        })
        {
            IReadOnlyList<CampaignExpectation> drawn = CampaignSimulation.Expect(
                campaign, [.. Exact.Select(k => CampaignSimulation.Decision(CorrectionRegistry.Find(k)!, Usual))], new CampaignDraws(20_261_201, draws));
            foreach ((string key, CampaignExpectation seen) in Exact.Zip(drawn))
            {
                CampaignExpectation law = Expect(key, campaign);
                CampaignErrors errors = seen.Errors!;
                Near(seen.Survivors, law.Survivors, errors.Survivors, "survivors");
                Near(seen.TrueSurvivors, law.TrueSurvivors, errors.TrueSurvivors, "true");
                Near(seen.FalseSurvivors, law.FalseSurvivors, errors.FalseSurvivors, "false");
                Near(seen.ShareFound!.Value, law.ShareFound!.Value, errors.ShareFound!.Value, "share found");
                Near(seen.AnyTrue, law.AnyTrue, errors.AnyTrue, "any true");
                Near(seen.AnyFalse, law.AnyFalse, errors.AnyFalse, "any false");
                Near(seen.FalseShare, law.FalseShare, errors.FalseShare, "false share");

                void Near(double simulated, double exact, double error, string what) =>
                    Assert.True(Math.Abs(simulated - exact) <= 4.7 * error, FormattableString.Invariant($"{key}, m = {campaign.Experiments}, {what}: drawn {simulated:G6}, law {exact:G6}, standard error {error:G2}."));
            }
        }
    }

    /// <remarks>power.csv: 40-digit arithmetic.</remarks>
    [Theory]
    [MemberData(nameof(ExactKeys))]
    public void A_campaign_of_one_is_one_experiment(string key)
    {
        foreach (ReferenceRow row in ReferenceTable.Read("experiment/power.csv").Rows)
        {
            var level = new SignificanceLevel(row.Number("alpha"));
            CampaignDesign Of(RealEffects real) => Campaign(1, real, row.Integer("k"), row.Integer("n_per_group"), row.Number("cohen_f"));
            CampaignExpectation certain = Expect(key, Of(RealEffects.OfNumber(1)), level);
            Relative.AssertNear(row.Number("power"), certain.TrueSurvivors, 1e-12, key);
            Relative.AssertNear(row.Number("power"), certain.AnyTrue, 1e-12, key);
            Assert.Equal(0, certain.FalseSurvivors);
            CampaignExpectation half = Expect(key, Of(RealEffects.OfShare(0.5)), level);
            Relative.AssertNear(row.Number("power"), half.ShareFound!.Value, 1e-12, key);
            Relative.AssertNear(row.Number("alpha") / 2, half.FalseSurvivors, 1e-12, key);
            Relative.AssertNear(row.Number("alpha") / 2, half.FalseShare, 1e-12, key);
        }
    }

    /// <remarks>Benjamini and Yekutieli (2001), theorem 5.1 with equality for independent tests: the false discovery rate of the step-up procedure is m0 q/m, whatever the effects.</remarks>
    [Theory]
    [InlineData(7, 3, 0.4, 0.05)]
    [InlineData(200, 60, 0.6, 0.1)]
    [InlineData(1000, 10, 0.8, 0.05)]
    [InlineData(600, 180, 0.5, 0.05)]
    public void The_false_discovery_rate_is_the_share_of_nulls_times_the_level(int m, int real, double f, double q)
    {
        foreach (RealEffects effects in new[] { RealEffects.OfNumber(real), RealEffects.OfShare((double)real / m) })
        {
            CampaignExpectation bh = Expect("bh", Campaign(m, effects, 4, 6, f), new SignificanceLevel(q));
            Relative.AssertNear(q * (m - real) / m, bh.FalseShare, 1e-11, $"{effects}");
        }
    }

    /// <remarks>To first order in a level that small, survivors are those of Bonferroni's correction.</remarks>
    [Theory]
    [InlineData(1e-12)]
    [InlineData(1e-100)]
    [InlineData(1e-290)]
    public void Tiny_levels_lose_nothing(double level)
    {
        foreach (RealEffects real in new[] { RealEffects.OfShare(0.01), RealEffects.OfNumber(2) })
        {
            CampaignDesign campaign = Campaign(200, real, 3, 4, 0.3);
            CampaignExpectation one = Expect("bonferroni", campaign, new(level));
            foreach (string key in new[] { "holm", "holm-sidak", "hochberg", "bh" })
            {
                CampaignExpectation law = Expect(key, campaign, new(level));
                Relative.AssertNear(one.TrueSurvivors, law.TrueSurvivors, 1e-9, key);
                Relative.AssertNear(one.FalseSurvivors, law.FalseSurvivors, 1e-9, key);
                Relative.AssertNear(one.AnyTrue, law.AnyTrue, 1e-9, key);
                Relative.AssertNear(one.AnyFalse, law.AnyFalse, 1e-9, key);
                Assert.True(law.FalseSurvivors > 0);
            }
        }
    }

    [Theory]
    [MemberData(nameof(ExactKeys))]
    public void Effects_beyond_all_doubt_are_all_found(string key)
    {
        foreach (double f in new[] { 30, 1e60 })
        {
            foreach (RealEffects real in new[] { RealEffects.OfNumber(30), RealEffects.OfShare(0.3), RealEffects.OfNumber(100), RealEffects.OfShare(1) })
            {
                CampaignExpectation all = Expect(key, Campaign(100, real, 3, 6, f));
                Assert.Equal(1, all.ShareFound!.Value, 1e-12);
                Assert.Equal(1, all.AnyTrue, 1e-12);
                Assert.Equal(real.Number ?? (100 * real.Share!.Value), all.TrueSurvivors, 1e-9);
            }
        }
    }

    [Theory]
    [MemberData(nameof(ExactKeys))]
    public void Without_real_effects_nothing_true_survives(string key)
    {
        CampaignExpectation fixedNone = Expect(key, Campaign(50, RealEffects.OfNumber(0), 3, 6, 0.7));
        CampaignExpectation none = Expect(key, Campaign(50, RealEffects.OfShare(0), 3, 6, 0.7));
        Assert.Null(none.ShareFound);
        Assert.Null(fixedNone.ShareFound);
        Assert.Equal(0, none.TrueSurvivors);
        Assert.Equal(0, fixedNone.AnyTrue);
        Assert.Equal(none.AnyFalse, none.FalseShare, 1e-13);
        Relative.AssertNear(none.FalseSurvivors, fixedNone.FalseSurvivors, 1e-11, key);
        Relative.AssertNear(none.AnyFalse, fixedNone.AnyFalse, 1e-11, key);
    }

    [Fact]
    public void Stronger_procedures_find_more()
    {
        foreach (RealEffects real in new[] { RealEffects.OfShare(0.4), RealEffects.OfNumber(40) })
        {
            double[] found = [.. new[] { "bonferroni", "holm", "hochberg", "bh", "none" }.Select(k => Expect(k, Campaign(100, real, 4, 8, 0.7)).ShareFound!.Value)];
            Assert.Equal(found.Order(), found);
            Assert.Equal(found.Length, found.Distinct().Count());
            Assert.True(Expect("holm", Campaign(100, real, 4, 8, 0.7)).AnyFalse <= 0.05);
        }
    }

    /// <remarks>A mixture of fixed numbers with binomial weights is the other model.</remarks>
    [Theory]
    [InlineData("holm")]
    [InlineData("bh")]
    public void A_share_is_a_mixture_of_numbers(string key)
    {
        double weight = Math.Pow(0.7, 25);
        double sum = 0;
        double any = 0;
        for (int number = 0; number <= 25; number++)
        {
            CampaignExpectation law = Expect(key, Campaign(25, RealEffects.OfNumber(number), 3, 7, 0.6));
            sum += weight * law.FalseSurvivors;
            any += weight * law.AnyTrue;
            weight *= (25.0 - number) / (number + 1) * 0.3 / 0.7;
        }

        CampaignExpectation mixed = Expect(key, Campaign(25, RealEffects.OfShare(0.3), 3, 7, 0.6));
        Relative.AssertNear(sum, mixed.FalseSurvivors, 1e-12, key);
        Relative.AssertNear(any, mixed.AnyTrue, 1e-12, key);
    }

    [Fact]
    public void A_hundred_thousand_experiments_and_one_level_are_no_work()
    {
        CampaignDesign campaign = Campaign(100_000, RealEffects.OfNumber(20_000), 4, 10, 0.6);
        CampaignExpectation law = Expect("bonferroni", campaign);
        double power = OneWayPower.Power(campaign.Experiment, new SignificanceLevel(0.05 / 100_000), campaign.Noncentrality);
        Relative.AssertNear(20_000 * power, law.TrueSurvivors, 1e-12, "true");
        Relative.AssertNear(0.04, law.FalseSurvivors, 1e-12, "false");
        Assert.InRange(law.FalseShare, 1e-6, 0.04 / (law.TrueSurvivors - 1));
    }

    [Fact]
    public void Large_campaigns_come_near_the_approximation()
    {
        double shortfall = double.PositiveInfinity;
        foreach (int m in new[] { 100, 1000, 3000 })
        {
            CampaignDesign campaign = Campaign(m, RealEffects.OfShare(0.3), 4, 10, 0.4);
            double relative = (Expect("bh", campaign).TrueSurvivors / LargeCampaign.Approximate(campaign, Usual).TrueSurvivors) - 1;
            Assert.InRange(relative, 0, shortfall / 3);
            shortfall = relative;
        }
    }

    [Fact]
    public void The_slope_is_that_of_power_at_tiny_levels()
    {
        CampaignDesign campaign = Campaign(1, RealEffects.OfShare(0.5), 3, 5, 0.4);
        double power = OneWayPower.Power(campaign.Experiment, new SignificanceLevel(1e-40), campaign.Noncentrality);
        Assert.Equal(LargeCampaign.SlopeAtZero(campaign.Experiment, campaign.Noncentrality), power / 1e-40, 1e-4);
        Assert.Equal(1, LargeCampaign.SlopeAtZero(campaign.Experiment, 0));
        Assert.Equal(double.PositiveInfinity, LargeCampaign.SlopeAtZero(campaign.Experiment, 1e300));
        Assert.Equal(0, LargeCampaign.EffectiveLevel(campaign, new SignificanceLevel(0.01)));
    }

    [Fact]
    public void Replicates_are_the_least_that_suffice()
    {
        Assert.Equal(2, CampaignReplicates.Smallest(_ => true));
        Assert.Equal(37, CampaignReplicates.Smallest(n => n >= 37));
        Assert.Null(CampaignReplicates.Smallest(_ => false));
        double Found(int n) => Expect("bh", Campaign(50, RealEffects.OfShare(0.2), 4, n, 0.5)).ShareFound!.Value;
        int least = CampaignReplicates.Smallest(n => Found(n) >= 0.8)!.Value;
        Assert.True(Found(least) >= 0.8);
        Assert.True(Found(least - 1) < 0.8);
    }

    [Fact]
    public void What_cannot_be_is_refused()
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => RealEffects.OfShare(double.NaN));
        Assert.Throws<ArgumentOutOfRangeException>(() => RealEffects.OfNumber(-1));
        Assert.Throws<ArgumentException>(() => Campaign(5, RealEffects.OfNumber(6), 3, 4, 0.5));
        Assert.Throws<ArgumentOutOfRangeException>(() => Campaign(0, RealEffects.OfShare(0.5), 3, 4, 0.5));
        CampaignDesign campaign = Campaign(5, RealEffects.OfNumber(2), 3, 4, 0.5);
        Assert.False(CampaignPower.IsExact(campaign, new Hommel()));
        Assert.Throws<ArgumentException>(() => Expect("hommel", campaign));
        Assert.Throws<ArgumentOutOfRangeException>(() => CampaignSimulation.Expect(campaign, [], new CampaignDraws(1, 1)));
        using var stopped = new CancellationTokenSource();
        stopped.Cancel();
        Assert.ThrowsAny<OperationCanceledException>(() => CampaignPower.Exact(campaign, new BenjaminiHochberg(), Usual, stopped.Token));
        Assert.ThrowsAny<OperationCanceledException>(() => CampaignSimulation.Expect(campaign, [], new CampaignDraws(1, 9) { Stop = stopped.Token }));
    }

    [Fact]
    public void A_seed_draws_the_same_campaigns_again()
    {
        CampaignDesign campaign = Campaign(30, RealEffects.OfNumber(9), 3, 5, 0.8);
        int told = 0;
        CampaignExpectation Draw(ulong seed) => CampaignSimulation.Expect(
            campaign, [CampaignSimulation.Decision(new Hommel(), Usual)], new CampaignDraws(seed, 500) { Drawn = () => Interlocked.Increment(ref told) })[0];
        Assert.Equal(Draw(1), Draw(1));
        Assert.Equal(1000, told);
        Assert.NotEqual(Draw(1), Draw(2));

        // Hommel's correction rejects what Hochberg's does, and more.
        Assert.True(Draw(1).TrueSurvivors > Expect("hochberg", campaign).TrueSurvivors - (4 * Draw(1).Errors!.TrueSurvivors));
    }

    private static CampaignDesign Of(ReferenceRow row) =>
        Campaign(row.Integer("m"), RealEffects.OfShare(row.Number("pi1")), row.Integer("k"), row.Integer("n"), row.Number("cohen_f"));

    /// <summary>The levels of the published procedures.</summary>
    private static IEnumerable<double> Cuts(string key, int m, double q) => Enumerable.Range(1, m).Select(j => key switch
    {
        "none" => q,
        "bonferroni" => q / m,
        "sidak" => 1 - Math.Pow(1 - q, 1.0 / m),
        "holm" or "hochberg" => q / (m - j + 1),
        "holm-sidak" => 1 - Math.Pow(1 - q, 1.0 / (m - j + 1)),
        "bh" => q * j / m,
        _ => q * j / m / Enumerable.Range(1, m).Sum(i => 1.0 / i),
    });

    private static void AssertSame(EveryOutcome.Sums truth, CampaignExpectation law, string what)
    {
        Relative.AssertNear(1, truth.Total, 1e-12, what + " total");
        Relative.AssertNear(truth.TrueOnes, law.TrueSurvivors, 1e-11, what + " true");
        Relative.AssertNear(truth.FalseOnes, law.FalseSurvivors, 1e-11, what + " false");
        Relative.AssertNear(truth.AnyTrue, law.AnyTrue, 1e-11, what + " any true");
        Relative.AssertNear(truth.AnyFalse, law.AnyFalse, 1e-11, what + " any false");
        Relative.AssertNear(truth.FalseShare, law.FalseShare, 1e-11, what + " false share");
    }
}
