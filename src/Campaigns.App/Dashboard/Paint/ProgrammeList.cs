using System.Globalization;
using Campaigns.App.Commands;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Wording;
using Campaigns.Catalog.Plans;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints the campaigns of a catalog, a row each: what each holds, how far it is, and the risk so far as a small picture.</summary>
public static class ProgrammeList
{
    /// <summary>Rows above the first campaign.</summary>
    public const int HeaderRows = 1;

    private const int ShortestCode = 8;
    private const int LongestCode = 20;
    private const int Percent = 7;
    private const int ShortestSpark = 6;
    private const int LongestSpark = 24;
    private const int ShortestTitle = 12;

    /// <summary>Paints the list.</summary>
    /// <param name="campaigns">The campaigns.</param>
    /// <param name="open">Code of the open campaign.</param>
    /// <param name="selected">The selected row, from 0.</param>
    /// <param name="top">The first row shown, from 0.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="height">Rows, the names included.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(IReadOnlyList<CampaignAttention> campaigns, string open, int selected, int top, int width, int height, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(campaigns);
        ArgumentNullException.ThrowIfNull(glyphs);
        TextCanvas canvas = new(width, height);
        Columns columns = Place(campaigns, width);
        Header(canvas, columns);
        for (int y = HeaderRows; y < height && top + y - HeaderRows < campaigns.Count; y++)
        {
            int row = top + y - HeaderRows;
            Row(canvas, columns, campaigns[row], open, y, glyphs);
            if (row == selected)
            {
                canvas.InkRow(y, Ink.Selected);
            }
        }

        return canvas;
    }

    private static void Header(TextCanvas canvas, Columns c)
    {
        canvas.Write(0, 0, "campaign", Ink.Heading);
        canvas.Write(c.Needs, 0, "!", Ink.Heading);
        canvas.Write(c.Holds, 0, "holds", Ink.Heading);
        canvas.Write(c.Level, 0, "level", Ink.Heading);
        canvas.Write(c.By, 0, "by", Ink.Heading);
        canvas.WriteRight(c.TestedEnd, 0, "tested", Ink.Heading);
        canvas.WriteRight(c.HitsEnd, 0, "hits", Ink.Heading);
        canvas.WriteRight(c.SurviveEnd, 0, "survive", Ink.Heading);
        if (c.SparkWidth > 0)
        {
            canvas.Write(c.Spark, 0, CellText.Fit("risk so far", c.SparkWidth + 1 + Percent, ""), Ink.Heading);
        }

        if (c.TitleWidth > 0)
        {
            canvas.Write(c.Title, 0, "title", Ink.Heading);
        }
    }

    private static void Row(TextCanvas canvas, Columns c, CampaignAttention of, string open, int y, GlyphSet glyphs)
    {
        CampaignOverview overview = of.Overview;
        Campaign campaign = overview.Campaign;
        canvas.Write(0, y, CellText.Fit(campaign.Code, c.CodeWidth, glyphs.Cut));
        if (campaign.Code == open)
        {
            canvas.Put(c.CodeWidth, y, glyphs.Marked, Ink.Heading);
        }

        if (of.Count > 0)
        {
            canvas.Write(c.Needs, y, of.Count.ToString(CultureInfo.InvariantCulture), Ink.Warning);
        }

        canvas.Write(c.Holds, y, campaign.ErrorRate.Word());
        canvas.Write(c.Level, y, FamilyText.Level(campaign.Level));
        canvas.Write(c.By, y, campaign.Correction);
        canvas.WriteRight(c.TestedEnd, y, Tested(of));
        canvas.WriteRight(c.HitsEnd, y, Whole(overview.UncorrectedCount));
        canvas.WriteRight(c.SurviveEnd, y, Whole(overview.SurvivorCount), overview.SurvivorCount > 0 ? Ink.Survivor : Ink.Text);
        if (c.SparkWidth > 0)
        {
            canvas.Write(c.Spark, y, RiskSpark.Of(overview.TestedCount, campaign.Level, c.SparkWidth, glyphs), Ink.Mean);
            canvas.WriteRight(c.Spark + c.SparkWidth + Percent, y, RiskText(overview, glyphs));
        }

        if (c.TitleWidth > 0)
        {
            canvas.Write(c.Title, y, CellText.Fit(campaign.Title, c.TitleWidth, glyphs.Cut));
        }
    }

    /// <summary>Tested of planned, for example "40/48".</summary>
    private static string Tested(CampaignAttention of) => FormattableString.Invariant($"{of.Overview.TestedCount}/{of.Waiting.Planned}");

    private static string RiskText(CampaignOverview overview, GlyphSet glyphs) => overview.TestedCount == 0
        ? glyphs.None
        : Words.Percent(FamilyRisk.AtLeastOneIfIndependent(overview.TestedCount, overview.Campaign.Level)).Replace("more than ", ">", StringComparison.Ordinal);

    private static string Whole(int n) => n.ToString(CultureInfo.InvariantCulture);

    /// <summary>The widths come from all campaigns, so that they do not jump while rows pass. Code and picture give way first; the title is shown where all else has room.</summary>
    private static Columns Place(IReadOnlyList<CampaignAttention> all, int width)
    {
        int holds = Longest(all, a => a.Overview.Campaign.ErrorRate.Word(), "holds");
        int level = Longest(all, a => FamilyText.Level(a.Overview.Campaign.Level), "level");
        int by = Longest(all, a => a.Overview.Campaign.Correction, "by");
        int tested = Longest(all, Tested, "tested");
        int hits = Longest(all, a => Whole(a.Overview.UncorrectedCount), "hits");
        int survive = Longest(all, a => Whole(a.Overview.SurvivorCount), "survive");
        int longest = Math.Clamp(all.Count == 0 ? 0 : all.Max(a => CellText.Width(a.Overview.Campaign.Code)), ShortestCode, LongestCode);
        const int needs = 1;

        // The blank behind the code holds the sign of the open campaign.
        int fixedCells = needs + holds + level + by + tested + hits + survive + 8;
        int spare = width - fixedCells;
        int code = Math.Clamp(spare - ShortestSpark - 1 - Percent, ShortestCode, longest);
        int spark = Math.Clamp(spare - code - 1 - Percent, 0, LongestSpark);
        spark = spark < ShortestSpark ? 0 : spark;
        int title = spare - code - spark - 2 - Percent;
        int x = code + 1;
        var columns = new Columns { CodeWidth = code, Needs = x, Holds = x += needs + 1, Level = x += holds + 1, By = x += level + 1 };
        x += by;
        return columns with
        {
            TestedEnd = x += tested,
            HitsEnd = x += hits + 1,
            SurviveEnd = x += survive + 1,
            Spark = x += 2,
            SparkWidth = spark,
            Title = x + spark + Percent + 2,
            TitleWidth = title < ShortestTitle ? 0 : title,
        };
    }

    private static int Longest(IReadOnlyList<CampaignAttention> all, Func<CampaignAttention, string> text, string name) =>
        all.Aggregate(name.Length, (longest, a) => Math.Max(longest, text(a).Length));

    private sealed record Columns
    {
        public int CodeWidth { get; init; }

        public int Needs { get; init; }

        public int Holds { get; init; }

        public int Level { get; init; }

        public int By { get; init; }

        public int TestedEnd { get; init; }

        public int HitsEnd { get; init; }

        public int SurviveEnd { get; init; }

        public int Spark { get; init; }

        public int SparkWidth { get; init; }

        public int Title { get; init; }

        public int TitleWidth { get; init; }
    }
}
