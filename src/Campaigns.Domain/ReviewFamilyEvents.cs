namespace Campaigns.Domain;

/// <summary>Experiments that came to a family or left it between two reviews, by decisions, not by results.</summary>
/// <param name="Family">Its name; empty for the one family of a campaign that names none.</param>
/// <param name="AmendedIn">Experiments that amendments of the plan added.</param>
/// <param name="Withdrawn">Experiments that were withdrawn.</param>
/// <param name="TakenBack">Experiments that were taken in again.</param>
public sealed record ReviewFamilyChange(string Family, int AmendedIn, int Withdrawn, int TakenBack);

/// <summary>What was done between two reviews to the families that stand behind a gained or lost experiment: its own, and those on which it waits.</summary>
/// <remarks>An answer is found once per family and shared by all its experiments. O(m) for the first about a gate.</remarks>
/// <param name="events">What was done to experiments between the two, by their keys.</param>
/// <param name="before">The earlier review.</param>
/// <param name="after">The later one.</param>
internal sealed class ReviewFamilyEvents(IReadOnlyDictionary<long, IReadOnlyList<ReviewEvent>> events, ReviewedFamily before, ReviewedFamily after)
{
    private readonly ILookup<string, ReviewEvent> _byFamily = events.OrderBy(e => e.Key).SelectMany(e => e.Value).ToLookup(e => e.Family, StringComparer.Ordinal);
    private readonly Dictionary<int, IReadOnlyList<ReviewEvent>> _gates = [];
    private readonly Dictionary<int, IReadOnlyList<ReviewEvent>> _sizes = [];
    private readonly Dictionary<int, int> _results = [];

    /// <summary>A difference with what its families say of it, where its reason lies with them.</summary>
    /// <param name="difference">The difference.</param>
    /// <param name="family">Place of its family among the families.</param>
    public ReviewDifference Told(ReviewDifference difference, int family)
    {
        if (difference.Reason is not (ReviewReason.FamilyOpened or ReviewReason.FamilyClosed))
        {
            bool bySize = difference.Reason is ReviewReason.FamilySize or ReviewReason.Together && difference.SizeBefore != difference.SizeAfter;
            return bySize ? difference with { FamilyEvents = Cached(_sizes, family, f => [.. _byFamily[NameOf(f)].Where(e => e.ChangesFamily)]) } : difference;
        }

        int gate = GateOf(family);
        return gate < 0 ? difference : difference with
        {
            Gate = NameOf(gate),
            GateResults = Cached(_results, gate, Results),
            FamilyEvents = Cached(_gates, family, Behind),
        };
    }

    /// <summary>Who came and left, family by family.</summary>
    public IReadOnlyList<ReviewFamilyChange> Changes()
    {
        ILookup<string, IReadOnlyList<ReviewEvent>> lists = events.Values.Where(e => e.Count > 0).ToLookup(e => e[0].Family, StringComparer.Ordinal);
        return [.. after.Members.Families.Select(f => new ReviewFamilyChange(
            f.Family.Name,
            lists[f.Family.Name].Count(e => e.Any(x => x.Cause == ReviewCause.AmendedIn)),
            lists[f.Family.Name].Count(e => LatestWithdrawal(e) == ReviewCause.Withdrawal),
            lists[f.Family.Name].Count(e => LatestWithdrawal(e) == ReviewCause.WithdrawalTakenBack)))];
    }

    private static ReviewCause? LatestWithdrawal(IReadOnlyList<ReviewEvent> list) =>
        list.LastOrDefault(x => x.Cause is ReviewCause.Withdrawal or ReviewCause.WithdrawalTakenBack)?.Cause;

    private static T Cached<T>(Dictionary<int, T> cache, int family, Func<int, T> find)
    {
        if (!cache.TryGetValue(family, out T? found))
        {
            cache[family] = found = find(family);
        }

        return found;
    }

    private string NameOf(int family) => after.Members.Families[family].Family.Name;

    /// <summary>Place of the family on which one waits; negative where it waits on none.</summary>
    private int GateOf(int family)
    {
        string? name = after.Members.Families[family].Family.OpensAfter;
        for (int i = 0; name is not null && i < after.Members.Families.Count; i++)
        {
            if (NameOf(i) == name)
            {
                return i;
            }
        }

        return -1;
    }

    /// <summary>The events of the family on which one waits, and where that one opened or closed too, of the family before it.</summary>
    private IReadOnlyList<ReviewEvent> Behind(int family)
    {
        var found = new List<ReviewEvent>();
        int gate = GateOf(family);
        while (gate >= 0)
        {
            found.AddRange(_byFamily[NameOf(gate)]);
            gate = before.Families[gate].IsOpen == after.Families[gate].IsOpen ? -1 : GateOf(gate);
        }

        return found;
    }

    /// <summary>Experiments of a family with a line in one review alone, or another p-value in the other.</summary>
    private int Results(int family)
    {
        int changed = 0;
        for (int i = 0; i < after.Lines.Count; i++)
        {
            changed += after.FamilyAt(i) == family && before.LineOf(after.Keys.Span[i])?.P != after.Lines[i].P ? 1 : 0;
        }

        for (int i = 0; i < before.Lines.Count; i++)
        {
            changed += before.FamilyAt(i) == family && after.PlaceOf(before.Keys.Span[i]) < 0 ? 1 : 0;
        }

        return changed;
    }
}
