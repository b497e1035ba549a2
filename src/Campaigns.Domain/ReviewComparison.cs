namespace Campaigns.Domain;

/// <summary>Two reviews of a campaign beside each other: which experiments were gained and lost between them, and why.</summary>
/// <param name="Before">The earlier review.</param>
/// <param name="After">The later one.</param>
/// <param name="Differences">Gained and lost experiments, in the plan's order.</param>
/// <param name="Kept">Experiments that survive in both.</param>
/// <param name="OtherAdjusted">Experiments on a line of both with the same verdict and another adjusted p-value.</param>
/// <param name="Added">Experiments with a line in the later review alone.</param>
/// <param name="Gone">Experiments with a line in the earlier review alone.</param>
public sealed record ReviewComparison(
    ReviewedFamily Before, ReviewedFamily After, IReadOnlyList<ReviewDifference> Differences, int Kept, int OtherAdjusted, int Added, int Gone)
{
    /// <summary>Whether both hold the same lines in families of the same size.</summary>
    public bool NothingChanged => Differences.Count == 0 && OtherAdjusted == 0 && Added == 0 && Gone == 0 && OtherP == 0 && SizesBefore.SequenceEqual(SizesAfter);

    /// <summary>Experiments on a line of both with another p-value.</summary>
    public int OtherP { get; init; }

    /// <summary>Who was amended in, withdrawn or taken in again between the two, family by family.</summary>
    public IReadOnlyList<ReviewFamilyChange> FamilyChanges { get; init; } = [];

    /// <summary>Version of the plan at the earlier review: the number of its latest amendment, 0 as it was sealed.</summary>
    public int PlanBefore { get; init; }

    /// <summary>The same at the later one.</summary>
    public int PlanAfter { get; init; }

    /// <summary>Hypotheses that each family counted in the earlier review.</summary>
    public IEnumerable<int> SizesBefore => Before.Members.Families.Select(f => f.Size);

    /// <summary>The same of the later one.</summary>
    public IEnumerable<int> SizesAfter => After.Members.Families.Select(f => f.Size);

    /// <summary>Compares two reviews.</summary>
    /// <param name="campaign">Their campaign, sealed.</param>
    /// <param name="before">The earlier review.</param>
    /// <param name="after">The later one.</param>
    /// <param name="events">What was done to experiments between the two, by their keys.</param>
    /// <param name="whyWithoutLine">Why an experiment has no line in a review: whether in the later one, and its key; asked only of those that have none.</param>
    /// <returns>
    /// The comparison. O(m log m) for all experiments whose own p-value stayed, and as much again for each gained or lost one whose own changed.
    /// A gate comes first, then the experiment's own p-value, the size of the family, the p-values of others, and where none of them alone would have done it, all together.
    /// </returns>
    public static ReviewComparison Of(
        Campaign campaign, ReviewedFamily before, ReviewedFamily after, IReadOnlyDictionary<long, IReadOnlyList<ReviewEvent>> events, Func<bool, long, ReviewReason> whyWithoutLine)
    {
        ArgumentNullException.ThrowIfNull(before);
        ArgumentNullException.ThrowIfNull(after);
        ArgumentNullException.ThrowIfNull(events);
        ArgumentNullException.ThrowIfNull(whyWithoutLine);
        var judge = new ReviewCounterfactual(campaign, before, after);
        var families = new ReviewFamilyEvents(events, before, after);
        var differences = new List<ReviewDifference>();
        (int kept, int otherAdjusted, int otherP, int added, int gone) = (0, 0, 0, 0, 0);
        int a = 0;
        int b = 0;
        while (a < before.Lines.Count || b < after.Lines.Count)
        {
            bool inBefore = b == after.Lines.Count || (a < before.Lines.Count && before.Keys.Span[a] <= after.Keys.Span[b]);
            bool inAfter = a == before.Lines.Count || (b < after.Lines.Count && after.Keys.Span[b] <= before.Keys.Span[a]);
            ReviewLine? first = inBefore ? before.Lines[a] : null;
            ReviewLine? second = inAfter ? after.Lines[b] : null;
            long key = inBefore ? before.Keys.Span[a] : after.Keys.Span[b];
            added += inBefore ? 0 : 1;
            gone += inAfter ? 0 : 1;
            bool survived = first?.Survives == true;
            bool survives = second?.Survives == true;
            if (inBefore && inAfter)
            {
                otherP += first!.Value.P == second!.Value.P ? 0 : 1;
                otherAdjusted += survived != survives || first.Value.AdjustedP == second.Value.AdjustedP ? 0 : 1;
            }

            kept += survived && survives ? 1 : 0;
            if (survived != survives)
            {
                ReviewReason reason = inBefore && inAfter ? Why(judge, before, after, a, b) : whyWithoutLine(!inAfter, key);
                int family = inAfter ? after.FamilyAt(b) : before.FamilyAt(a);
                differences.Add(families.Told(new ReviewDifference(
                    key, survives, first, second, reason, after.Members.Families[family].Family.Name, before.Members.Families[family].Size, after.Members.Families[family].Size,
                    [.. (events.GetValueOrDefault(key) ?? []).Where(e => reason != ReviewReason.FirstTested || e.Cause is ReviewCause.AmendedIn or ReviewCause.PlanAmendment)]), family));
            }

            a += inBefore ? 1 : 0;
            b += inAfter ? 1 : 0;
        }

        return new ReviewComparison(before, after, differences, kept, otherAdjusted, added, gone)
        {
            OtherP = otherP,
            FamilyChanges = families.Changes(),
        };
    }

    private static ReviewReason Why(ReviewCounterfactual judge, ReviewedFamily before, ReviewedFamily after, int a, int b)
    {
        bool was = before.Lines[a].Survives;
        bool isNow = after.Lines[b].Survives;
        bool wasOpen = before.Families[before.FamilyAt(a)].IsOpen;
        bool isOpen = after.Families[after.FamilyAt(b)].IsOpen;
        if (wasOpen != isOpen)
        {
            return isOpen ? ReviewReason.FamilyOpened : ReviewReason.FamilyClosed;
        }

        bool otherP = before.Lines[a].P != after.Lines[b].P;
        return otherP && judge.LaterWithOwnP(a, b) == was ? ReviewReason.OwnP
            : judge.EarlierAtLaterSize(a) == isNow ? ReviewReason.FamilySize
            : judge.LaterAtEarlierSize(a, b, otherP) == isNow ? ReviewReason.OtherP
            : ReviewReason.Together;
    }
}
