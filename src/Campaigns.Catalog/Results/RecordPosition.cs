using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Results;

/// <summary>How far the record of a campaign had come: what a test run or a review had before it, so that it can be repeated from just that.</summary>
/// <param name="LastLoadId">The latest load of the campaign; null where there was none.</param>
/// <param name="LastExclusionId">The latest exclusion in the catalog; null where there was none.</param>
/// <param name="LastAmendmentId">The latest plan amendment of the campaign; null where there was none.</param>
/// <param name="LastWithdrawalId">The latest withdrawal in the catalog; null where there was none.</param>
internal sealed record RecordPosition(long? LastLoadId, long? LastExclusionId, long? LastAmendmentId, long? LastWithdrawalId)
{
    /// <summary>The latest test run of the campaign that a review saw; null where every run counts.</summary>
    public long? LastTestRunId { get; init; }

    /// <summary>The position now. Four look-ups at the ends of keys, and one at the campaign's loads.</summary>
    public static RecordPosition Of(Catalog catalog, long campaignId)
    {
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT (SELECT max(id) FROM loads WHERE campaign_id = ?1), (SELECT max(id) FROM exclusions),
                (SELECT max(id) FROM plan_amendments WHERE campaign_id = ?1), (SELECT max(id) FROM withdrawals)
            """);
        select.Bind(1, campaignId).Read();
        return new RecordPosition(select.NullableInteger(0), select.NullableInteger(1), select.NullableInteger(2), select.NullableInteger(3));
    }
}
