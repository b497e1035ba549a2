using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Wording;

/// <summary>What the latest review of several families, or of experiments that share a control, should not leave unsaid.</summary>
/// <param name="Lines">A sentence a family; empty where the plan names none.</param>
/// <param name="Warnings">What to be careful about.</param>
internal sealed record ReviewedFamilies(IReadOnlyList<string> Lines, IReadOnlyList<string> Warnings)
{
    /// <summary>Reads them.</summary>
    /// <param name="catalog">The open catalog.</param>
    /// <param name="code">The campaign, which has a review.</param>
    public static ReviewedFamilies Read(Catalog.Catalog catalog, string code)
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        if (!FamilyTally.IsNeeded(stored.Campaign))
        {
            return new ReviewedFamilies([], []);
        }

        IReadOnlyList<FamilyStanding> families = new ReviewStore(catalog).Families(stored);
        return new ReviewedFamilies(
            stored.Campaign.JudgedFamilies.Count == 0 ? [] : [.. families.Select(f => FormattableString.Invariant($"{FamilyText.Line(stored.Campaign, f)} Survivors: {f.Survivors}."))],
            [.. FamilyText.Warnings(stored.Campaign, families)]);
    }
}
