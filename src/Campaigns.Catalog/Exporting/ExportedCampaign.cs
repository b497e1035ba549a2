using Campaigns.Catalog.Ledger;

namespace Campaigns.Catalog.Exporting;

/// <summary>What an export wrote.</summary>
/// <param name="Files">The files, from the folder, sorted.</param>
/// <param name="Head">The head of the ledger that they stand at.</param>
public sealed record ExportedCampaign(IReadOnlyList<string> Files, LedgerHead Head);
