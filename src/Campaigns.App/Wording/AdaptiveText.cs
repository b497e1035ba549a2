using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.TrueNulls;

namespace Campaigns.App.Wording;

/// <summary>What people must know about corrections that estimate how many nulls are true.</summary>
internal static class AdaptiveText
{
    /// <summary>Whether a correction estimates the true nulls from the p-values.</summary>
    public static bool IsAdaptive(ErrorProcedure procedure) => procedure is TwoStageBenjaminiHochberg or Storey;

    /// <summary>Cautions for some corrections; none where none of them is adaptive.</summary>
    /// <param name="corrections">Those that are shown.</param>
    /// <param name="tested">P-values at hand.</param>
    public static IEnumerable<string> Cautions(IEnumerable<ErrorProcedure> corrections, int tested)
    {
        ErrorProcedure[] adaptive = [.. corrections.Where(IsAdaptive)];
        if (adaptive.Length > 0)
        {
            yield return $"{string.Join(" and ", adaptive.Select(c => c.Key))}: proved for independent p-values only; experiments that share a control, a batch or an instrument are not covered.";
        }

        if (tested < TrueNullShare.FewPValues && adaptive.FirstOrDefault(c => c is Storey) is { } storey)
        {
            yield return FormattableString.Invariant($"{storey.Key}: {tested} p-values are few for an estimate of the number of true nulls; use it with {TrueNullShare.FewPValues} or more.");
        }
    }
}
