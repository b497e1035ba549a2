using Campaigns.App.Output;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>The effect sizes of one experiment.</summary>
internal static class EffectSection
{
    /// <summary>A row an effect size; no rows where there is no variation to measure it by.</summary>
    public static RowTable Table(ExperimentDetail detail) => new(
        [new("effect", "effect"), new("value", "value", true), new("lower", "lower", true), new("upper", "upper", true)],
        detail.Variation is not { } v ? [] :
        [
            [Cell.Text("eta squared"), Cell.Number(v.EtaSquared), Cell.Empty, Cell.Empty],
            [Cell.Text("omega squared"), Cell.Number(v.OmegaSquared), Cell.Empty, Cell.Empty],
            [Cell.Text("epsilon squared"), Cell.Number(EpsilonSquared(detail.Result)), Cell.Empty, Cell.Empty],
            [Cell.Text("Cohen's f"), Cell.Number(CohenF(detail.Result)), Cell.Empty, Cell.Empty],
        ]);

    /// <summary>What the figures mean.</summary>
    public static IEnumerable<string> Notes(ExperimentDetail detail)
    {
        if (detail.Variation is { } v)
        {
            yield return $"Residual standard deviation {NumberText.Screen(v.ResidualStandardDeviation, 5)} {detail.Result.Plan.Unit}".TrimEnd() + ".";
        }
    }

    /// <summary>Epsilon squared from the stored eta squared; null without a result.</summary>
    public static double? EpsilonSquared(ExperimentResult result)
    {
        if (result.EtaSquared is not { } eta)
        {
            return null;
        }

        double df1 = result.GroupCount - 1;
        double df2 = result.Plan.Test == "block-f" ? result.Df2!.Value : (result.SpecimenCount ?? result.ObservationCount) - result.GroupCount;
        return eta - (df1 / df2 * (1 - eta));
    }

    /// <summary>Cohen's f from the stored eta squared; null without a result.</summary>
    public static double? CohenF(ExperimentResult result) => result.EtaSquared is { } eta ? Math.Sqrt(eta / (1 - eta)) : null;
}
