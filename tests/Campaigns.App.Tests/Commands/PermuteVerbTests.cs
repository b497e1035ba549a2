using System.Globalization;
using System.Text;
using Campaigns.App.Tests.Dashboard;
using Campaigns.Statistics.CampaignPermutation;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.App.Tests.Commands;

/// <summary>An invented campaign: four responses on the same twelve panels, one of them read twice, one in ranks; a fifth experiment on other panels, a sixth that was never measured.</summary>
public sealed class PermuteVerbTests : IDisposable
{
    private const string Plan =
        """
        experiment,groups,test
        gloss,A|B|C,f
        pull-off,C|A|B,permutation
        cure,A|B|C,kruskal-wallis
        haze,A|B|C,f
        tack,A|B|C,f
        rust,A|B|C,f

        """;

    private static readonly int[] Gloss = [71, 74, 70, 73, 80, 83, 79, 84, 75, 76, 74, 78];
    private static readonly int[] PullOff = [31, 34, 33, 36, 35, 39, 37, 40, 33, 36, 34, 37];
    private static readonly int[] Cure = [5, 4, 4, 6, 7, 9, 6, 8, 5, 6, 5, 7];
    private static readonly int[] Haze = [12, 10, 11, 13, 12, 11, 14, 10, 13, 12, 11, 12];

    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void The_table_for_people_says_what_was_permuted_and_what_decides()
    {
        Tested();
        Golden.Match("permute", _place.Run("permute", "C", "gloss", "pull-off", "cure", "haze").Well().Out);
    }

    [Fact]
    public void Responses_on_the_same_panels_are_permuted_together_and_the_rest_of_the_family_counts()
    {
        Tested();
        CsvText csv = Csv("permute", "C", "gloss", "pull-off", "cure", "haze");
        Assert.Equal(["experiment", "p", "adjusted_p", "survives_here", "arrangements", "as_extreme", "seed", "method"], csv.Columns[..8]);
        Assert.Equal(["gloss", "pull-off", "cure", "haze"], csv.Column("experiment"));

        StepDownResult[] expected = StepDownPermutation.MaxT([Panels()], new PermutationRun(RandomDraws.Usual) { Others = 2 });
        Assert.Equal(expected.Select(r => r.P.Value), csv.Numbers("p"));
        Assert.Equal(expected.Select(r => r.AdjustedP.Value), csv.Numbers("adjusted_p"));
        Assert.All(csv.Column("arrangements"), a => Assert.Equal("34650", a));
        Assert.All(csv.Column("seed"), seed => Assert.Equal("", seed));
        Assert.All(csv.Column("set"), set => Assert.Equal("1", set));
        Assert.All(csv.Column("specimens"), n => Assert.Equal("12", n));

        // The permutation test of pull-off, on the means of its readings, has the same arrangements.
        Assert.Equal(csv.Numbers("test_p")[1], csv.Numbers("p")[1]);
        CsvText results = Csv("results", "C");
        Assert.Equal(results.Column("adjusted_p")[..4], csv.Column("sealed_adjusted_p"));
    }

    [Fact]
    public void Other_panels_are_permuted_apart()
    {
        Tested();
        CsvText csv = Csv("permute", "C", "--method", "min-p");
        Assert.Equal(["1", "1", "1", "1", "2"], csv.Column("set"));
        StepDownResult[] expected = StepDownPermutation.MinP([Panels(), Tack()], new PermutationRun(RandomDraws.Usual) { Others = 1 });
        Assert.Equal(expected.Select(r => r.AdjustedP.Value), csv.Numbers("adjusted_p"));
        Assert.Equal(csv.Column("adjusted_p"), Csv("permute", "C", "--method", "exact-min-p").Column("adjusted_p"));
    }

    [Fact]
    public void The_order_of_rows_and_the_number_of_threads_change_no_byte_and_a_seed_does()
    {
        // 21 panels, so that arrangements are drawn.
        string rows = Large();
        string[] lines = rows.TrimEnd('\n').Split('\n');
        _place.Run("run", _place.Campaign("L", null, rows)).Well();
        _place.Run("run", _place.Campaign("M", null, string.Join('\n', [lines[0], .. lines.Skip(1).Reverse()]) + "\n")).Well();
        string[] options = ["--method", "min-p", "--draws", "5000", "--seed", "7", "--format", "csv"];
        string first = _place.Run(["permute", "L", .. options, "--threads", "1"]).Well().Out;
        Assert.Equal(first, _place.Run(["permute", "L", .. options, "--threads", "2"]).Well().Out);
        Assert.Equal(first, _place.Run(["permute", "M", .. options]).Well().Out);
        Assert.All(CsvText.Read(first).Column("seed"), seed => Assert.Equal("7", seed));
        Assert.NotEqual(CsvText.Read(first).Column("p"), Csv("permute", "L", "--method", "min-p", "--draws", "5000").Column("p"));
        Assert.Equal(Csv("permute", "L").Column("seed")[0], Csv("permute", "L", "--method", "min-p").Column("seed")[0]);
        Assert.All(Csv("permute", "L").Column("arrangements"), a => Assert.Equal("99999", a));
    }

    [Fact]
    public void Panels_that_some_experiments_lack_are_refused_and_can_be_gone_round()
    {
        Tested();
        int line = File.ReadAllLines(_place.At("C", "measurements", "week-01.csv")).ToList().FindIndex(l => l.StartsWith("haze,B", StringComparison.Ordinal)) + 1;
        _place.Run("exclude", "C", "haze", "--line", line.ToString(CultureInfo.InvariantCulture), "--reason", "dust", "--as", "Ann").Well();
        _place.Run("test", "C").Well();
        _place.Run("permute", "C", "--method", "min-p").Refused(3, "'gloss' and 'haze' share specimen", "but not all their specimens");
        CsvText csv = Csv("permute", "C", "haze");
        Assert.Equal("11", csv.Column("specimens")[0]);
        Assert.Contains("dust", csv.Column("amendments")[0], StringComparison.Ordinal);
        Assert.Equal(3, Csv("permute", "C", "gloss", "cure", "pull-off").Rows.Count);
    }

    [Fact]
    public void Specimens_change_places_within_blocks_where_the_plan_tests_within_them()
    {
        var rows = new StringBuilder("experiment,group,value,specimen,block\n");
        for (int i = 0; i < 12; i++)
        {
            // Three days, each with two panels of either group.
            char group = i % 4 < 2 ? 'A' : 'B';
            rows.Append(CultureInfo.InvariantCulture, $"E1,{group},{Gloss[i]},P{i},day {i / 4}\nE2,{group},{Haze[i]},P{i},day {i / 4}\n");
        }

        _place.Run("run", _place.Campaign("B", "experiment,groups,test\nE1,A|B,block-f\nE2,A|B,kruskal-wallis\n", rows.ToString())).Well();
        CsvText csv = Csv("permute", "B", "--method", "min-p");
        Assert.All(csv.Column("arrangements"), a => Assert.Equal("216", a));
        Assert.Contains("within their block in E1, E2", Unwrapped("permute", "B", "--method", "min-p"), StringComparison.Ordinal);
        _place.Run("permute", "B").Refused(3, "those of 'E1' are 1 and 8, those of 'E2' 1 and 10", "--method min-p");
    }

    [Fact]
    public void Tests_that_are_not_permuted_count_in_the_family_and_enter_exact_min_p_as_they_are()
    {
        _place.Run("run", _place.Campaign("W", "experiment,groups,test\nE1,a|b,f\nE2,a|b,welch\n", Workplace.TwoExperiments)).Well();
        CsvText csv = Csv("permute", "W");
        Assert.Equal(["E1"], csv.Column("experiment"));

        // 2 of 20 arrangements; E2 is granted as much again.
        Assert.Equal((0.1, 0.2), (csv.Numbers("p")[0], csv.Numbers("adjusted_p")[0]));
        Assert.Contains("(E2: tests that allow for unequal variances", Unwrapped("permute", "W"), StringComparison.Ordinal);
        CsvText exact = Csv("permute", "W", "--method", "exact-min-p");
        Assert.Equal(exact.Column("test_p")[1], exact.Column("p")[1]);
        Assert.Equal("", exact.Column("arrangements")[1]);
        Assert.Equal(0.1 + (0.1 * 0.9), exact.Numbers("adjusted_p")[0], 1e-15);
        _place.Run("permute", "W", "E2").Refused(3, "'E2' is planned with the test welch", "exact-min-p");
    }

    [Theory]
    [InlineData(3, "There is no campaign 'D'", "permute", "D")]
    [InlineData(3, "has no experiment 'glos'; 'gloss' may be meant", "permute", "C", "glos")]
    [InlineData(3, "'rust' has no result to adjust", "permute", "C", "rust")]
    [InlineData(3, "those of 'gloss' are 2 and 9, those of 'tack' 2 and 6", "permute", "C")]
    [InlineData(2, "exact-min-p draws nothing", "permute", "C", "--method", "exact-min-p", "--seed", "3")]
    [InlineData(2, "--draws takes a whole number from 1 to 9999999", "permute", "C", "--draws", "10000000")]
    [InlineData(2, "--method takes max-t, min-p or exact-min-p, not 'maxt'", "permute", "C", "--method", "maxt")]
    public void What_cannot_be_permuted_is_refused_in_one_sentence(int code, string words, params string[] command)
    {
        Tested();
        Assert.Single(_place.Run(command).Refused(code, words).Error.TrimEnd('\n').Split('\n'));
    }

    [Fact]
    public void Nothing_is_seen_before_the_seal_and_before_the_test()
    {
        _place.Run("start", "C").Well();
        _place.Run("load", "C", _place.Write("m.csv", Workplace.TwoExperiments)).Well();
        _place.Run("permute", "C").Refused(3, "is not sealed");
        _place.Run("seal", "C").Well();
        _place.Run("permute", "C").Refused(3, "has no result yet");
    }

    [Fact]
    public void Ctrl_C_stops_it()
    {
        Tested();
        using var stop = new CancellationTokenSource();
        stop.Cancel();
        using var stopped = new Workplace { Cancel = stop.Token };
        stopped.Variables["CAMPAIGNS_CATALOG"] = _place.Catalog;
        stopped.Run("permute", "C", "gloss").Refused(130, "Stopped");
    }

    private CsvText Csv(params string[] arguments) => _place.Run([.. arguments, "--format", "csv"]).Well().Csv;

    private string Unwrapped(params string[] arguments) => _place.Run(arguments).Well().Out.Replace('\n', ' ');

    private void Tested()
    {
        var rows = new StringBuilder("experiment,group,value,specimen\n");
        for (int i = 11; i >= 0; i--)
        {
            string panel = $"{"ABC"[i / 4]},{{0}},panel {i + 1}";
            foreach ((string experiment, int value) in (ReadOnlySpan<(string, int)>)[("gloss", Gloss[i]), ("cure", Cure[i]), ("haze", Haze[i]), ("pull-off", PullOff[i] - 1), ("pull-off", PullOff[i] + (i % 2))])
            {
                rows.Append(experiment).Append(',').AppendFormat(CultureInfo.InvariantCulture, panel, value).Append('\n');
            }
        }

        for (int i = 0; i < 9; i++)
        {
            rows.Append(CultureInfo.InvariantCulture, $"tack,{"ABC"[i / 3]},{Haze[i] + i},strip {i}\n");
        }

        _place.Run("run", _place.Campaign("C", Plan, rows.ToString())).Well();
    }

    /// <summary>The panels with their four responses, as whole numbers; pull-off twice its mean.</summary>
    private static SpecimenSet Panels()
    {
        ushort[] groups = [.. Enumerable.Range(0, 12).Select(i => (ushort)(i / 4))];
        var set = new SpecimenSet(groups, []);
        foreach ((int[] values, PermutedStatistic statistic) in ((int[], PermutedStatistic)[])[(Gloss, PermutedStatistic.Values), ([.. PullOff.Select((v, i) => (2 * v) - 1 + (i % 2))], PermutedStatistic.Values), (Cure, PermutedStatistic.Ranks), (Haze, PermutedStatistic.Values)])
        {
            set.Add(new GroupedSample([.. values.Select(v => (long)v)], 0, groups, 3), statistic);
        }

        return set;
    }

    private static SpecimenSet Tack()
    {
        ushort[] groups = [.. Enumerable.Range(0, 9).Select(i => (ushort)(i / 3))];
        var set = new SpecimenSet(groups, []);
        set.Add(new GroupedSample([.. Enumerable.Range(0, 9).Select(i => (long)(Haze[i] + i))], 0, groups, 3), PermutedStatistic.Values);
        return set;
    }

    private static string Large()
    {
        var rows = new StringBuilder("experiment,group,value,specimen\n");
        var random = new Random(5);
        for (int i = 0; i < 21; i++)
        {
            for (int e = 1; e <= 3; e++)
            {
                rows.Append(CultureInfo.InvariantCulture, $"E{e},{"ABC"[i % 3]},{random.Next(100) / 10.0},P{i}\n");
            }

            rows.Append(CultureInfo.InvariantCulture, $"E4,{"ABC"[i % 3]},{random.Next(40)},\n");
        }

        return rows.ToString();
    }
}
