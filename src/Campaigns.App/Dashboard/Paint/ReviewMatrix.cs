using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints which experiment survived in which review: a row an experiment, a column a review with its day and figures above.</summary>
public static class ReviewMatrix
{
    private const string Taken = "taken", Time = "at, UTC", Survive = "survive", Tested = "tested", Family = "family";
    private const int ColumnWidth = 11;
    private const int ShortestCode = 10;
    private const int LongestCode = 16;

    /// <summary>Rows above the first experiment: number, day, where two reviews share a day also the time, survivors, tested, family.</summary>
    /// <param name="reviews">What is shown.</param>
    public static int HeaderRows(ReviewsModel reviews) => NamesOf(reviews).Length;

    /// <summary>How many reviews there is room for.</summary>
    /// <param name="reviews">What is shown.</param>
    /// <param name="width">Cells across.</param>
    public static int Room(ReviewsModel reviews, int width) => Math.Max(1, (width - CodeWidth(reviews) - 1) / ColumnWidth);

    /// <summary>The review whose column stands at a cell; null beside all.</summary>
    /// <param name="reviews">What is shown.</param>
    /// <param name="first">The first review shown, from 0.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="at">Cell from 0.</param>
    public static int? ReviewAt(ReviewsModel reviews, int first, int width, int at)
    {
        ArgumentNullException.ThrowIfNull(reviews);
        int place = at - CodeWidth(reviews) - 1;
        int review = first + (place / ColumnWidth);
        return place < 0 || place / ColumnWidth >= Room(reviews, width) || review >= reviews.Reviews.Count ? null : review;
    }

    /// <summary>Paints the matrix.</summary>
    /// <param name="reviews">What is shown.</param>
    /// <param name="first">The first review shown, from 0.</param>
    /// <param name="top">The first row shown, from 0.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="height">Rows, those above the experiments included.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(ReviewsModel reviews, int first, int top, int width, int height, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(reviews);
        ArgumentNullException.ThrowIfNull(glyphs);
        TextCanvas canvas = new(width, height);
        if (reviews.Reviews.Count == 0)
        {
            return canvas;
        }

        int code = CodeWidth(reviews);
        int last = Math.Min(reviews.Reviews.Count, first + Room(reviews, width));
        string[] names = NamesOf(reviews);
        int header = names.Length;
        for (int y = 0; y < names.Length; y++)
        {
            canvas.Write(0, y, names[y], Ink.Heading);
        }

        for (int review = first; review < last; review++)
        {
            Head(canvas, reviews, review, code + 1 + ((review - first) * ColumnWidth), names, glyphs);
        }

        IReadOnlyList<ExperimentHistory> rows = reviews.Rows;
        for (int y = header; y < height && top + y - header < rows.Count; y++)
        {
            ExperimentHistory experiment = rows[top + y - header];
            canvas.Write(0, y, CellText.Fit(experiment.Code, code, glyphs.Cut));
            for (int review = first; review < last; review++)
            {
                bool? survives = experiment.Lines[review]?.Survives;
                Ink ink = survives switch { true => Ink.Survivor, false => Ink.Text, null => Ink.Open };
                canvas.Write(code + 1 + ((review - first) * ColumnWidth), y, ListPainter.SurvivalText(survives, glyphs), ink);
            }

            if (top + y - header == reviews.Row)
            {
                canvas.InkRow(y, Ink.Selected);
            }
        }

        if (rows.Count == 0 && height > header)
        {
            IReadOnlyList<string> lines = CellText.Wrap("No experiment survives in one review and not in another; c shows all.", Math.Max(1, width - 2));
            for (int i = 0; i < lines.Count && header + i < height; i++)
            {
                canvas.Write(1, header + i, lines[i], Ink.Open);
            }
        }

        return canvas;
    }

    private static void Head(TextCanvas canvas, ReviewsModel reviews, int review, int x, string[] names, GlyphSet glyphs)
    {
        ReviewHead head = reviews.Reviews[review].Head;
        string number = head.Number.ToString(CultureInfo.InvariantCulture);
        bool isHere = review == reviews.Review;

        // The review at hand stands in brackets, like the name of the page at hand.
        int end = canvas.Write(x, 0, isHere ? $"[{number}]" : number, Ink.Heading);
        if (review == reviews.Held)
        {
            canvas.Put(end, 0, glyphs.Marked, Ink.Heading);
        }

        for (int y = 1; y < names.Length; y++)
        {
            int after = canvas.Write(x, y, Figure(head, names[y]), isHere && y == 1 ? Ink.Heading : Ink.Text);
            if (names[y] == Family && head.IsInterim)
            {
                canvas.Put(after, y, glyphs.Warns, Ink.Warning);
            }
        }
    }

    private static string Figure(ReviewHead head, string name) => name switch
    {
        Taken => head.At.UtcDateTime.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture),
        Time => head.At.UtcDateTime.ToString("HH:mm", CultureInfo.InvariantCulture),
        Survive => head.SurvivorCount.ToString(CultureInfo.InvariantCulture),
        Tested => head.TestedCount.ToString(CultureInfo.InvariantCulture),
        _ => head.FamilySize.ToString(CultureInfo.InvariantCulture),
    };

    private static string[] NamesOf(ReviewsModel reviews)
    {
        ArgumentNullException.ThrowIfNull(reviews);
        IReadOnlyList<ReviewRecord> all = reviews.Reviews;
        for (int i = 1; i < all.Count; i++)
        {
            if (all[i].Head.At.UtcDateTime.Date == all[i - 1].Head.At.UtcDateTime.Date)
            {
                return ["review", Taken, Time, Survive, Tested, Family];
            }
        }

        return ["review", Taken, Survive, Tested, Family];
    }

    private static int CodeWidth(ReviewsModel reviews)
    {
        // The first rows tell how long codes are; measuring all at every stroke would be felt.
        const int asked = 200;
        IReadOnlyList<ExperimentHistory> rows = reviews.Rows;
        int longest = ShortestCode;
        for (int i = 0; i < Math.Min(asked, rows.Count); i++)
        {
            longest = Math.Max(longest, CellText.Width(rows[i].Code));
        }

        return Math.Min(longest, LongestCode);
    }
}
