using System.Globalization;
using Campaigns.Statistics.Checks;
using Campaigns.Statistics.Checks.Computation;
using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Checks;

public sealed class ShapiroWilkTests(ITestOutputHelper output)
{
    private const int Seed = 20261203;

    /// <summary>The same figures come from R 4.2.2, shapiro.test.</summary>
    [Theory]
    [InlineData(3, .974532224532225, .693903923531135)]
    [InlineData(4, .84520810515047, .211018049458835)]
    [InlineData(6, .8976714330645, .36034904991059)]
    [InlineData(11, .966136601665534, .845089260553694)]
    [InlineData(12, .962125192056891, .813687034348386)]
    public void The_first_values_of_a_list_give_the_W_and_p_of_R(int n, double w, double p)
    {
        double[] values = [2.1, 3.7, 1.2, 9.9, 4.4, 5.0, 0.3, 7.7, 6.1, 2.9, 3.3, 8.8];
        ShapiroWilk test = ShapiroWilk.Of(values.AsSpan(0, n));
        Relative.AssertNear(w, test.W, 2e-14, "W");
        Relative.AssertNear(p, test.P.Value, 1e-13, "p");
    }

    [Fact]
    public void Random_samples_of_every_size_and_shape_get_the_W_and_p_of_R()
    {
        RProgram.SkipIfAbsent();
        var random = new Random(Seed);
        int[] sizes = [.. Enumerable.Range(3, 60), 100, 101, 500, 1999, 2000, 4999, 5000];
        double[][] samples = [.. sizes.SelectMany(n => Enumerable.Range(0, 8).Select(shape => Sample(random, n, shape)))];
        string input = string.Join('\n', samples.Select(s => string.Join(' ', s.Select(v => v.ToString("R", CultureInfo.InvariantCulture)))));
        string[] answers = RProgram.Run("for (l in readLines(file('stdin'))) { s <- shapiro.test(as.numeric(strsplit(l, ' ')[[1]])); cat(sprintf('%.17g,%.17g\n', s$statistic, s$p.value)) }", input).Split('\n', StringSplitOptions.RemoveEmptyEntries);
        Assert.Equal(samples.Length, answers.Length);
        (double worstW, double worstP) = (0, 0);
        for (int i = 0; i < samples.Length; i++)
        {
            double[] r = [.. answers[i].Split(',').Select(t => double.Parse(t, CultureInfo.InvariantCulture))];
            ShapiroWilk test = ShapiroWilk.Of(samples[i]);
            worstW = Math.Max(worstW, Relative.Error(test.W, r[0]));
            worstP = Math.Max(worstP, Relative.Error(test.P.Value, r[1]));
        }

        output.WriteLine(FormattableString.Invariant($"{samples.Length} samples, W off by at most {worstW:E1}, p by {worstP:E1}, seed {Seed}"));

        // R forms 1 - W as a difference of two sums: at 5000 values its p is right to eleven digits (against 40-digit arithmetic ours to thirteen).
        Assert.True(worstW < 1e-13);
        Assert.True(worstP < 1e-10);
    }

    [Fact]
    public void Residuals_of_two_hundred_experiments_get_the_W_and_p_of_forty_digits()
    {
        ILookup<string, ReferenceRow> data = ReferenceTable.Read("experiment/experiments_data.csv").Rows.ToLookup(r => r.Text("experiment"));
        (double worstW, double worstP, int seen) = (0, 0, 0);
        foreach (ReferenceRow truth in ReferenceTable.Read("experiment/checks_exact.csv").Rows)
        {
            seen++;
            CheckFinding finding = CheckedExperiment.OfTable(data[truth.Text("experiment")], withOrder: false).Look(new Normality());
            worstW = Math.Max(worstW, Relative.Error(finding.Statistic!.Value, truth.Number("shapiro_w")));
            worstP = Math.Max(worstP, Relative.Error(finding.P!.Value.Value, truth.Number("shapiro_p")));
        }

        output.WriteLine(FormattableString.Invariant($"{seen} experiments, W off by at most {worstW:E1}, p by {worstP:E1}"));
        Assert.Equal(200, seen);
        Assert.True(worstW < 1e-15);
        Assert.True(worstP < 1e-13);
    }

    [Theory]
    [InlineData("experiments_data", "experiments_r", 160)]
    [InlineData("worked_examples_data", "worked_examples_r", 13)]
    public void Residuals_get_the_W_and_p_of_R(string dataTable, string rTable, int atLeast)
    {
        ILookup<string, ReferenceRow> data = ReferenceTable.Read($"experiment/{dataTable}.csv").Rows.ToLookup(r => r.Text("experiment"));
        ILookup<string, ReferenceRow> designs = ReferenceTable.Read("experiment/experiments_design.csv").Rows.ToLookup(r => r.Text("experiment"));
        (double worstW, double worstP, int seen) = (0, 0, 0);
        foreach (ReferenceRow r in ReferenceTable.Read($"experiment/{rTable}.csv").Rows.Where(r => r.Has("shapiro_w")))
        {
            string name = r.Text("experiment");
            if (designs[name].Any(d => d.Text("kind") is "offset" or "tiny"))
            {
                continue; // R's residuals have lost their digits there.
            }

            seen++;
            CheckFinding finding = CheckedExperiment.OfTable(data[name], withOrder: false).Look(new Normality());
            worstW = Math.Max(worstW, Relative.Error(finding.Statistic!.Value, r.Number("shapiro_w")));
            worstP = Math.Max(worstP, Relative.Error(finding.P!.Value.Value, r.Number("shapiro_p")));
        }

        output.WriteLine(FormattableString.Invariant($"{seen} experiments, W off by at most {worstW:E1}, p by {worstP:E1}"));
        Assert.True(seen >= atLeast);
        Assert.True(worstW < 1e-13);
        Assert.True(worstP < 1e-10);
    }

    /// <summary>W is least, n a_n^2/(n - 1), where all values but one are the same.</summary>
    [Fact]
    public void The_most_lopsided_sample_of_every_size_has_a_p_that_is_a_positive_double()
    {
        foreach (int n in (int[])[.. Enumerable.Range(4, 40), 100, 1000, 5000])
        {
            var values = new double[n];
            values[n / 2] = 1;
            ShapiroWilk test = ShapiroWilk.Of(values);
            Assert.InRange(test.W, 0.0001, 0.99);
            Assert.InRange(test.P.Value, 1e-200, 0.01);
        }
    }

    [Fact]
    public void A_sample_that_lies_on_its_weights_is_as_normal_as_can_be()
    {
        double[] scores = [.. Enumerable.Range(1, 50).Select(i => NormalLaw.Quantile((i - 0.375) / 50.25))];
        ShapiroWilk test = ShapiroWilk.Of(scores);
        Assert.InRange(test.W, 0.998, 1);
        Assert.InRange(test.P.Value, 0.999, 1);
    }

    [Fact]
    public void Scale_and_offset_and_order_change_nothing_that_matters()
    {
        double[] values = [1, 2, 4, 4, 7, 11, 12, 30];
        ShapiroWilk plain = ShapiroWilk.Of(values);
        Relative.AssertNear(plain.P.Value, ShapiroWilk.Of([.. values.Select(v => v * Math.ScaleB(1, -300))]).P.Value, 1e-14, "scaled");
        Relative.AssertNear(plain.P.Value, ShapiroWilk.Of([.. values.Reverse().Select(v => 64 - v)]).P.Value, 1e-12, "mirrored");
    }

    [Fact]
    public void Too_few_too_many_and_constant_values_are_refused()
    {
        Assert.Throws<ArgumentException>(() => ShapiroWilk.Of([1, 2]));
        Assert.Throws<ArgumentException>(() => ShapiroWilk.Of(new double[5001]));
        Assert.Throws<ArgumentException>(() => ShapiroWilk.Of([3, 3, 3]));
    }

    private static double[] Sample(Random random, int n, int shape) =>
    [
        .. Enumerable.Range(0, n).Select(i =>
        {
            double u = 1 - random.NextDouble();
            double normal = Math.Sqrt(-2 * Math.Log(u)) * Math.Cos(2 * Math.PI * random.NextDouble());
            return shape switch
            {
                0 => normal,
                1 => -Math.Log(u),
                2 => u,
                3 => Math.Exp(normal),
                4 => Math.Tan(Math.PI * (u - 0.5)),
                5 => Math.Round(2 * normal) + (i == 0 ? 0.25 : 0),
                6 => i % 2 + (u / 10),
                _ => 1000 + normal,
            };
        }),
    ];
}
