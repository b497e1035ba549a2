using System.Globalization;

namespace Campaigns.App.Dashboard.Canvas;

/// <summary>A horizontal axis from numbers to cells, with round ticks.</summary>
public sealed class LinearScale
{
    private const double MostSteps = 1e12;
    private readonly double _low;
    private readonly double _high;
    private readonly double _step;

    /// <summary>Makes an axis that holds a range.</summary>
    /// <param name="low">Smallest number, finite.</param>
    /// <param name="high">Largest number, finite, at least <paramref name="low"/>.</param>
    /// <param name="cells">Cells along the axis, at least 2.</param>
    public LinearScale(double low, double high, int cells)
    {
        Cells = Math.Max(2, cells);
        if (!(high > low))
        {
            double pad = low == 0 ? 1 : Math.Abs(low) / 10;
            (low, high) = (low - pad, high + pad);
        }

        // Quarters, so that even the whole range of doubles has a finite length.
        double raw = ((high / 4) - (low / 4)) / Math.Max(3, Cells / 10) * 4;
        double magnitude = Math.Pow(10, Math.Floor(Math.Log10(raw)));
        double step = (raw / magnitude) switch { <= 1 => 1, <= 2 => 2, <= 5 => 5, _ => 10 } * magnitude;

        // Where the numbers are so large beside their spread that multiples of the step run together, only the ends are marked.
        _step = Math.Max(Math.Abs(low), Math.Abs(high)) / step < MostSteps ? step : 0;
        (_low, _high) = (low, high);
    }

    /// <summary>Cells along the axis.</summary>
    public int Cells { get; }

    /// <summary>The place of a number among a count of equal places along the axis; numbers outside stand at the nearer end.</summary>
    /// <param name="value">A finite number.</param>
    /// <param name="places">Places along the axis: the cells, or twice as many dots.</param>
    public int PlaceOf(double value, int places)
    {
        double share = ((value / 4) - (_low / 4)) / ((_high / 4) - (_low / 4));
        return Math.Clamp((int)Math.Round(share * (places - 1)), 0, places - 1);
    }

    /// <summary>Draws the axis line and, below it, the tick labels; labels that would touch are left out.</summary>
    /// <param name="canvas">Where to draw.</param>
    /// <param name="x">First column of the axis.</param>
    /// <param name="y">Row of the line; the labels go to the next.</param>
    /// <param name="glyphs">The signs.</param>
    public void Draw(TextCanvas canvas, int x, int y, GlyphSet glyphs)
    {
        canvas.Repeat(x, y, Cells, glyphs.Across, Ink.Axis);
        int free = 0;
        foreach (double tick in Ticks())
        {
            int at = x + PlaceOf(tick, Cells);
            canvas.Put(at, y, glyphs.TickDown, Ink.Axis);
            string label = LabelOf(tick);
            int start = Math.Clamp(at - (label.Length / 2), 0, Math.Max(0, canvas.Width - label.Length));
            if (start >= free)
            {
                canvas.Write(start, y + 1, label, Ink.Axis);
                free = start + label.Length + 1;
            }
        }
    }

    private IEnumerable<double> Ticks()
    {
        if (_step == 0)
        {
            yield return _low;
            yield return _high;
            yield break;
        }

        double last = Math.Floor(_high / _step);
        for (double multiple = Math.Ceiling(_low / _step); multiple <= last; multiple++)
        {
            yield return multiple * _step;
        }
    }

    private string LabelOf(double tick)
    {
        double size = Math.Max(Math.Abs(_low), Math.Abs(_high));
        if (_step == 0 || size >= 1e12 || size < 1e-6)
        {
            return tick.ToString("0.###e-0", CultureInfo.InvariantCulture);
        }

        int decimals = Math.Clamp((int)-Math.Floor(Math.Log10(_step) + 1e-9), 0, 12);
        double rounded = Math.Round(tick, decimals);
        return (rounded == 0 ? 0 : rounded).ToString("F" + decimals.ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture);
    }
}
