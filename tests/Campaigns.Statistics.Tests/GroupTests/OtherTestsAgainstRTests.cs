using System.Globalization;
using System.Text;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>Random experiments sent to R: oneway.test() and kruskal.test() as the outside referee.</summary>
public sealed class OtherTestsAgainstRTests(ITestOutputHelper output)
{
    private const int Seed = 20261203;
    private const int Experiments = 500;
    private const double Eps = 2.220446049250313e-16;

    private const string Script = """
        d <- read.csv(file('stdin'), colClasses = c('integer', 'factor', 'numeric'))
        for (s in split(d, d$e)) {
          s <- droplevels(s)
          w <- oneway.test(v ~ g, data = s)
          k <- kruskal.test(v ~ g, data = s)
          cat(sprintf('%.17g,%.17g,%.17g,%.17g,%.17g,%.17g\n', w$statistic, w$parameter[1], w$parameter[2], w$p.value, k$statistic, k$p.value))
        }
        """;

    [Fact]
    public void Five_hundred_random_experiments_get_the_statistics_and_the_p_of_R()
    {
        RProgram.SkipIfAbsent();
        var random = new Random(Seed);
        (string Group, string Value)[][] experiments = [.. Enumerable.Range(0, Experiments).Select(_ => Experiment(random))];
        string[] answers = Ask(experiments);
        int welchTests = 0;
        double worstWelch = 0;
        double worstRanks = 0;
        for (int i = 0; i < experiments.Length; i++)
        {
            TypedSample sample = TypedSample.OfText(experiments[i]);
            double[] r = [.. answers[i].Split(',').Select(t => t is "NaN" or "Inf" ? double.NaN : double.Parse(t, CultureInfo.InvariantCulture))];
            string what = FormattableString.Invariant($"experiment {i} of seed {Seed}");
            if (sample.Test(new WelchTest()) is Tested welch)
            {
                welchTests++;
                double error = WelchErrorOfR(sample, experiments[i], welch);
                Relative.AssertNear(r[0], welch.Statistic, error, what + " Welch F");
                Assert.Equal(r[1], welch.Df1);
                Relative.AssertNear(r[2], welch.Df2!.Value, error, what + " Welch df2");
                Relative.AssertNear(r[3], welch.P.Value, ((welch.Df2!.Value / 2) + Math.Abs(welch.P.Log)) * error + 1e-12, what + " Welch p");
                worstWelch = Math.Max(worstWelch, Relative.Error(welch.P.Value, r[3]));
            }

            // 12/(N (N + 1)) * sum - 3 (N + 1) cancels in R: its error is a few eps of 3 (N + 1), which then weighs on p with dln p/dH, at most about 1.
            Tested ranks = Assert.IsType<Tested>(sample.Test(new KruskalWallisTest()));
            double absolute = 20 * Eps * (sample.Count + 1);
            Assert.True(Math.Abs(r[4] - ranks.Statistic) <= absolute, $"{what} H: {ranks.Statistic:R} against {r[4]:R}.");
            Relative.AssertNear(r[5], ranks.P.Value, absolute + 1e-12, what + " Kruskal-Wallis p");
            worstRanks = Math.Max(worstRanks, Relative.Error(ranks.P.Value, r[5]));
        }

        output.WriteLine(FormattableString.Invariant($"seed {Seed}; {welchTests} Welch tests; largest relative difference of p: Welch {worstWelch:E1}, Kruskal-Wallis {worstRanks:E1}"));
        Assert.True(welchTests > 400);
    }

    /// <summary>R reads the values as doubles: each mean is off by about eps of the largest value, measured in the group's own standard deviation s for its variance, and in the spread of the means, sqrt(F/W), for F.</summary>
    private static double WelchErrorOfR(TypedSample sample, (string Group, string Value)[] rows, Tested welch)
    {
        double largest = rows.Max(r => Math.Abs(double.Parse(r.Value, CultureInfo.InvariantCulture)));
        GroupSummary[] groups = sample.Summaries(0.95);
        double smallest = groups.Min(g => g.StandardDeviation!.Value);
        double weight = groups.Sum(g => 1 / (g.StandardError!.Value * g.StandardError!.Value));
        return (20 * Eps * largest * ((1 / smallest) + Math.Sqrt(weight / welch.Statistic))) + (40 * Eps);
    }

    /// <summary>Whole numbers, hence ties everywhere, in a third of them.</summary>
    private static (string Group, string Value)[] Experiment(Random random)
    {
        string format = "F" + (random.Next(3) == 0 ? 0 : random.Next(1, 7));
        double offset = random.Next(3) == 0 ? 1000 * random.NextDouble() : 0;
        double effect = Math.Pow(10, (random.NextDouble() * 2.5) - 2);
        return [.. from g in Enumerable.Range(0, random.Next(2, 9))
            let mean = offset + (effect * random.NextDouble())
            let spread = Math.Pow(4, random.NextDouble())
            from _ in Enumerable.Range(0, random.Next(3, 16))
            select ($"g{g}", (mean + (spread * Normal(random))).ToString(format, CultureInfo.InvariantCulture))];
    }

    private static double Normal(Random random) =>
        Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());

    private static string[] Ask((string Group, string Value)[][] experiments)
    {
        var input = new StringBuilder("e,g,v\n");
        for (int i = 0; i < experiments.Length; i++)
        {
            foreach ((string group, string value) in experiments[i])
            {
                input.Append(CultureInfo.InvariantCulture, $"{i},{group},{value}\n");
            }
        }

        string[] answers = RProgram.Run(Script, input.ToString()).Split('\n', StringSplitOptions.RemoveEmptyEntries);
        Assert.Equal(experiments.Length, answers.Length);
        return answers;
    }
}
