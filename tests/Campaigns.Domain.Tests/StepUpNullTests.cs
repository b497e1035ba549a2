using Campaigns.Statistics.Tests.External;

namespace Campaigns.Domain.Tests;

public sealed class StepUpNullTests
{
    [Fact]
    public void The_law_and_its_mean_are_the_exact_ones()
    {
        foreach (ReferenceRow row in ReferenceTable.Read("campaign/bh_null_distribution.csv").Rows)
        {
            double q = row.Number("q");
            int m = row.Integer("m");
            Near(row.Number("P_R_eq_k"), StepUpNull.Exactly(row.Integer("k"), m, q / m), 2e-13);
            Near(row.Number("E_R"), StepUpNull.Expected(m, q / m), 2e-14);
            Near(row.Number("limit_q_over_(1-q)^2"), StepUpNull.Expected(100_000_000, q / 100_000_000), 1e-6);
        }
    }

    [Theory]
    [InlineData(1, 1, 0.05)]
    [InlineData(7, 7, 0.3)]
    [InlineData(40, 100, 0.05)]
    [InlineData(1000, 1000, 0.5)]
    [InlineData(3000, 3001, 0.9)]
    public void Probabilities_add_up_to_one_and_to_their_mean(int tests, int familySize, double level)
    {
        double step = level / familySize;
        double[] law = [.. Enumerable.Range(0, tests + 1).Select(k => StepUpNull.Exactly(k, tests, step))];
        Near(1, law.Sum(), 1e-11);
        Near(StepUpNull.Expected(tests, step), law.Select((p, k) => p * k).Sum(), 1e-11);
        Near(StepUpNull.AtLeastOne(tests, step), law.Skip(1).Sum(), 1e-11);
        Assert.Equal(0, StepUpNull.Exactly(tests + 1, tests, step));
    }

    [Fact]
    public void A_step_outside_its_range_is_refused()
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => StepUpNull.Exactly(1, 10, 0.2));
        Assert.Throws<ArgumentOutOfRangeException>(() => StepUpNull.Expected(10, 0));
        Assert.Throws<ArgumentOutOfRangeException>(() => StepUpNull.AtLeastOne(-1, 0.01));
        Assert.Throws<ArgumentOutOfRangeException>(() => StepUpNull.Exactly(-1, 10, 0.01));
    }

    private static void Near(double expected, double actual, double relative) =>
        Assert.True(Math.Abs(actual - expected) <= relative * Math.Abs(expected), FormattableString.Invariant($"expected {expected:R}, got {actual:R}"));
}
