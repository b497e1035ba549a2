using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.Numerics;

/// <summary>Against accurate.csv: mpmath, 60 and 80 digits.</summary>
public sealed class AccurateTests(ITestOutputHelper output)
{
    private const double Eps = 2.220446049250313e-16;

    [Theory]
    [InlineData("log1p", 1.5)]
    [InlineData("expm1", 2)]
    [InlineData("log1mexp", 2)]
    [InlineData("log1pminus", 6)]
    [InlineData("stirling", 4)]
    public void Each_function_keeps_its_relative_accuracy_everywhere(string function, double boundInEps)
    {
        double peak = 0;
        int seen = 0;
        foreach (ReferenceRow row in ReferenceTable.Read("experiment/accurate.csv").Rows.Where(r => r.Text("function") == function))
        {
            double x = row.Number("x");
            double truth = row.Number("expected");
            double computed = function switch
            {
                "log1p" => Accurate.Log1p(x),
                "expm1" => Accurate.Expm1(x),
                "log1mexp" => Accurate.Log1mExp(x),
                "log1pminus" => Accurate.Log1pMinus(x),
                _ => StirlingError.Of(x),
            };

            // The Stirling error is wanted to an absolute 1e-16: it is added to a logarithm.
            double scale = function == "stirling" ? Math.Max(1, truth) : Math.Abs(truth);
            double error = truth == computed ? 0 : Math.Abs(computed - truth) / scale / Eps;
            Assert.True(error <= boundInEps, FormattableString.Invariant($"{function}({x:R}) = {computed:R} instead of {truth:R}: {error:F1} eps."));
            peak = Math.Max(peak, error);
            seen++;
        }

        output.WriteLine(FormattableString.Invariant($"{function}: {seen} values, peak error {peak:F2} eps"));
        Assert.True(seen > 20);
    }

    [Fact]
    public void The_ends_are_what_they_should_be()
    {
        Assert.Equal(double.NegativeInfinity, Accurate.Log1p(-1));
        Assert.Equal(double.NaN, Accurate.Log1p(-1.5));
        Assert.Equal(double.PositiveInfinity, Accurate.Log1p(double.PositiveInfinity));
        Assert.Equal(-1, Accurate.Expm1(double.NegativeInfinity));
        Assert.Equal(double.PositiveInfinity, Accurate.Expm1(1000));
        Assert.Equal(double.NaN, Accurate.Expm1(double.NaN));
        Assert.Equal(double.NegativeInfinity, Accurate.Log1mExp(0));
        Assert.Equal(0, Accurate.Log1mExp(double.NegativeInfinity));
        Assert.Equal(double.NaN, Accurate.Log1mExp(0.1));
        Assert.True(double.IsNegative(Accurate.Log1p(-0.0)));
        Assert.True(double.IsNegative(Accurate.Expm1(-0.0)));
        Assert.Throws<ArgumentOutOfRangeException>(() => StirlingError.Of(0));
    }
}
