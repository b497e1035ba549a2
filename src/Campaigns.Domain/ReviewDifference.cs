namespace Campaigns.Domain;

/// <summary>An experiment that survives in one of two reviews and not in the other.</summary>
/// <param name="Key">Its key in the catalog.</param>
/// <param name="IsGained">Whether it survives in the later one.</param>
/// <param name="Before">Its line in the earlier review; null where it has none.</param>
/// <param name="After">Its line in the later review; null where it has none.</param>
/// <param name="Reason">Why.</param>
/// <param name="Family">Name of its family; empty for the one family of a campaign that names none.</param>
/// <param name="SizeBefore">Hypotheses that its family counted in the earlier review.</param>
/// <param name="SizeAfter">The same of the later one.</param>
/// <param name="Events">What was done to it between the two, oldest first.</param>
public sealed record ReviewDifference(
    long Key, bool IsGained, ReviewLine? Before, ReviewLine? After, ReviewReason Reason, string Family, int SizeBefore, int SizeAfter, IReadOnlyList<ReviewEvent> Events)
{
    /// <summary>
    /// Where the reason is a gate: what was done to experiments of the family on which its own waits. Where it is the size of its family: the decisions that changed it. Else empty. In the plan's order.
    /// </summary>
    public IReadOnlyList<ReviewEvent> FamilyEvents { get; init; } = [];

    /// <summary>Where the reason is a gate, the family on which its own waits; else null.</summary>
    public string? Gate { get; init; }

    /// <summary>Experiments of that family whose results came, changed or went between the two.</summary>
    public int GateResults { get; init; }
}
