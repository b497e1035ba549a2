using Campaigns.App.Commands;
using Campaigns.App.Output;
using Campaigns.Domain;
using Campaigns.Statistics.Effects;
using OxyPlot;
using OxyPlot.Axes;

namespace Campaigns.App.Figures;

/// <summary>The survivors of a campaign with the size of their effects, on a scale that experiments with different units share.</summary>
internal static class SurvivorsFigure
{
    /// <summary>Its key.</summary>
    public const string Key = "survivors";

    /// <summary>Survivors that are drawn at most.</summary>
    public const int MostSurvivors = 50;

    private const double RowHeight = 20;
    private const double WidestName = 200;
    private const double CapHeight = 0.2;

    /// <summary>Makes the figure.</summary>
    /// <param name="standing">The campaign.</param>
    public static Figure Of(CampaignStanding standing)
    {
        var figure = new Figure(Key, $"{standing.Campaign.Code}: survivors and the size of their effects", "");
        if (standing.TestedCount == 0)
        {
            return figure with { Alternative = FigureWords.NothingTested(standing) };
        }

        ExperimentResult[] survivors = [.. standing.Experiments.Where(e => e is { Survives: true, EtaSquared: not null, P: not null }).OrderBy(e => e.P!.Value).ThenBy(e => e.Position)];
        if (survivors.Length == 0)
        {
            return figure with { Alternative = $"No picture of effects: {FigureWords.Survivors(standing)} No difference shown is not the same as no difference." };
        }

        ExperimentResult[] shown = [.. survivors.Take(MostSurvivors)];
        var verdict = new ComparisonVerdict(standing.Campaign, standing.Families);
        double[] risks = [.. shown.Select(e => verdict.SelectedRisk(e) ?? 0)];
        Interval?[] intervals = [.. shown.Zip(risks, EffectSection.SelectedEtaSquared)];
        return figure with
        {
            Alternative = Say(standing, survivors),
            Plot = Draw(shown, intervals),
            PlotHeight = 100 + (RowHeight * shown.Length),
            Notes = [.. NotesOf(standing, survivors, shown, risks)],
        };
    }

    private static PlotModel Draw(ExperimentResult[] shown, Interval?[] intervals)
    {
        PlotModel plot = FigureStyle.NewPlot();
        plot.Axes.Add(FigureAxes.Numbers(AxisPosition.Bottom, "eta squared", 0, 1));
        plot.Axes.Add(FigureAxes.Names(AxisPosition.Left, "", [.. shown.Select(e => e.Plan.Title.Length > 0 ? $"{e.Plan.Code} {e.Plan.Title}" : e.Plan.Code)], WidestName));
        var interval = new Strokes("interval after selection", FigureStyle.Text, 1.2) { Form = LegendForm.Capped };
        var effect = new Marks("eta squared of the sample", MarkerType.Diamond, FigureStyle.Survivor, size: 4.2);
        for (int y = 0; y < shown.Length; y++)
        {
            if (intervals[y] is { } ends && double.IsFinite(ends.Lower) && double.IsFinite(ends.Upper))
            {
                interval.Add(ends.Lower, y, ends.Upper, y);
                interval.Add(ends.Lower, y - CapHeight, ends.Lower, y + CapHeight);
                interval.Add(ends.Upper, y - CapHeight, ends.Upper, y + CapHeight);
            }

            effect.Add(shown[y].EtaSquared!.Value, y);
        }

        FigureStyle.Draw(plot, interval, effect);
        return plot;
    }

    private static IEnumerable<string> NotesOf(CampaignStanding standing, ExperimentResult[] survivors, ExperimentResult[] shown, double[] risks)
    {
        if (survivors.Length > shown.Length)
        {
            yield return FormattableString.Invariant($"The {shown.Length} survivors with the smallest p of {survivors.Length} are drawn.");
        }

        string confidence = risks.Distinct().Count() == 1 ? FormattableString.Invariant($"at {100 * (1 - risks[0]):0.####} %, ") : "";
        yield return $"The smallest p first. Eta squared: the share of the variation that lies between groups. Intervals {confidence}from the noncentral F law, account for the selection of the survivors; they assume equal spreads. The effect of what was selected looks larger in the sample than it is.";
        yield return FigureWords.Procedure(standing);
    }

    private static string Say(CampaignStanding standing, ExperimentResult[] survivors)
    {
        ExperimentResult most = survivors.MaxBy(e => e.EtaSquared)!, least = survivors.MinBy(e => e.EtaSquared)!;
        string range = survivors.Length == 1
            ? $"It is {most.Plan.Code}, with an eta squared of {NumberText.Screen(most.EtaSquared!.Value, 3)}."
            : $"Their eta squared goes from {NumberText.Screen(least.EtaSquared!.Value, 3)} ({least.Plan.Code}) to {NumberText.Screen(most.EtaSquared!.Value, 3)} ({most.Plan.Code}); the smallest p is that of {survivors[0].Plan.Code}, {NumberText.P(survivors[0].P!.Value)}.";
        return $"{FigureWords.Survivors(standing)} {range}";
    }
}
