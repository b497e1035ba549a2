using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Distributions;

/// <summary>Against f_tail.csv and f_quantile.csv: 50- and 40-digit arithmetic with another continued fraction than ours.</summary>
public sealed class FDistributionTests(ITestOutputHelper output)
{
    private const double Representable = 1e-300;

    [Fact]
    public void Both_tails_and_their_logarithms_are_right_in_every_region()
    {
        var errors = new SortedDictionary<string, List<double>>(StringComparer.Ordinal);
        IReadOnlyList<ReferenceRow> rows = ReferenceTable.Read("experiment/f_tail.csv").Rows;
        Assert.Equal(2926, rows.Count);
        foreach (ReferenceRow row in rows)
        {
            var law = new FDistribution(row.Number("df1"), row.Number("df2"));
            double f = row.Number("f");
            Collect(errors, "upper", row.Number("upper"), law.UpperTail(f), row.Number("log_upper"), law.LogUpperTail(f));
            Collect(errors, "lower", row.Number("lower"), law.LowerTail(f), row.Number("log_lower"), law.LogLowerTail(f));
        }

        foreach ((string region, List<double> list) in errors)
        {
            output.WriteLine(FormattableString.Invariant($"{region,-34} {list.Count,5} rows  peak {list.Max():E1}  mean {list.Average():E1}"));
            Assert.True(list.Max() <= Bound(region), FormattableString.Invariant($"{region}: peak {list.Max():E1} above {Bound(region):E1}."));
        }
    }

    [Fact]
    public void Upper_quantiles_are_right_from_0_9_to_1e_minus_300()
    {
        double peak = 0;
        foreach (ReferenceRow row in ReferenceTable.Read("experiment/f_quantile.csv").Rows)
        {
            var law = new FDistribution(row.Number("df1"), row.Number("df2"));
            var mirrored = new FDistribution(row.Number("df2"), row.Number("df1"));
            double alpha = row.Number("alpha_upper");
            string what = $"({row.Text("df1")}, {row.Text("df2")}) at {row.Text("alpha_upper")}";
            double computed = law.UpperQuantile(alpha);
            peak = Math.Max(peak, Relative.Error(computed, row.Number("f")));
            Relative.AssertNear(row.Number("f"), computed, 5e-13, what);
            Relative.AssertNear(row.Number("f"), law.UpperQuantileOfLog(Math.Log(alpha)), 5e-13, what + " from its logarithm");

            // The reciprocal of F(df1, df2) is F(df2, df1).
            Relative.AssertNear(1 / row.Number("f"), mirrored.LowerQuantile(alpha), 5e-13, what + " mirrored");
        }

        output.WriteLine(FormattableString.Invariant($"peak relative error {peak:E1}"));
    }

    /// <remarks>With df1 = 2 the upper tail is (1 + 2f/df2)^(-df2/2); with df2 = 2 the lower tail is (1 + 2/(df1 f))^(-df1/2); both by integration of the density.</remarks>
    [Theory]
    [InlineData(7.3, 1e-5)]
    [InlineData(7.3, 0.4)]
    [InlineData(7.3, 12.5)]
    [InlineData(0.37, 3)]
    [InlineData(250.5, 0.99)]
    [InlineData(250.5, 40)]
    public void Fractional_degrees_of_freedom_meet_the_closed_forms(double df, double f)
    {
        Relative.AssertNear(Math.Pow(1 + (2 * f / df), -df / 2), new FDistribution(2, df).UpperTail(f), 2e-13, "upper tail, df1 = 2");
        Relative.AssertNear(Math.Pow(1 + (2 / (df * f)), -df / 2), new FDistribution(df, 2).LowerTail(f), 2e-13, "lower tail, df2 = 2");
        Relative.AssertNear(Math.Pow(1 + (2 * f / df), -(df / 2) - 1), Math.Exp(new FDistribution(2, df).LogDensity(f)), 2e-13, "density, df1 = 2");
    }

    /// <remarks>Where f_tail.csv has whole degrees of freedom, these have fractional ones: mpmath 1.3.0, log(betainc(df2/2, df1/2, 0, df2/(df2 + df1 f), regularized=True)) at 50 digits.</remarks>
    [Theory]
    [InlineData(3.5, 17.25, 2.75, -2.6949781016717012)]
    [InlineData(0.8, 4.6, 9.0, -3.3189931347956719)]
    [InlineData(12.6, 733.9, 0.2, -0.0011850300651784107)]
    public void Fractional_degrees_of_freedom_meet_mpmath(double df1, double df2, double f, double logUpper) =>
        Relative.AssertNear(logUpper, new FDistribution(df1, df2).LogUpperTail(f), 1e-13, "log upper tail");

    [Fact]
    public void The_ends_are_what_they_should_be()
    {
        var law = new FDistribution(3, 20);
        foreach (double f in new[] { 0, -1, double.NegativeInfinity })
        {
            Assert.Equal((1, 0, 0, double.NegativeInfinity), (law.UpperTail(f), law.LogUpperTail(f), law.LowerTail(f), law.LogLowerTail(f)));
        }

        Assert.Equal((0, double.NegativeInfinity, 1, 0), (law.UpperTail(double.PositiveInfinity), law.LogUpperTail(double.PositiveInfinity), law.LowerTail(double.PositiveInfinity), law.LogLowerTail(double.PositiveInfinity)));
        Assert.All([law.UpperTail(double.NaN), law.LogUpperTail(double.NaN), law.LowerTail(double.NaN), law.LogLowerTail(double.NaN), law.LogDensity(double.NaN)], v => Assert.Equal(double.NaN, v));
        Assert.Equal((0, double.PositiveInfinity), (law.UpperQuantile(1), law.UpperQuantile(0)));
        Assert.Equal((0, double.PositiveInfinity), (law.LowerQuantile(0), law.LowerQuantile(1)));
        Assert.Equal(double.PositiveInfinity, new FDistribution(1, 1).UpperQuantile(1e-300));
        Assert.Equal(double.NegativeInfinity, law.LogDensity(0));
        Assert.Equal(0, new FDistribution(2, 9).LogDensity(0));
        Assert.Equal(double.PositiveInfinity, new FDistribution(1, 9).LogDensity(0));
    }

    /// <remarks>The power laws of the far tails: with (1, 1) degrees of freedom P(F > f) = 2 arctan(f^-1/2)/pi.</remarks>
    [Theory]
    [InlineData(1e200)]
    [InlineData(1e281)]
    [InlineData(1.7e308)]
    public void Tails_are_right_to_the_ends_of_the_doubles(double f)
    {
        var law = new FDistribution(1, 1);
        double expected = Math.Log(2 / Math.PI) - (Math.Log(f) / 2);
        Relative.AssertNear(expected, law.LogUpperTail(f), 1e-14, "upper");
        Relative.AssertNear(expected, law.LogLowerTail(1 / f), 1e-14, "lower");
        Relative.AssertNear(expected - (Math.Log(f) / 2), law.LogDensity(f) + (Math.Log(f) / 2) + Math.Log(2), 1e-13, "density");
    }

    [Theory]
    [InlineData(0, 5)]
    [InlineData(-1, 5)]
    [InlineData(5, double.NaN)]
    [InlineData(5, double.PositiveInfinity)]
    public void Degrees_of_freedom_outside_their_range_are_refused(double df1, double df2) =>
        Assert.Throws<ArgumentOutOfRangeException>(() => new FDistribution(df1, df2));

    [Fact]
    public void Probabilities_outside_their_range_are_refused()
    {
        var law = new FDistribution(3, 20);
        Assert.All([-0.1, 1.1, double.NaN], p =>
        {
            Assert.Throws<ArgumentOutOfRangeException>(() => law.UpperQuantile(p));
            Assert.Throws<ArgumentOutOfRangeException>(() => law.LowerQuantile(p));
        });
        Assert.Throws<ArgumentOutOfRangeException>(() => law.UpperQuantileOfLog(0.5));
    }

    [Fact]
    public void The_table_of_laws_gives_each_its_own_under_many_threads()
    {
        Parallel.For(0, 20_000, i =>
        {
            double df1 = (i % 7) + 1;
            double df2 = (i % 611) + 1.5;
            FDistribution law = FDistribution.For(df1, df2);
            Assert.Equal((df1, df2), (law.Df1, law.Df2));
        });
        Assert.Same(FDistribution.For(4, 45), FDistribution.For(4, 45));
    }

    [Fact]
    public void A_law_made_for_one_question_answers_with_the_same_bits()
    {
        foreach (ReferenceRow row in ReferenceTable.Read("experiment/f_tail.csv").Rows)
        {
            (double df1, double df2, double f) = (row.Number("df1"), row.Number("df2"), row.Number("f"));
            Assert.Equal(new FDistribution(df1, df2).UpperTailPValue(f), FDistribution.Once(df1, df2).UpperTailPValue(f));
            Assert.Equal(new FDistribution(df1, df2).UpperTailPValue(f), FDistribution.Once(df1, df2).UpperTailPValue(WideReal.From(f)));
        }
    }

    /// <remarks>With (2, df2) degrees of freedom ln P(F > f) = -df2/2 ln(1 + 2f/df2), by integration of the density.</remarks>
    [Theory]
    [InlineData(299)]
    [InlineData(301)]
    [InlineData(308)]
    [InlineData(309)]
    [InlineData(5000)]
    public void The_upper_tail_goes_on_beyond_the_doubles(int power)
    {
        double expected = -3.65 * ((power * Math.Log(10)) + Math.Log(2 / 7.3));
        Relative.AssertNear(expected, new FDistribution(2, 7.3).UpperTailPValue(WideReal.PowerOfTen(power)).Log, 1e-14, "ln p");
    }

    private static void Collect(SortedDictionary<string, List<double>> errors, string tail, double truth, double computed, double logTruth, double logComputed)
    {
        string region = logTruth switch
        {
            > -0.7 => "1 above 1/2",
            > -4.7 => "2 from 0.01 to 1/2",
            > -34.6 => "3 from 1e-15 to 0.01",
            > -690.8 => "4 from 1e-300 to 1e-15",
            _ => "5 below 1e-300",
        };
        Add(errors, $"ln {tail}, {region}", Relative.Error(logComputed, logTruth));
        if (truth > Representable)
        {
            Add(errors, $"{tail}, {region}", Relative.Error(computed, truth));
        }
    }

    private static void Add(SortedDictionary<string, List<double>> errors, string region, double error)
    {
        if (!errors.TryGetValue(region, out List<double>? list))
        {
            errors[region] = list = [];
        }

        list.Add(error);
    }

    /// <summary>What was reached, with a little room for other mathematics libraries. May only be lowered.</summary>
    private static double Bound(string region) =>
        region.StartsWith("ln", StringComparison.Ordinal)
            ? region[^1] == '2' && region.Contains("above", StringComparison.Ordinal) ? 4e-13
                : region.Contains("0.01 to 1/2", StringComparison.Ordinal) ? 3e-14
                : 2e-15
            : region.Contains("1e-300 to", StringComparison.Ordinal) ? 4e-13 : 4e-14;
}
