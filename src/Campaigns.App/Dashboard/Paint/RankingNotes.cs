using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>The lines above and below the ranked p-values: what is shown under which assumption, what another level would change, and the selected experiment.</summary>
public static class RankingNotes
{
    /// <summary>Rows above the picture.</summary>
    public const int RowsAbove = 2;

    /// <summary>Rows below the picture and the row of levels.</summary>
    public const int RowsBelow = 3;

    /// <summary>What a level that is looked at changes in the catalog.</summary>
    public const string NothingStored = "exploration, nothing is stored";

    /// <summary>Paints the lines above: the sealed boundary, and what its correction supposes.</summary>
    /// <param name="model">The page's model.</param>
    /// <param name="procedure">The correction of the family shown; null where the program does not know it.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas PaintAbove(RankingModel model, ErrorProcedure? procedure, int width, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(model);
        ArgumentNullException.ThrowIfNull(glyphs);
        TextCanvas canvas = new(width, RowsAbove);
        FamilyStanding family = model.Family;
        bool hasFamilies = model.Standing.Families.Count > 1;
        string boundary = RankingPlot.BoundaryText(model.Ranking);
        string gate = family.IsOpen ? "" : $" ({glyphs.Warns} closed: none survives)";
        string first = hasFamilies
            ? string.Create(CultureInfo.InvariantCulture, $"Family {model.FamilyPlace + 1} of {model.Standing.Families.Count}, {family.Name}{gate}, level {FamilyText.Level(family.Level)}. {boundary}")
            : boundary;
        canvas.Write(1, 0, CellText.Fit(first, width - 1, glyphs.Cut), family.IsOpen ? Ink.Boundary : Ink.Warning);
        string assumes = procedure is null ? "" : $"{procedure.Name} {CampaignHeading.DependenceWords(procedure.ValidUnder)}.";
        string beside = string.Join(", ", model.Beside.Select(b => $"{b.Sign} {b.Line.Correction.Key}"));
        canvas.Write(1, 1, CellText.Fit(beside.Length > 0 ? $"{assumes} Beside: {beside}" : assumes, width - 1, glyphs.Cut), Ink.Quiet);
        return canvas;
    }

    /// <summary>Paints the lines below: another level, what the signs mean, the selected experiment.</summary>
    /// <param name="model">The page's model.</param>
    /// <param name="selected">The selected experiment; null for none.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas PaintBelow(RankingModel model, ExperimentResult? selected, int width, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(model);
        ArgumentNullException.ThrowIfNull(glyphs);
        TextCanvas canvas = new(width, RowsBelow);
        if (model.Exploration is { } explored)
        {
            canvas.Write(1, 0, CellText.Fit(ExplorationText(model, explored), width - 1, glyphs.Cut), Ink.Mean);
        }
        else if (model.WhyNoExploration is { } why)
        {
            canvas.Write(1, 0, CellText.Fit(why, width - 1, glyphs.Cut), Ink.Quiet);
        }

        canvas.Write(1, 1, CellText.Fit(RankingPlot.Key(model.Ranking, glyphs, RankingOverlay.Of(model)), width - 1, glyphs.Cut), Ink.Quiet);
        canvas.Write(1, 2, CellText.Fit(SelectedText(model, selected, glyphs), width - 1, glyphs.Cut), Ink.Heading);
        return canvas;
    }

    /// <summary>What another level would change, for example "exploration, nothing is stored: at 0.1 12 would survive (sealed: 8 at 0.05); gained 4: E7 ...; lost none".</summary>
    /// <param name="model">The page's model.</param>
    /// <param name="explored">The level.</param>
    public static string ExplorationText(RankingModel model, LevelExploration explored)
    {
        ArgumentNullException.ThrowIfNull(model);
        ArgumentNullException.ThrowIfNull(explored);
        CampaignStanding standing = model.Standing;
        return string.Create(CultureInfo.InvariantCulture,
            $"{NothingStored}: at {explored.Level} {explored.SurvivorCount} would survive (sealed: {standing.SurvivorCount} at {standing.Campaign.Level}); gained {Named(standing, explored.Gained)}; lost {Named(standing, explored.Lost)}");
    }

    private static string Named(CampaignStanding standing, HashSet<int> positions)
    {
        const int Most = 8;
        if (positions.Count == 0)
        {
            return "none";
        }

        string names = string.Join(" ", positions.Order().Take(Most).Select(i => standing.Experiments[i].Plan.Code));
        return string.Create(CultureInfo.InvariantCulture, $"{positions.Count}: {names}{(positions.Count > Most ? " ..." : "")}");
    }

    private static string SelectedText(RankingModel model, ExperimentResult? selected, GlyphSet glyphs)
    {
        if (selected is null)
        {
            return "";
        }

        if (model.Rank == 0 || selected.P is not { } p || selected.AdjustedP is not { } adjusted)
        {
            return $"{selected.Plan.Code}: {selected.Status.Sentence()}";
        }

        string boundary = selected.GivenLevel is { } given ? $", level given {NumberText.Screen(given, 3)}"
            : model.Ranking.BoundaryAt(model.Rank) is { } b ? $", boundary {NumberText.Screen(b, 3)}" : "";
        string survives = selected.Survives == true ? glyphs.Survivor + " survives" : glyphs.Other + " does not survive";
        return string.Create(CultureInfo.InvariantCulture, $"{selected.Plan.Code} {survives}: rank {model.Rank}, p {NumberText.P(p)}, adjusted {NumberText.P(adjusted)}{boundary}");
    }
}
