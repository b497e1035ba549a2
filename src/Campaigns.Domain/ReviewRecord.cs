namespace Campaigns.Domain;

/// <summary>A review with what stood behind it on its day.</summary>
/// <param name="Head">The review.</param>
/// <param name="PlanVersion">Number of the latest plan amendment before it; 0 for the plan as it was sealed.</param>
/// <param name="Files">Files of measurements that had been loaded.</param>
/// <param name="Rows">Rows of these files.</param>
/// <param name="LedgerSequence">The first entry of the ledger that speaks for it; null where none does.</param>
/// <param name="Families">Its families as it found them, in the plan's order; empty for a campaign of one family.</param>
public sealed record ReviewRecord(ReviewHead Head, int PlanVersion, int Files, long Rows, long? LedgerSequence, IReadOnlyList<FamilyStanding> Families);
