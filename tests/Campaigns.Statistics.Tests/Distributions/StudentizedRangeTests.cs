using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Distributions;

/// <summary>The studentized range against quadruple-precision quadrature (srange_tail.csv, srange_quantile.csv), identities and published tables.</summary>
public sealed class StudentizedRangeTests(ITestOutputHelper output)
{
    private const double SmallestTested = 1e-300;

    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public void Tails_agree_with_quadruple_precision(bool tabled)
    {
        double worst = 0;
        int below = 0;
        foreach (ReferenceRow row in ReferenceTable.Read("experiment/srange_tail.csv").Rows)
        {
            double q = row.Number("q");
            double df = Df(row);
            StudentizedRange law = tabled ? StudentizedRange.For(row.Integer("k"), df) : StudentizedRange.Direct(row.Integer("k"), df);
            double truth = row.Number("log_upper");

            // The error of p is that of its logarithm, which cannot be kept below a unit in the last place.
            double error = Math.Abs(law.LogUpperTail(q) - truth);
            double bound = 3e-14 + (4e-16 * Math.Abs(truth));
            Assert.True(error <= bound, FormattableString.Invariant($"q = {q}, k = {law.K}, df = {df}: ln p = {law.LogUpperTail(q):R} instead of {truth:R}"));
            if (truth > Math.Log(SmallestTested))
            {
                Relative.AssertNear(row.Number("upper"), law.UpperTailPValue(q).Value, 2 * bound, FormattableString.Invariant($"q = {q}, k = {law.K}, df = {df}"));
                worst = Math.Max(worst, error);
            }

            below += truth < Math.Log(1e-30) ? 1 : 0;
        }

        Assert.True(below >= 40);
        output.WriteLine(FormattableString.Invariant($"largest relative error of p down to {SmallestTested}: {worst:E1}; {below} points below 1e-30"));
    }

    [Fact]
    public void Quantiles_agree_with_the_reference()
    {
        double worst = 0;
        foreach (ReferenceRow row in ReferenceTable.Read("experiment/srange_quantile.csv").Rows)
        {
            double q = StudentizedRange.Direct(row.Integer("k"), Df(row)).UpperQuantile(row.Number("alpha"));
            Relative.AssertNear(row.Number("q"), q, 2e-13, $"k = {row.Text("k")}, df = {row.Text("df")}, alpha = {row.Text("alpha")}");
            worst = Math.Max(worst, Relative.Error(q, row.Number("q")));
        }

        output.WriteLine(FormattableString.Invariant($"largest relative difference: {worst:E1}"));
    }

    /// <summary>The range of two is the size of a difference: sqrt 2 |T|.</summary>
    [Fact]
    public void For_two_variables_it_is_Students_t()
    {
        var random = new Random(20261202);
        double worst = 0;
        for (int i = 0; i < 3000; i++)
        {
            double df = i % 2 == 0 ? random.Next(1, 200) : Math.Exp(random.NextDouble() * 12);
            double t = Math.Exp((random.NextDouble() * 12) - 5);
            double truth = StudentT.LogTwoSidedTail(t, df);
            foreach (StudentizedRange law in new[] { StudentizedRange.For(2, df), StudentizedRange.Direct(2, df) })
            {
                double error = Math.Abs(law.LogUpperTail(t * Math.Sqrt(2)) - truth);
                Assert.True(error <= 1e-13 + (1e-15 * Math.Abs(truth)), FormattableString.Invariant($"t = {t:R}, df = {df:R}: off by {error:E1} at ln p = {truth:R}"));
                worst = Math.Max(worst, error / (1 + Math.Abs(truth)));
            }

            double probability = Math.Exp(-random.NextDouble() * 40);
            Relative.AssertNear(Math.Sqrt(2) * StudentT.TwoSidedQuantile(probability, df), StudentizedRange.Direct(2, df).UpperQuantile(probability), 1e-12, FormattableString.Invariant($"quantile of {probability:R}, df = {df:R}"));
        }

        output.WriteLine(FormattableString.Invariant($"largest error of ln p over 1 + |ln p|: {worst:E1}"));
    }

    /// <summary>Upper 2.5 % points of Harter (1960), as reprinted in Berthouex and Brown, Statistics for Environmental Engineers, table 20.3, and the 5 % points of the NIST/SEMATECH e-Handbook (4.65 and, from memory, 4.05).</summary>
    [Theory]
    [InlineData(5, 10, 0.05, 4.65)]
    [InlineData(4, 16, 0.05, 4.05)]
    public void Published_points_come_out(int k, double df, double alpha, double published) =>
        Assert.Equal(published, StudentizedRange.For(k, df).UpperQuantile(alpha), 0.006);

    [Fact]
    public void Tail_and_quantile_are_inverse_to_each_other_for_any_number_of_groups()
    {
        foreach (int k in new[] { 2, 3, 7, 60, 65, 500, 20_000 })
        {
            foreach (double df in new[] { 1, 2.5, 40, 99_997, 1e7, double.PositiveInfinity })
            {
                foreach (double p in new[] { 0.999, 0.5, 0.05, 1e-6, 1e-20, 1e-200 })
                {
                    var law = StudentizedRange.Direct(k, df);
                    double q = law.UpperQuantile(p);
                    Assert.True(q > 0, FormattableString.Invariant($"k = {k}, df = {df}, p = {p}: {q:R}"));
                    if (double.IsFinite(q))
                    {
                        double bound = (k > 1000 ? 5e-13 : 1e-13) + (2e-14 * Math.Abs(Math.Log(p)));
                        double direct = law.LogUpperTail(q) - Math.Log(p);
                        double tabled = StudentizedRange.For(k, df).LogUpperTail(q) - Math.Log(p);
                        Assert.True(Math.Abs(direct) <= bound && Math.Abs(tabled) <= bound, FormattableString.Invariant($"k = {k}, df = {df}, p = {p}: off by {direct:E1}, in the table by {tabled:E1}"));
                    }
                }
            }
        }
    }

    /// <summary>With one degree of freedom or many, far tails have closed forms: for large df k (k - 1) normal pairs, and always a power of q.</summary>
    [Fact]
    public void Far_tails_stay_finite_in_the_logarithm_and_keep_falling()
    {
        foreach (double df in new[] { 1.0, 7, 1000, 1e6 })
        {
            double before = 0;
            for (double q = 1e-3; q < 1e308; q *= 7)
            {
                double log = StudentizedRange.For(5, df).LogUpperTail(q);
                Assert.True(double.IsFinite(log) && log <= before + 1e-12);
                before = log;
            }

            double slope = StudentizedRange.For(5, df).LogUpperTail(1e200) - StudentizedRange.For(5, df).LogUpperTail(1e199);
            Assert.Equal(-df * Math.Log(10), slope, 1e-9 * df);
        }

        Assert.Equal(double.NegativeInfinity, StudentizedRange.For(3, 5).LogUpperTail(double.PositiveInfinity));
        Assert.True(StudentizedRange.For(3, 5).UpperTailPValue(double.PositiveInfinity).Log > double.NegativeInfinity);
        Assert.Equal(0, StudentizedRange.For(3, 5).LogUpperTail(-1));
        Assert.True(double.IsNaN(StudentizedRange.For(3, 5).LogUpperTail(double.NaN)));
        Assert.Throws<ArgumentOutOfRangeException>(() => StudentizedRange.For(1, 5));
        Assert.Throws<ArgumentOutOfRangeException>(() => StudentizedRange.For(3, 0.5));
        Assert.Throws<ArgumentOutOfRangeException>(() => StudentizedRange.For(3, 5).UpperQuantile(1.5));
    }

    /// <summary>Tables are filled as they are asked for; what was asked before, and by whom, must not show in any bit.</summary>
    [Fact]
    public void The_order_of_questions_and_the_number_of_threads_change_no_bit()
    {
        double[] q = [.. Enumerable.Range(0, 4000).Select(i => 0.01 + (i * 0.005))];
        double[] upwards = Ask(37.125, q);
        double[] downwards = Ask(37.25, [.. q.Reverse()]);
        StudentizedRange.For(6, 38);
        Assert.Equal(upwards.Length, downwards.Length);

        // The same law twice: the first object falls out of the fixed-size table when another takes its slot.
        for (int i = 0; i < 5000; i++)
        {
            StudentizedRange.For(6, 1000 + i);
        }

        var together = new double[q.Length];
        Parallel.For(0, q.Length, i => together[q.Length - 1 - i] = StudentizedRange.For(6, 37.125).LogUpperTail(q[q.Length - 1 - i]));
        Assert.Equal(upwards, together);
        Assert.Equal(downwards.Reverse(), q.Select(x => StudentizedRange.For(6, 37.25).LogUpperTail(x)));

        static double[] Ask(double df, double[] q) => [.. q.Select(x => StudentizedRange.For(6, df).LogUpperTail(x))];
    }

    private static double Df(ReferenceRow row) => row.Text("df") == "inf" ? double.PositiveInfinity : row.Number("df");
}
