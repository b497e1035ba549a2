using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Reviewing;
using Campaigns.Catalog.Streams;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Results;

/// <summary>Collects a campaign's family: every tested experiment with its p-value, and how many hypotheses there are.</summary>
/// <remarks>
/// The latest review's lines are the base and only what was tested after it is read, so that one more experiment among 100,000 costs one packed vector, not a scan of all results.
/// Without a review, or after an amendment or a withdrawal, all results are read: O(m).
/// </remarks>
internal sealed class FamilyReader(Catalog catalog)
{
    /// <summary>Hypotheses in the family: every experiment of the campaign, those left out that were withdrawn before any data.</summary>
    public int FamilySize(long campaignId)
    {
        using SqliteStatement count = catalog.Prepare("SELECT count(*) FROM experiments WHERE campaign_id = ?1");
        count.Bind(1, campaignId).Read();
        return (int)count.Integer(0) - new StandingWithdrawals(catalog, campaignId).Counts.Left;
    }

    /// <summary>The same at a position of the record.</summary>
    public int FamilySize(StoredCampaign stored, RecordPosition? asOf) => asOf is null ? FamilySize(stored.Id) : new PastFamily(catalog, stored, asOf).Size;

    /// <summary>The latest test run; null before the first.</summary>
    public long? LastTestRun(long campaignId)
    {
        using SqliteStatement last = catalog.Prepare("SELECT max(id) FROM test_runs WHERE campaign_id = ?1");
        last.Bind(1, campaignId).Read();
        return last.NullableInteger(0);
    }

    /// <summary>Results that came after a test run.</summary>
    public int ResultsAfter(long campaignId, long testRunId)
    {
        using SqliteStatement count = catalog.Prepare(
            """
            SELECT count(*) FROM test_runs t CROSS JOIN test_results r ON r.test_run_id = t.id
            WHERE t.id > ?2 AND t.campaign_id = ?1
            """);
        count.Bind(1, campaignId).Bind(2, testRunId).Read();
        return (int)count.Integer(0);
    }

    public FamilyColumns Read(long campaignId)
    {
        using SqliteStatement latest = catalog.Prepare("SELECT last_test_run_id, lines FROM reviews WHERE campaign_id = ?1 ORDER BY number DESC LIMIT 1");
        if (!latest.Bind(1, campaignId).Read() || latest.IsNull(0) || new AmendedExperiments(catalog, campaignId).Any)
        {
            return ReadAll(campaignId);
        }

        FamilyColumns columns = PackedReviewLines.UnpackFamily(latest.Blob(1));
        List<(long, PValue?)> newer = TestedAfter(campaignId, latest.Integer(0));
        return newer.Count == 0 ? columns : columns.With(newer);
    }

    /// <summary>The family as the correction takes it, with what was planned and not tested.</summary>
    /// <param name="stored">The campaign.</param>
    /// <param name="columns">Its tested experiments.</param>
    /// <param name="testedOnly">Whether the tested ones alone are counted.</param>
    /// <param name="asOf">The position of the record at which the family is counted; null for today.</param>
    public FamilyMembers Members(StoredCampaign stored, FamilyColumns columns, bool testedOnly, RecordPosition? asOf = null)
    {
        FamilyMembers members = Counted(stored, columns, testedOnly, asOf);
        if (OnlineVerdict.ProcedureOf(stored.Campaign) is null)
        {
            return members;
        }

        Dictionary<long, StreamEntry> entries = StreamEntries.Read(catalog, stored.Id, asOf?.LastTestRunId);
        return members with
        {
            Entries = [.. columns.ExperimentIds.ToArray().Select(id => entries.GetValueOrDefault(id))],
            StandingSurvivors = StandingSurvivors(stored.Id, entries, asOf).Count(),
        };
    }

    /// <summary>Experiments that survive by their standing decisions and are not withdrawn.</summary>
    public IEnumerable<KeyValuePair<long, StreamEntry>> StandingSurvivors(long campaignId, Dictionary<long, StreamEntry> entries, RecordPosition? asOf = null)
    {
        var withdrawals = new StandingWithdrawals(catalog, campaignId, asOf);
        return entries.Where(e => e.Value.Survives == true && !withdrawals.IsWithdrawn(e.Key));
    }

    /// <summary>Draws of the campaign's permutation tests: as many as the strictest threshold of its families asks for.</summary>
    /// <param name="stored">The campaign.</param>
    /// <param name="asOf">The position of the record at which the families are counted; null for today.</param>
    public int PermutationDrawCount(StoredCampaign stored, RecordPosition? asOf = null)
    {
        Campaign campaign = stored.Campaign;
        if (campaign.JudgedFamilies.Count == 0)
        {
            return PermutationDraws.Count(campaign.Level, FamilySize(stored, asOf));
        }

        CampaignVerdict planned = FamilyVerdict.Judge(campaign, Tally(stored, new FamilyColumns(0), asOf).Members(testedOnly: false));
        return PermutationDraws.Count(planned.Families);
    }

    private FamilyMembers Counted(StoredCampaign stored, FamilyColumns columns, bool testedOnly, RecordPosition? asOf)
    {
        if (FamilyTally.IsNeeded(stored.Campaign))
        {
            return Tally(stored, columns, asOf).Members(testedOnly);
        }

        FamilyMembers members = FamilyMembers.OneFamily(columns.PMemory, FamilySize(stored, asOf));
        return testedOnly ? members with { Families = [members.Families[0] with { Size = columns.Count }] } : members;
    }

    /// <summary>One scan of the plan, in step with the columns: O(m).</summary>
    private FamilyTally Tally(StoredCampaign stored, FamilyColumns columns, RecordPosition? asOf)
    {
        if (asOf is not null)
        {
            return new PastFamily(catalog, stored, asOf).Tally(columns);
        }

        using SqliteStatement select = catalog.Prepare("SELECT id, family, weight, shared_control FROM experiments WHERE campaign_id = ?1 ORDER BY id");
        select.Bind(1, stored.Id);
        var tally = new FamilyTally(stored.Campaign);
        var withdrawals = new StandingWithdrawals(catalog, stored.Id);
        int next = 0;
        while (select.Read())
        {
            if (withdrawals.LeavesFamily(select.Integer(0)))
            {
                continue;
            }

            bool isTested = next < columns.Count && columns.ExperimentIds[next] == select.Integer(0);
            tally.Add(select.NullableText(1), select.NullableReal(2), select.NullableText(3), isTested ? columns.P[next] : null);
            next += isTested ? 1 : 0;
        }

        return tally;
    }

    private FamilyColumns ReadAll(long campaignId)
    {
        var amended = new AmendedExperiments(catalog, campaignId);
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT e.id, r.p, r.log_p FROM experiments e JOIN test_results r ON r.experiment_id = e.id
            WHERE e.campaign_id = ?1 ORDER BY e.id, r.test_run_id
            """);
        select.Bind(1, campaignId);
        var columns = new FamilyColumns();
        long id = 0;
        PValue? p = null;
        while (select.Read())
        {
            if (select.Integer(0) != id)
            {
                AddCurrent();
                id = select.Integer(0);
            }

            p = ReadP(select, 1);
        }

        AddCurrent();
        return columns;

        void AddCurrent()
        {
            if (p is { } given && !amended.AwaitsTest(id))
            {
                columns.Add(id, given);
            }
        }
    }

    private List<(long ExperimentId, PValue? P)> TestedAfter(long campaignId, long testRunId)
    {
        // A cross join tells SQLite to begin at the few runs: for the order's sake it would walk through all results.
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT r.experiment_id, r.p, r.log_p FROM test_runs t CROSS JOIN test_results r ON r.test_run_id = t.id
            WHERE t.id > ?2 AND t.campaign_id = ?1 ORDER BY r.experiment_id, r.test_run_id
            """);
        select.Bind(1, campaignId).Bind(2, testRunId);
        var tested = new List<(long, PValue?)>();
        while (select.Read())
        {
            if (tested.Count > 0 && tested[^1].Item1 == select.Integer(0))
            {
                tested.RemoveAt(tested.Count - 1);
            }

            tested.Add((select.Integer(0), ReadP(select, 1)));
        }

        return tested;
    }

    /// <summary>The p-value in two neighbouring columns, value and logarithm; null where there is none.</summary>
    internal static PValue? ReadP(SqliteStatement row, int column)
    {
        if (row.IsNull(column))
        {
            return null;
        }

        double value = row.Real(column);
        return row.IsNull(column + 1) ? PValue.FromValue(value) : PValue.FromValueAndLog(value, row.Real(column + 1));
    }
}
