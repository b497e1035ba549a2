using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Domain.Tests;

public sealed class CorrectedRiskTests
{
    private const int Seed = 20261207;
    private static readonly SignificanceLevel Five = new(0.05);

    public static TheoryData<string> Keys => [.. CorrectionRegistry.All.Select(c => c.Key)];

    [Fact]
    public void Without_and_with_single_steps_the_risk_is_that_of_the_reference_table()
    {
        foreach (ReferenceRow row in ReferenceTable.Read("campaign/cumulative_risk.csv").Rows.Where(r => r.Integer("m") > 0))
        {
            var level = new SignificanceLevel(row.Number("alpha"));
            int m = row.Integer("m");
            Near(row.Number("fwer_independent"), Of("none", level, m, m).AtLeastOne, 1e-14);
            Near(row.Number("pfer_m_alpha"), Of("none", level, m, m).ExpectedFalse!.Value, 1e-14);
            Near(row.Number("fwer_bonferroni_independent"), Of("bonferroni", level, m, m).AtLeastOne, 1e-13);
            Near(row.Number("fwer_bonferroni_independent"), Of("holm", level, m, m).AtLeastOne, 1e-13);
            Near(level.Value, Of("bonferroni", level, m, m).ExpectedFalse!.Value, 1e-14);
            Near(level.Value, Of("sidak", level, m, m).AtLeastOne, 1e-13);
            Near(m * row.Number("level_sidak"), Of("sidak", level, m, m).ExpectedFalse!.Value, 1e-13);
            Near(level.Value, Of("bh", level, m, m).AtLeastOne, 1e-13);
        }
    }

    [Fact]
    public void The_expected_false_survivors_of_Benjamini_and_Hochberg_are_the_exact_ones()
    {
        foreach (ReferenceRow row in ReferenceTable.Read("campaign/bh_null_distribution.csv").Rows)
        {
            int m = row.Integer("m");
            Near(row.Number("E_R"), Of("bh", new SignificanceLevel(row.Number("q")), m, m).ExpectedFalse!.Value, 1e-13);
        }
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void Simulated_families_without_effects_show_the_risk_also_while_part_of_them_is_untested(string key)
    {
        // 20,000 seeded families of uniform p-values; four standard errors.
        Correction correction = CorrectionRegistry.Find(key)!;
        var random = new Random(Seed);
        var level = new SignificanceLevel(0.2);
        foreach ((int tests, int familySize) in ((int, int)[])[(3, 3), (4, 9)])
        {
            const int Runs = 20_000;
            int any = 0;
            long all = 0;
            double[] adjusted = new double[tests];
            for (int run = 0; run < Runs; run++)
            {
                double[] p = [.. Enumerable.Range(0, tests).Select(_ => random.NextDouble())];
                correction.Adjust(RankedFamily.Of(p, familySize), adjusted);
                int survivors = adjusted.Count(a => a <= level.Value);
                any += survivors > 0 ? 1 : 0;
                all += survivors;
            }

            CorrectedRisk risk = CorrectedRisk.Of(correction, level, familySize, tests);
            double error = 4 * Math.Sqrt(risk.AtLeastOne * (1 - risk.AtLeastOne) / Runs);
            Assert.True(any / (double)Runs <= risk.AtLeastOne + error, $"{any} of {Runs} against {risk}");
            Assert.True(!risk.IsExact || any / (double)Runs >= risk.AtLeastOne - error, $"{any} of {Runs} against {risk}");
            if (risk.ExpectedFalse is { } expected)
            {
                Assert.InRange(all / (double)Runs, expected - (4 * Math.Sqrt(tests * expected / Runs)), expected + (4 * Math.Sqrt(tests * expected / Runs)));
            }
        }
    }

    [Fact]
    public void Nothing_tested_risks_nothing_and_more_tests_than_hypotheses_are_refused()
    {
        Assert.Equal(new CorrectedRisk(0, true, 0), Of("bh", Five, 10, 0));
        Assert.Equal(new CorrectedRisk(0, true, 0), Of("bh", Five, 0, 0));
        Assert.Throws<ArgumentOutOfRangeException>(() => Of("bh", Five, 3, 4));
    }

    private static CorrectedRisk Of(string key, SignificanceLevel level, int familySize, int tests) => CorrectedRisk.Of(CorrectionRegistry.Find(key)!, level, familySize, tests);

    private static void Near(double expected, double actual, double relative) =>
        Assert.True(Math.Abs(actual - expected) <= relative * Math.Abs(expected), FormattableString.Invariant($"expected {expected:R}, got {actual:R}"));
}
