using System.Globalization;
using OxyPlot;
using OxyPlot.Axes;

namespace Campaigns.App.Figures;

/// <summary>The axes of all figures.</summary>
internal static class FigureAxes
{
    private const double Room = 0.04;
    private const double FinestSpread = 1e-11;
    private const double SmallestSpread = 1e-290;
    private const double LargestValue = 1e290;
    private const int MostPowers = 8;

    /// <summary>Whether a range of numbers can be drawn to scale: its ends are finite, and lie apart by more than the last digits of a double.</summary>
    public static bool CanShow(double low, double high)
    {
        double size = Math.Max(Math.Abs(low), Math.Abs(high));
        return double.IsFinite(size) && size < LargestValue && low <= high && (low == high ? size is 0 or > SmallestSpread : high - low > Math.Max(SmallestSpread, size * FinestSpread));
    }

    /// <summary>An axis of numbers that holds a range, with a little room on either side.</summary>
    /// <param name="position">Bottom or left.</param>
    /// <param name="title">What the numbers are, with their unit.</param>
    /// <param name="low">Smallest number; see <see cref="CanShow"/>.</param>
    /// <param name="high">Largest number.</param>
    public static LinearAxis Numbers(AxisPosition position, string title, double low, double high)
    {
        double room = high > low ? (high - low) * Room : low == 0 ? 1 : Math.Abs(low) / 10;
        LinearAxis axis = Plain(position, title);
        axis.Minimum = low - room;
        axis.Maximum = high + room;
        axis.MajorGridlineStyle = LineStyle.Solid;
        axis.LabelFormatter = value => Label(value, axis.ActualMajorStep);
        return axis;
    }

    /// <summary>An axis with a name at 0, 1, 2, ...; on the left the first name is at the top.</summary>
    /// <param name="position">Bottom or left.</param>
    /// <param name="title">What is named; empty for none.</param>
    /// <param name="names">The names; cut where they are long.</param>
    /// <param name="widest">Units of the drawing that a name may take.</param>
    public static LinearAxis Names(AxisPosition position, string title, IReadOnlyList<string> names, double widest)
    {
        string[] shown = [.. names.Select(n => FigureText.Fit(FigureText.Safe(n), FigureStyle.LetterSize, widest))];
        LinearAxis axis = Plain(position, title);
        axis.Minimum = -0.5;
        axis.Maximum = names.Count - 0.5;
        axis.MajorStep = 1;
        axis.MinimumMajorStep = 1;
        axis.MaximumMajorIntervalCount = names.Count + 1;
        axis.IntervalLength = 1;
        axis.TickStyle = TickStyle.None;
        axis.LabelFormatter = value => Math.Round(value) is var at && at >= 0 && at < shown.Length && Math.Abs(value - at) < 1e-6 ? shown[(int)at] : "";
        if (position == AxisPosition.Left)
        {
            (axis.StartPosition, axis.EndPosition) = (1, 0);
        }

        return axis;
    }

    /// <summary>An axis of decimal logarithms, with the numbers themselves at its ticks.</summary>
    /// <param name="position">Bottom or left.</param>
    /// <param name="title">What the numbers are.</param>
    /// <param name="low">Smallest logarithm.</param>
    /// <param name="high">Largest one.</param>
    /// <param name="room">Room on either side, in powers of ten.</param>
    public static LinearAxis Powers(AxisPosition position, string title, double low, double high, double room)
    {
        LinearAxis axis = Plain(position, title);
        axis.Minimum = low - room;
        axis.Maximum = high + room;
        axis.MajorStep = StepOf(high - low);
        axis.MajorGridlineStyle = LineStyle.Solid;
        axis.LabelFormatter = value => Power((int)Math.Round(value));
        return axis;
    }

    /// <summary>An axis of counts from 0 or 1 on, with whole numbers at its ticks.</summary>
    public static LinearAxis Counts(AxisPosition position, string title, double low, double high)
    {
        LinearAxis axis = Plain(position, title);
        axis.Minimum = low;
        axis.Maximum = high;
        axis.MinimumMajorStep = 1;
        axis.MajorGridlineStyle = LineStyle.Solid;
        axis.LabelFormatter = value => Math.Abs(value - Math.Round(value)) < 1e-6 ? Math.Round(value).ToString("F0", CultureInfo.InvariantCulture) : "";
        return axis;
    }

    /// <summary>A whole power of ten as text.</summary>
    public static string Power(int exponent) => exponent is >= -3 and <= 6
        ? Math.Pow(10, exponent).ToString("0.###", CultureInfo.InvariantCulture)
        : string.Create(CultureInfo.InvariantCulture, $"1e{exponent}");

    /// <summary>A number of an axis as text, with the decimals that its step needs.</summary>
    /// <param name="value">The number.</param>
    /// <param name="step">From one tick to the next.</param>
    public static string Label(double value, double step)
    {
        double size = Math.Abs(value);
        if (size < step * 1e-6)
        {
            return "0";
        }

        int power = (int)Math.Floor(Math.Log10(size) + 1e-9), stepPower = (int)Math.Floor(Math.Log10(step) + 1e-9);
        return power is < -4 or >= 7
            ? value.ToString("0." + new string('#', Math.Clamp(power - stepPower, 1, 15)) + "e-0", CultureInfo.InvariantCulture)
            : value.ToString("F" + Math.Clamp(-stepPower, 0, 15).ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture);
    }

    /// <summary>What is measured, with its unit in brackets.</summary>
    public static string WithUnit(string what, string unit) => unit.Length > 0 ? $"{what} ({unit})" : what;

    private static double StepOf(double powers)
    {
        double step = 1;
        for (int i = 0; powers / step > MostPowers; i++)
        {
            step *= i % 3 == 1 ? 2.5 : 2;
        }

        return step;
    }

    private static LinearAxis Plain(AxisPosition position, string title) => new()
    {
        Position = position,
        Title = FigureText.Fit(FigureText.Safe(title), FigureStyle.LetterSize, position == AxisPosition.Bottom ? 300 : 220),
        TitleColor = FigureStyle.Text,
        TextColor = FigureStyle.Quiet,
        AxislineStyle = LineStyle.Solid,
        AxislineColor = FigureStyle.Axis,
        TicklineColor = FigureStyle.Axis,
        TickStyle = TickStyle.Outside,
        MinorTickSize = 0,
        MajorTickSize = 4,
        MajorGridlineColor = FigureStyle.Grid,
        MajorGridlineThickness = 1,
        AxisTitleDistance = 6,
        IntervalLength = position == AxisPosition.Left ? 36 : 62,
        IsZoomEnabled = false,
        IsPanEnabled = false,
    };
}
