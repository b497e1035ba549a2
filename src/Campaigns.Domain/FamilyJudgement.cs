using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>The families of a campaign as they are judged, each after the one on which it waits.</summary>
/// <remarks>
/// A gate "all" asks for every planned experiment of the other family, in an interim review too: what was not tested may be a true null. In the whole family a further result only lowers adjusted p-values, so that
/// what survives and which gates are open only grow while experiments come in, and looking early risks nothing beyond the last look.
/// </remarks>
internal sealed class FamilyJudgement
{
    private readonly Campaign _campaign;
    private readonly FamilyMembers _members;
    private readonly IReadOnlyList<SignificanceLevel> _levels;
    private readonly FamilyStanding?[] _standings;
    private readonly PValue[] _adjusted;
    private readonly bool[] _survives;
    private readonly int[][] _places;

    public FamilyJudgement(Campaign campaign, FamilyMembers members)
    {
        _campaign = campaign;
        _members = members;
        IReadOnlyList<Family> families = campaign.JudgedFamilies;
        _levels = families.Count == 0 ? [campaign.Level] : FamilyLevels.Of(campaign, families);
        _standings = new FamilyStanding?[_levels.Count];
        _adjusted = new PValue[members.P.Length];
        _survives = new bool[members.P.Length];
        _places = PlacesOf(members);
    }

    public CampaignVerdict Verdict() => new(_adjusted, _survives, [.. _levels.Select((_, i) => Of(i))]) { FamilyOf = _members.FamilyOf };

    /// <summary>Adjusted p-values of one family.</summary>
    private static PValue[] Adjust(Correction correction, ReadOnlySpan<PValue> p, FamilyCount count, ReadOnlySpan<double> weights)
    {
        double rest = count.Size > p.Length ? count.WeightOfRest : 0;
        if (!correction.NeedsWeights || weights.Length < p.Length || p.Length == 0)
        {
            return correction.Adjust(RankedFamily.Of(p, count.Size));
        }

        // In an interim review those counted may all weigh 0, which the seal refuses for a whole family: then nothing can be rejected.
        return rest > 0 || weights.ContainsAnyExcept(0.0)
            ? correction.Adjust(RankedFamily.Of(p, count.Size, weights, rest))
            : [.. Enumerable.Repeat(PValue.FromValue(1), p.Length)];
    }

    /// <summary>For each family the places of its p-values among all of them; empty where there is one family.</summary>
    private static int[][] PlacesOf(FamilyMembers members)
    {
        if (members.FamilyOf.IsEmpty)
        {
            return [];
        }

        var places = new List<int>[members.Families.Count];
        for (int i = 0; i < places.Length; i++)
        {
            places[i] = [];
        }

        ReadOnlySpan<int> familyOf = members.FamilyOf.Span;
        for (int i = 0; i < familyOf.Length; i++)
        {
            places[familyOf[i]].Add(i);
        }

        return [.. places.Select(p => p.ToArray())];
    }

    private FamilyStanding Of(int index) => _standings[index] ??= Judge(index);

    private FamilyStanding Judge(int index)
    {
        FamilyCount count = _members.Families[index];
        Family family = count.Family;
        (bool isOpen, string? waits) = GateOf(family);
        Correction correction = FamilyVerdict.CorrectionOf(_campaign with { Correction = family.Correction ?? _campaign.Correction });
        ReadOnlySpan<PValue> p = Taken(_members.P.Span, index);
        ReadOnlySpan<double> weights = _members.Weights.IsEmpty ? [] : Taken(_members.Weights.Span, index);
        PValue[] adjusted = isOpen ? Adjust(correction, p, count, weights) : [.. Enumerable.Repeat(PValue.FromValue(1), p.Length)];
        SignificanceLevel level = _levels[index];
        int[]? places = _places.Length == 0 ? null : _places[index];
        int survivors = 0;
        for (int i = 0; i < adjusted.Length; i++)
        {
            int place = places is null ? i : places[i];
            bool survives = isOpen && level.Rejects(adjusted[i]);
            _adjusted[place] = adjusted[i];
            _survives[place] = survives;
            survivors += survives ? 1 : 0;
        }

        return new FamilyStanding(family.Name, correction.Key, level, count.Size, count.Planned, adjusted.Length, survivors)
        {
            IsOpen = isOpen,
            Waits = waits,
            Sharing = count.Sharing,
            WeightTotal = correction.NeedsWeights && weights.Length == p.Length ? Sum(weights) + count.WeightOfRest : null,
        };
    }

    private static double Sum(ReadOnlySpan<double> weights)
    {
        double sum = 0;
        foreach (double weight in weights)
        {
            sum += weight;
        }

        return sum;
    }

    private ReadOnlySpan<T> Taken<T>(ReadOnlySpan<T> column, int family)
    {
        if (_places.Length == 0)
        {
            return column;
        }

        int[] places = _places[family];
        var taken = new T[places.Length];
        for (int i = 0; i < taken.Length; i++)
        {
            taken[i] = column[places[i]];
        }

        return taken;
    }

    private (bool IsOpen, string? Waits) GateOf(Family family)
    {
        if (family.OpensAfter is not { } name)
        {
            return (true, null);
        }

        int other = 0;
        while (_members.Families[other].Family.Name != name)
        {
            other++;
        }

        FamilyStanding on = Of(other);
        bool isOpen = family.Gate == FamilyGate.AllSurvive ? on.Survivors == on.Planned : on.Survivors > 0;
        string which = family.Gate == FamilyGate.AllSurvive ? FormattableString.Invariant($"all {on.Planned} experiments of {name} survive") : $"an experiment of {name} survives";
        string doing = on.Survivors == 0 ? "none does" : on.Survivors == 1 ? "1 does" : FormattableString.Invariant($"{on.Survivors} do");
        return (isOpen, $"{(isOpen ? "opened when" : "waits until")} {which}: {doing}");
    }
}
