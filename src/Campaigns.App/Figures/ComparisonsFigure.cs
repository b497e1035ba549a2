using Campaigns.App.Output;
using Campaigns.Domain;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.Probability;
using OxyPlot;
using OxyPlot.Axes;

namespace Campaigns.App.Figures;

/// <summary>The differences between the groups of an experiment with their simultaneous intervals, to scale, beside a line at 0.</summary>
internal static class ComparisonsFigure
{
    /// <summary>Its key.</summary>
    public const string Key = "comparisons";

    /// <summary>Pairs that are drawn at most.</summary>
    public const int MostPairs = 60;

    private const double RowHeight = 24;
    private const double WidestName = 170;
    private const double CapHeight = 0.16;
    private const double WiderBelow = 0.26;

    /// <summary>Makes the figure.</summary>
    /// <param name="standing">The campaign.</param>
    /// <param name="detail">The experiment.</param>
    public static Figure Of(CampaignStanding standing, ExperimentDetail detail)
    {
        ExperimentResult result = detail.Result;
        PlannedExperiment plan = result.Plan;
        var figure = new Figure(Key, $"{plan.Code}: differences between groups", "");
        ExperimentComparison[] possible = [.. detail.Comparisons.Where(c => double.IsFinite(c.Comparison.Difference) && c.Comparison.P is not null)];
        if (possible.Length == 0)
        {
            string why = plan.FollowUp == FollowUpRegistry.None ? "its plan names no follow-up, so that groups are not compared"
                : result.P is null ? $"it is {result.Status.Sentence()}"
                : "its values allow no comparison";
            return figure with { Alternative = $"No picture of comparisons inside {plan.Code}: {why}." };
        }

        ExperimentComparison[] shown = possible.Length <= MostPairs ? possible : [.. possible.OrderBy(c => c.Comparison.P!.Value).Take(MostPairs)];
        double[] ends = [0, .. shown.SelectMany(Ends)];
        return !FigureAxes.CanShow(ends.Min(), ends.Max())
            ? figure with { Alternative = $"No picture: the differences inside {plan.Code} run from {NumberText.Screen(ends.Min(), 6)} to {NumberText.Screen(ends.Max(), 6)}, which no axis can show to scale." }
            : figure with
            {
                Alternative = Say(detail, possible),
                Plot = Draw(plan, shown, ends.Min(), ends.Max()),
                PlotHeight = 100 + (RowHeight * shown.Length),
                Notes = [.. NotesOf(standing, detail, possible.Length, shown)],
            };
    }

    private static IEnumerable<double> Ends(ExperimentComparison c) =>
        new[] { c.Comparison.Difference, c.Comparison.Lower, c.Comparison.Upper, c.SelectedInterval?.Lower, c.SelectedInterval?.Upper }.OfType<double>().Where(double.IsFinite);

    private static PlotModel Draw(PlannedExperiment plan, ExperimentComparison[] shown, double low, double high)
    {
        PlotModel plot = FigureStyle.NewPlot();
        plot.Axes.Add(FigureAxes.Numbers(AxisPosition.Bottom, FigureAxes.WithUnit("difference of means", plan.Unit), low, high));
        plot.Axes.Add(FigureAxes.Names(AxisPosition.Left, "", [.. shown.Select(c => $"{c.GroupB} \u2212 {c.GroupA}")], WidestName));
        var zero = new Strokes("no difference", FigureStyle.Axis, 1, LineStyle.Dash) { Form = LegendForm.Upright };
        zero.Add(0, -0.5, 0, shown.Length - 0.5);
        var interval = new Strokes("simultaneous interval", FigureStyle.Text) { Form = LegendForm.Capped };
        var wider = new Strokes("interval after selection", FigureStyle.Third, 1.4, LineStyle.Dot);
        var claimed = new Marks("claimed", MarkerType.Diamond, FigureStyle.Survivor, size: 4.5);
        var other = new Marks("not claimed", MarkerType.Circle, FigureStyle.Other, isHollow: true, size: 3.5);
        for (int y = 0; y < shown.Length; y++)
        {
            GroupComparison c = shown[y].Comparison;
            if (c is { Lower: { } lower, Upper: { } upper } && double.IsFinite(lower) && double.IsFinite(upper))
            {
                interval.Add(lower, y, upper, y);
                interval.Add(lower, y - CapHeight, lower, y + CapHeight);
                interval.Add(upper, y - CapHeight, upper, y + CapHeight);
            }

            if (shown[y].SelectedInterval is { } selected && double.IsFinite(selected.Lower) && double.IsFinite(selected.Upper))
            {
                wider.Add(selected.Lower, y + WiderBelow, selected.Upper, y + WiderBelow);
            }

            (shown[y].Survives == true ? claimed : other).Add(c.Difference, y);
        }

        FigureStyle.Draw(plot, zero, wider, interval, claimed, other);
        return plot;
    }

    private static IEnumerable<string> NotesOf(CampaignStanding standing, ExperimentDetail detail, int possible, ExperimentComparison[] shown)
    {
        FollowUp? followUp = FollowUpRegistry.Find(detail.Result.Plan.FollowUp);
        yield return FormattableString.Invariant($"{followUp?.Name ?? detail.Result.Plan.FollowUp}: intervals hold together inside the experiment at {100 * (1 - standing.Campaign.Level.Value):0.###} %.");
        if (shown.Select(c => c.SelectedConfidence).FirstOrDefault(c => c is not null) is { } confidence)
        {
            yield return FormattableString.Invariant($"Dotted: intervals that also account for the selection of the experiment, at {100 * confidence:0.####} %.");
        }

        yield return detail.ComparisonGuarantee;
        if (shown.Length < possible)
        {
            yield return FormattableString.Invariant($"The {shown.Length} pairs with the smallest p of {possible} are drawn.");
        }

        if (possible < detail.Comparisons.Count)
        {
            yield return FormattableString.Invariant($"{detail.Comparisons.Count - possible} {(detail.Comparisons.Count - possible == 1 ? "pair cannot be compared and is" : "pairs cannot be compared and are")} left out.");
        }
    }

    private static string Say(ExperimentDetail detail, ExperimentComparison[] possible)
    {
        string unit = detail.Result.Plan.Unit.Length > 0 ? " " + detail.Result.Plan.Unit : "";
        ExperimentComparison[] claimed = [.. possible.Where(c => c.Survives == true)];
        ExperimentComparison widest = (claimed.Length > 0 ? claimed : possible).MaxBy(c => Math.Abs(c.Comparison.Difference))!;
        string interval = widest.Comparison is { Lower: { } lower, Upper: { } upper } ? $", interval from {NumberText.Screen(lower, 3)} to {NumberText.Screen(upper, 3)}" : "";
        PValue? adjusted = widest.AdjustedP;
        string p = adjusted is { } a ? $", adjusted p {NumberText.P(a)}" : "";
        return FormattableString.Invariant($"{FigureWords.Count(possible.Length, "pair of groups", "pairs of groups")}, {claimed.Length} claimed. The widest {(claimed.Length > 0 ? "claimed " : "")}difference is {widest.GroupB} less {widest.GroupA}: {NumberText.Screen(widest.Comparison.Difference, 3)}{unit}{interval}{p}.");
    }
}
