using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Results;

/// <summary>What taking a review did.</summary>
/// <param name="Review">The review that stands.</param>
/// <param name="IsNew">Whether it was taken now; false where nothing had changed since.</param>
public sealed record ReviewTaken(ReviewHead Review, bool IsNew);

/// <summary>Reviews in the catalog: taken, kept, never changed.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class ReviewStore(Catalog catalog)
{
    private const string Columns =
        "number, taken_at, correction, level, family_size, tested_count, survivor_count, is_interim, program_version, last_test_run_id";

    private const string DataHead = "last_load_id, last_exclusion_id, last_amendment_id, last_withdrawal_id";

    /// <summary>Applies the sealed correction to the family and stores the outcome; where nothing changed since the latest review, that one stands.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="testedOnly">Whether only tested experiments are counted; the review is then marked as interim.</param>
    /// <exception cref="RefusedException">The campaign is not sealed, or nothing was tested.</exception>
    public ReviewTaken Take(string code, bool testedOnly) => catalog.Change(() =>
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        if (!stored.Campaign.IsSealed)
        {
            throw new RefusedException($"The campaign '{code}' is not sealed: level, correction and family must be fixed before a review; run 'campaigns seal {code}'.");
        }

        var families = new FamilyReader(catalog);
        long? lastRun = families.LastTestRun(stored.Id);
        if (lastRun is null)
        {
            throw new RefusedException($"Nothing of the campaign '{code}' was tested yet, so there is nothing to review; test it first ('campaigns test {code}', in the dashboard key t).");
        }

        // An amendment takes a result away, and only a new run, another sign of change, brings one back: the count tells.
        if (Latest(stored.Id) is { } latest && latest.LastRun == lastRun && latest.Head.IsInterim == testedOnly
            && (testedOnly || latest.Head.FamilySize == families.FamilySize(stored.Id))
            && DecisionsSince(stored.Id, new StandingWithdrawals(catalog, stored.Id)) == 0
            && (!new AmendedExperiments(catalog, stored.Id).Any || latest.Head.TestedCount == families.Read(stored.Id).Count))
        {
            return new ReviewTaken(latest.Head, false);
        }

        return new ReviewTaken(Store(stored, families.Read(stored.Id), testedOnly, lastRun.Value), true);
    });

    /// <summary>Whether anything of a campaign was tested, so that a review has something to hold.</summary>
    /// <param name="code">The campaign.</param>
    public bool CanReview(string code) => new FamilyReader(catalog).LastTestRun(new CampaignStore(catalog).Get(code).Id) is not null;

    /// <summary>The latest review of a campaign; null before the first.</summary>
    internal (ReviewHead Head, long? LastRun)? Latest(long campaignId)
    {
        using SqliteStatement select = catalog.Prepare($"SELECT {Columns} FROM reviews WHERE campaign_id = ?1 ORDER BY number DESC LIMIT 1");
        return select.Bind(1, campaignId).Read() ? (Head(select), select.NullableInteger(9)) : null;
    }

    /// <summary>Decisions to withdraw experiments or to take them in again, and amendments of the plan, that came after the latest review; 0 before the first.</summary>
    internal int DecisionsSince(long campaignId, StandingWithdrawals withdrawals)
    {
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT coalesce(last_withdrawal_id, 0), (SELECT count(*) FROM plan_amendments a WHERE a.campaign_id = ?1 AND a.id > coalesce(r.last_amendment_id, 0))
            FROM reviews r WHERE campaign_id = ?1 ORDER BY number DESC LIMIT 1
            """);
        return select.Bind(1, campaignId).Read() ? withdrawals.After(select.Integer(0)) + (int)select.Integer(1) : 0;
    }

    /// <summary>The families of a campaign as its latest review counts them; interim or not as the review is.</summary>
    /// <param name="stored">The campaign.</param>
    /// <exception cref="RefusedException">It has no review.</exception>
    public IReadOnlyList<FamilyStanding> Families(StoredCampaign stored)
    {
        ArgumentNullException.ThrowIfNull(stored);
        (ReviewHead head, _) = Latest(stored.Id) ?? throw new RefusedException($"The campaign '{stored.Campaign.Code}' has no review yet; run 'campaigns review {stored.Campaign.Code}'.");
        var families = new FamilyReader(catalog);
        return FamilyVerdict.Judge(stored.Campaign, families.Members(stored, families.Read(stored.Id), head.IsInterim)).Families;
    }

    /// <summary>Every review of a campaign, oldest first.</summary>
    /// <param name="campaignId">The campaign.</param>
    public IReadOnlyList<ReviewHead> All(long campaignId)
    {
        using SqliteStatement select = catalog.Prepare($"SELECT {Columns} FROM reviews WHERE campaign_id = ?1 ORDER BY number");
        select.Bind(1, campaignId);
        var reviews = new List<ReviewHead>();
        while (select.Read())
        {
            reviews.Add(Head(select));
        }

        return reviews;
    }

    private ReviewHead Store(StoredCampaign stored, FamilyColumns columns, bool testedOnly, long lastRun)
    {
        Campaign campaign = stored.Campaign;
        CampaignVerdict verdict = FamilyVerdict.Judge(campaign, new FamilyReader(catalog).Members(stored, columns, testedOnly));
        int number = (Latest(stored.Id)?.Head.Number ?? 0) + 1;
        using SqliteStatement next = catalog.Prepare("SELECT coalesce(max(id), 0) + 1 FROM reviews");
        next.Read();
        long id = next.Integer(0);
        next.Reset();
        using SqliteStatement insert = catalog.Prepare($"INSERT INTO reviews (id, campaign_id, {Columns}, lines, {DataHead}) VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8, ?9, ?10, ?11, ?12, ?13, ?14, ?15, ?16, ?17)");
        RecordPosition seen = RecordPosition.Of(catalog, stored.Id);
        insert.Bind(14, seen.LastLoadId).Bind(15, seen.LastExclusionId).Bind(16, seen.LastAmendmentId).Bind(17, seen.LastWithdrawalId);
        insert.Bind(1, id).Bind(2, stored.Id).Bind(3, (long)number).Bind(4, catalog.Now).Bind(5, campaign.Correction)
            .Bind(6, campaign.Level.Value).Bind(7, (long)verdict.Size).Bind(8, (long)columns.Count).Bind(9, (long)verdict.SurvivorLineCount)
            .Bind(10, testedOnly ? 1L : 0L).Bind(11, ProgramVersion.Current).Bind(12, lastRun)
            .BindBlob(13, PackedReviewLines.Pack(columns.ExperimentIds, columns.P, verdict.Adjusted as PValue[] ?? [.. verdict.Adjusted]).Written).Run();
        if (campaign.JudgedFamilies.Count > 0)
        {
            new ReviewFamilies(catalog).Add(id, verdict.Families);
        }

        catalog.Record(new LedgerAct(LedgerAction.Review, campaign.Code)
        {
            Subject = FormattableString.Invariant($"review {number}"),
            Changes =
            [
                new LedgerChange("correction", null, campaign.Correction), new LedgerChange("level", null, campaign.Level.ToString()),
                new LedgerChange("family", null, FormattableString.Invariant($"{verdict.Size}{(testedOnly ? " (interim: tested experiments only)" : "")}")),
                new LedgerChange("tested", null, FormattableString.Invariant($"{columns.Count}")), new LedgerChange("survivors", null, FormattableString.Invariant($"{verdict.SurvivorLineCount}")),
            ],
            Evidence = [EvidenceRegistry.Review.Of(id)],
        });

        return Latest(stored.Id)!.Value.Head;
    }

    private static ReviewHead Head(SqliteStatement row) => new()
    {
        Number = (int)row.Integer(0),
        At = Instants.FromMicroseconds(row.Integer(1)),
        Correction = row.Text(2),
        Level = new SignificanceLevel(row.Real(3)),
        FamilySize = (int)row.Integer(4),
        TestedCount = (int)row.Integer(5),
        SurvivorCount = (int)row.Integer(6),
        IsInterim = row.Integer(7) != 0,
        ProgramVersion = row.Text(8),
    };
}
