using Campaigns.App.Dashboard.Model;
using Campaigns.Catalog;
using Campaigns.Catalog.Ledger;
using Campaigns.Domain;
using Terminal.Gui.Input;

namespace Campaigns.App.Tests.Dashboard;

[Collection(ScreenTests.Name)]
public sealed class CatalogWatchTests
{
    private static readonly CampaignStanding Standing = SampleCampaign.Standing(48);

    [Fact]
    public void A_catalog_that_is_locked_is_told_on_the_screen_and_asked_again_by_F5_alone()
    {
        bool isLocked = true;
        int asked = 0;
        SampleSource source = new(Standing)
        {
            OnDetail = _ =>
            {
                asked++;
                if (isLocked)
                {
                    throw new CatalogException("The catalog 'c.db' is locked by another program.");
                }
            },
        };
        using TestScreen screen = new(120, 40, source);
        screen.Wait(TimeSpan.FromMilliseconds(10));
        Assert.Contains("F5 tries again. The catalog 'c.db' is locked by another program.", screen.Lines[^1], StringComparison.Ordinal);
        Assert.Contains(screen.Lines, l => l.StartsWith("E1 ", StringComparison.Ordinal));
        screen.Press(Key.CursorDown, Key.CursorDown);
        Assert.Equal(1, asked);
        isLocked = false;
        screen.Press(Key.F5);
        Assert.DoesNotContain("F5 tries again", screen.Text, StringComparison.Ordinal);
        Assert.Contains("values by group", screen.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void What_others_changed_since_is_told_when_a_page_is_turned()
    {
        List<LedgerEntry> entries = [];
        using TestScreen screen = new(80, 24, new SampleSource(Standing) { Entries = entries });
        screen.Turn("Risk");
        Assert.DoesNotContain("F5 reads anew", screen.Text, StringComparison.Ordinal);
        entries.Add(new LedgerEntry { Sequence = 41, At = DateTimeOffset.UnixEpoch, By = new Actor("lab", null), ProgramVersion = "0.5.0", Action = LedgerAction.Withdraw, Hash = new string('a', 64) });
        screen.Turn("Experiments");
        Assert.Contains("F5 reads anew: the catalog was changed since (ledger entry 41).", screen.Lines[^1], StringComparison.Ordinal);
        screen.Press(Key.F5);
        Assert.DoesNotContain("F5 reads anew", screen.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void A_page_that_cannot_be_read_gives_way_to_the_experiments_and_other_faults_end_the_dashboard()
    {
        using TestScreen screen = new(80, 24, Standing);
        screen.Turn("Help");
        Assert.True(screen.Excuse(new CatalogException("The catalog 'c.db' is locked by another program.")));
        Assert.Contains("[2 Experiments]", screen.Text, StringComparison.Ordinal);
        Assert.Contains("F5 tries again.", screen.Text, StringComparison.Ordinal);
        Assert.False(screen.Excuse(new InvalidOperationException("a fault")));
    }

    [Fact]
    public void Nothing_is_wrong_with_a_catalog_that_nobody_changed()
    {
        CatalogWatch watch = new(new SampleSource(Standing));
        watch.Begin();
        watch.Look();
        Assert.Null(watch.Sentence);
        Assert.False(watch.HasFailed);
    }
}
