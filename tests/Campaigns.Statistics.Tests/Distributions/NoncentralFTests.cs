using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Distributions;

/// <summary>Against ncf.csv and ncf_far.csv: Poisson mixtures of beta tails in 40-digit arithmetic, by another fraction and with other limits than ours.</summary>
public sealed class NoncentralFTests(ITestOutputHelper output)
{
    private const double Representable = 1e-300;

    [Fact]
    public void Both_tails_and_their_logarithms_are_right_in_every_region()
    {
        var peaks = new SortedDictionary<string, double>(StringComparer.Ordinal);
        IReadOnlyList<ReferenceRow> rows = ReferenceTable.Read("experiment/ncf.csv").Rows;
        Assert.Equal(900, rows.Count);
        foreach (ReferenceRow row in rows)
        {
            var law = new NoncentralF(row.Number("df1"), row.Number("df2"), row.Number("ncp"));
            double f = row.Number("f");
            Collect("upper", row, law.UpperTail(f), law.LogUpperTail(f));
            Collect("lower", row, law.LowerTail(f), law.LogLowerTail(f));
        }

        foreach ((string region, double peak) in peaks)
        {
            output.WriteLine(FormattableString.Invariant($"{region,-30} peak {peak:E1}"));
            double bound = region.Contains("below", StringComparison.Ordinal) && !region.StartsWith("ln", StringComparison.Ordinal) ? 8e-13 : 2e-13;
            Assert.True(peak <= bound, FormattableString.Invariant($"{region}: peak {peak:E1} above {bound:E1}."));
        }

        void Collect(string tail, ReferenceRow row, double computed, double logComputed)
        {
            double truth = row.Number(tail);
            if (truth < Representable)
            {
                return;
            }

            string region = truth > 0.5 ? "above 1/2" : truth > 1e-15 ? "1e-15 to 1/2" : "below 1e-15";
            Raise($"{tail}, {region}", Relative.Error(computed, truth));

            // Of a tail next to 1 the table does not hold the logarithm's digits.
            if (truth < 0.9)
            {
                Raise($"ln {tail}, {region}", Relative.Error(logComputed, Math.Log(truth)));
            }
        }

        void Raise(string region, double error) => peaks[region] = Math.Max(peaks.GetValueOrDefault(region), error);
    }

    /// <remarks>Sums of 8 to 53,000 terms, noncentralities to 100,000, degrees of freedom fractional or in the millions, on both sides of every change of method.</remarks>
    [Fact]
    public void Logarithms_are_right_where_sums_are_long_and_tails_far_out()
    {
        IReadOnlyList<ReferenceRow> rows = ReferenceTable.Read("experiment/ncf_far.csv").Rows;
        Assert.Equal(34, rows.Count);
        foreach (ReferenceRow row in rows)
        {
            var law = new NoncentralF(row.Number("df1"), row.Number("df2"), row.Number("ncp"));
            string what = $"({row.Text("df1")}, {row.Text("df2")}, {row.Text("ncp")}) at {row.Text("f")}";
            double f = row.Number("f");
            foreach ((string tail, double computed, double plain) in new[] { ("log_lower", law.LogLowerTail(f), law.LowerTail(f)), ("log_upper", law.LogUpperTail(f), law.UpperTail(f)) })
            {
                double truth = row.Number(tail);
                double error = Relative.Error(computed, truth);
                output.WriteLine(FormattableString.Invariant($"{what} {tail} {truth:G4}: {error:E1}"));
                Assert.True(error <= 2e-13, FormattableString.Invariant($"{what} {tail}: {computed:R} instead of {truth:R}."));
                Assert.Equal(Math.Exp(truth), plain, 5e-13 * Math.Max(1, Math.Abs(truth)) * Math.Exp(truth));
            }
        }
    }

    [Theory]
    [InlineData(3, 20)]
    [InlineData(0.5, 7.25)]
    [InlineData(59, 100_000)]
    public void Without_noncentrality_it_is_the_central_law(double df1, double df2)
    {
        foreach (double f in new[] { 1e-300, 1e-3, 0.7, 1, 2.5, 40, 1e12, 1e300 })
        {
            Assert.Equal(FDistribution.For(df1, df2).LogUpperTail(f), new NoncentralF(df1, df2, 0).LogUpperTail(f), 1e-15);
            Relative.AssertNear(FDistribution.For(df1, df2).LogLowerTail(f), new NoncentralF(df1, df2, 1e-300).LogLowerTail(f), 1e-14, "lower tail");
        }
    }

    /// <remarks>With (1, df2) degrees of freedom F is the square of a noncentral t; for huge df2 of a normal variable with mean sqrt(lambda): P(F > f) = Q(sqrt f - sqrt lambda) + Q(sqrt f + sqrt lambda). Q(0) = 1/2, Q(1) = 0.15865525393145705 (Abramowitz and Stegun 1964, table 26.1).</remarks>
    [Theory]
    [InlineData(1e4, 1e4, 0.5, 1e-12)]
    [InlineData(1e4, 10201, 0.15865525393145705, 1e-12)]
    [InlineData(1e8, 100020001, 0.15865525393145705, 1e-9)]
    [InlineData(1e12, 1000002000001, 0.15865525393145705, 1e-5)]
    public void For_huge_denominators_it_is_the_square_of_a_normal_variable(double noncentrality, double f, double upper, double tolerance) =>
        Relative.AssertNear(upper, new NoncentralF(1, 1e18, noncentrality).UpperTail(f), tolerance, "upper tail");

    [Fact]
    public void Tails_stay_numbers_at_the_ends_of_the_doubles()
    {
        foreach (double noncentrality in new[] { 0, 5e-324, 1e-30, 1e-3, 1, 128, 255.9, 256.1, 1e5, 1e9, 1e15, 1e27, 1e31, 1e100, 1e300, double.MaxValue })
        {
            foreach (double f in new[] { double.Epsilon, 1e-300, 1e-20, 1, 1e20, 1e300, double.MaxValue })
            {
                foreach ((double df1, double df2) in new[] { (1.0, 1.0), (3, 20), (59, 6e6), (0.25, 0.25) })
                {
                    var law = new NoncentralF(df1, df2, noncentrality);
                    string what = FormattableString.Invariant($"({df1}, {df2}, {noncentrality}) at {f}");
                    double lower = law.LowerTail(f);
                    double upper = law.UpperTail(f);
                    Assert.True(lower is >= 0 and <= 1 && upper is >= 0 and <= 1, what);
                    Assert.True(Math.Abs(lower + upper - 1) <= 1e-9, FormattableString.Invariant($"{what}: {lower:R} + {upper:R}"));
                    Assert.True(law.LogLowerTail(f) <= 0 && law.LogUpperTail(f) <= 0, what);
                }
            }
        }
    }

    [Fact]
    public void The_ends_are_what_they_should_be()
    {
        var law = new NoncentralF(3, 20, 7.5);
        Assert.All([0, -1, double.NegativeInfinity], f =>
            Assert.Equal((1, 0, 0, double.NegativeInfinity), (law.UpperTail(f), law.LogUpperTail(f), law.LowerTail(f), law.LogLowerTail(f))));
        Assert.Equal((0, 1), (law.UpperTail(double.PositiveInfinity), law.LowerTail(double.PositiveInfinity)));
        Assert.All([law.UpperTail(double.NaN), law.LogUpperTail(double.NaN), law.LowerTail(double.NaN), law.LogLowerTail(double.NaN)], v => Assert.Equal(double.NaN, v));
        Assert.All([-1, double.NaN, double.PositiveInfinity], l => Assert.Throws<ArgumentOutOfRangeException>(() => new NoncentralF(3, 20, l)));
        Assert.Throws<ArgumentOutOfRangeException>(() => new NoncentralF(0, 20, 1));
        Assert.All([0, 1, double.NaN], p => Assert.Throws<ArgumentOutOfRangeException>(() => NoncentralF.NoncentralityOfUpperTail(2, 3, 20, p)));
        Assert.Throws<ArgumentOutOfRangeException>(() => NoncentralF.NoncentralityOfLowerTail(double.NaN, 3, 20, 0.5));
    }
}
