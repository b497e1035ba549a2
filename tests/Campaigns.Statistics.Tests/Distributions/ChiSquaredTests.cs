using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Distributions;

/// <summary>Against chi_squared_tail.csv: 80-digit arithmetic, each tail by its own expansion.</summary>
public sealed class ChiSquaredTests(ITestOutputHelper output)
{
    private const double Representable = 1e-300;

    [Fact]
    public void Both_tails_and_their_logarithms_are_right_in_every_region()
    {
        var errors = new SortedDictionary<string, List<double>>(StringComparer.Ordinal);
        IReadOnlyList<ReferenceRow> rows = ReferenceTable.Read("experiment/chi_squared_tail.csv").Rows;
        Assert.Equal(850, rows.Count);
        foreach (ReferenceRow row in rows)
        {
            double x = row.Number("x");
            double df = row.Number("df");
            double log = row.Number("log_upper");
            Add(errors, "ln upper", log, Relative.Error(ChiSquared.LogUpperTail(x, df), log));
            Add(errors, "ln lower", row.Number("log_lower"), Relative.Error(ChiSquared.LogLowerTail(x, df), row.Number("log_lower")));
            if (row.Number("upper") > Representable)
            {
                Add(errors, "upper", log, Relative.Error(ChiSquared.UpperTail(x, df), row.Number("upper")));
            }

            PValue p = ChiSquared.UpperTailPValue(x, df);
            Assert.Equal((ChiSquared.UpperTail(x, df), ChiSquared.LogUpperTail(x, df)), (p.Value, p.Log));
        }

        foreach ((string region, List<double> list) in errors)
        {
            output.WriteLine(FormattableString.Invariant($"{region,-34} {list.Count,5} rows  peak {list.Max():E1}  mean {list.Average():E1}"));
            Assert.True(list.Max() <= Bound(region), FormattableString.Invariant($"{region}: peak {list.Max():E1} above {Bound(region):E1}."));
        }
    }

    /// <remarks>By integration of the density: with 2 degrees of freedom the upper tail is e^(-x/2), with 4 it is (1 + x/2) e^(-x/2).</remarks>
    [Theory]
    [InlineData(1e-200)]
    [InlineData(0.3)]
    [InlineData(2)]
    [InlineData(4)]
    [InlineData(77.5)]
    [InlineData(1e5)]
    [InlineData(1e200)]
    [InlineData(1.7e308)]
    public void The_closed_forms_of_2_and_4_degrees_of_freedom_come_out(double x)
    {
        Relative.AssertNear(-x / 2, ChiSquared.LogUpperTail(x, 2), 5e-14, "2 degrees of freedom");
        if (x > 1e-10)
        {
            // For small x this form cancels, its error grows to 1e-16 over x^2/8.
            Relative.AssertNear(Math.Log(1 + (x / 2)) - (x / 2), ChiSquared.LogUpperTail(x, 4), x < 1 ? 3e-14 : 2e-15, "4 degrees of freedom");
        }
    }

    /// <remarks>Tables of the chi-squared law as printed in any textbook (from memory): 3.841, 9.488, 18.307 and 124.342 are exceeded with probability 0.05.</remarks>
    [Theory]
    [InlineData(3.841, 1)]
    [InlineData(9.488, 4)]
    [InlineData(18.307, 10)]
    [InlineData(124.342, 100)]
    public void The_printed_five_per_cent_points_come_out(double x, double df) => Assert.Equal(0.05, ChiSquared.UpperTail(x, df), 2e-5);

    [Fact]
    public void The_ends_are_what_they_should_be()
    {
        foreach (double x in new[] { 0, -1, double.NegativeInfinity })
        {
            Assert.Equal((1, 0, double.NegativeInfinity), (ChiSquared.UpperTail(x, 3), ChiSquared.LogUpperTail(x, 3), ChiSquared.LogLowerTail(x, 3)));
            Assert.Equal(PValue.One, ChiSquared.UpperTailPValue(x, 3));
        }

        Assert.Equal((0, double.NegativeInfinity, 0), (ChiSquared.UpperTail(double.PositiveInfinity, 3), ChiSquared.LogUpperTail(double.PositiveInfinity, 3), ChiSquared.LogLowerTail(double.PositiveInfinity, 3)));
        Assert.All([ChiSquared.UpperTail(double.NaN, 3), ChiSquared.LogUpperTail(double.NaN, 3), ChiSquared.LogLowerTail(double.NaN, 3)], v => Assert.Equal(double.NaN, v));
        Assert.Throws<ArgumentOutOfRangeException>(() => ChiSquared.UpperTailPValue(double.NaN, 3));
    }

    [Theory]
    [InlineData(0)]
    [InlineData(-1)]
    [InlineData(double.NaN)]
    [InlineData(double.PositiveInfinity)]
    public void Degrees_of_freedom_outside_their_range_are_refused(double df) =>
        Assert.Throws<ArgumentOutOfRangeException>(() => ChiSquared.LogUpperTail(1, df));

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(7)]
    [InlineData(59)]
    [InlineData(4000)]
    public void The_upper_tail_falls_without_a_step_back_where_the_expansions_meet(double df)
    {
        double last = 0;
        for (double x = 0.01 * df; x < (3 * df) + 10; x += df / 50)
        {
            double log = ChiSquared.LogUpperTail(x, df);
            Assert.True(log < last || x < 0.8 * df, FormattableString.Invariant($"at {x:R}: {log:R} after {last:R}"));
            last = log;
        }

        double around = ChiSquared.LogUpperTail(df + 2, df);
        Relative.AssertNear(around, ChiSquared.LogUpperTail(Math.BitDecrement(df + 2), df), 1e-13, "either side of the change of expansion");
    }

    /// <summary>What was reached, with a little room for other mathematics libraries. May only be lowered.</summary>
    private static double Bound(string region) => region switch
    {
        "ln upper, 1 above 1/2" or "ln lower, 1 above 1/2" => 2e-13,
        "upper, 4 from 1e-300 to 1e-15" => 2e-13,
        _ when region.StartsWith("upper", StringComparison.Ordinal) => 1e-14,
        _ when region.Contains("0.01 to 1/2", StringComparison.Ordinal) => 5e-15,
        _ => 6e-16,
    };

    private static void Add(SortedDictionary<string, List<double>> errors, string tail, double log, double error)
    {
        string region = tail + log switch
        {
            > -0.7 => ", 1 above 1/2",
            > -4.7 => ", 2 from 0.01 to 1/2",
            > -34.6 => ", 3 from 1e-15 to 0.01",
            > -690.8 => ", 4 from 1e-300 to 1e-15",
            _ => ", 5 below 1e-300",
        };
        if (!errors.TryGetValue(region, out List<double>? list))
        {
            errors[region] = list = [];
        }

        list.Add(error);
    }
}
