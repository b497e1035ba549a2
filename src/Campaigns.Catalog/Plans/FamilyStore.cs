using Campaigns.Catalog.Providers;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Plans;

/// <summary>The families of campaigns that have several.</summary>
internal sealed class FamilyStore(Catalog catalog)
{
    private const string Columns = "name, correction, level, opens_after, opens_when";

    /// <summary>A campaign's families in the plan's order; empty for a campaign of one family.</summary>
    public IReadOnlyList<Family> Read(long campaignId)
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

    /// <summary>Puts families in the place of those that were there; inside a transaction, before the seal.</summary>
    public void Replace(long campaignId, IReadOnlyList<Family> families)
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
