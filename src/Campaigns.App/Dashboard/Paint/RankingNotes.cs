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
    /// <param name="hasFamilies">Whether the campaign has several families: the one shown takes a row.</param>
    public static int RowsAbove(bool hasFamilies) => hasFamilies ? 4 : 3;

    /// <summary>Rows between the picture and the row of levels, where there is something to say of another level.</summary>
    public const int RowsOnLevel = 2;

    /// <summary>Rows below the row of levels.</summary>
    public const int RowsBelow = 2;

    /// <summary>What a level that is looked at changes in the catalog.</summary>
    public const string NothingStored = "exploration, nothing is stored";

    /// <summary>Paints the lines above: the family, the sealed boundary, what its correction supposes, and what the letters beside it are.</summary>
    /// <param name="model">The page's model.</param>
    /// <param name="procedure">The correction of the family shown; null where the program does not know it.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas PaintAbove(RankingModel model, ErrorProcedure? procedure, int width, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(model);
        ArgumentNullException.ThrowIfNull(glyphs);
        FamilyStanding family = model.Family;
        bool hasFamilies = model.Standing.Families.Count > 1;
        TextCanvas canvas = new(width, RowsAbove(hasFamilies));
        string assumes = procedure is null ? "" : $"{procedure.Name} {CampaignHeading.DependenceWords(procedure.ValidUnder)}.";
        string gate = family.IsOpen ? "" : $" ({glyphs.Warns} closed: none survives)";
        string which = string.Create(CultureInfo.InvariantCulture, $"Family {model.FamilyPlace + 1} of {model.Standing.Families.Count}, {family.Name}{gate}, level {FamilyText.Level(family.Level)}.");
        string boundary = RankingPlot.BoundaryText(model.Ranking);
        string beside = string.Join(", ", model.Beside.Select(b => $"{b.Sign} {b.Line.Correction.Key}"));
        if (hasFamilies)
        {
            Line(0, which, family.IsOpen ? Ink.Heading : Ink.Warning);
        }

        int first = canvas.Height - 3;
        Line(first, boundary, family.IsOpen ? Ink.Boundary : Ink.Warning);
        Line(first + 1, assumes, Ink.Quiet);
        canvas.Write(1, first + 2, beside.Length == 0 ? "" : CellText.FirstThatFits(width - 1, glyphs.Cut, "Beside it, deciding nothing: " + beside, "Deciding nothing: " + beside), Ink.Quiet);
        return canvas;

        void Line(int y, string text, Ink ink) => canvas.Write(1, y, CellText.Fit(text, width - 1, glyphs.Cut), ink);
    }

    /// <summary>Paints what another level would change, or why none can be looked at.</summary>
    /// <param name="model">The page's model.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas PaintOnLevel(RankingModel model, int width, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(model);
        ArgumentNullException.ThrowIfNull(glyphs);
        TextCanvas canvas = new(width, RowsOnLevel);
        string level = model.Exploration is { } explored ? ExplorationText(model, explored, glyphs) : model.WhyNoExploration ?? "";
        IReadOnlyList<string> lines = CellText.Wrap(level, Math.Max(20, width - 2));
        for (int i = 0; i < Math.Min(RowsOnLevel, lines.Count); i++)
        {
            bool isCut = i == RowsOnLevel - 1 && lines.Count > RowsOnLevel;
            canvas.Write(1, i, isCut ? CellText.Fit(lines[i] + " " + lines[i + 1], width - 2, glyphs.Cut) : lines[i], model.Exploration is null ? Ink.Quiet : Ink.Mean);
        }

        return canvas;
    }

    /// <summary>Paints the lines below: what the signs mean, and the selected experiment.</summary>
    /// <param name="model">The page's model.</param>
    /// <param name="selected">The selected experiment; null for none.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas PaintBelow(RankingModel model, ExperimentResult? selected, int width, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(model);
        ArgumentNullException.ThrowIfNull(glyphs);
        TextCanvas canvas = new(width, RowsBelow);
        canvas.Write(1, 0, CellText.FirstThatFits(width - 1, glyphs.Cut, RankingPlot.Key(model.Ranking, glyphs, RankingOverlay.Of(model))), Ink.Quiet);
        canvas.Write(1, 1, CellText.FirstThatFits(width - 1, glyphs.Cut, SelectedText(model, selected, glyphs)), Ink.Heading);
        return canvas;
    }

    /// <summary>What another level would change, for example "exploration, nothing is stored: at 0.1 12 would survive (sealed: 8 at 0.05); + gained 4: E7 ...; ◈ lost none".</summary>
    /// <param name="model">The page's model.</param>
    /// <param name="explored">The level.</param>
    /// <param name="glyphs">The signs: those of gained and lost stand in the picture.</param>
    public static string ExplorationText(RankingModel model, LevelExploration explored, GlyphSet glyphs)
    {
        ArgumentNullException.ThrowIfNull(model);
        ArgumentNullException.ThrowIfNull(explored);
        ArgumentNullException.ThrowIfNull(glyphs);
        CampaignStanding standing = model.Standing;
        return string.Create(CultureInfo.InvariantCulture,
            $"{NothingStored}: at {explored.Level} {explored.SurvivorCount} would survive (sealed: {standing.SurvivorCount} at {standing.Campaign.Level}); {glyphs.Gained} gained {Named(standing, explored.Gained)}; {glyphs.Lost} lost {Named(standing, explored.Lost)}");
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

    /// <summary>The selected experiment; the verdict comes first, and the boundary is given up before it: the picture shows it.</summary>
    private static IReadOnlyList<string> SelectedText(RankingModel model, ExperimentResult? selected, GlyphSet glyphs)
    {
        if (selected is null)
        {
            return [""];
        }

        if (model.Rank == 0 || selected.P is not { } p || selected.AdjustedP is not { } adjusted)
        {
            return [$"{selected.Plan.Code}: {selected.Status.Sentence()}"];
        }

        string boundary = selected.GivenLevel is { } given ? $", level given {NumberText.Screen(given, 3)}"
            : model.Ranking.BoundaryAt(model.Rank) is { } b ? $", boundary {NumberText.Screen(b, 3)}" : "";
        (string sign, string survives) = selected.Survives == true ? (glyphs.Survivor, "survives") : (glyphs.Other, "does not survive");
        string mark = model.IsSelectedMarked ? glyphs.Marked : "";
        string verdict = $"{selected.Plan.Code}{mark} {sign} {survives}", numbers = string.Create(CultureInfo.InvariantCulture, $"rank {model.Rank}, p {NumberText.P(p)}, adjusted {NumberText.P(adjusted)}");
        return [$"{verdict}: {numbers}{boundary}", $"{verdict}: {numbers}"];
    }
}
