using Campaigns.App.Output;
using Campaigns.Domain;
using Campaigns.Statistics.Effects;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>The effect sizes of one experiment.</summary>
internal static class EffectSection
{
    /// <summary>A row an effect size; no rows where there is no variation to measure it by.</summary>
    public static RowTable Table(ExperimentDetail detail) => new(
        [new("effect", "effect"), new("value", "value", true), new("lower", "lower", true), new("upper", "upper", true)],
        detail.Analysis.Effects is not { } e ? [] :
        [
            Row("eta squared", e.EtaSquared, e.EtaSquaredInterval),
            Row("omega squared", e.OmegaSquared, null),
            Row("epsilon squared", e.EpsilonSquared, null),
            Row("Cohen's f", e.CohenF, e.CohenFInterval),
            .. Difference("smallest detectable difference", detail.Analysis.Detectable),
            .. Difference("smallest detectable difference at the strictest threshold", detail.Analysis.DetectableAtStrictest),
        ]);

    private static Cell[] Row(string name, double value, Interval? interval) =>
        [Cell.Text(name), Cell.Number(value), Cell.Number(interval?.Lower), Cell.Number(interval?.Upper)];

    private static Cell[][] Difference(string name, double? value) => value is null ? [] : [[Cell.Text(name), Cell.Number(value), Cell.Empty, Cell.Empty]];

    /// <summary>Epsilon squared from the stored eta squared; null without a result.</summary>
    public static double? EpsilonSquared(ExperimentResult result)
    {
        if (result.EtaSquared is not { } eta)
        {
            return null;
        }

        (double df1, double df2) = DegreesOfFreedom(result);
        return eta - (df1 / df2 * (1 - eta));
    }

    /// <summary>Cohen's f, the root of the ratio of both sums of squares; null without a result.</summary>
    /// <remarks>From F where the test's statistic is F: 1 less an eta squared near 1 has lost its digits. Elsewhere from the stored eta squared.</remarks>
    public static double? CohenF(ExperimentResult result)
    {
        if (result.EtaSquared is not { } eta)
        {
            return null;
        }

        (double df1, double df2) = DegreesOfFreedom(result);
        return Math.Sqrt(result is { Plan.Test: "f" or "block-f" or "permutation", Statistic: { } f } ? f * (df1 / df2) : eta / (1 - eta));
    }

    /// <summary>The interval of a selected experiment's eta squared, at confidence 1 - risk; null without a result, and where nothing varies inside the groups.</summary>
    /// <param name="result">The experiment.</param>
    /// <param name="risk">The probability with which the interval may miss, in (0, 1); half of it on either side, so that the lower bound may be 0 for an experiment that only just survives.</param>
    public static Interval? SelectedEtaSquared(ExperimentResult result, double risk)
    {
        if (CohenF(result) is not { } effect || !(risk > 0))
        {
            return null;
        }

        (double df1, double df2) = DegreesOfFreedom(result);
        double f = effect * effect * (df2 / df1);
        return double.IsFinite(f) ? EffectSizes.Of(f, df1, df2, new SignificanceLevel(risk / 2)).EtaSquaredInterval : null;
    }

    private static (double Df1, double Df2) DegreesOfFreedom(ExperimentResult result) =>
        (result.GroupCount - 1, result.Plan.Test == "block-f" ? result.Df2!.Value : (result.SpecimenCount ?? result.ObservationCount) - result.GroupCount);
}
