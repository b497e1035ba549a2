using Campaigns.App.Output;
using Campaigns.Domain;
using Campaigns.Statistics.Effects;

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

    /// <summary>What the figures mean.</summary>
    public static IEnumerable<string> Notes(CampaignStanding standing, ExperimentDetail detail)
    {
        bool isPartial = detail.Variation?.Blocks is not null;
        if (detail.Variation is { } v)
        {
            yield return $"Residual standard deviation {NumberText.Screen(v.ResidualStandardDeviation, 5)} {detail.Result.Plan.Unit}".TrimEnd() + ".";
        }

        if (detail.Analysis.Effects is { } e)
        {
            yield return FormattableString.Invariant($"Intervals: {100 * e.Confidence:0.###} %, from the noncentral F law; they leave out 0 exactly where the F test alone would call the groups different at {standing.Campaign.Level}. Omega and epsilon squared are negative where F is below 1.{(isPartial ? " Within blocks all of them are partial: the blocks are left out." : "")}");
        }

        if (detail.Analysis.Effects is not null && detail.Result.Plan.Test is not ("f" or "block-f"))
        {
            yield return "Effect sizes and their intervals come from the one-way table and assume equal spreads, whatever the planned test assumes.";
        }

        if (detail.Analysis.DetectableAtStrictest is not null)
        {
            yield return FormattableString.Invariant($"Smallest detectable difference: between any two group means, with these group sizes and this residual standard deviation, found by the F test with a power of 0.8, at level {standing.Campaign.Level} alone and at the strictest threshold {standing.Campaign.Level}/{standing.FamilySize}. A smaller difference may well be there and not be shown.");
        }
    }

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

        double df1 = result.GroupCount - 1;
        double df2 = result.Plan.Test == "block-f" ? result.Df2!.Value : (result.SpecimenCount ?? result.ObservationCount) - result.GroupCount;
        return eta - (df1 / df2 * (1 - eta));
    }

    /// <summary>Cohen's f from the stored eta squared; null without a result.</summary>
    public static double? CohenF(ExperimentResult result) => result.EtaSquared is { } eta ? Math.Sqrt(eta / (1 - eta)) : null;
}
