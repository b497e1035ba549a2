using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>What one procedure makes of the tested experiments of a campaign.</summary>
/// <param name="Procedure">The procedure.</param>
/// <param name="IsSealed">Whether it is the one that the plan fixed, and that alone decides.</param>
/// <param name="Adjusted">Adjusted p-values of the tested experiments in the plan's order; null where the procedure gives none.</param>
/// <param name="Survives">Whether each of these survives.</param>
public sealed record CorrectionOutcome(ErrorProcedure Procedure, bool IsSealed, IReadOnlyList<PValue?> Adjusted, IReadOnlyList<bool> Survives)
{
    /// <summary>Whether families of the sealed plan have corrections of their own, so that it is no one procedure in all of them.</summary>
    public bool IsMixed { get; init; }

    /// <summary>Key of the procedure; "as-sealed" for a sealed plan with several.</summary>
    public string Key => IsMixed ? "as-sealed" : Procedure.Key;

    /// <summary>Experiments that survive.</summary>
    public int SurvivorCount => Survives.Count(s => s);
}
