using System.Globalization;
using System.Text;
using Campaigns.Statistics.Checks;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Checks;

public sealed class OutliersTests(ITestOutputHelper output)
{
    private const int Seed = 20261204;

    [Fact]
    public void Two_hundred_experiments_get_the_exact_residual_and_its_adjusted_p()
    {
        ILookup<string, ReferenceRow> data = ReferenceTable.Read("experiment/experiments_data.csv").Rows.ToLookup(r => r.Text("experiment"));
        (double worst, double worstP, int seen) = (0, 0, 0);
        foreach (ReferenceRow truth in ReferenceTable.Read("experiment/experiments_exact.csv").Rows.Where(r => r.Has("max_rstudent")))
        {
            seen++;
            string name = truth.Text("experiment");
            CheckFinding finding = CheckedExperiment.OfTable(data[name], withOrder: false).Look(new Outliers());
            worst = Math.Max(worst, Relative.Error(Math.Abs(finding.Statistic!.Value), Math.Abs(truth.Number("max_rstudent"))));
            worstP = Math.Max(worstP, Relative.Error(finding.P!.Value.Value, truth.Number("max_rstudent_p_bonferroni")));
            Assert.Contains($" in {truth.Text("max_rstudent_group")}", finding.Saw, StringComparison.Ordinal);
            ReferenceRow[] group = [.. data[name].Where(r => r.Text("group") == truth.Text("max_rstudent_group"))];
            if (group.Length > 2)
            {
                // In a pair both values lie equally far out, and either may be named.
                Assert.Equal(Math.Sign(truth.Number("max_rstudent")), Math.Sign(finding.Statistic!.Value));
            }
        }

        output.WriteLine(FormattableString.Invariant($"{seen} experiments, t off by at most {worst:E1}, p by {worstP:E1}"));
        Assert.True(seen >= 190);
        Assert.True(worst < 1e-12);
        Assert.True(worstP < 1e-11);
    }

    /// <summary>Figures of R: rstudent(lm(weight ~ group, PlantGrowth)) and of Michelson's data morley.</summary>
    [Theory]
    [InlineData("PlantGrowth", 2.53734138, .5253, CheckVerdict.Quiet)]
    [InlineData("morley", -3.82826052, .02325, CheckVerdict.Warns)]
    public void Published_data_get_the_published_residual(string name, double t, double p, CheckVerdict verdict)
    {
        CheckFinding finding = CheckedExperiment.OfText(ReferenceTable.Read("experiment/worked_examples_data.csv").Rows.Where(r => r.Text("experiment") == name).Select(r => (r.Text("group"), r.Text("value")))).Look(new Outliers());
        Assert.Equal(t, finding.Statistic!.Value, 8);
        Relative.AssertNear(p, finding.P!.Value.Value, 2e-4, "p");
        Assert.Equal(verdict, finding.Verdict);
    }

    [Fact]
    public void Five_hundred_random_experiments_get_the_largest_residual_of_R()
    {
        RProgram.SkipIfAbsent();
        const string Script = """
            d <- read.csv(file('stdin'), colClasses = c('integer', 'factor', 'numeric'))
            for (s in split(d, d$e)) {
              f <- lm(v ~ g, data = droplevels(s))
              r <- rstudent(f)
              i <- which.max(abs(r))
              cat(sprintf('%.17g,%.17g\n', r[i], min(1, nrow(s) * 2 * pt(-abs(r[i]), f$df.residual - 1))))
            }
            """;
        var random = new Random(Seed);
        (string Group, string Value)[][] experiments = [.. Enumerable.Range(0, 500).Select(_ => SpreadReferenceTests.RandomRows(random))];
        var text = new StringBuilder("e,g,v\n");
        for (int i = 0; i < experiments.Length; i++)
        {
            foreach ((string group, string value) in experiments[i])
            {
                text.AppendLine(CultureInfo.InvariantCulture, $"{i},{group},{value}");
            }
        }

        string[] answers = RProgram.Run(Script, text.ToString()).Split('\n', StringSplitOptions.RemoveEmptyEntries);
        Assert.Equal(experiments.Length, answers.Length);
        double worst = 0;
        for (int i = 0; i < answers.Length; i++)
        {
            double[] r = [.. answers[i].Split(',').Select(t => double.Parse(t, CultureInfo.InvariantCulture))];
            CheckFinding finding = CheckedExperiment.OfText(experiments[i]).Look(new Outliers());
            worst = Math.Max(worst, Relative.Error(finding.Statistic!.Value, r[0]));
            worst = Math.Max(worst, Relative.Error(finding.P!.Value.Value, r[1]));
        }

        output.WriteLine(FormattableString.Invariant($"worst relative difference {worst:E1}, seed {Seed}"));
        Assert.True(worst < 1e-11);
    }

    /// <summary>Groups 1, 2, 3 and 1, 2, 10^k: without the last, SSW = 2 + 1/2 on 3 degrees of freedom, and the last lies 10^k - 3/2 from its group's mean with variance 3/2 times that.</summary>
    [Theory]
    [InlineData("1e9", 1e9)]
    [InlineData("1e40", 1e40)]
    public void A_slip_of_many_digits_keeps_all_digits_of_its_residual(string typed, double value)
    {
        CheckFinding finding = CheckedExperiment.Of("1 2 3", $"1 2 {typed}").Look(new Outliers());
        double t = (value - 1.5) / Math.Sqrt(1.5 * 2.5 / 3);
        Relative.AssertNear(t, finding.Statistic!.Value, 1e-15, "t");
        Assert.True(finding.P!.Value.Log < -40);
        Assert.Equal(CheckVerdict.Warns, finding.Verdict);
        Assert.StartsWith("The value 1", finding.Saw, StringComparison.Ordinal);
    }

    [Fact]
    public void A_value_that_is_the_only_scatter_has_no_p_but_its_name() =>
        Assert.Equal(
            new CheckFinding(CheckVerdict.NotPossible, "Without the value 5.5 in B there would be no scatter left to hold it against."),
            CheckedExperiment.Of("1 1 1", "2 2 5.50").Look(new Outliers()));

    [Fact]
    public void A_value_alone_in_its_group_is_never_held_against_anything()
    {
        CheckFinding with = CheckedExperiment.Of("1 2 4", "3 5 4", "1000").Look(new Outliers());
        CheckFinding without = CheckedExperiment.Of("1 2 4", "3 5 4").Look(new Outliers());
        Assert.Equal(without, with);
    }

    [Fact]
    public void One_degree_of_freedom_is_too_little() =>
        Assert.Equal(CheckVerdict.NotPossible, CheckedExperiment.Of("1 2", "5").Look(new Outliers()).Verdict);
}
