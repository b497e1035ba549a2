using System.Globalization;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.GroupTests;
using OxyPlot;
using OxyPlot.Axes;

namespace Campaigns.App.Figures;

/// <summary>Every observation of an experiment by group, with the mean of each group and its interval.</summary>
internal static class ObservationsFigure
{
    /// <summary>Its key.</summary>
    public const string Key = "observations";

    /// <summary>Groups that are drawn at most.</summary>
    public const int MostGroups = 80;

    private const double RowHeight = 44;
    private const double LowRowHeight = 18;
    private const int HighRows = 12;
    private const double WidestName = 120;
    private const double CapHeight = 0.09;

    /// <summary>Makes the figure.</summary>
    /// <param name="standing">The campaign.</param>
    /// <param name="detail">The experiment.</param>
    /// <param name="observations">Its observations, the excluded ones among them.</param>
    public static Figure Of(CampaignStanding standing, ExperimentDetail detail, IReadOnlyList<TracedObservation> observations)
    {
        PlannedExperiment plan = detail.Result.Plan;
        var figure = new Figure(Key, $"{plan.Code}: {(plan.Response.Length > 0 ? plan.Response : "values")} by group", "");
        if (observations.Count == 0)
        {
            return figure with { Alternative = $"No picture: {plan.Code} has no values yet." };
        }

        GroupDetail[] groups = [.. detail.Groups.Take(MostGroups)];
        HashSet<string> drawn = [.. groups.Select(g => g.Label)];
        TracedObservation[] shown = [.. observations.Where(o => drawn.Contains(o.Group))];
        double[] numbers = [.. shown.Select(o => o.Number), .. groups.SelectMany(g => new[] { g.Summary.Lower, g.Summary.Upper }.OfType<double>()).Where(double.IsFinite)];
        if (!FigureAxes.CanShow(numbers.Min(), numbers.Max()))
        {
            return figure with { Alternative = $"No picture: the values of {plan.Code} run from {NumberText.Screen(numbers.Min(), 6)} to {NumberText.Screen(numbers.Max(), 6)}, which no axis can show to scale." };
        }

        DotField field = DotField.Of(groups, shown);
        return figure with
        {
            Alternative = Say(detail, groups, observations),
            Plot = Draw(detail, groups, field, numbers.Min(), numbers.Max()),
            PlotHeight = 96 + (groups.Length * (groups.Length > HighRows ? LowRowHeight : RowHeight)),
            Notes = [.. NotesOf(standing, detail, field)],
        };
    }

    private static PlotModel Draw(ExperimentDetail detail, GroupDetail[] groups, DotField field, double low, double high)
    {
        PlannedExperiment plan = detail.Result.Plan;
        PlotModel plot = FigureStyle.NewPlot();
        plot.Axes.Add(FigureAxes.Numbers(AxisPosition.Bottom, FigureAxes.WithUnit(plan.Response.Length > 0 ? plan.Response : "value", plan.Unit), low, high));
        plot.Axes.Add(FigureAxes.Names(AxisPosition.Left, "", [.. groups.Select(g => g.Label)], WidestName));
        var readings = new Strokes("readings of one specimen", FigureStyle.Other, 0.8);
        var values = new Marks("value", MarkerType.Circle, FigureStyle.Other, size: 2.2);
        var excluded = new Marks("excluded value", MarkerType.Circle, FigureStyle.Boundary, isHollow: true, size: 2.8);
        field.Fill(values, excluded, readings);
        var interval = new Strokes("interval", FigureStyle.Text);
        var mean = new Marks("mean with interval", MarkerType.Diamond, FigureStyle.Survivor, size: 4.5);
        var control = new Marks("mean of the control", MarkerType.Square, FigureStyle.Control, size: 4);
        interval.RenderInLegend = false;
        for (int g = 0; g < groups.Length; g++)
        {
            GroupSummary s = groups[g].Summary;
            double y = g + DotField.MeanBelow;
            if (s is { Lower: { } lower, Upper: { } upper } && double.IsFinite(lower) && double.IsFinite(upper))
            {
                interval.Add(lower, y, upper, y);
                interval.Add(lower, y - CapHeight, lower, y + CapHeight);
                interval.Add(upper, y - CapHeight, upper, y + CapHeight);
            }

            if (s.Mean is { } at && double.IsFinite(at))
            {
                (groups[g].IsControl ? control : mean).Add(at, y);
            }
        }

        FigureStyle.Draw(plot, readings, values, excluded, interval, mean, control);
        return plot;
    }

    private static IEnumerable<string> NotesOf(CampaignStanding standing, ExperimentDetail detail, DotField field)
    {
        ExperimentResult result = detail.Result;
        string test = GroupTestRegistry.Find(result.Plan.Test)?.Name ?? result.Plan.Test;
        yield return result is { P: { } p, AdjustedP: { } adjusted, Survives: { } survives }
            ? $"{test}: p {NumberText.P(p)}, adjusted {NumberText.P(adjusted)}; {(survives ? "survives" : "does not survive")} ({Commands.CampaignText.Goal(standing.Campaign)})."
            : $"{test}: {result.Status.Sentence()}.";
        if (ExperimentWording.MeanIntervals(detail) is { } intervals)
        {
            yield return intervals;
        }

        if (field.HasReadings)
        {
            yield return "Several readings of one specimen are averaged first: means and intervals are of specimens." + (field.IsThinned ? "" : " A thin line joins the readings of one.");
        }

        if (field.IsThinned)
        {
            yield return string.Create(CultureInfo.InvariantCulture, $"{field.Total} values lie too close for a dot each; {field.Drawn} dots stand for them, each for the values at its place.");
        }

        if (detail.Groups.Count > MostGroups)
        {
            yield return string.Create(CultureInfo.InvariantCulture, $"The first {MostGroups} of {detail.Groups.Count} groups are drawn.");
        }
    }

    private static string Say(ExperimentDetail detail, GroupDetail[] groups, IReadOnlyList<TracedObservation> observations)
    {
        ExperimentResult result = detail.Result;
        string unit = result.Plan.Unit.Length > 0 ? " " + result.Plan.Unit : "";
        int excluded = observations.Count(o => o.IsExcluded);
        string values = FormattableString.Invariant($"{observations.Count - excluded} values in {detail.Groups.Count} groups{(excluded > 0 ? $", and {excluded} excluded" : "")}.");
        GroupDetail[] ranked = [.. groups.Where(g => g.Summary.Mean is { } m && double.IsFinite(m)).OrderBy(g => g.Summary.Mean)];
        string means = ranked.Length switch
        {
            0 => "",
            1 => $" The only mean is {NumberText.Screen(ranked[0].Summary.Mean!.Value, 4)}{unit}, of {ranked[0].Label}.",
            _ => $" Group means go from {NumberText.Screen(ranked[0].Summary.Mean!.Value, 4)}{unit} ({ranked[0].Label}) to {NumberText.Screen(ranked[^1].Summary.Mean!.Value, 4)}{unit} ({ranked[^1].Label}).",
        };
        string control = groups.FirstOrDefault(g => g.IsControl) is { Summary.Mean: { } m } c && double.IsFinite(m) ? $" The mean of the control{(c.Label == "control" ? "" : $" ({c.Label})")} is {NumberText.Screen(m, 4)}{unit}." : "";
        string verdict = result is { P: { } p, AdjustedP: { } adjusted, Survives: { } survives }
            ? $" p is {NumberText.P(p)}, adjusted {NumberText.P(adjusted)}: the experiment {(survives ? "survives" : "does not survive")}."
            : $" Status: {result.Status.Sentence()}.";
        return values + means + control + verdict;
    }
}
