using System.Globalization;
using Campaigns.Statistics.Checks;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Checks;

/// <summary>Whatever the data: figures are finite, p is never 0, and what has no figure has a reason.</summary>
public sealed class CheckEdgeCasesTests(ITestOutputHelper output)
{
    private const int Seed = 20261206;

    public static TheoryData<string, string[]> Hostile => new()
    {
        { "a group of one", ["1 2 4", "3 5 4", "9"] },
        { "groups of one but one pair", ["1", "2", "4", "9 10"] },
        { "two groups of one", ["1", "2"] },
        { "one constant group", ["5 5 5", "4 6 8", "1 2 3"] },
        { "constant groups that differ", ["0.1 0.1 0.1", "0.3 0.3 0.3"] },
        { "all equal", ["7 7 7", "7 7 7"] },
        { "two pairs", ["1 2", "4 5"] },
        { "ties everywhere", ["1 1 2 2", "2 2 1 1", "1 2 1 2"] },
        { "offset", ["1000000000000.1 1000000000000.2 1000000000000.4", "1000000000000.3 1000000000000.1 1000000000000.9"] },
        { "tiny", ["1e-300 2e-300 4e-300 3e-300", "4e-300 5e-300 9e-300 1e-300"] },
        { "huge", ["1e300 2e300 4e300 3e300", "4e300 5e300 9e300 1e300"] },
        { "all sizes at once", ["1e-300 2e-300 4e-300 5", "4e300 5e300 9e300", "1 2 3"] },
        { "a pair far beyond", ["1e-300 2e-300 4e-300", "1e300 -1e300"] },
        { "beyond the doubles", ["1e400 2e400 3e400", "1e400 5e400 9e400"] },
        { "three residuals, two equal", ["1 1 2", "5"] },
        { "three residuals", ["1 2 4", "5"] },
        { "one far value", ["0 0 0 0 0 0 0 0 1e30", "0 0 0 0 0 0 0 1"] },
    };

    [Theory]
    [MemberData(nameof(Hostile))]
    public void Every_finding_is_fit_to_print(string what, string[] groups)
    {
        CheckedExperiment experiment = CheckedExperiment.Of(groups);
        int count = groups.Sum(g => g.Split(' ').Length);
        AssertPrintable(what, experiment);
        AssertPrintable(what, experiment.InOrder([.. Enumerable.Range(0, count).Select(i => (long)((i * 7919) % 1000003))]));
    }

    [Fact]
    public void An_offset_changes_no_figure()
    {
        CheckedExperiment plain = CheckedExperiment.Of("0.1 0.2 0.4 0.7", "0.3 0.1 0.9 0.8", "1.4 1.5 1.9 1.1").InOrder(3, 1, 4, 12, 5, 9, 2, 6, 8, 7, 10, 11);
        CheckedExperiment offset = CheckedExperiment.Of("1000000000000.1 1000000000000.2 1000000000000.4 1000000000000.7", "1000000000000.3 1000000000000.1 1000000000000.9 1000000000000.8", "1000000000001.4 1000000000001.5 1000000000001.9 1000000000001.1").InOrder(3, 1, 4, 12, 5, 9, 2, 6, 8, 7, 10, 11);
        foreach ((CheckLine a, CheckLine b) in plain.Report().Zip(offset.Report()))
        {
            Assert.Equal((a.Finding.Verdict, a.Finding.Statistic, a.Finding.P), (b.Finding.Verdict, b.Finding.Statistic, b.Finding.P));
        }
    }

    [Fact]
    public void A_unit_changes_no_figure()
    {
        string[] groups = ["1 2 4 7", "3 1 9 8", "14 15 19 11"];
        CheckedExperiment plain = CheckedExperiment.Of(groups);
        foreach (string power in (string[])["e-300", "e300", "e-4", "e13"])
        {
            CheckedExperiment scaled = CheckedExperiment.Of([.. groups.Select(g => string.Join(' ', g.Split(' ').Select(v => v + power)))]);
            foreach ((CheckLine a, CheckLine b) in plain.Report().Zip(scaled.Report()).Where(l => l.First.Finding.Statistic is not null))
            {
                Relative.AssertNear(a.Finding.Statistic!.Value, b.Finding.Statistic!.Value, 1e-14, power + " " + a.Key);
                Assert.Equal(a.Finding.Verdict, b.Finding.Verdict);
            }
        }
    }

    [Fact]
    public void Sixty_groups_and_a_hundred_thousand_values_in_one_are_looked_at()
    {
        var random = new Random(Seed);
        string[] Values(int n) => [.. Enumerable.Range(0, n).Select(_ => (random.NextDouble() + random.NextDouble()).ToString("F6", CultureInfo.InvariantCulture))];
        CheckedExperiment sixty = CheckedExperiment.OfText(Enumerable.Range(0, 60).SelectMany(g => Values(5 + (g % 7)).Select(v => ("group " + g.ToString(CultureInfo.InvariantCulture), v))));
        AssertPrintable("sixty groups", sixty);
        Assert.All(sixty.Report().Where(l => l.Key != "run-order"), l => Assert.NotEqual(CheckVerdict.NotPossible, l.Finding.Verdict));

        (string, string)[] rows = [.. Values(100_000).Select(v => ("many", v)), .. Values(20).Select(v => ("few", v))];
        CheckedExperiment large = CheckedExperiment.OfText(rows, [.. Enumerable.Range(0, rows.Length).Select(i => (long)i)], []);
        var watch = System.Diagnostics.Stopwatch.StartNew();
        IReadOnlyList<CheckLine> report = large.Report();
        output.WriteLine(FormattableString.Invariant($"{rows.Length} values: all checks in {watch.ElapsedMilliseconds} ms; {string.Join(" | ", report.Select(l => l.Finding.Saw))}"));
        AssertPrintable("a hundred thousand values", large);
        Assert.Equal("100020 residuals, while the test is made for 3 to 5000.", report.Single(l => l.Key == "normality").Finding.Saw);
        Assert.All(report.Where(l => l.Key != "normality"), l => Assert.NotEqual(CheckVerdict.NotPossible, l.Finding.Verdict));
    }

    [Fact]
    public void Published_data_read_well()
    {
        foreach (IGrouping<string, ReferenceRow> data in ReferenceTable.Read("experiment/worked_examples_data.csv").Rows.GroupBy(r => r.Text("experiment")))
        {
            CheckedExperiment experiment = CheckedExperiment.OfText(data.Select(r => (r.Text("group"), r.Text("value"))));
            output.WriteLine(data.Key + "\n  " + string.Join("\n  ", experiment.Report().Select(l => $"{l.Key}: {l.Finding.Verdict}: {l.Finding.Saw}")));
            AssertPrintable(data.Key, experiment);
        }
    }

    private static void AssertPrintable(string what, CheckedExperiment experiment)
    {
        foreach (CheckLine line in experiment.Report())
        {
            CheckFinding finding = line.Finding;
            string message = $"{what}, {line.Key}: {finding}";
            Assert.True(finding.Statistic is null || double.IsFinite(finding.Statistic.Value), message);
            Assert.True(finding.P is null || double.IsFinite(finding.P.Value.Log), message);
            Assert.True(finding.P is null || finding.Statistic is not null, message);
            Assert.True(finding.Verdict != CheckVerdict.NotPossible || finding.Statistic is null, message);
            Assert.Matches(@"^[^.].*\.$", finding.Saw);
            Assert.DoesNotMatch(@"NaN|Infinity|∞|p = 0(\.0*)?[^.0-9]", finding.Saw);
        }
    }
}
