using System.Globalization;
using System.Text;
using Campaigns.Statistics.Checks;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Checks;

public sealed class ChecksWithinBlocksTests(ITestOutputHelper output)
{
    private const int Seed = 20261207;

    private const string AdditiveModels = """
        d <- read.csv(file('stdin'), colClasses = c('integer', 'factor', 'factor', 'numeric', 'integer'))
        for (s in split(d, d$e)) {
          f <- lm(v ~ g + b, data = droplevels(s))
          free <- hatvalues(f) < 1 - 1e-9
          r <- rstudent(f)
          r[!free] <- 0
          i <- which.max(abs(r))
          w <- shapiro.test(residuals(f)[free])
          e <- residuals(f)[order(s$o)]
          cat(sprintf('%.17g,%.17g,%.17g,%.17g,%.17g\n', r[i], min(1, sum(free) * 2 * pt(-abs(r[i]), f$df.residual - 1)), w$statistic, w$p.value, sum(diff(e)^2) / sum(e^2)))
        }
        """;

    [Fact]
    public void Two_hundred_random_layouts_get_the_residuals_and_tests_of_R()
    {
        RProgram.SkipIfAbsent();
        var random = new Random(Seed);
        Row[][] layouts = [.. Enumerable.Range(0, 200).Select(_ => RandomLayout(random))];
        var text = new StringBuilder("e,g,b,v,o\n");
        for (int i = 0; i < layouts.Length; i++)
        {
            foreach (Row row in layouts[i])
            {
                text.AppendLine(CultureInfo.InvariantCulture, $"{i},{row.Group},b{row.Block},{row.Value},{row.Order}");
            }
        }

        string[] answers = RProgram.Run(AdditiveModels, text.ToString()).Split('\n', StringSplitOptions.RemoveEmptyEntries);
        Assert.Equal(layouts.Length, answers.Length);
        (double worst, int warned) = (0, 0);
        for (int i = 0; i < answers.Length; i++)
        {
            double[] r = [.. answers[i].Split(',').Select(t => double.Parse(t, CultureInfo.InvariantCulture))];
            var experiment = CheckedExperiment.OfText(layouts[i].Select(l => (l.Group, l.Value)), [.. layouts[i].Select(l => (long)l.Order)], [.. layouts[i].Select(l => l.Block)]);
            CheckFinding outliers = experiment.Look(new Outliers());
            CheckFinding normality = experiment.Look(new Normality());
            CheckFinding order = experiment.Look(new RunOrder());
            warned += outliers.Verdict == CheckVerdict.Warns ? 1 : 0;
            foreach ((double computed, double truth) in new[]
            {
                // Where several values lie equally far out, which of them is named first is a matter of rounding in R.
                (Math.Abs(outliers.Statistic!.Value), Math.Abs(r[0])), (outliers.P!.Value.Value, r[1]),
                (normality.Statistic!.Value, r[2]), (normality.P!.Value.Value, r[3]), (order.Statistic!.Value, r[4]),
            })
            {
                worst = Math.Max(worst, Relative.Error(computed, truth));
            }
        }

        output.WriteLine(FormattableString.Invariant($"worst relative difference {worst:E1}, {warned} outliers, seed {Seed}"));
        Assert.True(worst < 1e-10);
        Assert.True(warned > 5);
    }

    [Fact]
    public void Spreads_are_not_compared_where_blocks_stand_inside_them()
    {
        CheckedExperiment experiment = CheckedExperiment.Of("1 5 9 14", "2 7 9 15", "4 6 11 17").InBlocks(0, 1, 2, 3, 0, 1, 2, 3, 0, 1, 2, 3);
        foreach (string key in (string[])["equal-spread", "levene", "bartlett", "spread-ratio"])
        {
            Assert.Equal(
                new CheckFinding(CheckVerdict.NotPossible, "The groups are compared within blocks, and what the blocks add stands inside the spread of every group."),
                experiment.Look(CheckRegistry.Find(key)!));
        }

        Assert.Equal("All groups have 4 values.", experiment.Look(new Balance()).Saw);
        Assert.Equal(CheckVerdict.Quiet, experiment.Look(new Normality()).Verdict);
    }

    /// <summary>Blocks of two groups, one difference far from the others: leaving out either value of that block leaves out the block.</summary>
    [Fact]
    public void A_far_value_is_found_in_pairs_too()
    {
        CheckFinding finding = CheckedExperiment.Of("10 20 30 40 50", "11 21.1 30.9 41.0 85").InBlocks(0, 1, 2, 3, 4, 0, 1, 2, 3, 4).Look(new Outliers());
        Assert.Equal(CheckVerdict.Warns, finding.Verdict);
        Assert.Contains(" in A stands out", finding.Saw, StringComparison.Ordinal);
    }

    [Fact]
    public void Groups_and_blocks_that_fit_every_value_are_told()
    {
        CheckedExperiment exact = CheckedExperiment.Of("1 2 3", "11 12 13").InBlocks(0, 1, 2, 0, 1, 2).InOrder(1, 2, 3, 4, 5, 6);
        Assert.All([new Normality(), new Outliers(), (ExperimentCheck)new RunOrder()], c =>
            Assert.Equal(new CheckFinding(CheckVerdict.NotPossible, "Groups and blocks fit every value exactly."), exact.Look(c)));
        CheckedExperiment nothingLeft = CheckedExperiment.Of("1 2", "11").InBlocks(0, 1, 0).InOrder(1, 2, 3);
        Assert.All([new Normality(), new Outliers(), (ExperimentCheck)new RunOrder()], c =>
            Assert.Equal("There are no residuals: groups, or groups and blocks, fit every value exactly whatever it is.", nothingLeft.Look(c).Saw));
    }

    [Fact]
    public void A_drift_inside_blocks_is_found_and_blocks_themselves_are_none()
    {
        // Four blocks far apart, groups in another order in each; inside each the values rise with the run.
        string[] groups = ["1.0 102 203.1 304", "2 103.1 201 301.9", "3 101 204 303", "4.1 104 202 302.1"];
        long[] orders = [1, 6, 11, 16, 2, 7, 9, 14, 3, 5, 12, 15, 4, 8, 10, 13];
        int[] blocks = [0, 1, 2, 3, 0, 1, 2, 3, 0, 1, 2, 3, 0, 1, 2, 3];
        CheckFinding finding = CheckedExperiment.Of(groups).InBlocks(blocks).InOrder(orders).Look(new RunOrder());
        Assert.NotNull(finding.P);
        Assert.InRange(finding.Statistic!.Value, 0.1, 3.9);
        CheckFinding shifted = CheckedExperiment.Of(groups).InBlocks(blocks).InOrder([.. orders.Select(o => o * 1000)]).Look(new RunOrder());
        Assert.Equal(finding, shifted);
    }

    private sealed record Row(string Group, int Block, string Value, int Order);

    private static Row[] RandomLayout(Random random)
    {
        int groups = random.Next(2, 6);
        int blocks = random.Next(6, 10);
        var rows = new List<Row>();
        for (int b = 0; b < blocks; b++)
        {
            for (int g = 0; g < groups; g++)
            {
                // Some cells are empty, some hold two; the first two groups meet in every block, so that all are linked as far as they occur with them.
                int values = g < 2 ? 1 : random.Next(0, 3);
                for (int i = 0; i < values; i++)
                {
                    double normal = Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());
                    double far = random.Next(100) == 0 ? 8 : 0;
                    rows.Add(new("g" + g.ToString(CultureInfo.InvariantCulture), b, ((10 * b) + g + normal + far).ToString("F3", CultureInfo.InvariantCulture), 0));
                }
            }
        }

        int[] order = [.. Enumerable.Range(0, rows.Count)];
        random.Shuffle(order);
        return [.. rows.Select((row, i) => row with { Order = order[i] })];
    }
}
