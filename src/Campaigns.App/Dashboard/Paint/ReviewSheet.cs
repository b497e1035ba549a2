using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints what lies between two reviews, and what stood behind the one at hand.</summary>
public static class ReviewSheet
{
    private const int MostShown = 200;

    /// <summary>Paints the sheet, as high as it needs.</summary>
    /// <param name="reviews">What is shown.</param>
    /// <param name="campaign">Code of the campaign.</param>
    /// <param name="isWaiting">Whether the comparison is put off until the keys stand still.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(ReviewsModel reviews, string campaign, bool isWaiting, int width, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(reviews);
        DetailSheet sheet = new(width, glyphs);
        if (reviews.Review < 0)
        {
            sheet.Line($"No review was taken yet; {StepNames.Keys(campaign).Review(campaign)} takes one.", Ink.Open);
            return sheet.Painted();
        }

        if (isWaiting)
        {
            sheet.Line("Comparing takes a moment; it begins when the keys stand still.", Ink.Quiet);
        }
        else if (reviews.Comparison() is { } found)
        {
            Between(sheet, found, campaign);
        }
        else
        {
            sheet.Line(reviews.Held is null ? "The first review: there is none before it to compare with." : "A review compared with itself: go to another one.", Ink.Quiet);
        }

        sheet.Title("what stood behind it");
        foreach (string sentence in ReviewRecordWording.Behind(reviews.Reviews[reviews.Review]))
        {
            sheet.Line(sentence);
        }

        return sheet.Painted();
    }

    /// <summary>An experiment at the review at hand, in one line: its p-values there.</summary>
    /// <param name="experiment">The experiment through all reviews.</param>
    /// <param name="review">The review.</param>
    /// <param name="place">Its place among all reviews, from 0.</param>
    /// <param name="glyphs">The signs.</param>
    public static string Line(ExperimentHistory experiment, ReviewHead review, int place, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(experiment);
        ArgumentNullException.ThrowIfNull(review);
        ArgumentNullException.ThrowIfNull(glyphs);
        return experiment.Lines[place] is not { } line
            ? FormattableString.Invariant($"{experiment.Code} in review {review.Number}: {glyphs.Open} no line, since it had no result that counted then")
            : FormattableString.Invariant($"{experiment.Code} in review {review.Number}: {(line.Survives ? glyphs.Survivor + " survives" : glyphs.Other + " does not survive")}, {Numbers(line)}");
    }

    private static void Between(DetailSheet sheet, ReviewDifferences found, string campaign)
    {
        ReviewComparison comparison = found.Comparison;
        sheet.Line(ReviewWording.Summary(comparison), Ink.Heading);
        foreach ((string experiment, ReviewDifference d) in found.Differences.Take(MostShown))
        {
            string sign = d.IsGained ? "+" : "-";
            sheet.Marked(sign, $"{experiment} {(d.IsGained ? "gained" : "lost")}: {ReviewWording.Why(d)} ({Numbers(d)})", d.IsGained ? Ink.Survivor : Ink.Warning);
        }

        if (found.Differences.Count > MostShown)
        {
            sheet.Line(FormattableString.Invariant($"and {found.Differences.Count - MostShown} more; 'campaigns reviews {campaign} --compare {comparison.Before.Head.Number} {comparison.After.Head.Number} --top 0' lists all."), Ink.Quiet);
        }

        foreach (string sentence in ReviewWording.Counts(comparison))
        {
            sheet.Line(sentence);
        }

        if (!comparison.NothingChanged)
        {
            sheet.Line(ReviewWording.Sealed(comparison), Ink.Quiet);
        }
    }

    private static string Numbers(ReviewLine line) => $"p {NumberText.P(line.P)}, adjusted {NumberText.P(line.AdjustedP)}";

    private static string Numbers(ReviewDifference d) => $"adjusted {P(d.Before?.AdjustedP)} before, {P(d.After?.AdjustedP)} after";

    private static string P(PValue? p) => p is { } given ? NumberText.P(given) : "none";
}
