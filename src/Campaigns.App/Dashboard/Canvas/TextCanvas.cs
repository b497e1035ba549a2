using System.Text;

namespace Campaigns.App.Dashboard.Canvas;

/// <summary>A grid of terminal cells, each with a sign and an <see cref="Ink"/>. What falls outside is left out without a word.</summary>
public sealed class TextCanvas
{
    private const char DotsBase = '\u2800';
    private readonly string[] _signs;
    private readonly Ink[] _inks;

    /// <summary>Makes an empty canvas.</summary>
    /// <param name="width">Cells across; below 0 counts as 0.</param>
    /// <param name="height">Rows; below 0 counts as 0.</param>
    public TextCanvas(int width, int height)
    {
        Width = Math.Max(0, width);
        Height = Math.Max(0, height);
        _signs = new string[Width * Height];
        _inks = new Ink[Width * Height];
        Array.Fill(_signs, " ");
    }

    /// <summary>Cells across.</summary>
    public int Width { get; }

    /// <summary>Rows.</summary>
    public int Height { get; }

    /// <summary>The sign in a cell; empty for the second cell of a wide sign.</summary>
    /// <param name="x">Column from 0.</param>
    /// <param name="y">Row from 0.</param>
    public string SignAt(int x, int y) => _signs[(y * Width) + x];

    /// <summary>The ink of a cell.</summary>
    /// <param name="x">Column from 0.</param>
    /// <param name="y">Row from 0.</param>
    public Ink InkAt(int x, int y) => _inks[(y * Width) + x];

    /// <summary>Puts a sign of one cell.</summary>
    /// <param name="x">Column from 0.</param>
    /// <param name="y">Row from 0.</param>
    /// <param name="sign">A sign that takes one cell.</param>
    /// <param name="ink">Its meaning.</param>
    public void Put(int x, int y, string sign, Ink ink)
    {
        if (Holds(x, y))
        {
            _signs[(y * Width) + x] = sign;
            _inks[(y * Width) + x] = ink;
        }
    }

    /// <summary>Writes a text to the right, made safe and cut at the edge.</summary>
    /// <param name="x">Column of its first cell.</param>
    /// <param name="y">Row.</param>
    /// <param name="text">Any text.</param>
    /// <param name="ink">Its meaning.</param>
    /// <returns>The column after its last cell.</returns>
    public int Write(int x, int y, string text, Ink ink = Ink.Text)
    {
        foreach ((string sign, int width) in CellText.Cells(text))
        {
            if (width == 1)
            {
                Put(x, y, sign, ink);
            }
            else if (Holds(x, y) && Holds(x + 1, y))
            {
                Put(x, y, sign, ink);
                Put(x + 1, y, "", ink);
            }

            x += width;
        }

        return x;
    }

    /// <summary>Writes a text that ends at a column.</summary>
    /// <param name="end">Column of its last cell.</param>
    /// <param name="y">Row.</param>
    /// <param name="text">Any text.</param>
    /// <param name="ink">Its meaning.</param>
    public void WriteRight(int end, int y, string text, Ink ink = Ink.Text) => Write(end - CellText.Width(text) + 1, y, text, ink);

    /// <summary>Repeats a sign to the right.</summary>
    /// <param name="x">First column.</param>
    /// <param name="y">Row.</param>
    /// <param name="count">Cells.</param>
    /// <param name="sign">A sign that takes one cell.</param>
    /// <param name="ink">Its meaning.</param>
    public void Repeat(int x, int y, int count, string sign, Ink ink)
    {
        for (int i = 0; i < count; i++)
        {
            Put(x + i, y, sign, ink);
        }
    }

    /// <summary>Gives the cells of a row another meaning.</summary>
    /// <param name="y">Row.</param>
    /// <param name="ink">The meaning.</param>
    public void InkRow(int y, Ink ink)
    {
        for (int x = 0; x < Width; x++)
        {
            if (Holds(x, y))
            {
                _inks[(y * Width) + x] = ink;
            }
        }
    }

    /// <summary>Adds one of the 2 by 4 dots of a cell (Unicode braille patterns).</summary>
    /// <param name="x">Column of the cell.</param>
    /// <param name="y">Row of the cell.</param>
    /// <param name="dotX">0 left, 1 right.</param>
    /// <param name="dotY">0 top to 3 bottom.</param>
    /// <param name="ink">Its meaning.</param>
    public void PutDot(int x, int y, int dotX, int dotY, Ink ink)
    {
        if (!Holds(x, y))
        {
            return;
        }

        ReadOnlySpan<byte> bits = [0x01, 0x02, 0x04, 0x40, 0x08, 0x10, 0x20, 0x80];
        string old = SignAt(x, y);
        int pattern = old.Length == 1 && old[0] is >= DotsBase and <= '\u28FF' ? old[0] - DotsBase : 0;
        Put(x, y, ((char)(DotsBase + (pattern | bits[(dotX * 4) + dotY]))).ToString(), ink);
    }

    /// <summary>Copies another canvas onto this one.</summary>
    /// <param name="other">What to copy.</param>
    /// <param name="x">Column of its left edge here.</param>
    /// <param name="y">Row of its top edge here.</param>
    /// <param name="firstRow">Rows of the other that are skipped.</param>
    public void Paste(TextCanvas other, int x, int y, int firstRow = 0)
    {
        for (int row = firstRow; row < other.Height; row++)
        {
            for (int column = 0; column < other.Width; column++)
            {
                Put(x + column, y + row - firstRow, other.SignAt(column, row), other.InkAt(column, row));
            }
        }
    }

    /// <summary>The rows as lines of text, blanks at their ends cut.</summary>
    public override string ToString()
    {
        StringBuilder text = new();
        for (int y = 0; y < Height; y++)
        {
            text.Append(string.Concat(_signs.AsSpan(y * Width, Width)).TrimEnd()).Append('\n');
        }

        return text.ToString();
    }

    private bool Holds(int x, int y) => (uint)x < (uint)Width && (uint)y < (uint)Height;
}
