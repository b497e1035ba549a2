using Campaigns.Catalog.Plans;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Tests.Plans;

public sealed class CampaignStoreTests
{
    [Fact]
    public void A_campaign_is_read_as_it_was_opened_at_the_clocks_instant()
    {
        using var catalog = new TestCatalog();
        catalog.Clock.Advance(TimeSpan.FromMicroseconds(1_234_567));
        var campaign = new Campaign
        {
            Code = "K.1_x-2",
            Title = "Grundierung µ",
            Purpose = "line one\nline two",
            ErrorRate = ErrorRate.Familywise,
            Level = new SignificanceLevel(0.012345678901234567),
            Correction = "hommel",
            DefaultTest = "f",
            DefaultFollowUp = "tukey-kramer",
            OpenedAt = catalog.Clock.GetUtcNow(),
        };
        StoredCampaign stored = catalog.Campaigns.Open(campaign);
        Assert.Equal(campaign, stored.Campaign);
        Assert.Equal(stored, catalog.Campaigns.Find(campaign.Code));
        Assert.Equal([stored], catalog.Campaigns.All());
    }

    [Fact]
    public void A_code_is_given_once()
    {
        using var catalog = new TestCatalog();
        catalog.Start();
        Assert.Contains("already", Assert.Throws<RefusedException>(() => catalog.Start()).Message, StringComparison.Ordinal);
        Assert.Single(catalog.Campaigns.All());
    }

    [Fact]
    public void A_mistyped_code_is_told_with_the_nearest()
    {
        using var catalog = new TestCatalog();
        Assert.Contains("holds none yet", Assert.Throws<RefusedException>(() => catalog.Campaigns.Get("screen")).Message, StringComparison.Ordinal);
        catalog.Campaigns.Open(catalog.Start().Campaign with { Code = "screen" });
        Assert.Contains("'screen' may be meant", Assert.Throws<RefusedException>(() => catalog.Campaigns.Get("scren")).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Sealing_fixes_instant_and_digest_once()
    {
        using var catalog = new TestCatalog();
        catalog.Start();
        string before = catalog.Dump;
        Assert.Contains("no experiments to seal", Assert.Throws<RefusedException>(() => catalog.Campaigns.Seal(TestCatalog.Code)).Message, StringComparison.Ordinal);
        Assert.Equal(before, catalog.Dump);
        catalog.Plan(TestCatalog.Experiment("E", 3, "a", "b"));
        catalog.Clock.Advance(TimeSpan.FromDays(1));
        Campaign campaign = catalog.Campaigns.Seal(TestCatalog.Code).Campaign;
        Assert.Equal(catalog.Clock.GetUtcNow(), campaign.SealedAt);
        Assert.Matches("^[0-9a-f]{64}$", campaign.PlanDigest);
        Assert.Contains("sealed already, since 2026-12-02 08:00:00 UTC", Assert.Throws<RefusedException>(() => catalog.Campaigns.Seal(TestCatalog.Code)).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Plans_that_differ_anywhere_have_different_digests()
    {
        PlannedExperiment e = TestCatalog.Experiment("E", 3, "a", "b");
        PlannedExperiment[] others =
        [
            e with { Code = "F" }, e with { Title = "t" }, e with { Response = "t" }, e with { Unit = "t" }, e with { Groups = ["a", "b", "c"] }, e with { Groups = ["b", "a"] },
            e with { Control = "a" }, e with { FollowUp = "dunnett" }, e with { Replicates = 4 }, e with { Replicates = null }, e with { SmallestEffect = 1 },
            e with { AssumedStandardDeviation = 1 }, e with { Weight = 1 }, e with { Family = "f" },
        ];
        string[] digests = [Digest(e), .. others.Select(o => Digest(o)), Digest(e, e with { Code = "F" }), Digest(e with { Code = "F" }, e)];
        Assert.Distinct(digests);
        Assert.Equal(digests[0], Digest(e));

        static string Digest(params PlannedExperiment[] plan)
        {
            using var catalog = new TestCatalog();
            catalog.Seal(plan);
            return catalog.Campaigns.Get(TestCatalog.Code).Campaign.PlanDigest!;
        }
    }
}
