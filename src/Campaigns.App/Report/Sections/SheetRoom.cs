namespace Campaigns.App.Report.Sections;

/// <summary>Room on the one printed page, in lines of its text: reckoned with a wide font on the shorter of both papers, so that what fits here fits there.</summary>
/// <remarks>What two very different campaigns took of a sheet of Letter paper in DejaVu Sans, one of the widest fonts of systems, came to 67 and 72 of these lines. A line holds some 98 of its characters.</remarks>
internal sealed class SheetRoom
{
    private const double Lines = 66;
    private const int LineLength = 98;

    /// <summary>Lines that are left.</summary>
    public double Left { get; private set; } = Lines;

    /// <summary>Lines of a text.</summary>
    /// <param name="text">The text.</param>
    /// <param name="perLine">Characters that fit a line; the usual number where none is given.</param>
    public static int Of(string text, int perLine = LineLength) => Math.Max(1, (text.Length + perLine - 1) / perLine);

    /// <summary>Takes lines away.</summary>
    public void Take(double lines) => Left -= lines;
}
