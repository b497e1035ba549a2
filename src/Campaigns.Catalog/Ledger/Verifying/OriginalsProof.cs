using Campaigns.Catalog.Originals;
using Campaigns.Catalog.Plans;

namespace Campaigns.Catalog.Ledger.Verifying;

/// <summary>Proves that the bytes of every loaded file come back with the SHA-256 with which they were loaded, and that a file whose load is in the ledger has its bytes.</summary>
/// <param name="catalog">The open catalog, in a snapshot.</param>
/// <param name="findings">Takes what is wrong.</param>
/// <param name="evidence">What the entries speak for.</param>
internal sealed class OriginalsProof(Catalog catalog, Findings findings, EvidenceProof evidence)
{
    /// <summary>Expands every kept file. O(bytes).</summary>
    public void Run()
    {
        var originals = new OriginalStore(catalog);
        foreach (StoredCampaign campaign in new CampaignStore(catalog).All())
        {
            foreach (OriginalFile file in originals.All(campaign.Campaign.Code))
            {
                if (file.IsKept)
                {
                    LookAt(originals, file, campaign.Campaign.Code);
                }
                else if (evidence.SpeaksFor(EvidenceRegistry.Original, file.LoadId))
                {
                    findings.Add(null, campaign.Campaign.Code, FormattableString.Invariant($"The bytes of the loaded file '{file.FileName}' (load {file.LoadId}) are gone."));
                }
            }
        }
    }

    private void LookAt(OriginalStore originals, OriginalFile file, string campaign)
    {
        try
        {
            originals.CopyTo(file, Stream.Null);
        }
        catch (Exception error) when (error is RecordException or CatalogException)
        {
            findings.Add(null, campaign, error.Message);
        }
    }
}
