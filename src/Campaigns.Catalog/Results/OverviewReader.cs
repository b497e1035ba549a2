using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Streams;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Results;

/// <summary>Reads campaigns in figures, and their survivors, without the other experiments one by one.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class OverviewReader(Catalog catalog)
{
    /// <summary>One campaign in figures; O(m log m) in its tested experiments.</summary>
    /// <param name="stored">The campaign.</param>
    public CampaignOverview Read(StoredCampaign stored) => catalog.Snapshot(() => ReadWithSurvivors(stored).Overview);

    /// <summary>One campaign in figures with its survivors, the smallest p-value first.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="most">Survivors to read in full.</param>
    /// <exception cref="RefusedException">There is no such campaign.</exception>
    public (CampaignOverview Overview, IReadOnlyList<ExperimentResult> Survivors) ReadSurvivors(string code, int most) =>
        catalog.Snapshot(() => ReadSurvivorsNow(code, most));

    private (CampaignOverview Overview, IReadOnlyList<ExperimentResult> Survivors) ReadSurvivorsNow(string code, int most)
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        (CampaignOverview overview, FamilyColumns family, CampaignVerdict verdict) = ReadWithSurvivors(stored);
        if (stored.Campaign.Streams.Count > 0)
        {
            return (overview, StandingSurvivors(stored, overview, most));
        }

        int[] survivors = [.. Enumerable.Range(0, family.Count).Where(i => verdict.Survives[i])];
        Array.Sort(survivors, (a, b) => family.P[a].CompareTo(family.P[b]) is var order && order != 0 ? order : a.CompareTo(b));
        int[] listed = most < survivors.Length ? survivors[..most] : survivors;
        Dictionary<long, ExperimentResult> experiments = new StandingReader(catalog).ReadSome(stored.Id, listed.Select(i => family.ExperimentIds[i]));
        return (overview, [.. listed.Select(i => experiments[family.ExperimentIds[i]] with { AdjustedP = verdict.Adjusted[i], Survives = true, Family = verdict.FamilyAt(i) })]);
    }

    /// <summary>What survives by its decision, the smallest p-value of the decision first, whatever happened to its values since.</summary>
    private List<ExperimentResult> StandingSurvivors(StoredCampaign stored, CampaignOverview overview, int most)
    {
        KeyValuePair<long, StreamEntry>[] survivors = [.. new FamilyReader(catalog).StandingSurvivors(stored.Id, StreamEntries.Read(catalog, stored.Id)).OrderBy(e => e.Value.P!.Value).ThenBy(e => e.Key).Take(most)];
        Dictionary<long, ExperimentResult> experiments = new StandingReader(catalog).ReadSome(stored.Id, survivors.Select(e => e.Key));
        return [.. survivors.Select(e => OnlineVerdict.Apply(experiments[e.Key] with { Entry = e.Value }, overview.Families[0]))];
    }

    private (CampaignOverview Overview, FamilyColumns Family, CampaignVerdict Verdict) ReadWithSurvivors(StoredCampaign stored)
    {
        ArgumentNullException.ThrowIfNull(stored);
        Campaign campaign = stored.Campaign;
        var families = new FamilyReader(catalog);
        FamilyColumns family = families.Read(stored.Id);
        CampaignVerdict verdict = FamilyVerdict.Judge(campaign, families.Members(stored, family, testedOnly: false));
        int hits = 0;
        foreach (PValue p in family.P)
        {
            hits += campaign.Level.Rejects(p) ? 1 : 0;
        }

        (ReviewHead Head, long? LastRun)? latest = new ReviewStore(catalog).Latest(stored.Id);
        var amended = new AmendedExperiments(catalog, stored.Id);
        return (
            new CampaignOverview(
                campaign, verdict.Size, family.Count, hits, verdict.SurvivorCount,
                Deviating(stored.Id, amended), latest?.Head, families.ResultsAfter(stored.Id, latest?.LastRun ?? 0))
            {
                AwaitingNewTest = amended.AwaitingTest,
                Withdrawn = amended.Withdrawals.Counts,
                AmendedPlan = amended.Plan.Counts,
                DecisionsSinceReview = new ReviewStore(catalog).DecisionsSince(stored.Id, amended.Withdrawals),
                Families = verdict.Families,
            },
            family,
            verdict);
    }

    /// <summary>Experiments that received values after their test, of which values were left out, that were withdrawn, whose plan was amended, or whose test was run short of the planned values.</summary>
    private int Deviating(long campaignId, AmendedExperiments amended)
    {
        var ids = new HashSet<long>(amended.Ids);
        using SqliteStatement shorter = catalog.Prepare(
            """
            SELECT r.experiment_id FROM test_runs t JOIN test_results r ON r.test_run_id = t.id JOIN experiments e ON e.id = r.experiment_id
            WHERE t.campaign_id = ?1 AND t.includes_incomplete = 1 AND e.replicates IS NOT NULL
                AND (r.group_count < (SELECT count(*) FROM groups g WHERE g.group_set_id = e.group_set_id)
                    OR coalesce(r.specimen_count, r.observation_count) < e.replicates * (SELECT count(*) FROM groups g WHERE g.group_set_id = e.group_set_id))
            """);
        shorter.Bind(1, campaignId);
        while (shorter.Read())
        {
            ids.Add(shorter.Integer(0));
        }

        return ids.Count;
    }
}
