using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>What a campaign's correction makes of its hypotheses: adjusted p-values, survivors, and each family in figures.</summary>
/// <param name="Adjusted">Adjusted p-values in the order of the p-values given; 1 in a family that is not open.</param>
/// <param name="Survives">Whether each survives: its adjusted p-value is at most the level of its family.</param>
/// <param name="Families">The families in figures.</param>
public sealed record CampaignVerdict(IReadOnlyList<PValue> Adjusted, IReadOnlyList<bool> Survives, IReadOnlyList<FamilyStanding> Families)
{
    /// <summary>For each p-value the place of its family, from 0; empty where there is one.</summary>
    public ReadOnlyMemory<int> FamilyOf { get; init; }

    /// <summary>Where standing decisions make the verdict, the batch view beside them; else null.</summary>
    public CampaignVerdict? Batch { get; init; }

    /// <summary>Survivors among the p-values at hand; a standing decision whose experiment awaits a new test has none.</summary>
    public int SurvivorLineCount => Survives.Count(s => s);

    /// <summary>Survivors of all families.</summary>
    public int SurvivorCount => Families.Sum(f => f.Survivors);

    /// <summary>Hypotheses counted in all families.</summary>
    public int Size => Families.Sum(f => f.Size);

    /// <summary>The family of a p-value.</summary>
    /// <param name="index">Place of the p-value, from 0.</param>
    public FamilyStanding FamilyAt(int index) => Families[FamilyOf.IsEmpty ? 0 : FamilyOf.Span[index]];
}
