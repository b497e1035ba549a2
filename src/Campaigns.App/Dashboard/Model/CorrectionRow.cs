using Campaigns.Statistics.Corrections;

namespace Campaigns.App.Dashboard.Model;

/// <summary>A correction beside others on the page of the ranking.</summary>
/// <param name="Key">Its key, or "as-sealed" where families of the plan have corrections of their own.</param>
/// <param name="Procedure">The procedure.</param>
/// <param name="IsSealed">Whether it is the sealed one, which alone decides.</param>
/// <param name="Letter">The sign of its boundary in the picture; null where it has none, and for the sealed one, which has a sign of its own.</param>
/// <param name="IsDrawn">Whether its boundary is drawn.</param>
/// <param name="Survivors">Experiments of the whole campaign that survive; null while that is reckoned.</param>
public sealed record CorrectionRow(string Key, ErrorProcedure Procedure, bool IsSealed, string? Letter, bool IsDrawn, int? Survivors);
