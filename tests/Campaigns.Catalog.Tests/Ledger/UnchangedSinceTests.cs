using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Plans;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Tests.Ledger;

public sealed class UnchangedSinceTests : IDisposable
{
    private readonly TestCatalog _catalog = new();

    public UnchangedSinceTests() => LedgerWriterTests.Live(_catalog);

    public void Dispose() => _catalog.Dispose();

    [Fact]
    public void A_change_of_a_campaign_that_others_changed_since_is_refused_and_says_what_was_done()
    {
        LedgerHead seen = new LedgerReader(_catalog.Catalog).Head;
        Decide(_catalog.Catalog, 3, "Ada");
        string before = _catalog.Dump;
        using Catalog second = Open(seen);
        ChangedSinceException refused = Assert.Throws<ChangedSinceException>(() => Decide(second, 4, "Ben"));
        Assert.Equal(before, _catalog.Dump);
        LedgerEntry since = Assert.Single(refused.Since);
        Assert.Equal((10, LedgerAction.Exclude, "E1: line 3 of data-1.csv"), (since.Sequence, since.Action, since.Subject));
        Assert.Equal(new LedgerReader(_catalog.Catalog).Head, refused.Head);
        Assert.Equal($"--head {refused.Head}", refused.Details[^1]);
    }

    [Fact]
    public void Whoever_has_seen_the_latest_head_may_change_several_times()
    {
        using Catalog second = Open(new LedgerReader(_catalog.Catalog).Head);
        Decide(second, 3, "Ben");
        Decide(second, 4, "Ben");
        Decide(_catalog.Catalog, 5, "Ada");
        Assert.Throws<ChangedSinceException>(() => Decide(second, 6, "Ben"));
    }

    [Fact]
    public void What_is_taken_back_does_not_count_as_seen()
    {
        using Catalog second = Open(new LedgerReader(_catalog.Catalog).Head);
        Assert.Throws<InvalidOperationException>(() => second.Change(() =>
        {
            Decide(second, 3, "Ben");
            return false ? 0 : throw new InvalidOperationException("stop");
        }));
        Decide(second, 4, "Ben");
    }

    [Fact]
    public void Another_campaign_may_have_been_changed_meanwhile()
    {
        LedgerHead seen = new LedgerReader(_catalog.Catalog).Head;
        new CampaignStore(_catalog.Catalog).Open(new Campaign
        {
            Code = "OTHER",
            ErrorRate = ErrorRate.FalseDiscovery,
            Level = new SignificanceLevel(0.05),
            Correction = "bh",
            OpenedAt = _catalog.Clock.GetUtcNow(),
        });
        using Catalog second = Open(seen);
        Decide(second, 3, "Ben");
    }

    [Theory]
    [InlineData(3)]
    [InlineData(300)]
    [InlineData(0)]
    public void A_head_that_the_chain_does_not_hold_is_a_broken_record_and_nothing_is_changed(long sequence)
    {
        string before = _catalog.Dump;
        using Catalog second = Open(new LedgerHead(sequence, new string('a', 64)));
        Assert.Throws<RecordException>(() => Decide(second, 3, "Ben"));
        Assert.Equal(before, _catalog.Dump);
    }

    private Catalog Open(LedgerHead seen) => Catalog.Open(_catalog.Catalog.Path, _catalog.Clock, null, seen);

    private static void Decide(Catalog catalog, int line, string name) =>
        new ExclusionStore(catalog).Decide(TestCatalog.Code, "E1", new ObservationPlace(line, null), true, "spilled", name);
}
