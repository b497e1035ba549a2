using Campaigns.App.Wording;
using Campaigns.Catalog;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Ledger.Verifying;
using Terminal.Gui.Input;

namespace Campaigns.App.Tests.Dashboard;

[Collection(ScreenTests.Name)]
public sealed class LedgerPageTests
{
    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void The_ledger_looks_as_kept(int width, int height)
    {
        using TestScreen screen = new(width, height, SamplePast.Source(1), page: "Ledger");
        Golden.Match($"ledger-{width}x{height}", screen.Text);
        Golden.Match($"ledger-reason-{width}x{height}", screen.Press(new Key('/')).Type("action:exclude").Press(Key.Enter).Text);
        Golden.Match($"ledger-help-{width}x{height}", screen.Press(Key.F1).Text);
    }

    [Theory]
    [InlineData(80, 24)]
    [InlineData(120, 40)]
    public void The_record_is_shown_in_the_words_of_the_command_and_the_head_in_full(int width, int height)
    {
        SampleSource source = SamplePast.Source(1);
        using TestScreen screen = new(width, height, source, page: "Ledger");
        (IReadOnlyList<LedgerEntry> entries, LedgerHead head) = source.Ledger(new LedgerFilter());
        Assert.Contains(screen.Lines, l => l.StartsWith(head.ToString(), StringComparison.Ordinal));
        int first = screen.Lines.ToList().FindIndex(l => l.Contains("what was done", StringComparison.Ordinal)) + 1;
        for (int row = 0; row < 6; row++)
        {
            LedgerEntry entry = entries[^(row + 1)];
            string[] words = screen.Lines[first + row].Split(' ', StringSplitOptions.RemoveEmptyEntries);
            Assert.Equal(entry.Sequence.ToString(System.Globalization.CultureInfo.InvariantCulture), words[0]);
            Assert.Equal(entry.At.ToString("yyyy-MM-dd HH:mm", System.Globalization.CultureInfo.InvariantCulture), words[1] + " " + words[2]);
            Assert.Equal(entry.By.ActingAs ?? entry.By.Account, words[3]);
            string shown = string.Join(' ', words[4..6]);
            Assert.True(LedgerText.Deed(entry).StartsWith(shown, StringComparison.Ordinal) || LedgerText.ShortDeed(entry).StartsWith(shown, StringComparison.Ordinal), shown);
        }

        string text = ProgrammePageTests.Flat(Sheet(screen, width));
        Assert.Contains(LedgerText.Sentence(entries[^1])[..60], text, StringComparison.Ordinal);
    }

    [Fact]
    public void An_entry_in_full_has_its_changes_its_reason_its_hash_and_its_digests()
    {
        using TestScreen screen = new(160, 50, SamplePast.Source(1), page: "Ledger");
        LedgerEntry entry = SamplePast.Entries(18).Last(e => e.Reason is not null);
        screen.Press(new Key('/')).Type("blistered").Press(Key.Enter);
        string text = Sheet(screen, 160);
        Assert.Contains("E4: oven-7.csv, line 14: 91.0 -> left out", text, StringComparison.Ordinal);
        Assert.Contains("Reason: film blistered; run again\\u{1B}[31m\\u{202E}.", ProgrammePageTests.Flat(text), StringComparison.Ordinal);
        Assert.Contains(entry.Hash, text, StringComparison.Ordinal);
        Assert.Contains(entry.Evidence[0].Digest, text, StringComparison.Ordinal);
        Assert.DoesNotContain('\u202e', screen.Sent);
        Assert.DoesNotContain("again\u001b", screen.Sent, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("withdraw", 0)]
    [InlineData("loaded week-01", 1)]
    [InlineData("ACTION:exclude", 3)]
    [InlineData("action:exclude primer", 2)]
    [InlineData("by:ada", 9)]
    [InlineData("91.0 left", 3)]
    [InlineData("experiment:E4", 2)]
    [InlineData("by:ada action:load", 2)]
    public void Typing_filters_by_words_actions_people_and_experiments(string typed, int expected)
    {
        using TestScreen screen = new(120, 40, SamplePast.Source(1), page: "Ledger");
        screen.Press(new Key('/')).Type(typed).Press(Key.Enter);
        Assert.Contains(expected == 0 ? "none of 18 entries shown" : FormattableString.Invariant($"of {expected} shown, 18 in all"), screen.Text, StringComparison.Ordinal);
        Assert.Contains(" of 18; whole catalog", screen.Press(Key.Esc).Text, StringComparison.Ordinal);
    }

    [Fact]
    public void A_head_that_was_printed_earlier_finds_its_entry_and_another_one_none()
    {
        using TestScreen screen = new(120, 40, SamplePast.Source(1), page: "Ledger");
        LedgerEntry seventh = SamplePast.Entries(18)[6];
        screen.Press(new Key('/')).Type($"7:{seventh.Hash}").Press(Key.Enter);
        Assert.Contains("row 1 of 1 shown, 18 in all", screen.Text, StringComparison.Ordinal);
        screen.Press(Key.Esc).Press(new Key('/')).Type(seventh.Hash[..12]).Press(Key.Enter);
        Assert.Contains("row 1 of 1 shown, 18 in all", screen.Text, StringComparison.Ordinal);
        screen.Press(Key.Esc).Press(new Key('/')).Type($"8:{seventh.Hash}").Press(Key.Enter);
        Assert.Contains("none of 18 entries shown", screen.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void An_experiment_that_the_campaign_does_not_have_is_said_to_be_none()
    {
        using TestScreen screen = new(120, 40, SamplePast.Source(1), page: "Ledger");
        screen.Press(new Key('/')).Type("experiment:E99");
        Assert.Contains("The campaign PRIMER-26 has no experiment E99.", screen.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void Order_and_scope_turn_and_the_selected_entry_stays()
    {
        using TestScreen screen = new(120, 40, SamplePast.Source(1), page: "Ledger");
        Assert.Contains("row 1 of 18; whole catalog, newest first", screen.Text, StringComparison.Ordinal);
        screen.Press(Key.CursorDown, Key.R);
        Assert.Contains("row 17 of 18; whole catalog, oldest first", screen.Text, StringComparison.Ordinal);
        screen.Press(Key.C);
        Assert.Contains("row 12 of 12 shown, 18 in all; PRIMER-26 alone, oldest first", screen.Text, StringComparison.Ordinal);
        Assert.DoesNotContain("GLOSS-7", screen.Text, StringComparison.Ordinal);
        screen.Press(Key.C, Key.Home);
        Assert.Contains("row 1 of 18", screen.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void The_record_is_proved_on_the_side_and_the_result_is_in_the_words_of_the_command()
    {
        using ManualResetEventSlim go = new();
        LedgerProof whole = Proof([]);
        SampleSource source = Proving((progress, stop) =>
        {
            progress(new WorkProgress("proving the tables", 3, 6, "parts"));
            go.Wait(stop);
            return whole;
        });
        using TestScreen screen = new(120, 40, source, page: "Ledger");
        screen.Press(Key.P);
        ProgrammePageTests.Until(screen, "proving the tables, part 4 of 6; Esc stops it");
        screen.Press(Key.CursorDown);
        Assert.Contains("part 4 of 6", screen.Text, StringComparison.Ordinal);
        go.Set();
        ProgrammePageTests.Until(screen, "The record is whole");
        string text = ProgrammePageTests.Flat(Sheet(screen, 120));
        Assert.All(ProofText.Whole(whole).Take(2), sentence => Assert.Contains(ProgrammePageTests.Flat(sentence)[..40], text, StringComparison.Ordinal));
        screen.Press(Key.Esc);
        Assert.Contains("what proves it", screen.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void A_record_that_is_not_whole_is_said_to_be_so_finding_by_finding()
    {
        LedgerProof broken = Proof([new LedgerFinding(7, "PRIMER-26", "The rows differ from their digest."), new LedgerFinding(null, null, "A table is too many.")]);
        using TestScreen screen = new(120, 40, Proving((_, _) => broken), page: "Ledger");
        screen.Press(Key.P);
        ProgrammePageTests.Until(screen, "The record is not whole");
        string text = ProgrammePageTests.Flat(Sheet(screen, 120));
        Assert.Contains("the first entry that shows it is 7", text, StringComparison.Ordinal);
        Assert.Contains("Entry 7 (PRIMER-26): The rows differ from their digest.", text, StringComparison.Ordinal);
        Assert.Contains("A table is too many.", text, StringComparison.Ordinal);
    }

    [Fact]
    public void Of_very_many_findings_the_first_are_shown_and_the_others_counted()
    {
        LedgerProof broken = Proof([.. Enumerable.Range(1, 5_000).Select(n => new LedgerFinding(n, null, "The rows differ from their digest."))]);
        using TestScreen screen = new(120, 40, Proving((_, _) => broken), page: "Ledger");
        screen.Press(Key.P);
        ProgrammePageTests.Until(screen, "Findings: 5000.");
        screen.Press(Key.Tab, Key.End);
        Assert.Contains("... and 4800 more; 'campaigns ledger verify' names all.", screen.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void A_proof_that_is_stopped_or_cannot_be_made_says_nothing_about_the_record()
    {
        int tries = 0;
        SampleSource source = Proving((_, stop) =>
        {
            if (tries++ > 0)
            {
                throw new CatalogException("The catalog is locked by another program.");
            }

            stop.WaitHandle.WaitOne();
            throw new OperationCanceledException(stop);
        });
        using TestScreen screen = new(120, 40, source, page: "Ledger");
        screen.Press(Key.P, Key.Esc);
        ProgrammePageTests.Until(screen, "what proves it");
        Assert.DoesNotContain("The record", screen.Text, StringComparison.Ordinal);
        screen.Press(Key.P);
        ProgrammePageTests.Until(screen, "The record could not be proved: The catalog is locked by another program.");
        Assert.False(screen.IsStopped);
    }

    [Fact]
    public void A_hundred_thousand_entries_are_read_once_and_scroll()
    {
        SampleSource source = SamplePast.Source(1, SamplePast.Entries(100_000));
        using TestScreen screen = new(120, 40, source, page: "Ledger");
        screen.Press(Key.End);
        Assert.Contains("row 100000 of 100000", screen.Text, StringComparison.Ordinal);
        screen.Press(Key.PageUp, Key.PageUp, Key.Home, Key.R, Key.End).Press(new Key('/')).Type("99999").Press(Key.Enter);
        Assert.Contains("row 1 of ", screen.Text, StringComparison.Ordinal);
        Assert.Equal(1, source.LedgerReads);
        Assert.Contains("99999 ", screen.Text, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(1, 1)]
    [InlineData(20, 5)]
    [InlineData(79, 12)]
    [InlineData(300, 90)]
    public void No_size_stops_it(int width, int height)
    {
        using TestScreen screen = new(80, 24, SamplePast.Source(1), page: "Ledger");
        screen.Resize(width, height).Press(Key.CursorDown, Key.PageDown, Key.Space, Key.Tab, Key.End, Key.Esc, Key.Home);
        Assert.Contains("row 1 of 18", screen.Resize(80, 24).Text, StringComparison.Ordinal);
    }

    [Fact]
    public void A_ledger_without_an_entry_says_so()
    {
        using TestScreen screen = new(80, 24, SampleCampaign.Standing(3), ascii: true);
        screen.Turn("Ledger").Press(Key.CursorDown, Key.Enter, Key.Esc, Key.C, Key.R);
        Assert.Contains("Nothing was done yet.", screen.Text, StringComparison.Ordinal);
        Assert.DoesNotContain(screen.Text, c => c > '~');
    }

    private static LedgerProof Proof(IReadOnlyList<LedgerFinding> findings) => new()
    {
        Head = new LedgerHead(18, new string('a', 64)),
        Entries = 18,
        Digests = 31,
        ClockSteps = 0,
        Findings = findings,
        Remarks = [],
    };

    private static SampleSource Proving(Func<Action<WorkProgress>, CancellationToken, LedgerProof> prove) =>
        new(SamplePast.Standing) { Entries = SamplePast.Entries(18), Proving = prove };

    /// <summary>The text beside or below the list, its lines one below the other.</summary>
    private static string Sheet(TestScreen screen, int width)
    {
        List<string> lines = [.. screen.Lines];
        if (width >= 160)
        {
            return string.Join('\n', lines.Select(l => l.Contains('│', StringComparison.Ordinal) ? l[(l.IndexOf('│', StringComparison.Ordinal) + 1)..].Trim() : ""));
        }

        return string.Join('\n', lines.SkipWhile(l => !l.StartsWith("────", StringComparison.Ordinal)).Skip(1));
    }
}
