using Campaigns.Statistics.Corrections;

namespace Campaigns.Domain;

/// <summary>Experiments that share a control, a batch or an instrument are dependent; what that means for a procedure that is proved for independent ones.</summary>
public static class SharedControls
{
    /// <summary>Whether a procedure is proved for independent p-values alone, as every one is that estimates how many nulls are true.</summary>
    public static bool AreNotCoveredBy(ErrorProcedure procedure)
    {
        ArgumentNullException.ThrowIfNull(procedure);
        return procedure.ValidUnder is Dependence.Independent or Dependence.IndependentConservative;
    }

    /// <summary>A warning in a sentence; null where nothing is shared, or where the procedure allows for it.</summary>
    /// <param name="procedure">The procedure of the family.</param>
    /// <param name="family">Its name; empty for the one family of a campaign.</param>
    /// <param name="sharing">Its experiments that share a control, batch or instrument with another one.</param>
    public static string? Warning(ErrorProcedure procedure, string family, int sharing) => sharing < 2 || !AreNotCoveredBy(procedure)
        ? null
        : FormattableString.Invariant($"Warning: {sharing} experiments{(family.Length > 0 ? $" of the family '{family}'" : "")} share a control, batch or instrument, so that their p-values are dependent, and {procedure.Name} is proved for independent ones: what it promises is not proved here. Holm (familywise) and Benjamini-Yekutieli (false discovery) hold under any dependence.");

    /// <summary>The experiments that share something with another one of the list.</summary>
    /// <param name="names">What each experiment shares; null for nothing.</param>
    public static int Count(IEnumerable<string?> names) =>
        names.Where(n => n is not null).GroupBy(n => n, StringComparer.Ordinal).Where(g => g.Count() > 1).Sum(g => g.Count());
}
