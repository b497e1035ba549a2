using Campaigns.Catalog.Amending;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;

namespace Campaigns.Catalog.Plans;

/// <summary>What registering a plan file did.</summary>
/// <param name="Added">Experiments that are new.</param>
/// <param name="Changed">Experiments that were registered otherwise before.</param>
/// <param name="Unchanged">Experiments that stand as they were.</param>
public sealed record PlanChange(int Added, int Changed, int Unchanged);

/// <summary>The plans in the catalog.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class PlanStore(Catalog catalog)
{
    internal const string ExperimentColumns =
        "id, campaign_id, code, title, response, unit, group_set_id, groups_are_planned, control, test, follow_up, replicates, smallest_effect, assumed_sd, weight, family, confirms, shared_control";

    /// <summary>The planned experiments of a campaign, in the plan's order; where the plan names no groups, those that came with the data are given.</summary>
    /// <param name="campaignId">The campaign.</param>
    public IReadOnlyList<PlannedExperiment> Read(long campaignId)
    {
        using var sets = new GroupSets(catalog, campaignId);
        using SqliteStatement select = catalog.Prepare($"SELECT {ExperimentColumns} FROM experiments WHERE campaign_id = ?1 ORDER BY id");
        select.Bind(1, campaignId);
        var plan = new List<PlannedExperiment>();
        while (select.Read())
        {
            plan.Add(Row(select, sets));
        }

        return plan;
    }

    /// <summary>The planned experiments of a campaign by their keys, in the plan's order, with what the plan says alone: groups that came with the data are left out.</summary>
    internal List<(long Id, PlannedExperiment Plan)> ReadPlanned(long campaignId)
    {
        using var sets = new GroupSets(catalog, campaignId);
        using SqliteStatement select = catalog.Prepare($"SELECT {ExperimentColumns} FROM experiments WHERE campaign_id = ?1 AND first_load_id IS NULL ORDER BY id");
        select.Bind(1, campaignId);
        var plan = new List<(long, PlannedExperiment)>();
        while (select.Read())
        {
            PlannedExperiment experiment = Row(select, sets);
            plan.Add((select.Integer(0), select.Integer(7) != 0 ? experiment : experiment with { Groups = [] }));
        }

        return plan;
    }

    /// <summary>Refuses a code that no experiment of a campaign has.</summary>
    /// <exception cref="RefusedException">There is none; the message names the nearest.</exception>
    public void Demand(StoredCampaign campaign, string experiment)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        using SqliteStatement select = catalog.Prepare("SELECT EXISTS (SELECT 1 FROM experiments WHERE campaign_id = ?1 AND code = ?2)");
        select.Bind(1, campaign.Id).Bind(2, experiment).Read();
        if (select.Integer(0) == 0)
        {
            string near = Nearest.Of(experiment, [.. Codes(campaign.Id).Values]) is { } meant ? $"; '{meant}' may be meant" : "";
            throw new RefusedException($"There is no experiment '{experiment}' in campaign '{campaign.Campaign.Code}'{near}.");
        }
    }

    /// <summary>The codes of a campaign's experiments by their keys.</summary>
    internal Dictionary<long, string> Codes(long campaignId)
    {
        using SqliteStatement select = catalog.Prepare("SELECT id, code FROM experiments WHERE campaign_id = ?1");
        select.Bind(1, campaignId);
        var codes = new Dictionary<long, string>();
        while (select.Read())
        {
            codes.Add(select.Integer(0), select.Text(1));
        }

        return codes;
    }

    /// <summary>Registers experiments, or changes registered ones: freely while the plan is open, and with a reason as an amendment once it is sealed.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="experiments">Those to add or to change, each code once.</param>
    /// <param name="reason">Why; recorded. A sealed plan is amended only with one.</param>
    /// <exception cref="RefusedException">The campaign is sealed and no reason is given, or the amendment asks for what the seal fixed, or its experiments come from its data.</exception>
    public PlanChange Register(string code, IReadOnlyList<PlannedExperiment> experiments, string? reason = null) => catalog.Change(() =>
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        if (stored.Campaign.IsExploratory)
        {
            throw new RefusedException($"The experiments of '{code}' come from measurements that are loaded already, so a plan would come after the data; open a new campaign for a plan.");
        }

        if (stored.Campaign.IsSealed)
        {
            return reason is not null
                ? new PlanAmender(catalog, stored).Amend(experiments, reason)
                : throw new RefusedException(FormattableString.Invariant($"The plan of '{code}' is sealed since {stored.Campaign.SealedAt:yyyy-MM-dd HH:mm:ss} UTC and takes no changes; open a new campaign for new experiments, or give --reason TEXT to have the change recorded as an amendment of the sealed plan."));
        }

        OnlineVerdict.RefuseFamilies(stored.Campaign, experiments);
        long setsBefore = GroupSets.LastId(catalog);
        var changes = new List<LedgerChange>();
        PlanChange change = Write(stored.Id, experiments, changes);
        new ConfirmsRule(catalog, stored).Check(experiments);
        if (change.Added + change.Changed > 0)
        {
            catalog.Record(new LedgerAct(LedgerAction.Plan, code)
            {
                Subject = FormattableString.Invariant($"{change.Added} added, {change.Changed} changed"),
                Reason = reason,
                Changes = changes,
                Evidence = [EvidenceRegistry.Plan.Of(stored.Id), .. GroupSets.Since(catalog, stored.Id, setsBefore)],
            });
        }

        return change;
    });

    private PlanChange Write(long campaignId, IReadOnlyList<PlannedExperiment> experiments, List<LedgerChange> changes)
    {
        Dictionary<string, (long Id, PlannedExperiment Plan)> known = Known(campaignId);
        using var sets = new GroupSets(catalog, campaignId);
        using var writer = new ExperimentWriter(catalog, campaignId);
        int added = 0, changed = 0, unchanged = 0;
        foreach (PlannedExperiment experiment in experiments)
        {
            long? set = experiment.Groups.Count > 0 ? sets.IdOf(experiment.Groups) : null;
            if (!known.TryGetValue(experiment.Code, out (long Id, PlannedExperiment Plan) old))
            {
                writer.Insert(experiment, set, groupsArePlanned: set is not null);
                added++;
            }
            else if (SamePlan(old.Plan, experiment))
            {
                unchanged++;
            }
            else
            {
                writer.Replace(old.Id, experiment, set, groupsArePlanned: set is not null);
                changes.AddRange(PlanFields.Differences(old.Plan, experiment).Select(f => new LedgerChange($"{experiment.Code}: {f.Name}", f.Before, f.After)));
                changed++;
            }
        }

        return new PlanChange(added, changed, unchanged);
    }

    private Dictionary<string, (long Id, PlannedExperiment Plan)> Known(long campaignId)
    {
        using var sets = new GroupSets(catalog, campaignId);
        using SqliteStatement select = catalog.Prepare($"SELECT {ExperimentColumns} FROM experiments WHERE campaign_id = ?1 ORDER BY id");
        select.Bind(1, campaignId);
        var known = new Dictionary<string, (long, PlannedExperiment)>(StringComparer.Ordinal);
        while (select.Read())
        {
            known.Add(select.Text(2), (select.Integer(0), Row(select, sets)));
        }

        return known;
    }

    private static bool SamePlan(PlannedExperiment a, PlannedExperiment b) =>
        a.Groups.SequenceEqual(b.Groups, StringComparer.Ordinal) && a with { Groups = b.Groups } == b;

    /// <summary>An experiment from a row that selects <see cref="ExperimentColumns"/>.</summary>
    internal static PlannedExperiment Row(SqliteStatement row, GroupSets sets) => new()
    {
        Code = row.Text(2),
        Title = row.NullableText(3) ?? "",
        Response = row.NullableText(4) ?? "",
        Unit = row.NullableText(5) ?? "",
        Groups = sets.Labels(row.NullableInteger(6)),
        Control = row.NullableText(8),
        Test = row.Text(9),
        FollowUp = row.Text(10),
        Replicates = (int?)row.NullableInteger(11),
        SmallestEffect = row.NullableReal(12),
        AssumedStandardDeviation = row.NullableReal(13),
        Weight = row.NullableReal(14),
        Family = row.NullableText(15),
        Confirms = row.NullableText(16),
        SharedControl = row.NullableText(17),
    };
}
