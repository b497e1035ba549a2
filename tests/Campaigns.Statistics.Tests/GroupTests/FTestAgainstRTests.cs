using System.Globalization;
using System.Text;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>Random experiments sent to R: anova(lm()), pf() and t.test() as the outside referee.</summary>
public sealed class FTestAgainstRTests(ITestOutputHelper output)
{
    private const int Seed = 20261201;
    private const double Eps = 2.220446049250313e-16;

    private const string LinearModels = """
        d <- read.csv(file('stdin'), colClasses = c('integer', 'factor', 'numeric'))
        for (s in split(d, d$e)) {
          a <- anova(lm(v ~ g, data = droplevels(s)))
          p <- pf(a$F[1], a$Df[1], a$Df[2], lower.tail = FALSE)
          cat(sprintf('%.17g,%.17g,%.17g,%.17g\n', a$F[1], a$`Sum Sq`[1], a$`Sum Sq`[2], p))
        }
        """;

    private const string Groups = """
        d <- read.csv(file('stdin'), colClasses = c('integer', 'factor', 'numeric'))
        for (s in split(d, d$e)) {
          ci <- t.test(s$v, conf.level = 0.9)$conf.int
          cat(sprintf('%.17g,%.17g,%.17g,%.17g,%.17g\n', mean(s$v), sd(s$v), sd(s$v) / sqrt(length(s$v)), ci[1], ci[2]))
        }
        """;

    [Fact]
    public void Two_thousand_random_experiments_get_the_F_the_sums_of_squares_and_the_p_of_R()
    {
        RProgram.SkipIfAbsent();
        var random = new Random(Seed);
        (string Group, string Value)[][] experiments = [.. Enumerable.Range(0, 2000).Select(_ => Experiment(random))];
        string[] answers = Ask(LinearModels, experiments);
        double worst = 0;
        for (int i = 0; i < experiments.Length; i++)
        {
            Tested tested = Assert.IsType<Tested>(TypedSample.OfText(experiments[i]).Test(new FTest()));
            double[] r = Numbers(answers[i]);
            double within = tested.Variation!.Within.SumOfSquares;
            double between = tested.Variation!.Between.SumOfSquares;

            // R reads the values as doubles and rotates the whole vector, offset included: each effect is off by a few eps times the vector's length,
            // which is 2 sqrt(SS) times that in a sum of squares. Ours is exact.
            double length = Math.Sqrt(experiments[i].Sum(o => Math.Pow(double.Parse(o.Value, CultureInfo.InvariantCulture), 2)));
            double absolute = 10 * Eps * length;
            double withinError = (2 * absolute / Math.Sqrt(within)) + (20 * Eps);
            double betweenError = (2 * absolute / Math.Sqrt(between)) + (absolute * absolute / between) + (20 * Eps);
            string what = FormattableString.Invariant($"experiment {i} of seed {Seed}");
            Relative.AssertNear(r[2], within, withinError, what + " SS within");
            Relative.AssertNear(r[1], between, betweenError, what + " SS between");
            Relative.AssertNear(r[0], tested.Statistic, withinError + betweenError, what + " F");

            // d ln P/d ln F lies between -df2/2 and 0; pf itself is good to 2e-13.
            double pError = (tested.Df2!.Value / 2 * (withinError + betweenError)) + 1e-12;
            Relative.AssertNear(r[3], tested.P.Value, pError, what + " p");
            worst = Math.Max(worst, Relative.Error(tested.P.Value, r[3]));
        }

        output.WriteLine(FormattableString.Invariant($"seed {Seed}; largest relative difference of p: {worst:E1}"));
    }

    [Fact]
    public void Means_spreads_and_intervals_of_random_groups_are_those_of_R()
    {
        RProgram.SkipIfAbsent();
        var random = new Random(Seed + 1);
        (string Group, string Value)[][] groups = [.. Enumerable.Range(0, 300).Select(_ => Values(random, "a", random.Next(2, 30), 0, 3).ToArray())];
        string[] answers = Ask(Groups, groups);
        for (int i = 0; i < groups.Length; i++)
        {
            GroupSummary summary = Assert.Single(TypedSample.OfText(groups[i]).Summaries(0.9));
            double[] r = Numbers(answers[i]);
            double[] ours = [summary.Mean!.Value, summary.StandardDeviation!.Value, summary.StandardError!.Value, summary.Lower!.Value, summary.Upper!.Value];

            // Values within a few standard deviations of zero; R's qt is good to about 1e-12, an end near zero is compared by the interval's width.
            double scale = Math.Abs(ours[0]) + ours[4] - ours[3];
            Assert.All(ours.Zip(r), pair => Assert.True(Math.Abs(pair.First - pair.Second) <= 1e-11 * scale, $"group {i}: {pair.First:R} against {pair.Second:R}"));
        }
    }

    private static (string Group, string Value)[] Experiment(Random random)
    {
        int groups = random.Next(2, 9);
        int decimals = random.Next(0, 6);
        double offset = random.Next(3) == 0 ? 1000 * random.NextDouble() : 0;
        double effect = Math.Pow(10, (random.NextDouble() * 3) - 2);
        return [.. Enumerable.Range(0, groups).SelectMany(g => Values(random, $"g{g}", random.Next(2, 15), offset + (effect * random.NextDouble()), decimals + 1))];
    }

    private static IEnumerable<(string Group, string Value)> Values(Random random, string group, int count, double mean, int decimals) =>
        Enumerable.Range(0, count).Select(_ => (group, (mean + Normal(random)).ToString("F" + decimals, CultureInfo.InvariantCulture)));

    private static double Normal(Random random) =>
        Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());

    private static string[] Ask(string script, (string Group, string Value)[][] experiments)
    {
        var input = new StringBuilder("e,g,v\n");
        for (int i = 0; i < experiments.Length; i++)
        {
            foreach ((string group, string value) in experiments[i])
            {
                input.Append(CultureInfo.InvariantCulture, $"{i},{group},{value}\n");
            }
        }

        string[] answers = RProgram.Run(script, input.ToString()).Split('\n', StringSplitOptions.RemoveEmptyEntries);
        Assert.Equal(experiments.Length, answers.Length);
        return answers;
    }

    private static double[] Numbers(string line) => [.. line.Split(',').Select(t => double.Parse(t, CultureInfo.InvariantCulture))];
}
