namespace Campaigns.App.Report.Sections;

/// <summary>Room on the one printed page, in lines of its text: reckoned with a wide font on the shorter of both papers, so that what fits here fits there.</summary>
/// <remarks>Letter paper is 279 mm high; less the margins these are 60 lines of 9 points at 1.3. A line of 182 mm holds some 118 characters of a wide font, fewer where words break badly.</remarks>
internal sealed class SheetRoom
{
    private const double Lines = 60;
    private const int LineLength = 114;

    /// <summary>Lines that are left.</summary>
    public double Left { get; private set; } = Lines;

    /// <summary>Lines of a text.</summary>
    /// <param name="text">The text.</param>
    /// <param name="perLine">Characters that fit a line; the usual number where none is given.</param>
    public static int Of(string text, int perLine = LineLength) => Math.Max(1, (text.Length + perLine - 1) / perLine);

    /// <summary>Takes lines away.</summary>
    public void Take(double lines) => Left -= lines;
}
