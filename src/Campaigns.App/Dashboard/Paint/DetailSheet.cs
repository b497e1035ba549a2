using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Output;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>A page that grows line by line, section by section, and is painted when complete.</summary>
/// <param name="width">Cells across.</param>
/// <param name="glyphs">The signs.</param>
internal sealed class DetailSheet(int width, GlyphSet glyphs)
{
    private const int Digits = 4;
    private readonly List<Action<TextCanvas, int>> _rows = [];

    /// <summary>Cells across.</summary>
    public int Width => width;

    /// <summary>The signs.</summary>
    public GlyphSet Glyphs => glyphs;

    /// <summary>A number as the sheet shows it: four digits that carry meaning.</summary>
    public static string Number(double value) => NumberText.Screen(value, Digits);

    /// <summary>A count.</summary>
    public static string Whole(int count) => count.ToString(CultureInfo.InvariantCulture);

    /// <summary>A number, or the sign for none.</summary>
    public string Number(double? value) => value is { } v ? Number(v) : glyphs.None;

    /// <summary>Adds a text, wrapped.</summary>
    /// <param name="text">Any text.</param>
    /// <param name="ink">Its meaning.</param>
    /// <param name="indent">Cells left free before every line.</param>
    public void Line(string text, Ink ink = Ink.Text, int indent = 0)
    {
        foreach (string line in CellText.Wrap(text, Math.Max(1, width - indent)))
        {
            _rows.Add((canvas, y) => canvas.Write(indent, y, line, ink));
        }
    }

    /// <summary>Adds a text with a sign before it; further lines stand below the text.</summary>
    public void Marked(string sign, string text, Ink ink)
    {
        int row = _rows.Count;
        Line(text, ink, indent: 2);
        if (row < _rows.Count)
        {
            Action<TextCanvas, int> words = _rows[row];
            _rows[row] = (canvas, y) =>
            {
                canvas.Write(0, y, sign, ink);
                words(canvas, y);
            };
        }
    }

    /// <summary>Adds an empty line and a heading.</summary>
    public void Title(string text)
    {
        Blank();
        Line(text, Ink.Heading);
    }

    /// <summary>Adds an empty line.</summary>
    public void Blank() => _rows.Add((_, _) => { });

    /// <summary>Adds a row of a table: a name cut to its column, and cells that end at the right of theirs.</summary>
    /// <param name="label">Cells for the name.</param>
    /// <param name="name">The name.</param>
    /// <param name="cells">Texts with the widths of their columns.</param>
    /// <param name="ink">Their meaning.</param>
    public void Row(int label, string name, IReadOnlyList<(string Text, int Width)> cells, Ink ink = Ink.Text)
    {
        _rows.Add((canvas, y) =>
        {
            canvas.Write(0, y, CellText.Fit(name, label, glyphs.Cut), ink);
            int end = label - 1;
            foreach ((string text, int cellWidth) in cells)
            {
                end += cellWidth;
                canvas.WriteRight(end, y, text, ink);
            }
        });
    }

    /// <summary>Adds a picture.</summary>
    public void Insert(TextCanvas picture)
    {
        for (int row = 0; row < picture.Height; row++)
        {
            int line = row;
            _rows.Add((canvas, y) =>
            {
                for (int x = 0; x < picture.Width; x++)
                {
                    canvas.Put(x, y, picture.SignAt(x, line), picture.InkAt(x, line));
                }
            });
        }
    }

    /// <summary>The whole, as high as it has become.</summary>
    public TextCanvas Painted()
    {
        TextCanvas canvas = new(width, _rows.Count);
        for (int y = 0; y < _rows.Count; y++)
        {
            _rows[y](canvas, y);
        }

        return canvas;
    }
}
