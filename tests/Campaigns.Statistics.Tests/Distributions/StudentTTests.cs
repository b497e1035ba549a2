using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Distributions;

public sealed class StudentTTests
{
    /// <remarks>Abramowitz and Stegun (1964), table 26.10, two-sided points; df = 1: tan(pi (1 - p)/2), df = 2: closed form.</remarks>
    [Theory]
    [InlineData(0.05, 1, 12.706)]
    [InlineData(0.05, 2, 4.303)]
    [InlineData(0.05, 10, 2.228)]
    [InlineData(0.01, 10, 3.169)]
    [InlineData(0.05, 30, 2.042)]
    [InlineData(0.001, 60, 3.460)]
    public void Two_sided_points_are_those_of_the_printed_table(double probability, double df, double t) =>
        Assert.Equal(t, StudentT.TwoSidedQuantile(probability, df), 0.0005);

    [Theory]
    [InlineData(0.5)]
    [InlineData(0.05)]
    [InlineData(1e-9)]
    [InlineData(1e-100)]
    public void With_one_and_two_degrees_of_freedom_the_points_have_closed_forms(double p)
    {
        Relative.AssertNear(1 / Math.Tan(Math.PI * p / 2), StudentT.TwoSidedQuantile(p, 1), 1e-13, "df = 1");
        Relative.AssertNear((1 - p) * Math.Sqrt(2 / (p * (2 - p))), StudentT.TwoSidedQuantile(p, 2), 1e-13, "df = 2");
    }

    [Theory]
    [InlineData(0)]
    [InlineData(0.3)]
    [InlineData(-0.3)]
    [InlineData(25)]
    [InlineData(-25)]
    [InlineData(1e10)]
    public void With_two_degrees_of_freedom_the_tail_has_a_closed_form(double t)
    {
        // P(T > t) = (1 - t/sqrt(2 + t^2))/2, for t > 0 written as 1/(sqrt(2 + t^2) (sqrt(2 + t^2) + t)).
        double root = Math.Sqrt(2 + (t * t));
        double upper = t > 0 ? 1 / (root * (root + t)) : (1 - (t / root)) / 2;
        Relative.AssertNear(upper, StudentT.UpperTail(t, 2), 1e-14, "upper tail");
        Relative.AssertNear(Math.Log(upper), StudentT.LogUpperTail(t, 2), 1e-13, "log upper tail");
        Relative.AssertNear(1, StudentT.UpperTail(t, 2) + StudentT.UpperTail(-t, 2), 1e-15, "both");
    }

    [Fact]
    public void The_tail_goes_on_where_the_square_of_t_would_overflow()
    {
        // df = 1: P(|T| > t) = 2 arctan(1/t)/pi.
        Relative.AssertNear(Math.Log(2 / Math.PI) - (300 * Math.Log(10)), StudentT.LogTwoSidedTail(-1e300, 1), 1e-14, "df = 1");
        Assert.Equal(double.NaN, StudentT.LogUpperTail(double.NaN, 5));
        Assert.Equal(double.NegativeInfinity, StudentT.LogUpperTail(double.PositiveInfinity, 5));
        Assert.Equal(1, StudentT.UpperTail(double.NegativeInfinity, 5));
    }
}
