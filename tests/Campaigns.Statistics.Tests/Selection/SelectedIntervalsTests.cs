using System.Globalization;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Effects;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Selection;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Selection;

public sealed class SelectedIntervalsTests
{
    private static readonly SignificanceLevel Level = new(0.05);

    // Group means, group sizes and pooled variances of tests/reference/campaign/generate/10_selective.py.
    private static readonly Dictionary<string, (double[] Means, int[] Sizes, double Variance)> Experiments = new()
    {
        ["E1"] = ([12.0, 15.0, 14.0], [5, 5, 5], 1.5),
        ["E2"] = ([8.0, 8.2, 8.1, 7.9], [4, 4, 4, 4], 0.6),
        ["E3"] = ([30.0, 33.5, 31.0, 36.0], [6, 5, 6, 5], 4.0),
        ["E4"] = ([1.0, 1.1], [8, 8], 0.09),
        ["E5"] = ([5.0, 5.9, 5.5], [10, 10, 9], 0.35),
        ["E6"] = ([100.0, 103.0, 99.0, 101.0, 98.0], [3, 3, 3, 3, 3], 9.0),
    };

    // 40-digit arithmetic (mpmath), tests/reference/campaign/generate/10b_false_coverage.py.
    [Fact]
    public void The_four_intervals_of_selected_estimates_agree_with_the_reference()
    {
        IReadOnlyList<ReferenceRow> rows = ReferenceTable.Read("campaign/fcr_intervals.csv").Rows;
        PValue[] p = [.. rows.Select(r => PValue.FromLog(StudentT.LogTwoSidedTail(Math.Abs(r.Number("estimate") / r.Number("se")), r.Number("df"))))];
        PValue[] adjusted = new BenjaminiHochberg().Adjust(RankedFamily.Of(p, p.Length));
        int selected = adjusted.Count(Level.Rejects);
        for (int i = 0; i < rows.Count; i++)
        {
            ReferenceRow row = rows[i];
            Assert.Equal(row.Number("p"), p[i].Value, 1e-14);
            Assert.Equal((row.Integer("selected") == 1, row.Integer("R"), row.Integer("m")), (Level.Rejects(adjusted[i]), selected, rows.Count));
            double risk = SelectedIntervals.FalseCoverageRisk(Level, rows.Count, selected);
            Assert.Equal(row.Number("fcr_level"), 1 - risk, 1e-15);
            AssertInterval(row, Level.Value, null, "unadj");
            if (row.Integer("selected") == 1)
            {
                AssertInterval(row, risk, "t_fcr", "fcr");
                AssertInterval(row, SelectedIntervals.FalseCoverageRiskUnderAnyDependence(Level, rows.Count, selected), "t_fcr_any_dep", "fcr_any_dep");
                AssertInterval(row, SelectedIntervals.FamilywiseRisk(Level, rows.Count), "t_bonf", "bonf");

                // Selected by the same p-values, so the interval leaves out 0 (duality).
                Interval interval = SelectedIntervals.Marginal(row.Number("estimate"), row.Number("se"), row.Number("df"), risk);
                Assert.True(interval.Lower > 0 || interval.Upper < 0);
            }
        }

        Assert.Equal(3, selected);
    }

    // The whole way: values with the reference's means and variances, F tests, Benjamini and Hochberg, Holm inside, and for the selection.
    [Fact]
    public void Values_lead_through_test_correction_and_follow_up_to_the_reference_claims()
    {
        IReadOnlyList<ReferenceRow> tests = ReferenceTable.Read("campaign/selective_experiments.csv").Rows;
        Tested[] outcomes = [.. tests.Select(t => (Tested)Values(t.Text("experiment")).Test(new FTest()))];
        PValue[] adjusted = new BenjaminiHochberg().Adjust(RankedFamily.Of([.. outcomes.Select(o => o.P)], outcomes.Length));
        for (int i = 0; i < tests.Count; i++)
        {
            Assert.Equal(tests[i].Number("F"), outcomes[i].Statistic, 1e-10 * tests[i].Number("F"));
            Assert.Equal(tests[i].Number("p"), outcomes[i].P.Value, 1e-10);
            Assert.Equal(tests[i].Number("bh_adjusted"), adjusted[i].Value, 1e-10);
        }

        int selected = adjusted.Count(Level.Rejects);
        double risk = SelectedIntervals.FalseCoverageRisk(Level, tests.Count, selected);
        Assert.Equal(tests[0].Number("within_level_Rq_over_m"), risk, 1e-16);
        foreach (var pairs in ReferenceTable.Read("campaign/selective_pairs.csv").Rows.GroupBy(r => r.Text("experiment")))
        {
            IReadOnlyList<GroupComparison> compared = new HolmPairs().Compare(Values(pairs.Key).Estimates()!, null, 1 - risk);
            Assert.Equal(pairs.Count(), compared.Count);
            foreach ((ReferenceRow row, GroupComparison comparison) in pairs.Zip(compared))
            {
                Assert.Equal((row.Integer("group_a") - 1, row.Integer("group_b") - 1), (comparison.GroupA, comparison.GroupB));
                Assert.Equal(-row.Number("difference"), comparison.Difference, 1e-10);
                Assert.Equal(row.Number("holm_within"), comparison.P!.Value.Value, 1e-10);
                if (row.Integer("experiment_selected") == 1)
                {
                    Assert.Equal(row.Number("bb_holm_adjusted"), SelectedFamilies.FalseDiscovery(comparison.P!.Value, tests.Count, selected).Value, 1e-10);

                    // Bonferroni's interval among M pairs is the marginal one at the M-th part of the risk.
                    Interval marginal = SelectedIntervals.Marginal(comparison.Difference, row.Number("se"), row.Number("df"), risk / pairs.Count());
                    Assert.Equal(marginal.Lower, comparison.Lower!.Value, 1e-10);
                    Assert.Equal(marginal.Upper, comparison.Upper!.Value, 1e-10);
                }
            }
        }
    }

    public static TheoryData<string> Dual => new("tukey-kramer", "games-howell", "dunnett", "scheffe");

    // An interval at 1 - risk leaves out 0 exactly where the p-value is at most the risk.
    [Theory]
    [MemberData(nameof(Dual))]
    public void Intervals_and_p_values_say_the_same_at_every_risk(string key)
    {
        FollowUp followUp = FollowUpRegistry.Find(key)!;
        foreach (string experiment in Experiments.Keys)
        {
            GroupEstimates estimates = Values(experiment).Estimates()!;
            foreach (double risk in (double[])[0.3, 0.05, 0.05 / 2, 0.05 / 6, 1e-4])
            {
                Assert.All(followUp.Compare(estimates, 0, 1 - risk), c => Assert.Equal(c.P!.Value.Value <= risk, c.Lower > 0 || c.Upper < 0));
            }
        }
    }

    // Holm's p-values are at most Bonferroni's, whose intervals stand beside them: an interval that leaves out 0 has a p at most the risk, and not the other way round.
    [Fact]
    public void Holms_p_may_be_small_where_Bonferronis_interval_holds_zero_but_never_the_reverse()
    {
        int onlyP = 0;
        foreach (string experiment in Experiments.Keys)
        {
            GroupEstimates estimates = Values(experiment).Estimates()!;
            for (double risk = 0.001; risk < 0.3; risk += 0.001)
            {
                foreach (GroupComparison c in new HolmPairs().Compare(estimates, null, 1 - risk))
                {
                    bool leavesOut = c.Lower > 0 || c.Upper < 0;
                    Assert.True(!leavesOut || c.P!.Value.Value <= risk * (1 + 1e-12));
                    onlyP += !leavesOut && c.P!.Value.Value <= risk ? 1 : 0;
                }
            }
        }

        Assert.True(onlyP > 0);
    }

    // What the procedure promises (Benjamini and Yekutieli 2005): of the intervals shown at most q miss on average; unadjusted ones miss far more often.
    [Fact]
    public void Intervals_of_the_selected_miss_at_most_as_often_as_promised()
    {
        const int Parameters = 50;
        const int Runs = 600;
        const int Df = 10;
        SignificanceLevel q = new(0.1);
        var random = new Random(20261201);
        (double Sum, double Squares, double Plain) missed = default;
        double plain = StudentT.TwoSidedQuantile(q.Value, Df);
        for (int run = 0; run < Runs; run++)
        {
            double[] truth = [.. Enumerable.Range(0, Parameters).Select(_ => random.NextDouble() < 0.3 ? 2 * Normal(random) : 0)];
            double[] estimate = [.. truth.Select(t => t + Normal(random))];
            double[] error = [.. truth.Select(_ => Math.Sqrt(Enumerable.Range(0, Df).Sum(_ => Math.Pow(Normal(random), 2)) / Df))];
            PValue[] p = [.. estimate.Select((e, i) => PValue.FromLog(StudentT.LogTwoSidedTail(Math.Abs(e / error[i]), Df)))];
            PValue[] adjusted = new BenjaminiHochberg().Adjust(RankedFamily.Of(p, Parameters));
            int[] selected = [.. Enumerable.Range(0, Parameters).Where(i => q.Rejects(adjusted[i]))];
            if (selected.Length > 0)
            {
                double risk = SelectedIntervals.FalseCoverageRisk(q, Parameters, selected.Length);
                double share = selected.Count(i => Misses(SelectedIntervals.Marginal(estimate[i], error[i], Df, risk), truth[i])) / (double)selected.Length;
                missed.Sum += share;
                missed.Squares += share * share;
                missed.Plain += selected.Count(i => Math.Abs(estimate[i] - truth[i]) > plain * error[i]) / (double)selected.Length;
            }
        }

        double mean = missed.Sum / Runs;
        double standardError = Math.Sqrt(((missed.Squares / Runs) - (mean * mean)) / Runs);
        Assert.True(mean <= q.Value + (3 * standardError), $"false coverage {mean} with standard error {standardError}");
        Assert.True(mean > 0.02, $"false coverage {mean}: nothing was tried");
        Assert.True(missed.Plain / Runs > q.Value + (5 * standardError), $"unadjusted {missed.Plain / Runs}");
    }

    [Theory]
    [InlineData(3, 0)]
    [InlineData(3, 4)]
    [InlineData(0, 1)]
    public void Counts_that_cannot_be_are_refused(int parameters, int selected)
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => SelectedIntervals.FalseCoverageRisk(Level, parameters, selected));
        Assert.Throws<ArgumentOutOfRangeException>(() => SelectedIntervals.FalseCoverageRiskUnderAnyDependence(Level, parameters, selected));
    }

    [Theory]
    [InlineData(double.NaN, 1, 10, 0.05)]
    [InlineData(0, 0, 10, 0.05)]
    [InlineData(0, double.PositiveInfinity, 10, 0.05)]
    [InlineData(0, 1, 0, 0.05)]
    [InlineData(0, 1, 10, 0)]
    [InlineData(0, 1, 10, 1)]
    [InlineData(0, 1, 10, double.NaN)]
    public void What_gives_no_interval_is_refused(double estimate, double error, double df, double risk) =>
        Assert.Throws<ArgumentOutOfRangeException>(() => SelectedIntervals.Marginal(estimate, error, df, risk));

    // Of one out of one nothing was selected, and 1 + 1/2 + 1/3 + 1/4 is 25/12.
    [Fact]
    public void The_factor_for_any_dependence_is_the_harmonic_sum()
    {
        Assert.Equal(0.05, SelectedIntervals.FalseCoverageRiskUnderAnyDependence(Level, 1, 1), 1e-17);
        Assert.Equal(0.05 * 2 / 4 * 12 / 25, SelectedIntervals.FalseCoverageRiskUnderAnyDependence(Level, 4, 2), 1e-17);
    }

    private static void AssertInterval(ReferenceRow row, double risk, string? quantile, string name)
    {
        if (quantile is not null)
        {
            double expected = row.Number(quantile);
            Assert.Equal(expected, StudentT.TwoSidedQuantile(risk, row.Number("df")), 1e-13 * expected);
        }

        Interval interval = SelectedIntervals.Marginal(row.Number("estimate"), row.Number("se"), row.Number("df"), risk);
        Assert.Equal(row.Number($"{name}_lo"), interval.Lower, 1e-12);
        Assert.Equal(row.Number($"{name}_hi"), interval.Upper, 1e-12);
    }

    /// <summary>Values of every group whose mean is the given one and whose variance is the pooled one, to the rounding of doubles.</summary>
    private static TypedSample Values(string experiment)
    {
        (double[] means, int[] sizes, double variance) = Experiments[experiment];
        return TypedSample.OfDoubles(means.SelectMany((mean, g) =>
        {
            double[] ramp = [.. Enumerable.Range(0, sizes[g]).Select(j => j - ((sizes[g] - 1) / 2.0))];
            double scale = Math.Sqrt(variance * (sizes[g] - 1) / ramp.Sum(r => r * r));
            return ramp.Select(r => ($"{g}", (mean + (scale * r)).ToString("R", CultureInfo.InvariantCulture)));
        }));
    }

    private static bool Misses(Interval interval, double truth) => truth < interval.Lower || truth > interval.Upper;

    private static double Normal(Random random) => Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());
}
