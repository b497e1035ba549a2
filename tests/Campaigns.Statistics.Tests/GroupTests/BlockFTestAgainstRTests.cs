using System.Globalization;
using System.Text;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Units;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>Experiments in blocks sent to R: anova(lm(value ~ block + group)), its coefficients, hat values and friedman.test() as the outside referee.</summary>
public sealed class BlockFTestAgainstRTests(ITestOutputHelper output)
{
    private const int Seed = 20261202;
    private const double Eps = 2.220446049250313e-16;

    private const string LinearModels = """
        d <- read.csv(file('stdin'), colClasses = c('integer', 'character', 'character', 'numeric'))
        for (s in split(d, d$e)) {
          s$g <- factor(s$g, levels = unique(s$g)); s$b <- factor(s$b, levels = unique(s$b))
          m <- if (nlevels(s$b) > 1) lm(v ~ b + g, data = s) else lm(v ~ g, data = s)
          a <- anova(m)
          if (nlevels(s$b) > 1) blocks <- a['b', 'Sum Sq'] else blocks <- 0
          last <- paste0('g', levels(s$g)[nlevels(s$g)])
          cat(sprintf('%d,%.17g,%.17g,%.17g,%.17g,%.17g,%.17g,%.17g,%.17g\n', df.residual(m), blocks, a['g', 'Sum Sq'], a['Residuals', 'Sum Sq'],
            a['g', 'Pr(>F)'], coef(m)[last], coef(summary(m))[last, 'Std. Error'], hatvalues(m)[1], residuals(m)[1]))
        }
        """;

    private const string DataSets = """
        show <- function(name, y, g, b) {
          a <- anova(lm(y ~ b + g))
          for (i in seq_along(y)) cat(sprintf('%s,%s,%s,%.10g\n', name, g[i], b[i], y[i]))
          cat(sprintf('%s,%d,%d,%.17g,%.17g,%.17g\n', name, a$Df[2], a$Df[3], a$`Sum Sq`[2], a$F[2], a$`Pr(>F)`[2]))
        }
        show('warpbreaks', warpbreaks$breaks, warpbreaks$tension, warpbreaks$wool)
        show('npk', npk$yield, paste0(npk$N, npk$P), npk$block)
        show('OrchardSprays', OrchardSprays$decrease, OrchardSprays$treatment, factor(OrchardSprays$rowpos))
        show('sleep', sleep$extra, sleep$group, sleep$ID)
        """;

    private const string Friedman = """
        d <- read.csv(file('stdin'), colClasses = c('integer', 'character', 'character', 'numeric'))
        for (s in split(d, d$e)) cat(sprintf('%.17g\n', friedman.test(v ~ g | b, data = s)$statistic))
        """;

    [Fact]
    public void Five_hundred_random_designs_get_the_table_the_estimates_and_the_p_of_R()
    {
        RProgram.SkipIfAbsent();
        var random = new Random(Seed);
        DesignedSample[] designs = [.. Testable(random).Take(500)];
        string[] answers = RProgram.Run(LinearModels, Input(designs)).Split('\n', StringSplitOptions.RemoveEmptyEntries);
        Assert.Equal(designs.Length, answers.Length);
        double worst = 0;
        for (int i = 0; i < designs.Length; i++)
        {
            double[] r = Numbers(answers[i].Split(','));
            Tested tested = Assert.IsType<Tested>(new BlockFTest().Test(designs[i].Sample));
            VariationTable table = tested.Variation!;
            Assert.Equal(r[0], tested.Df2);

            // R reads the values as doubles and rotates the whole vector, offset included: each effect is off by some eps times the vector's length for every column of the design,
            // which is 2 sqrt(SS) times that in a sum of squares. Ours is exact.
            double length = Math.Sqrt(designs[i].Rows.Sum(o => Math.Pow(double.Parse(o.Value, CultureInfo.InvariantCulture), 2)));
            double absolute = 20 * Eps * length;
            string what = FormattableString.Invariant($"design {i} of seed {Seed}");
            double residualError = Compare(r[3], table.Within.SumOfSquares, absolute, what + " residual");
            double groupError = Compare(r[2], table.Between.SumOfSquares, absolute, what + " groups");
            if (table.Blocks!.Value.DegreesOfFreedom > 0)
            {
                Compare(r[1], table.Blocks.Value.SumOfSquares, absolute, what + " blocks");
            }

            double pError = (tested.Df2!.Value / 2 * (residualError + groupError)) + 1e-12;
            Relative.AssertNear(r[4], tested.P.Value, pError, what + " p");
            worst = Math.Max(worst, Relative.Error(tested.P.Value, r[4]));
            CompareEstimates(designs[i], r, absolute, residualError, what);
        }

        output.WriteLine(FormattableString.Invariant($"seed {Seed}; largest relative difference of p: {worst:E1}"));
    }

    [Fact]
    public void Data_sets_of_R_get_the_figures_of_R()
    {
        RProgram.SkipIfAbsent();
        string[][] lines = [.. RProgram.Run(DataSets, "").Split('\n', StringSplitOptions.RemoveEmptyEntries).Select(l => l.Split(','))];
        Assert.Equal(4, lines.Count(l => l.Length == 6));
        foreach (IGrouping<string, string[]> set in lines.GroupBy(l => l[0]))
        {
            var sample = new DesignedSample(set.Where(l => l.Length == 4).Select(l => new DesignedRow(l[1], l[2], "", l[3])));
            double[] r = Numbers(set.Single(l => l.Length == 6)[1..]);
            Tested tested = Assert.IsType<Tested>(new BlockFTest().Test(sample.Sample));
            Assert.Equal((r[0], r[1]), (tested.Df1, tested.Df2));
            Relative.AssertNear(r[2], tested.Variation!.Between.SumOfSquares, 1e-12, set.Key + " groups");
            Relative.AssertNear(r[3], tested.Statistic, 1e-12, set.Key + " F");
            Relative.AssertNear(r[4], tested.P.Value, 1e-11, set.Key + " p");
        }
    }

    /// <summary>On ranks within complete blocks F = (b - 1) X/(b (k - 1) - X), X the statistic of Friedman corrected for ties (R. L. Iman and J. M. Davenport 1980, Communications in Statistics A 9:571).</summary>
    [Fact]
    public void On_ranks_within_complete_blocks_F_goes_with_the_statistic_of_Friedman()
    {
        RProgram.SkipIfAbsent();
        var random = new Random(Seed);
        DesignedSample[] designs = [.. Enumerable.Range(0, 40).Select(_ => Ranked(random))];
        double[] friedman = Numbers(RProgram.Run(Friedman, Input(designs)).Split('\n', StringSplitOptions.RemoveEmptyEntries));
        for (int i = 0; i < designs.Length; i++)
        {
            Tested tested = Assert.IsType<Tested>(new BlockFTest().Test(designs[i].Sample));
            int k = tested.GroupCount;
            int b = tested.ObservationCount / k;
            Relative.AssertNear((b - 1) * friedman[i] / ((b * (k - 1)) - friedman[i]), tested.Statistic, 1e-11, $"design {i}");
        }
    }

    private static void CompareEstimates(DesignedSample design, double[] r, double absolute, double residualError, string what)
    {
        GroupEstimates estimates = GroupEstimates.InBlocks(design.Sample)!;
        FittedLayout fit = FittedLayout.InBlocks(design.Sample)!;
        int last = design.GroupNames.Length - 1;
        double error = estimates.StandardErrorOfDifference(0, last);

        // A coefficient is off by what its standard error makes of an error of one effect; R's factors of it and hat values by a few eps for every column.
        double factor = error / estimates.ResidualStandardDeviation;
        Assert.InRange(Math.Abs(r[5] - estimates.Difference(0, last)), 0, absolute * factor * 2);
        Relative.AssertNear(r[6], error, residualError + (200 * Eps), what + " standard error");
        Relative.AssertNear(r[7], fit.Leverages[0], 500 * Eps, what + " leverage");
        Assert.InRange(Math.Abs(r[8] - (fit.Residuals[0] * fit.Scale.ToDouble())), 0, absolute);
    }

    private static double Compare(double r, double ours, double absolute, string what)
    {
        double error = (2 * absolute / Math.Sqrt(ours)) + (absolute * absolute / ours) + (20 * Eps);
        Relative.AssertNear(r, ours, error, what);
        return error;
    }

    private static IEnumerable<DesignedSample> Testable(Random random)
    {
        while (true)
        {
            DesignedSample design = RandomDesigns.Draw(random);
            if (new BlockFTest().Test(design.Sample) is Tested { Variation.Between.SumOfSquares: > 0 })
            {
                yield return design;
            }
        }
    }

    private static DesignedSample Ranked(Random random)
    {
        int k = random.Next(3, 7);
        int b = random.Next(3, 12);
        var rows = new List<DesignedRow>();
        for (int j = 0; j < b; j++)
        {
            int[] values = [.. Enumerable.Range(0, k).Select(i => random.Next(10) + i)];
            rows.AddRange(values.Select((v, i) => new DesignedRow($"g{i}", $"b{j}", "", (values.Count(o => o < v) + ((values.Count(o => o == v) + 1) / 2.0)).ToString(CultureInfo.InvariantCulture))));
        }

        return new DesignedSample(rows);
    }

    private static string Input(DesignedSample[] designs)
    {
        var input = new StringBuilder("e,g,b,v\n");
        for (int i = 0; i < designs.Length; i++)
        {
            foreach (DesignedRow row in designs[i].Rows)
            {
                input.Append(CultureInfo.InvariantCulture, $"{i},{row.Group},{row.Block},{row.Value}\n");
            }
        }

        return input.ToString();
    }

    private static double[] Numbers(IEnumerable<string> cells) => [.. cells.Select(t => double.Parse(t, CultureInfo.InvariantCulture))];
}
