using Campaigns.App.Commands;
using Campaigns.App.Dashboard;
using Campaigns.App.Tests.Commands;
using Campaigns.Catalog;
using Campaigns.Domain;
using Terminal.Gui.Input;

namespace Campaigns.App.Tests.Dashboard;

/// <summary>Programme, reviews and ledger of a catalog that commands made.</summary>
[Collection(ScreenTests.Name)]
public sealed class PastOfACatalogTests : IDisposable
{
    private readonly Workplace _place = new();
    private Catalog.Catalog? _opened;

    public void Dispose()
    {
        _opened?.Dispose();
        _place.Dispose();
    }

    [Fact]
    public void The_programme_shows_what_the_commands_left_undone()
    {
        Three();
        using TestScreen screen = Screen("Programme");
        string text = ProgrammePageTests.Flat(screen.Text);
        Assert.Contains("of 3 campaigns need attention", text, StringComparison.Ordinal);
        Assert.Contains("data not tested in 1 (2 experiments)", text, StringComparison.Ordinal);
        Assert.Contains("gates closed in 1", text, StringComparison.Ordinal);
        string feed = ProgrammePageTests.Flat(screen.Press(Key.Home).Text);
        Assert.Contains("closed", feed, StringComparison.Ordinal);
        string late = ProgrammePageTests.Flat(screen.Press(Key.End).Text);
        Assert.Contains("! Data not tested: 2 experiments with data and no test, 2 of them", late, StringComparison.Ordinal);
    }

    [Fact]
    public void The_programmes_figures_are_those_of_the_risk_command()
    {
        Three();
        string[] sentences = _place.Run("risk").Well().Out.Split('\n');
        using Catalog.Catalog catalog = Catalog.Catalog.Open(_place.Catalog, _place.Clock);
        IReadOnlyList<string> said = RiskTable.Programme(new CatalogSource(catalog).Campaigns());
        string risk = ProgrammePageTests.Flat(string.Join(' ', sentences));
        Assert.All(said.Skip(1), sentence => Assert.Contains(sentence, risk, StringComparison.Ordinal));
        CsvText csv = _place.Run("risk", "--format", "csv").Well().Csv;
        Assert.Equal("programme", csv.Column("campaign")[^1]);
        Assert.Contains($"Cumulative risk of the programme: {csv.Column("tests")[^1]} tests in 3 campaigns", said[0], StringComparison.Ordinal);
        Assert.Contains($"{csv.Column("uncorrected_hits")[^1]} experiments would count as hits; {csv.Column("survivors")[^1]} survive", said[0], StringComparison.Ordinal);
    }

    [Fact]
    public void Reviews_and_ledger_tell_of_a_withdrawal_as_the_commands_do()
    {
        _place.Run("run", _place.Campaign("T", "experiment,groups\nE1,a|b\nE2,a|b\n", Workplace.TwoExperiments)).Well();
        _place.Run("withdraw", "T", "E1", "--reason", "panel broke", "--as", "Ada").Well();
        _place.Run("review", "T").Well();
        using TestScreen screen = Screen("Reviews");
        string reviews = ProgrammePageTests.Side(screen);
        Assert.Contains("Between review 1 and review 2: 0 gained, 1 lost", reviews, StringComparison.Ordinal);
        Assert.Contains("E1 lost: withdrawn (panel broke)", reviews, StringComparison.Ordinal);
        screen.Turn("Ledger").Press(new Key('/')).Type("experiment:E1 withdraw").Press(Key.Enter);
        Assert.Contains("Reason: panel broke.", ProgrammePageTests.Flat(screen.Text), StringComparison.Ordinal);
        screen.Press(Key.P);
        ProgrammePageTests.Until(screen, "The record is whole");
        string head = _place.Run("ledger", "--format", "csv").Well().Csv.Column("hash")[^1];
        Assert.Contains(screen.Lines, l => l.Contains(":" + head, StringComparison.Ordinal));
    }

    [Fact]
    public void A_record_that_was_tampered_with_is_found_out_and_one_that_is_stopped_is_not_called_broken()
    {
        _place.Run("run", _place.Campaign("T", null, Workplace.TwoExperiments)).Well();
        using (Catalog.Catalog catalog = Catalog.Catalog.Open(_place.Catalog, _place.Clock))
        {
            CatalogSource source = new(catalog);
            Assert.True(source.Verify(_ => { }, CancellationToken.None).IsWhole);
            using CancellationTokenSource stop = new();
            Assert.ThrowsAny<OperationCanceledException>(() => source.Verify(p =>
            {
                if (p.Done == 3)
                {
                    stop.Cancel();
                }
            }, stop.Token));
        }

        // A text of the same length, somewhere in the file: the title of the campaign.
        byte[] bytes = File.ReadAllBytes(_place.Catalog);
        int at = bytes.AsSpan().IndexOf("Invented"u8);
        Assert.True(at > 0);
        "Invested"u8.CopyTo(bytes.AsSpan(at));
        for (int next; (next = bytes.AsSpan(at + 8).IndexOf("Invented"u8)) >= 0;)
        {
            at += 8 + next;
            "Invested"u8.CopyTo(bytes.AsSpan(at));
        }

        File.WriteAllBytes(_place.Catalog, bytes);
        using TestScreen screen = Screen("Ledger");
        screen.Press(Key.P);
        ProgrammePageTests.Until(screen, "The record is not whole");
    }

    [Fact]
    public void Checks_of_survivors_are_those_that_show_gives()
    {
        _place.Run("run", Workplace.Demo).Well();
        using Catalog.Catalog catalog = Catalog.Catalog.Open(_place.Catalog, _place.Clock);
        CatalogSource source = new(catalog);
        CampaignStanding standing = source.Standing("adhesion-screen");
        List<WorkProgress> told = [];
        SurvivorChecks checks = source.Checks(standing, told.Add, CancellationToken.None);
        Assert.Equal(standing.SurvivorCount, checks.Checked);
        Assert.NotEmpty(checks.Warning);
        Assert.NotEmpty(told);
        string[] expected = [.. standing.Experiments.Where(e => e.Survives == true).Select(e => e.Plan.Code)
            .Where(code => source.Detail(standing, code).Analysis.Checks.Any(c => c.Finding.Verdict == Campaigns.Statistics.Checks.CheckVerdict.Warns))];
        Assert.Equal(expected, checks.Warning.Select(w => w.Experiment));
        Assert.ThrowsAny<OperationCanceledException>(() => source.Checks(standing, _ => { }, new CancellationToken(canceled: true)));
    }

    [Fact]
    public void Without_a_code_the_programme_is_shown_where_there_are_several_campaigns()
    {
        _place.Run("start", "A", "--error-rate", "familywise", "--level", "0.05", "--correction", "holm").Well();
        Assert.Equal(("A", "Experiments"), Opening(null));
        _place.Run("start", "B", "--error-rate", "familywise", "--level", "0.05", "--correction", "holm").Well();
        Assert.Equal(("B", "Programme"), Opening(null));
        Assert.Equal(("A", "Experiments"), Opening("A"));
    }

    [Fact]
    public void Without_any_campaign_it_says_how_to_open_one()
    {
        Catalog.Catalog.OpenOrCreate(_place.Catalog, _place.Clock).Dispose();
        RefusedException refused = Assert.Throws<RefusedException>(() => Opening(null));
        Assert.Contains("'campaigns start CODE' opens one", refused.Message, StringComparison.Ordinal);
    }

    private (string, string) Opening(string? code)
    {
        using Catalog.Catalog catalog = Catalog.Catalog.Open(_place.Catalog, _place.Clock);
        return DashboardVerb.Opening(catalog, code);
    }

    /// <summary>One with a gate that is closed, one explored and done, one with data that nobody tested.</summary>
    private void Three()
    {
        _place.Run("run", ThreeFamilies.Folder(_place, 0)).Well();
        _place.Run("run", _place.Campaign("T", null, Workplace.TwoExperiments)).Well();
        _place.Run("start", "LATE", "--error-rate", "familywise", "--level", "0.05", "--correction", "holm").Well();
        _place.Run("plan", "LATE", _place.Write("plan.csv", "experiment,groups\nE1,a|b\nE2,a|b\nE3,a|b\n")).Well();
        _place.Run("seal", "LATE").Well();
        _place.Run("load", "LATE", _place.Write("late.csv", Workplace.TwoExperiments)).Well();
    }

    private TestScreen Screen(string page)
    {
        _opened = Catalog.Catalog.Open(_place.Catalog, _place.Clock);
        return new TestScreen(120, 60, new CatalogSource(_opened), page: page);
    }
}
