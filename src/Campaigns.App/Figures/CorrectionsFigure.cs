using Campaigns.App.Commands;
using Campaigns.App.Wording;
using Campaigns.Domain;
using OxyPlot;
using OxyPlot.Annotations;
using OxyPlot.Axes;

namespace Campaigns.App.Figures;

/// <summary>How many experiments survive under each correction, side by side.</summary>
internal static class CorrectionsFigure
{
    /// <summary>Its key.</summary>
    public const string Key = "corrections";

    private const double RowHeight = 22;
    private const double WidestName = 190;

    /// <summary>Makes the figure.</summary>
    /// <param name="standing">The campaign.</param>
    public static Figure Of(CampaignStanding standing)
    {
        var figure = new Figure(Key, $"{standing.Campaign.Code}: survivors under every correction", "");
        if (standing.TestedCount == 0)
        {
            return figure with { Alternative = FigureWords.NothingTested(standing) };
        }

        IReadOnlyList<CorrectionOutcome> outcomes = CorrectionsBeside.Of(standing);
        return figure with
        {
            Alternative = Say(standing, outcomes),
            Plot = Draw(standing, outcomes),
            PlotHeight = 100 + (RowHeight * outcomes.Count),
            Notes =
            [
                "Diamond: the sealed correction, which alone decides; circles: what others would give, under assumptions of their own. Choosing another after seeing this would undo what a correction is for.",
                FigureWords.Procedure(standing),
            ],
        };
    }

    private static int Survivors(CampaignStanding standing, CorrectionOutcome outcome) => outcome.IsSealed ? standing.SurvivorCount : outcome.SurvivorCount;

    private static string Name(CampaignStanding standing, CorrectionOutcome outcome) => outcome.IsMixed ? FamilyText.Procedures(standing.Campaign) : outcome.Procedure.Name;

    private static PlotModel Draw(CampaignStanding standing, IReadOnlyList<CorrectionOutcome> outcomes)
    {
        int most = Math.Max(1, outcomes.Max(o => Survivors(standing, o)));
        PlotModel plot = FigureStyle.NewPlot();
        plot.Axes.Add(FigureAxes.Counts(AxisPosition.Bottom, $"survivors among {FigureWords.Count(standing.TestedCount, "tested experiment", "tested experiments")}", 0, most * 1.12));
        plot.Axes.Add(FigureAxes.Names(AxisPosition.Left, "", [.. outcomes.Select(o => Name(standing, o))], WidestName));
        var stems = new Strokes("stem", FigureStyle.Axis, 1) { RenderInLegend = false };
        var chosen = new Marks("sealed", MarkerType.Diamond, FigureStyle.Survivor, size: 5);
        var others = new Marks("for comparison", MarkerType.Circle, FigureStyle.Other, isHollow: true, size: 4);
        for (int y = 0; y < outcomes.Count; y++)
        {
            int count = Survivors(standing, outcomes[y]);
            stems.Add(0, y, count, y);
            (outcomes[y].IsSealed ? chosen : others).Add(count, y);
            plot.Annotations.Add(new TextAnnotation
            {
                Text = FormattableString.Invariant($"{count}"),
                TextPosition = new DataPoint(count, y),
                TextHorizontalAlignment = HorizontalAlignment.Left,
                TextVerticalAlignment = VerticalAlignment.Middle,
                Offset = new ScreenVector(9, 0),
                StrokeThickness = 0,
                TextColor = FigureStyle.Text,
                FontSize = FigureStyle.LetterSize - 1,
            });
        }

        FigureStyle.Draw(plot, stems, others, chosen);
        return plot;
    }

    private static string Say(CampaignStanding standing, IReadOnlyList<CorrectionOutcome> outcomes)
    {
        IEnumerable<string> others = outcomes.Where(o => !o.IsSealed).Select(o => FormattableString.Invariant($"{o.Procedure.Name} {Survivors(standing, o)}"));
        return $"{FigureWords.Survivors(standing)} That is by the sealed correction ({CampaignText.Goal(standing.Campaign)}); the others would give: {string.Join(", ", others)}.";
    }
}
