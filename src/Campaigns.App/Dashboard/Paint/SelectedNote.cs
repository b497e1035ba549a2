using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Output;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Paints two lines on the selected experiment, below a list that cuts its title and its reason.</summary>
public static class SelectedNote
{
    /// <summary>Paints the lines.</summary>
    /// <param name="selected">The experiment; null for none.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="height">Rows.</param>
    /// <param name="glyphs">The signs.</param>
    public static TextCanvas Paint(ExperimentResult? selected, int width, int height, GlyphSet glyphs)
    {
        TextCanvas canvas = new(width, height);
        if (selected is null)
        {
            return canvas;
        }

        string name = selected.Plan.Title.Length > 0 ? selected.Plan.Code + ": " + selected.Plan.Title : selected.Plan.Code;
        canvas.Write(1, 0, CellText.Fit(name, width - 1, glyphs.Cut), Ink.Heading);
        (string sentence, Ink ink) = Standing(selected, glyphs);
        if (selected.Amendments.Count > 0)
        {
            sentence += "; amended after the test";
            ink = Ink.Warning;
        }

        canvas.Write(1, 1, CellText.Fit(sentence, width - 1, glyphs.Cut), ink);
        return canvas;
    }

    private static (string Sentence, Ink Ink) Standing(ExperimentResult selected, GlyphSet glyphs)
    {
        if (selected is not { P: { } p, AdjustedP: { } adjusted, Survives: { } survives })
        {
            return (glyphs.Open + " " + selected.Status.Sentence(), Ink.Open);
        }

        string numbers = $"p {NumberText.P(p)}, adjusted {NumberText.P(adjusted)}";
        return survives ? ($"{glyphs.Survivor} survives: {numbers}", Ink.Survivor) : ($"{glyphs.Other} does not survive: {numbers}", Ink.Text);
    }
}
