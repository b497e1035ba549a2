using Campaigns.Statistics.Checks;
using Campaigns.Statistics.Checks.Computation;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Checks;

public sealed class RunOrderTests(ITestOutputHelper output)
{
    private const int Seed = 20261205;

    [Fact]
    public void Two_hundred_experiments_get_the_exact_ratio_its_moments_and_p()
    {
        ILookup<string, ReferenceRow> data = ReferenceTable.Read("experiment/experiments_data.csv").Rows.ToLookup(r => r.Text("experiment"));
        Dictionary<string, ReferenceRow> checks = ReferenceTable.Read("experiment/checks_exact.csv").Rows.ToDictionary(r => r.Text("experiment"));
        (double worst, double worstMoment, double worstP, int seen) = (0, 0, 0, 0);
        foreach (ReferenceRow truth in ReferenceTable.Read("experiment/experiments_exact.csv").Rows)
        {
            string name = truth.Text("experiment");
            CheckFinding finding = CheckedExperiment.OfTable(data[name], withOrder: true).Look(new RunOrder());
            string[] groups = [.. data[name].OrderBy(r => r.Integer("order")).Select(r => r.Text("group"))];
            string[] names = [.. groups.Distinct()];
            SuccessiveDifferences law = SuccessiveDifferences.OneWay([.. groups.Select(g => Array.IndexOf(names, g))])!.Value;
            worstMoment = Math.Max(worstMoment, Relative.Error(law.Mean, truth.Number("dw_mean")));
            worstMoment = Math.Max(worstMoment, Relative.Error(law.Variance, truth.Number("dw_var")));
            if (finding.Statistic is { } ratio)
            {
                seen++;
                worst = Math.Max(worst, Relative.Error(ratio, truth.Number("dw")));
                worstP = Math.Max(worstP, Relative.Error(finding.P!.Value.Value, checks[name].Number("run_order_p")));
            }
            else
            {
                Assert.True(truth.Integer("df_within") < 4, name);
            }
        }

        output.WriteLine(FormattableString.Invariant($"{seen} experiments, ratio off by at most {worst:E1}, moments by {worstMoment:E1}, p by {worstP:E1}"));
        Assert.True(seen > 190);
        Assert.True(worst < 1e-13);
        Assert.True(worstMoment < 1e-13);
        Assert.True(worstP < 1e-11);
    }

    [Fact]
    public void Layouts_with_and_without_blocks_get_the_moments_of_the_full_matrices()
    {
        (double worst, int blocked) = (0, 0);
        foreach (ReferenceRow row in ReferenceTable.Read("experiment/run_order_layouts.csv").Rows)
        {
            int[] groups = Numbers(row.Text("groups"));
            SuccessiveDifferences law = (row.Has("blocks") ? SuccessiveDifferences.WithinBlocks(Numbers(row.Text("blocks")), groups) : SuccessiveDifferences.OneWay(groups))!.Value;
            blocked += row.Has("blocks") ? 1 : 0;
            Assert.Equal(row.Integer("df"), law.DegreesOfFreedom);
            worst = Math.Max(worst, Relative.Error(law.Mean, row.Number("mean")));
            worst = Math.Max(worst, Relative.Error(law.Variance, row.Number("variance")));
        }

        output.WriteLine(FormattableString.Invariant($"moments off by at most {worst:E1}"));
        Assert.True(blocked > 10);
        Assert.True(worst < 1e-12);
    }

    [Fact]
    public void Groups_in_blocks_that_nothing_links_have_no_law() =>
        Assert.Null(SuccessiveDifferences.WithinBlocks([0, 0, 0, 0, 1, 1, 1, 1], [0, 1, 0, 1, 2, 3, 2, 3]));

    /// <summary>Normal errors, no drift: p below 0.05 one time in twenty, whatever lies along the order.</summary>
    [Theory]
    [InlineData(1, 5, 4)]
    [InlineData(4, 3, 6)]
    [InlineData(10, 2, 2)]
    public void Without_drift_p_is_below_a_level_as_often_as_that_level_says(int runLength, int groups, int runsEach)
    {
        const int Repeats = 4000;
        var random = new Random(Seed);
        int[] levels = [.. Enumerable.Range(0, groups * runsEach).SelectMany(run => Enumerable.Repeat(run % groups, runLength))];
        int alarms = 0;
        for (int repeat = 0; repeat < Repeats; repeat++)
        {
            (string, string)[] rows = [.. levels.Select(g => (((char)('A' + g)).ToString(), Normal(random).ToString("F6", System.Globalization.CultureInfo.InvariantCulture)))];
            CheckFinding finding = CheckedExperiment.OfText(rows, [.. Enumerable.Range(0, rows.Length).Select(i => (long)i)], []).Look(new RunOrder());
            alarms += finding.Verdict == CheckVerdict.Warns ? 1 : 0;
        }

        output.WriteLine(FormattableString.Invariant($"{alarms} of {Repeats}, seed {Seed}"));
        double standardError = Math.Sqrt(0.05 * 0.95 / Repeats);
        Assert.InRange(alarms / (double)Repeats, 0.05 - (4 * standardError), 0.05 + (4 * standardError));
    }

    [Fact]
    public void A_drift_and_an_alternation_are_told_apart()
    {
        // Groups in turn A B A B ..., values that rise, then values that swing from one pair to the next.
        long[] orders = [1, 3, 5, 7, 9, 11, 13, 15, 2, 4, 6, 8, 10, 12, 14, 16];
        CheckFinding drift = CheckedExperiment.Of("1 2 3 4 5 6 7 8", "1.5 2.4 3.6 4.5 5.5 6.4 7.5 8.6").InOrder(orders).Look(new RunOrder());
        Assert.Equal(CheckVerdict.Warns, drift.Verdict);
        Assert.StartsWith("Drift: ", drift.Saw, StringComparison.Ordinal);

        long[] halves = [1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12, 13, 14, 15, 16];
        CheckFinding alternation = CheckedExperiment.Of("1 9 1.1 9 1 9.2 1 9", "1 9 1 9.1 1 9 1.3 9").InOrder(halves).Look(new RunOrder());
        Assert.Equal(CheckVerdict.Warns, alternation.Verdict);
        Assert.StartsWith("Alternation: ", alternation.Saw, StringComparison.Ordinal);
        Assert.True(alternation.Statistic > 3);
    }

    [Fact]
    public void Without_a_whole_order_there_is_a_reason_instead()
    {
        CheckedExperiment experiment = CheckedExperiment.Of("1 2 3 5", "2 4 6 5");
        Assert.Equal("No run order is recorded.", Reason(experiment));
        Assert.Equal("No run order is recorded.", Reason(experiment.InOrder([.. Enumerable.Repeat(GroupedSample.NoOrder, 8)])));
        Assert.Equal("2 of 8 values have no place in the run order.", Reason(experiment.InOrder(1, 2, 3, GroupedSample.NoOrder, 5, 6, GroupedSample.NoOrder, 8)));
        Assert.Equal("Several values share place 5 in the run order, so that it is not known which came first.", Reason(experiment.InOrder(1, 2, 3, 4, 5, 5, 7, 8)));
        Assert.Equal("Too few values: 3 of the 4 residual degrees of freedom that are needed.", Reason(CheckedExperiment.Of("1 2 3", "2 4").InOrder(1, 2, 3, 4, 5)));
    }

    [Fact]
    public void A_perfect_drift_of_many_values_has_a_p_below_the_doubles()
    {
        string values = string.Join(' ', Enumerable.Range(0, 3000));
        CheckFinding finding = CheckedExperiment.Of(values, "0 3000").InOrder([.. Enumerable.Range(1, 3000).Select(i => (long)i), 0, 3001]).Look(new RunOrder());
        Assert.Equal(CheckVerdict.Warns, finding.Verdict);
        Assert.True(finding.P!.Value.Log < -1000);
        Assert.Matches(@"\(p = \d\.\d\de-\d{4}\)", finding.Saw);
    }

    private static string Reason(CheckedExperiment experiment)
    {
        CheckFinding finding = experiment.Look(new RunOrder());
        Assert.Equal(CheckVerdict.NotPossible, finding.Verdict);
        return finding.Saw;
    }

    private static int[] Numbers(string text) => [.. text.Split(' ').Select(t => int.Parse(t, System.Globalization.CultureInfo.InvariantCulture))];

    private static double Normal(Random random) => Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());
}
