using System.Globalization;
using System.Text;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.FollowUps;

/// <summary>Random experiments sent to R: TukeyHSD and pairwise.t.test as the outside referee.</summary>
public sealed class FollowUpsAgainstRTests(ITestOutputHelper output)
{
    private const int Seed = 20261203;

    private const string Script = """
        d <- read.csv(file('stdin'), colClasses = c('integer', 'factor', 'numeric'))
        for (s in split(d, d$e)) {
          s <- droplevels(s)
          t <- TukeyHSD(aov(v ~ g, data = s))$g
          h <- pairwise.t.test(s$v, s$g, p.adjust.method = 'holm')$p.value
          L <- levels(s$g)
          pairs <- t(combn(length(L), 2))
          for (i in seq_len(nrow(pairs)))
            cat(sprintf('%d,%.17g,%.17g,%.17g,%.17g,%.17g\n', s$e[1], t[i, 1], t[i, 2], t[i, 3], t[i, 4], h[L[pairs[i, 2]], L[pairs[i, 1]]]))
        }
        """;

    /// <summary>R integrates the lower tail of the studentized range on a fixed grid: with 8 and more degrees of freedom its p is good to about 1e-5 absolutely, its quantiles to 1e-5 relatively, hence the bounds. Its pairwise t p-values are good to 1e-12 relatively.</summary>
    [Fact]
    public void Three_hundred_random_experiments_get_what_TukeyHSD_and_pairwise_t_test_give()
    {
        RProgram.SkipIfAbsent();
        var random = new Random(Seed);
        (string Group, string Value)[][] experiments = [.. Enumerable.Range(0, 300).Select(_ => Experiment(random))];
        var input = new StringBuilder("e,g,v\n");
        for (int i = 0; i < experiments.Length; i++)
        {
            foreach ((string group, string value) in experiments[i])
            {
                input.Append(CultureInfo.InvariantCulture, $"{i},{group},{value}\n");
            }
        }

        ILookup<int, double[]> answers = RProgram.Run(Script, input.ToString()).Split('\n', StringSplitOptions.RemoveEmptyEntries)
            .Select(l => l.Split(',').Select(t => double.Parse(t, CultureInfo.InvariantCulture)).ToArray())
            .ToLookup(n => (int)n[0]);
        double worstTukey = 0;
        double worstHolm = 0;
        for (int i = 0; i < experiments.Length; i++)
        {
            GroupEstimates estimates = TypedSample.OfText(experiments[i]).Estimates()!;
            IReadOnlyList<GroupComparison> tukey = FollowUpRegistry.Find("tukey-kramer")!.Compare(estimates, null, 0.95);
            IReadOnlyList<GroupComparison> holm = FollowUpRegistry.Find("holm-pairs")!.Compare(estimates, null, 0.95);
            Assert.Equal(answers[i].Count(), tukey.Count);
            foreach ((double[] r, GroupComparison t, GroupComparison h) in answers[i].Zip(tukey, holm))
            {
                double width = r[3] - r[2];
                Assert.Equal(r[1], t.Difference, 1e-12 * width);
                Assert.Equal(r[2], t.Lower!.Value, 1e-5 * width);
                Assert.Equal(r[3], t.Upper!.Value, 1e-5 * width);
                Assert.Equal(r[4], t.P!.Value.Value, 1e-5);
                Relative.AssertNear(r[5], h.P!.Value.Value, 1e-10, $"experiment {i}");
                worstTukey = Math.Max(worstTukey, Math.Abs(r[4] - t.P.Value.Value));
                worstHolm = Math.Max(worstHolm, Relative.Error(h.P.Value.Value, r[5]));
            }
        }

        output.WriteLine(FormattableString.Invariant($"seed {Seed}; largest difference: Tukey p {worstTukey:E1} absolute, Holm p {worstHolm:E1} relative"));
    }

    private static (string Group, string Value)[] Experiment(Random random)
    {
        int groups = random.Next(2, 9);
        double effect = random.NextDouble() * 2;
        return [.. Enumerable.Range(0, groups).SelectMany(g =>
        {
            double mean = effect * random.NextDouble();
            return Enumerable.Range(0, random.Next(5, 15)).Select(_ => ($"g{g}", (mean + Normal(random)).ToString("F4", CultureInfo.InvariantCulture))).ToArray();
        })];
    }

    private static double Normal(Random random) =>
        Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());
}
