using System.Globalization;
using Campaigns.App.Wording;
using Campaigns.Domain;
using OxyPlot;
using OxyPlot.Axes;

namespace Campaigns.App.Figures;

/// <summary>Survivors and tested experiments, review by review.</summary>
internal static class ReviewsFigure
{
    /// <summary>Its key.</summary>
    public const string Key = "reviews";

    private const int MostLabels = 6;
    private const int MostMarks = 120;

    /// <summary>Makes the figure.</summary>
    /// <param name="standing">The campaign.</param>
    /// <param name="reviews">Its reviews, oldest first.</param>
    public static Figure Of(CampaignStanding standing, IReadOnlyList<ReviewHead> reviews)
    {
        var figure = new Figure(Key, $"{standing.Campaign.Code}: survivors from review to review", "");
        if (reviews.Count == 0)
        {
            return figure with { Alternative = $"No picture: no review of {standing.Campaign.Code} was taken yet; 'campaigns review {standing.Campaign.Code}' takes one." };
        }

        var survivors = new Marks("survivors", MarkerType.Diamond, FigureStyle.Survivor, size: 4.5);
        var tested = new Marks("tested", MarkerType.Circle, FigureStyle.Other, isHollow: true, size: 3.5);
        var interim = new Marks("interim: tested experiments alone counted", MarkerType.Square, FigureStyle.Control, isHollow: true, size: 6.5);
        var survivorLine = new Strokes("from review to review, survivors", FigureStyle.Survivor) { RenderInLegend = false };
        var testedLine = new Strokes("from review to review, tested", FigureStyle.Other, 1.2, LineStyle.Dash) { RenderInLegend = false };
        for (int i = 0; i < reviews.Count; i++)
        {
            ReviewHead review = reviews[i];
            survivorLine.Add(i, review.SurvivorCount);
            testedLine.Add(i, review.TestedCount);
            if (reviews.Count <= MostMarks)
            {
                survivors.Add(i, review.SurvivorCount);
                tested.Add(i, review.TestedCount);
            }

            if (review.IsInterim)
            {
                interim.Add(i, review.SurvivorCount);
            }
        }

        (survivorLine.RenderInLegend, testedLine.RenderInLegend) = (reviews.Count > MostMarks, reviews.Count > MostMarks);
        PlotModel plot = FigureStyle.NewPlot();
        plot.Axes.Add(Dates(reviews));
        plot.Axes.Add(FigureAxes.Counts(AxisPosition.Left, "experiments", 0, Math.Max(1, reviews.Max(r => r.TestedCount)) * 1.08));
        FigureStyle.Draw(plot, testedLine, survivorLine, interim, tested, survivors);
        return figure with { Alternative = Say(reviews), Plot = plot, Notes = [FigureWords.Procedure(standing), "The gap from one review to the next tells nothing of the time between them; the dates do."] };
    }

    /// <summary>Reviews stand evenly, each with its number and day: two may be of one minute, and the next of another year.</summary>
    private static LinearAxis Dates(IReadOnlyList<ReviewHead> reviews)
    {
        int step = (reviews.Count + MostLabels - 1) / MostLabels;
        LinearAxis axis = FigureAxes.Counts(AxisPosition.Bottom, "review", -0.5, reviews.Count - 0.5);
        axis.MajorStep = step;
        axis.MajorGridlineStyle = LineStyle.None;
        axis.LabelFormatter = value => Math.Round(value) is >= 0 and var at && at < reviews.Count && Math.Abs(value - at) < 1e-6
            ? string.Create(CultureInfo.InvariantCulture, $"{reviews[(int)at].Number}\n{reviews[(int)at].At:yyyy-MM-dd}")
            : "";
        return axis;
    }

    private static string Say(IReadOnlyList<ReviewHead> reviews) => reviews.Count == 1
        ? $"{ReviewWording.Line(reviews[0])}."
        : FormattableString.Invariant($"{reviews.Count} reviews, survivors from {reviews.Min(r => r.SurvivorCount)} to {reviews.Max(r => r.SurvivorCount)}. {ReviewWording.Line(reviews[0])}. {ReviewWording.Line(reviews[^1])}.");
}
