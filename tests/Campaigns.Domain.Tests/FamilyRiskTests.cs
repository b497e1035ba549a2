using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Domain.Tests;

public sealed class FamilyRiskTests
{
    private static readonly SignificanceLevel Five = new(0.05);

    [Fact]
    public void Six_tests_at_the_five_percent_level_risk_a_false_positive_in_more_than_one_case_of_four()
    {
        // 1 - 0.95^2 and 1 - 0.95^6, worked by hand; 20 tests: the exact power of the double 0.05, mpmath, 50 digits.
        Assert.Equal(0.0975, FamilyRisk.AtLeastOneIfIndependent(2, Five), 1e-16);
        Assert.Equal(0.264908109375, FamilyRisk.AtLeastOneIfIndependent(6, Five), 1e-15);
        Assert.Equal(0.6415140775914577, FamilyRisk.AtLeastOneIfIndependent(20, Five), 2e-16);
    }

    [Fact]
    public void The_cumulative_risk_agrees_with_the_reference_table()
    {
        foreach (ReferenceRow row in ReferenceTable.Read("campaign/cumulative_risk.csv").Rows)
        {
            var level = new SignificanceLevel(row.Number("alpha"));
            int tests = row.Integer("m");
            Near(row.Number("fwer_independent"), FamilyRisk.AtLeastOneIfIndependent(tests, level), 1e-14);
            Near(row.Number("pfer_m_alpha"), FamilyRisk.ExpectedFalsePositives(tests, level), 1e-15);
            Near(row.Number("sd_false_positives_independent"), FamilyRisk.StandardDeviationIfIndependent(tests, level), 1e-15);
            Near(row.Number("fwer_bound_any_dependence"), FamilyRisk.AtLeastOneUpperBound(tests, level), 1e-15);
            if (tests > 0)
            {
                var shared = new SignificanceLevel(row.Number("level_bonferroni"));
                Near(row.Number("fwer_bonferroni_independent"), FamilyRisk.AtLeastOneIfIndependent(tests, shared), 1e-14);
                Near(level.Value, FamilyRisk.AtLeastOneIfIndependent(tests, new SignificanceLevel(row.Number("level_sidak"))), 1e-14);
            }
        }
    }

    [Fact]
    public void The_number_of_false_positives_follows_the_binomial_law()
    {
        foreach (ReferenceRow row in ReferenceTable.Read("campaign/false_positive_binomial.csv").Rows)
        {
            double tail = FamilyRisk.AtLeastIfIndependent(row.Integer("k"), row.Integer("m"), new SignificanceLevel(row.Number("alpha")));
            Near(row.Number("P_V_ge_k"), tail, 1e-12);
        }
    }

    [Fact]
    public void Risk_lies_between_its_bounds_and_grows_with_the_tests()
    {
        double before = 0;
        for (int tests = 1; tests <= 2000; tests++)
        {
            double risk = FamilyRisk.AtLeastOneIfIndependent(tests, Five);
            Assert.InRange(risk, FamilyRisk.AtLeastOneLowerBound(tests, Five), FamilyRisk.AtLeastOneUpperBound(tests, Five));
            Assert.True(risk >= before);
            before = risk;
        }
    }

    [Fact]
    public void Tail_probabilities_add_up_to_the_expected_number()
    {
        // The mean of a count is the sum of P(V >= k) over k = 1, 2, ...
        foreach (int tests in (int[])[1, 2, 17, 400, 3000])
        {
            double sum = Enumerable.Range(1, tests).Sum(k => FamilyRisk.AtLeastIfIndependent(k, tests, Five));
            Near(FamilyRisk.ExpectedFalsePositives(tests, Five), sum, 1e-12);
        }
    }

    [Fact]
    public void The_ends_are_exact()
    {
        Assert.Equal(0, FamilyRisk.AtLeastOneIfIndependent(0, Five));
        Assert.Equal(0, FamilyRisk.AtLeastOneLowerBound(0, Five));
        Assert.Equal(0, FamilyRisk.AtLeastOneUpperBound(0, Five));
        Assert.Equal(0, FamilyRisk.StandardDeviationIfIndependent(0, Five));
        Assert.Equal(1, FamilyRisk.AtLeastIfIndependent(0, 0, Five));
        Assert.Equal(0, FamilyRisk.AtLeastIfIndependent(1, 0, Five));
        Assert.Equal(0, FamilyRisk.AtLeastIfIndependent(4, 3, Five));
        Near(0.05 * 0.05 * 0.05, FamilyRisk.AtLeastIfIndependent(3, 3, Five), 1e-15);
    }

    [Fact]
    public void A_tiny_level_keeps_its_digits() =>
        Near(1e-17, FamilyRisk.AtLeastOneIfIndependent(10, new SignificanceLevel(1e-18)), 1e-15);

    [Fact]
    public void A_negative_number_of_tests_is_refused()
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => FamilyRisk.AtLeastOneIfIndependent(-1, Five));
        Assert.Throws<ArgumentOutOfRangeException>(() => FamilyRisk.AtLeastOneLowerBound(-1, Five));
        Assert.Throws<ArgumentOutOfRangeException>(() => FamilyRisk.ExpectedFalsePositives(-1, Five));
        Assert.Throws<ArgumentOutOfRangeException>(() => FamilyRisk.AtLeastIfIndependent(1, -1, Five));
    }

    private static void Near(double expected, double actual, double relative) =>
        Assert.True(Math.Abs(actual - expected) <= relative * Math.Abs(expected), FormattableString.Invariant($"expected {expected:R}, got {actual:R}"));
}
