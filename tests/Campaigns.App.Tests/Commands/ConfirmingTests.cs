using Campaigns.App.Tests.Dashboard;

namespace Campaigns.App.Tests.Commands;

/// <summary>An invented screen and the campaign that confirms its survivors, with what people and scripts read of both.</summary>
public sealed class ConfirmingTests : IDisposable
{
    private const string ScreenPlan = """
        experiment,title,unit,groups,control,follow_up,replicates
        S1,binder A,MPa,old|new,old,holm-pairs,4
        S2,binder B,MPa,old|new,old,holm-pairs,4
        S3,binder C,MPa,old|new,old,holm-pairs,4
        S4,binder D,MPa,old|new,old,holm-pairs,4

        """;

    private const string ConfirmPlan = """
        experiment,title,unit,groups,control,follow_up,replicates,confirms
        C1,binder A again,MPa,old|new,old,holm-pairs,4,SCREEN/S1
        C2,binder B again,MPa,old|new,old,holm-pairs,4,SCREEN/S2
        C3,binder C again,MPa,old|new,old,holm-pairs,4,SCREEN/S3

        """;

    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void A_confirmation_after_the_screen_is_judged_over_the_whole_screen()
    {
        Screen();
        Confirm();
        CsvText screen = Csv("results", "SCREEN");
        CsvText confirm = Csv("results", "CONFIRM");
        Assert.Equal(["SCREEN/S1", "SCREEN/S2", "SCREEN/S3"], confirm.Column("confirms"));
        double[] larger = [.. ((string[])["1", "2"]).Select(i => Math.Max(CsvText.Number(screen.Value("S" + i, "p")), CsvText.Number(confirm.Value("C" + i, "p"))))];
        Assert.Equal(larger, confirm.Column("replicability_p").Take(2).Select(CsvText.Number));

        // Benjamini and Hochberg by hand over the four of the screen: the larger of two p-values times 4/2, the smaller times 4 and at most that.
        double top = Math.Min(1, larger.Max() * 4 / 2);
        Assert.Equal(top, confirm.Column("replicability_adjusted_p").Take(2).Max(CsvText.Number), 1e-15);
        Assert.Equal(Math.Min(larger.Min() * 4, top), confirm.Column("replicability_adjusted_p").Take(2).Min(CsvText.Number), 1e-15);
        Assert.Equal(["true", "false", ""], confirm.Column("replicated"));
        Assert.Equal("", confirm.Value("C3", "replicability_p"));
        Assert.Equal("confirms,replicability_p,replicability_adjusted_p,replicated", string.Join(',', confirm.Columns.TakeLast(4)));
        Assert.All(screen.Column("confirms").Concat(screen.Column("replicated")), field => Assert.Equal("", field));
        HonestOutput.Of(_place, "CONFIRM", "C1", "C3");
    }

    [Fact]
    public void People_read_how_it_was_judged()
    {
        Screen();
        Confirm();
        Golden.Match("confirming", _place.Run("results", "CONFIRM").Well().Out);
        string one = _place.Run("show", "CONFIRM", "C1").Well().Out;
        Assert.Contains("Confirms SCREEN/S1: the larger of both p is", one, StringComparison.Ordinal);
        Assert.Contains("Confirms SCREEN/S3: it has no result itself, so nothing can be said yet.", _place.Run("show", "CONFIRM", "C3").Well().Out, StringComparison.Ordinal);
        Assert.DoesNotContain("Replicated", _place.Run("results", "SCREEN").Well().Out, StringComparison.Ordinal);
    }

    [Fact]
    public void A_folder_confirms_again_after_an_export()
    {
        Screen();
        Confirm();
        _place.Run("export", "CONFIRM", "--out", _place.At("out")).Well();
        Assert.Contains("SCREEN/S2", File.ReadAllText(_place.At("out", "plan.csv")), StringComparison.Ordinal);
        _place.Variables["CAMPAIGNS_CATALOG"] = _place.At("second.db");
        Screen();
        _place.Run("run", _place.At("out")).Well();
        Assert.Equal("true", Csv("results", "CONFIRM").Value("C1", "replicated"));
    }

    [Fact]
    public void Old_data_and_unknown_first_experiments_are_refused()
    {
        _place.Run("run", _place.Campaign("CONFIRM", ConfirmPlan, null)).Refused(3, "column confirms; nothing was changed", "there is no experiment 'SCREEN/S1' to confirm");
        Screen();
        _place.Run("run", _place.Campaign("CONFIRM", ConfirmPlan, null)).Well();
        string old = _place.Write("old.csv", "experiment,group,value\nC1,old,5.0\nC1,old,5.2\nC1,new,7.0\nC1,new,7.1\n");
        _place.Run("load", "CONFIRM", old).Refused(3, "old.csv line 2, column value", "\"CONFIRM/C1\" confirms \"SCREEN/S1\" on new data");
        string more = _place.Write("more.csv", "experiment,group,value\nS1,old,5.05\n");
        _place.Run("load", "SCREEN", more).Refused(3, "Register a new experiment that confirms it (plan column confirms)");
    }

    [Fact]
    public void Corrections_put_the_sealed_one_first_and_tell_what_hangs_on_the_choice()
    {
        _place.Run("run", Workplace.Demo).Well();
        CsvText corrections = Csv("corrections", "adhesion-screen");
        Assert.Equal("bh", corrections.Column("correction")[0]);
        Assert.Equal(["true", .. Enumerable.Repeat("false", corrections.Rows.Count - 1)], corrections.Column("sealed"));
        CsvText all = Csv("corrections", "adhesion-screen", "--by-experiment");
        Assert.Equal("bh", all.Columns[2]);
        CsvText hanging = Csv("corrections", "adhesion-screen", "--hanging");
        Assert.Equal(all.Rows.Where(r => r[Array.IndexOf(all.Columns, "hangs")] == "true"), hanging.Rows);

        // GS-02 survives under bh (0.0225) and not under by (0.1003).
        string[] under = hanging.Value("GS-02", "survives_under").Split('|');
        Assert.Contains("bh", under);
        Assert.DoesNotContain("by", under);
        Assert.Contains("The sealed correction alone decides", _place.Run("corrections", "adhesion-screen", "--hanging").Well().Out, StringComparison.Ordinal);
    }

    [Fact]
    public void Near_misses_change_one_thing_at_a_time()
    {
        _place.Run("run", Workplace.Demo).Well();
        CsvText misses = Csv("corrections", "adhesion-screen", "--near-misses");
        Assert.Equal(["scenario", "changed", "survivors", "gained", "lost"], misses.Columns);
        Assert.Equal(["sealed", "", "14", "", ""], misses.Rows[0]);
        Assert.Equal(["level", "0.01", "8", "", "GS-02|GS-08|GS-24|GS-25|GS-37|GS-38"], misses.Rows[1]);
        Assert.Equal(["0.2"], Csv("corrections", "adhesion-screen", "--near-misses", "--level", "0.2").Rows.Where(r => r[0] == "level").Select(r => r[1]));
        Assert.Contains("holds no error rate", _place.Run("corrections", "adhesion-screen", "--near-misses").Well().Out, StringComparison.Ordinal);
        _place.Run("corrections", "adhesion-screen", "--level", "0.1").Refused(2, "--level goes with --near-misses");
        _place.Run("corrections", "adhesion-screen", "--near-misses", "--hanging").Refused(2, "--near-misses gives a row a change");
    }

    [Fact]
    public void Survivors_carry_intervals_that_account_for_their_selection()
    {
        Screen();
        CsvText survivors = Csv("survivors", "SCREEN");
        CsvText comparisons = Csv("comparisons", "SCREEN");
        Assert.Equal(["selected_lower", "selected_upper", "selected_confidence"], comparisons.Columns[^3..]);
        Assert.Equal(["selected_lower", "selected_upper", "selected_confidence", "eta_squared_lower", "eta_squared_upper", "not_claimed"], survivors.Columns[^6..]);

        // Two of four survive: 1 - 0.05 x 2/4.
        Assert.Equal([0.975, 0.975], survivors.Numbers("selected_confidence"));
        foreach (string[] row in survivors.Rows)
        {
            // Of two groups the gap is the one comparison, and old is the lower.
            Assert.Equal(comparisons.Value(row[0], "selected_lower"), survivors.Value(row[0], "selected_lower"));
            Assert.Equal(comparisons.Value(row[0], "selected_upper"), survivors.Value(row[0], "selected_upper"));
            double eta = CsvText.Number(survivors.Value(row[0], "eta_squared"));
            Assert.InRange(eta, CsvText.Number(survivors.Value(row[0], "eta_squared_lower")), CsvText.Number(survivors.Value(row[0], "eta_squared_upper")));
        }

        Assert.Equal("", comparisons.Value("S3", "selected_lower") + comparisons.Value("S3", "selected_confidence"));
        Assert.Equal("its experiment does not survive", comparisons.Value("S3", "note"));
        string table = _place.Run("comparisons", "SCREEN").Well().Out;
        Assert.Contains("Not claimed: 1 (its experiment does not survive).", table, StringComparison.Ordinal);
        Assert.Contains("1 - 0.05 x 2/4", table.ReplaceLineEndings(" "), StringComparison.Ordinal);
    }

    private CsvText Csv(params string[] arguments) => _place.Run([.. arguments, "--format", "csv"]).Well().Csv;

    private void Screen() => _place.Run("run", _place.Campaign("SCREEN", ScreenPlan, Values("S1", "5.0 5.2 4.9 5.1", "7.0 7.1 6.8 7.2") + Rows("S2", "5.0 5.3 4.8 5.1", "6.0 6.2 5.9 6.3") + Rows("S3", "5.0 5.2 4.9 5.1", "5.1 5.0 5.2 4.9"))).Well();

    private void Confirm()
    {
        _place.Clock.Advance(TimeSpan.FromDays(30));
        _place.Run("run", _place.Campaign("CONFIRM", ConfirmPlan, Values("C1", "5.1 5.3 4.95 5.05", "6.9 7.15 6.75 7.3") + Rows("C2", "5.1 5.6 4.6 5.2", "5.2 5.8 4.9 5.4"))).Well();
    }

    private static string Values(string experiment, string old, string fresh) => "experiment,group,value\n" + Rows(experiment, old, fresh);

    private static string Rows(string experiment, string old, string fresh) =>
        string.Concat(old.Split(' ').Select(v => $"{experiment},old,{v}\n").Concat(fresh.Split(' ').Select(v => $"{experiment},new,{v}\n")));
}
