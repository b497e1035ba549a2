using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Ledger.Verifying;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Reviewing;
using Campaigns.Domain;

namespace Campaigns.Catalog.Tests.Providers;

/// <summary>What version 0.5.0 wrote with schema 4 is proved, read and continued by the program of today, upgraded first where its schema is a later one.</summary>
public sealed class Schema4Tests : IDisposable
{
    private const string Migrations = "Campaigns.Migrations.Sqlite";
    private static readonly LedgerHead Head = new(35, "70fd31469c3783e2fae29c2a9af82b6bdca18c15c9d907dbf00ae364bb75c546");

    private readonly TestFolder _folder = KeptCatalog.Unpack("schema-4");
    private readonly Catalog _catalog;

    public Schema4Tests()
    {
        bool wasUpgraded = CatalogUpgrade.Run(_folder[KeptCatalog.Name], Migrations, TimeProvider.System, stop: TestContext.Current.CancellationToken);
        Assert.Equal(SqliteCatalogFile.SchemaVersion > 4, wasUpgraded);
        _catalog = Catalog.Open(_folder[KeptCatalog.Name], TimeProvider.System);
    }

    [Fact]
    public void Its_record_is_whole_and_holds_the_head_that_was_printed_then()
    {
        LedgerProof proof = new LedgerVerifier(_catalog).Verify(Head);
        Assert.Empty(proof.Findings);
        Assert.True(proof.Entries >= 35 && proof.Digests >= 44, $"{proof.Entries} entries, {proof.Digests} digests");
    }

    [Fact]
    public void A_result_that_somebody_changes_in_it_is_found()
    {
        Raw.Execute(_catalog.Connection, "DROP TRIGGER test_results_are_kept; UPDATE test_results SET p = p / 2 WHERE experiment_id = (SELECT id FROM experiments WHERE code = 'P4')");
        Assert.Contains(new LedgerVerifier(_catalog).Verify(Head).Findings, f => f.What.Contains("test run", StringComparison.Ordinal));
    }

    [Theory]
    [InlineData("primers", "P1 tested 17 2.4910756500513464E-05 survives|P2 tested 18 0.000176445085285551 survives|P3 withdrawn 24 |P4 tested 18 0.79477 |P5 withdrawn 0  left|N5 tested 18 0.010032328799459434 survives")]
    [InlineData("screens", "S1 tested 18 9.039320892843792E-06 survives|S2 tested 18 1.7076183204126935E-05 survives|S3 tested 18 0.692276110486284 |S4 tested 18 0.77655522534363 |S5 tested 18 0.786343491273579 |S6 tested 18 0.7057680412591842 ")]
    [InlineData("arrivals", "W1 tested 18 5.9365928774936976E-05 survives|W2 tested 18 0.16857439176538463 |W3 tested 18 0.34681126325375344 |W4 planned 0 |W5 planned 0 ")]
    [InlineData("explore", "X1 tested 15 2.613283469362048E-05 survives|X2 tested 15 0.32047987723212484 ")]
    public void Its_results_are_those_that_version_0_5_0_printed(string code, string printed)
    {
        IEnumerable<string> read = new StandingReader(_catalog).Read(code).Experiments.Select(e => FormattableString.Invariant(
            $"{e.Plan.Code} {e.Status.Word()} {e.ObservationCount} {e.P?.Value:R}{(e.Survives == true ? " survives" : e.LeftFamily ? " left" : "")}"));
        Assert.Equal(printed.Split('|').Select(l => l.TrimEnd()), read.Select(l => l.TrimEnd()));
    }

    [Fact]
    public void Its_decisions_stand_with_their_reasons()
    {
        CampaignStanding standing = new StandingReader(_catalog).Read("primers");
        string Told(string code) => string.Join("; ", standing.Experiments.Single(e => e.Plan.Code == code).Amendments);
        Assert.Contains("line 3 of p-1.csv), by A. Moss: panel dropped", Told("P1"), StringComparison.Ordinal);
        Assert.Contains("two more panels were found", Told("P3"), StringComparison.Ordinal);
        Assert.Contains("withdrawn after its data came", Told("P3"), StringComparison.Ordinal);
        Assert.Contains("withdrawn before any data", Told("P5"), StringComparison.Ordinal);
        Assert.Contains("added to the sealed plan (amendment 1)", Told("N5"), StringComparison.Ordinal);
        Assert.Equal([("screen", 0.03, 3, 2), ("cost", 0.02, 3, 0)], new StandingReader(_catalog).Read("screens").Families.Select(f => (f.Name, f.Level.Value, f.Size, f.Survivors)));
    }

    [Theory]
    [InlineData("primers", 2)]
    [InlineData("screens", 1)]
    [InlineData("arrivals", 1)]
    [InlineData("explore", 1)]
    public void Its_reviews_come_out_of_the_record_to_the_byte(string code, int reviews)
    {
        IReadOnlyList<ReviewRerun.Outcome> outcomes = new ReviewRerun(_catalog).Run(code, null, _ => { }, TestContext.Current.CancellationToken);
        Assert.Equal(reviews, outcomes.Count);
        Assert.All(outcomes, o => Assert.True(o.IsSame, $"{o.Review.Number}: {string.Join("; ", o.Figures)} {string.Join(", ", o.Lines.Select(l => l.Experiment))}"));
    }

    [Theory]
    [InlineData("primers", false)]
    [InlineData("screens", false)]
    [InlineData("arrivals", false)]
    [InlineData("explore", true)]
    public void Nothing_in_it_waits_to_be_tested_or_reviewed(string code, bool testedOnly)
    {
        Assert.False(new TestRunner(_catalog).Run(code, false, _ => { }, TestContext.Current.CancellationToken).Ran);
        Assert.False(new ReviewStore(_catalog).Take(code, testedOnly).IsNew);
    }

    [Fact]
    public void It_takes_new_work_and_its_record_stays_whole()
    {
        string file = _folder["o-3.csv"];
        File.WriteAllText(file, "experiment,group,value\n" + string.Concat("ABC".SelectMany(g => Enumerable.Range(0, 6).Select(i => FormattableString.Invariant($"W4,{g},{10 + i}.{(int)g}\n")))));
        new MeasurementLoader(_catalog).Load("arrivals", file, new LoadOptions(DelimitedFileOptions.Default), _ => { }, TestContext.Current.CancellationToken);
        TestRunSummary run = new TestRunner(_catalog).Run("arrivals", false, _ => { }, TestContext.Current.CancellationToken);
        Assert.Equal((1, 1), (run.Tested, run.Decided));
        Assert.True(new ReviewStore(_catalog).Take("arrivals", testedOnly: false).IsNew);
        Assert.Empty(new LedgerVerifier(_catalog).Verify(Head).Findings);
        StoredCampaign stored = new CampaignStore(_catalog).Get("arrivals");
        Assert.Equal(stored.Campaign.PlanDigest, PlanDigest.Of(stored.Campaign, new PlanStore(_catalog).Read(stored.Id)));
    }

    public void Dispose()
    {
        _catalog.Dispose();
        _folder.Dispose();
    }
}
