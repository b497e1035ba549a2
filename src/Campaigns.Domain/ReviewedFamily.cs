namespace Campaigns.Domain;

/// <summary>A review with every line, and its family as it was counted on that day.</summary>
/// <param name="Head">The review.</param>
/// <param name="Keys">Keys of the experiments on its lines, ascending.</param>
/// <param name="Members">The hypotheses that were counted; their p-values are those of the lines, in the same order.</param>
/// <param name="Lines">The lines.</param>
/// <param name="Families">The families as the review found them: one, or those of the plan.</param>
public sealed record ReviewedFamily(
    ReviewHead Head, ReadOnlyMemory<long> Keys, FamilyMembers Members, IReadOnlyList<ReviewLine> Lines, IReadOnlyList<FamilyStanding> Families)
{
    /// <summary>Place of an experiment among the lines; negative where it has none. O(log m).</summary>
    public int PlaceOf(long key) => Keys.Span.BinarySearch(key);

    /// <summary>The line of an experiment; null where it has none.</summary>
    public ReviewLine? LineOf(long key) => PlaceOf(key) is >= 0 and var place ? Lines[place] : null;

    /// <summary>Place of a line's family among the families, from 0.</summary>
    public int FamilyAt(int place) => Members.FamilyOf.IsEmpty ? 0 : Members.FamilyOf.Span[place];
}
