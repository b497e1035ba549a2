using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.TrueNulls;

namespace Campaigns.Domain;

/// <summary>A correction that estimates the number of true nulls from the share of large p-values needs a family of some size; what is said of a smaller one.</summary>
public static class FewExperiments
{
    /// <summary>A warning in a sentence; null where the family is large enough, or the procedure estimates nothing from large p-values.</summary>
    /// <param name="procedure">The procedure of the family.</param>
    /// <param name="family">Its name; empty for the one family of a campaign.</param>
    /// <param name="planned">Experiments planned in it.</param>
    public static string? Warning(ErrorProcedure procedure, string family, int planned) => procedure is not Storey || planned >= TrueNullShare.FewPValues
        ? null
        : FormattableString.Invariant($"Warning: {planned} experiment{(planned == 1 ? " is" : "s are")} few{(family.Length > 0 ? $" in the family '{family}'" : "")} for {procedure.Name}, which estimates from them how many nulls are true; use it with {TrueNullShare.FewPValues} or more.");
}
