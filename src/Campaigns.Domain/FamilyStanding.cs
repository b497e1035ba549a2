using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>A family as its correction finds it.</summary>
/// <param name="Name">Its name; empty for the one family of a campaign that names none.</param>
/// <param name="Correction">Key of the correction applied.</param>
/// <param name="Level">Level applied.</param>
/// <param name="Size">Hypotheses that the correction counted.</param>
/// <param name="Planned">Experiments planned in it.</param>
/// <param name="Tested">Experiments with a result.</param>
/// <param name="Survivors">Experiments that survive.</param>
public sealed record FamilyStanding(string Name, string Correction, SignificanceLevel Level, int Size, int Planned, int Tested, int Survivors)
{
    /// <summary>Whether its experiments can survive; false while the family on which it waits has not opened it.</summary>
    public bool IsOpen { get; init; } = true;

    /// <summary>What it waits on, in a clause; null for a family that is open from the start.</summary>
    public string? Waits { get; init; }

    /// <summary>Sum of the weights of its experiments; null where its correction takes none.</summary>
    public double? WeightTotal { get; init; }

    /// <summary>Experiments of the family that share a control, batch or instrument with another one; counted where its procedure is proved for independent experiments alone, else 0.</summary>
    public int Sharing { get; init; }
}
