using System.IO.Compression;
using System.Text.RegularExpressions;
using Campaigns.App.Tests.Dashboard;
using Campaigns.App.Wording;
using Campaigns.Catalog.Ledger;
using Microsoft.Data.Sqlite;

namespace Campaigns.App.Tests.Commands;

public sealed partial class LedgerVerbTests : IDisposable
{
    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void Every_action_is_told_in_words()
    {
        Live();
        string text = _place.Run("ledger").Well().Out;
        Golden.Match("ledger", Versionless(text));
        string[] actions = [.. _place.Run("ledger", "--format", "csv").Well().Csv.Column("action").Distinct()];
        Assert.Equal(["upgrade", "start", "families", "plan", "seal", "load", "test", "review", "exclude", "register", "restream", "include", "withdraw", "restore"], actions);
        Assert.Contains("the computer's clock had gone back", text, StringComparison.Ordinal);
        Assert.DoesNotContain("no words for", text, StringComparison.Ordinal);
    }

    [Fact]
    public void No_word_of_an_action_is_left_without_a_sentence()
    {
        foreach (string action in LedgerAction.All)
        {
            var entry = new LedgerEntry { Sequence = 1, At = Workplace.Now, By = new Actor("lab", "Ada"), ProgramVersion = "1", Action = action, Campaign = "C", Subject = "S", Reason = "it broke.", Hash = "" };
            string sentence = LedgerText.Sentence(entry);
            Assert.StartsWith("1. 2026-03-02 09:30:00 UTC, Ada (account lab): ", sentence, StringComparison.Ordinal);
            Assert.EndsWith(". Reason: it broke.", sentence, StringComparison.Ordinal);
            Assert.DoesNotContain("no words for", sentence, StringComparison.Ordinal);
        }

        Assert.Contains("no words for, 'dance'", LedgerText.Deed(new LedgerEntry { Sequence = 1, At = Workplace.Now, By = new Actor("lab"), ProgramVersion = "1", Action = "dance", Hash = "" }), StringComparison.Ordinal);
    }

    [Fact]
    public void The_ledger_is_filtered_by_campaign_action_experiment_name_number_and_day()
    {
        Live();
        Assert.Equal(["start", "families", "plan", "seal", "load", "test", "review", "exclude", "include", "test"], Actions("ledger", "A"));
        Assert.Equal(["exclude"], Actions("ledger", "A", "--action", "exclude"));
        Assert.Equal(["plan", "seal", "load", "test", "exclude", "include", "test"], Actions("ledger", "A", "--experiment", "E1"));
        Assert.Equal(["plan", "seal", "load", "test"], Actions("ledger", "A", "--experiment", "E2"));
        Assert.Equal(["plan", "seal", "register", "load", "test"], Actions("ledger", "B", "--experiment", "E01"));
        Assert.Equal(["plan", "seal", "withdraw", "restore"], Actions("ledger", "B", "--experiment", "E04"));
        Assert.Equal(["exclude", "withdraw"], Actions("ledger", "--by", "A. Moss"));
        Assert.Equal(["include"], Actions("ledger", "--by", "B. Reed"));
        Assert.Equal(["seal", "register", "load", "test", "restream", "withdraw", "restore"], Actions("ledger", "B", "--from", "12"));
        Assert.Equal(["include", "test"], Actions("ledger", "A", "--since", "2026-03-03"));
        Assert.Equal(["upgrade"], Actions("ledger", "--until", "2026-03-01"));
        Assert.Empty(Actions("ledger", "--since", "2030-01-01"));
        Assert.Contains("Nothing that was done fits.", _place.Run("ledger", "--since", "2030-01-01").Well().Out, StringComparison.Ordinal);
        _place.Run("ledger", "X").Refused(3, "no campaign 'X'");
        _place.Run("ledger", "A", "--experiment", "E11").Refused(3, "no experiment 'E11' in campaign 'A'");
        _place.Run("ledger", "--experiment", "E1").Refused(2, "--experiment needs the campaign");
        _place.Run("ledger", "--since", "yesterday").Refused(2, "YYYY-MM-DD");
        _place.Run("ledger", "--action", "exclud").Refused(2, "did you mean 'exclude'");
    }

    [Fact]
    public void A_whole_record_is_proved_and_what_cannot_be_seen_is_said()
    {
        Live();
        string text = OneLine(_place.Run("ledger", "verify").Well().Out);
        Assert.Contains($"The record is whole: 20 entries. Its head: {Head} Proved", text, StringComparison.Ordinal);
        Assert.Contains("Without a head from outside it cannot be seen whether the end of the record was cut off, or the whole file was replaced by an older copy", text, StringComparison.Ordinal);
        string with = OneLine(_place.Run("ledger", "verify", "--head", Head).Well().Out);
        Assert.Contains($"the record was only continued: 0 entries came after it. The head given: {Head}", with, StringComparison.Ordinal);
        Assert.DoesNotContain("cannot be seen", with, StringComparison.Ordinal);
        CsvText csv = _place.Run("ledger", "verify", "--format", "csv").Well().Csv;
        Assert.Equal(["true"], csv.Column("whole"));
        Assert.Equal([Head], csv.Column("head"));
    }

    [Fact]
    public void A_record_that_is_not_whole_ends_with_5_and_names_the_first_bad_entry()
    {
        Live();
        string head = Head;
        using (SqliteConnection connection = new($"Data Source={_place.Catalog};Pooling=False"))
        {
            connection.Open();
            using SqliteCommand tamper = connection.CreateCommand();
            tamper.CommandText = "DROP TRIGGER ledger_is_kept; UPDATE ledger SET reason = 'another' WHERE sequence = 9;";
            tamper.ExecuteNonQuery();
        }

        Ran ran = _place.Run("ledger", "verify").Refused(5, "not whole", "the first entry that shows it is 9", "Entry 9 (A): The hash of this entry does not follow", "The trigger ledger_is_kept is missing.");
        Assert.Contains("Findings: 2.", ran.Error, StringComparison.Ordinal);
        Ran csv = _place.Run("ledger", "verify", "--format", "csv");
        Assert.Equal(5, csv.Code);
        Assert.Equal(["9", ""], csv.Csv.Column("sequence"));
        _place.Run("ledger", "verify", "--head", $"20:{new string('a', 64)}").Refused(5, "Entry 20", "not the one of the head given");
        _place.Run("ledger", "verify", "--head", $"21:{head[^64..]}").Refused(5, "The record was cut, or this is an older copy");
        _place.Run("ledger", "verify", "--head", "20").Refused(2, "SEQUENCE:HASH");
        _place.Run("ledger", "verify", "--hed", "20").Refused(2, "'campaigns ledger verify --help' explains it");
    }

    [Fact]
    public void Levels_and_decisions_beside_the_record_are_named_by_their_experiment()
    {
        Live();
        using (SqliteConnection connection = new($"Data Source={_place.Catalog};Pooling=False"))
        {
            connection.Open();
            using SqliteCommand tamper = connection.CreateCommand();
            tamper.CommandText = """
                INSERT INTO stream_entries SELECT s.id, 3, e.id, 0.01, 0, 0 FROM streams s JOIN campaigns c ON c.id = s.campaign_id JOIN experiments e ON e.campaign_id = c.id WHERE c.code = 'B' AND s.number = 1 AND e.code = 'E03';
                INSERT INTO standing_decisions SELECT stream_id, 3, 9, max(test_run_id), 0.5, NULL, 0, 0 FROM standing_decisions WHERE stream_id = (SELECT stream_id FROM stream_entries WHERE level = 0.01 AND position = 3);
                """;
            tamper.ExecuteNonQuery();
        }

        _place.Run("ledger", "verify").Refused(
            5, "No entry of the ledger speaks for the level given to experiment 'E03' in stream 1 of campaign 'B'.", "No entry of the ledger speaks for the decision on experiment 'E03' in stream 1 of campaign 'B'.");
    }

    [Fact]
    public void Show_seal_and_review_print_the_head_that_the_ledger_has()
    {
        _place.Run("start", "C").Well();
        _place.Run("plan", "C", _place.Write("plan.csv", "experiment,groups\nE1,a|b\nE2,a|b\n")).Well();
        string fixedNow = OneLine(_place.Run("seal", "C").Well().Out);
        Assert.Contains(Head, fixedNow, StringComparison.Ordinal);
        string sealing = OneLine(_place.Run("show", "C").Well().Out);
        Assert.Contains($"This is what stood in the catalog at ledger head {Head}", sealing, StringComparison.Ordinal);
        _place.Run("load", "C", _place.Write("m.csv", Workplace.TwoExperiments)).Well();
        _place.Run("test", "C").Well();
        string review = OneLine(_place.Run("review", "C").Well().Out);
        Assert.Contains(Head, review, StringComparison.Ordinal);
        Assert.Contains(Head, OneLine(_place.Run("show", "C", "E1").Well().Out), StringComparison.Ordinal);
        foreach (string[] command in (string[][])[["show", "C"], ["show", "C", "E1"]])
        {
            CsvText csv = _place.Run([.. command, "--format", "csv"]).Well().Csv;
            Assert.Equal(["ledger_sequence", "ledger_head"], csv.Columns.TakeLast(2));
            Assert.All(csv.Column("ledger_head"), head => Assert.Equal(Head, head));
            Assert.Contains($"\"ledger_head\": \"{Head}\"", _place.Run([.. command, "--format", "json"]).Well().Out, StringComparison.Ordinal);
        }
    }

    [Fact]
    public void A_change_with_a_head_that_is_out_of_date_is_refused_with_what_was_done_since()
    {
        _place.Run("start", "C").Well();
        string seen = Head;
        string plan = _place.Write("plan.csv", "experiment,groups\nE1,a|b\n");
        _place.Run("plan", "C", plan, "--as", "Ada", "--head", seen).Well();
        string other = _place.Write("other.csv", "experiment,groups\nE1,a|b|c\n");
        Ran refused = _place.Run("plan", "C", other, "--as", "Ben", "--head", seen).Refused(3, "was changed since", "  2. 2026-03-02 09:30:00 UTC, Ada (account lab): registered or changed planned experiments of C (1 added, 0 changed).\n", $"  --head {Head}\n");
        Assert.DoesNotContain("Ben", refused.Error, StringComparison.Ordinal);
        _place.Run("plan", "C", other, "--as", "Ben", "--head", Head).Well();
        _place.Run("seal", "C", "--head", $"1:{new string('0', 64)}").Refused(5, "does not hold the head 1:000");
        _place.Run("seal", "C", "--head", "x").Refused(2, "SEQUENCE:HASH");
        Assert.Equal(["start", "plan", "plan"], Actions("ledger"));
    }

    private string Head => _place.Run("ledger", "verify", "--format", "csv").Csv.Column("head")[0];

    private string[] Actions(params string[] command) => _place.Run([.. command, "--format", "csv"]).Well().Csv.Column("action");

    private static string OneLine(string text) => text.ReplaceLineEndings(" ");

    private static string Versionless(string text) => Digest().Replace(text, "<digest>");

    [GeneratedRegex("[0-9a-f]{64}")]
    private static partial Regex Digest();

    /// <summary>An upgraded catalog in which everything is done once: a campaign with families, corrected, and one that is judged as its experiments arrive.</summary>
    private void Live()
    {
        string old = Path.Combine(Workplace.Repository(), "tests", "reference", "catalog", "schema-3.db.gz");
        using (var packed = new GZipStream(File.OpenRead(old), CompressionMode.Decompress))
        using (FileStream file = File.Create(_place.Catalog))
        {
            packed.CopyTo(file);
        }

        _place.Clock.AdjustTime(Workplace.Now.AddDays(-1));
        _place.Run("upgrade").Well();
        _place.Clock.AdjustTime(Workplace.Now);
        _place.Run("start", "A", "--title", "Primers").Well();
        _place.Run("families", "A", _place.Write("families.csv", "family\nwet\ndry\n")).Well();
        _place.Run("plan", "A", _place.Write("plan.csv", "experiment,groups,family\nE1,a|b,wet\nE2,a|b,dry\n")).Well();
        _place.Run("seal", "A").Well();
        _place.Run("load", "A", _place.Write("m.csv", Workplace.TwoExperiments)).Well();
        _place.Run("test", "A").Well();
        _place.Run("review", "A").Well();
        _place.Run("exclude", "A", "E1", "--line", "2", "--reason", "panel dropped", "--as", "A. Moss").Well();
        _place.Run("start", "B", "--correction", "lord", "--horizon", "4").Well();
        _place.Clock.AdjustTime(Workplace.Now.AddHours(-2));
        _place.Run("plan", "B", _place.Write("online.csv", OnlineCampaign.Plan(4))).Well();
        _place.Clock.AdjustTime(Workplace.Now);
        _place.Run("seal", "B").Well();
        _place.Run("register", "B", "E02", "E01").Well();
        _place.Run("load", "B", _place.Write("b.csv", OnlineCampaign.Measurements(1, 2))).Well();
        _place.Run("test", "B").Well();
        _place.Run("restream", "B", "--correction", "saffron", "--horizon", "6", "--reason", "more than planned").Well();
        _place.Clock.AdjustTime(Workplace.Now.AddDays(2));
        _place.Run("exclude", "A", "E1", "--line", "2", "--take-back", "--reason", "it was another", "--as", "B. Reed").Well();
        _place.Run("test", "A").Well();
        _place.Run("withdraw", "B", "E04", "--reason", "resin no longer made", "--as", "A. Moss").Well();
        _place.Run("withdraw", "B", "E04", "--take-back", "--reason", "found a drum").Well();
    }
}
