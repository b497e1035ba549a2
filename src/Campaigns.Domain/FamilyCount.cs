namespace Campaigns.Domain;

/// <summary>How many hypotheses of a family are counted.</summary>
/// <param name="Family">The family.</param>
/// <param name="Planned">Experiments planned in it.</param>
/// <param name="Size">Hypotheses that the correction counts: the planned ones, or in an interim review the tested ones alone.</param>
public sealed record FamilyCount(Family Family, int Planned, int Size)
{
    /// <summary>Sum of the planned weights of those without a p-value, null counting as 1.</summary>
    public double WeightOfRest { get; init; }

    /// <summary>Experiments of the family that share a control, batch or instrument with another one.</summary>
    public int Sharing { get; init; }
}
