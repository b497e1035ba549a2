using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Plans;

/// <summary>The families of campaigns that have several.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class FamilyStore(Catalog catalog)
{
    private const string Columns = "name, correction, level, opens_after, opens_when";

    /// <summary>Registers the families of a campaign, in the place of those that were registered before, while its plan is open; whether they fit the plan is found out at the seal.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="families">Its families, each name once.</param>
    /// <exception cref="RefusedException">The campaign is sealed, its experiments come from its data, or its procedure decides as experiments arrive.</exception>
    public void Register(string code, IReadOnlyList<Family> families) => catalog.Change(() =>
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        if (stored.Campaign.IsSealed)
        {
            throw new RefusedException(FormattableString.Invariant($"The plan of '{code}' is sealed since {stored.Campaign.SealedAt:yyyy-MM-dd HH:mm:ss} UTC, its families with it; open a new campaign for others."));
        }

        if (stored.Campaign.IsExploratory)
        {
            throw new RefusedException($"The experiments of '{code}' come from measurements that are loaded already, so families would come after the data; open a new campaign for families.");
        }

        OnlineVerdict.RefuseFamilies(stored.Campaign with { Families = families }, []);
        if (!stored.Campaign.Families.SequenceEqual(families))
        {
            Replace(stored.Id, families);
            catalog.Record(new LedgerAct(LedgerAction.Families, code)
            {
                Subject = FormattableString.Invariant($"{families.Count} families"),
                Changes = Differences(stored.Campaign.Families, families),
                Evidence = [EvidenceRegistry.Campaign.Of(stored.Id)],
            });
        }

        return true;
    });

    /// <summary>The families with which a campaign may be sealed: those registered, or else those that its plan names, which are registered here; inside a transaction.</summary>
    /// <exception cref="RefusedException">They do not fit the plan or the campaign.</exception>
    internal IReadOnlyList<Family> Settle(StoredCampaign stored, IReadOnlyList<PlannedExperiment> plan)
    {
        IReadOnlyList<Family> registered = stored.Campaign.Families;
        IReadOnlyList<Family> families = registered.Count > 0 ? registered : FamilyPlan.NamedIn(plan);
        FamilyPlan.Check(stored.Campaign, families, plan);
        if (registered.Count == 0 && families.Count > 0)
        {
            Replace(stored.Id, families);
        }

        return families;
    }

    /// <summary>A campaign's families in the plan's order; empty for a campaign of one family.</summary>
    internal IReadOnlyList<Family> Read(long campaignId)
    {
        using SqliteStatement select = catalog.Prepare($"SELECT {Columns} FROM families WHERE campaign_id = ?1 ORDER BY position");
        select.Bind(1, campaignId);
        var families = new List<Family>();
        while (select.Read())
        {
            families.Add(new Family(select.Text(0))
            {
                Correction = select.NullableText(1),
                Level = select.NullableReal(2) is { } level ? new SignificanceLevel(level) : null,
                OpensAfter = select.NullableText(3),
                Gate = select.Text(4) == "all" ? FamilyGate.AllSurvive : FamilyGate.AnySurvives,
            });
        }

        return families.Count == 0 ? Array.Empty<Family>() : families;
    }

    private static List<LedgerChange> Differences(IReadOnlyList<Family> before, IReadOnlyList<Family> after)
    {
        Dictionary<string, string> old = before.ToDictionary(f => f.Name, Words, StringComparer.Ordinal);
        Dictionary<string, string> now = after.ToDictionary(f => f.Name, Words, StringComparer.Ordinal);
        return [.. old.Keys.Union(now.Keys).Select(name => new LedgerChange($"family {name}", old.GetValueOrDefault(name), now.GetValueOrDefault(name))).Where(c => c.Before != c.After)];
    }

    private static string Words(Family family) => string.Join(
        ", ",
        (string[])[family.Correction ?? "the campaign's correction", family.Level is { } level ? $"level {level}" : "level by share",
            .. family.OpensAfter is { } first ? [$"opens after {(family.Gate == FamilyGate.AllSurvive ? "all" : "any")} of {first}"] : Array.Empty<string>()]);

    /// <summary>Puts families in the place of those that were there; inside a transaction, before the seal.</summary>
    private void Replace(long campaignId, IReadOnlyList<Family> families)
    {
        using SqliteStatement delete = catalog.Prepare("DELETE FROM families WHERE campaign_id = ?1");
        delete.Bind(1, campaignId).Run();
        using SqliteStatement insert = catalog.Prepare($"INSERT INTO families (campaign_id, position, {Columns}) VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7)");
        for (int i = 0; i < families.Count; i++)
        {
            Family family = families[i];
            insert.Bind(1, campaignId).Bind(2, i + 1L).Bind(3, family.Name).Bind(4, family.Correction).Bind(5, family.Level?.Value)
                .Bind(6, family.OpensAfter).Bind(7, family.Gate == FamilyGate.AllSurvive ? "all" : "any").Run();
        }
    }
}
