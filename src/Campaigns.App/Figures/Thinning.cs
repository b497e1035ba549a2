namespace Campaigns.App.Figures;

/// <summary>Leaves out marks that another of their kind would hide: of all that fall into one small square of the plot, the first is kept.</summary>
/// <param name="width">What the plot holds across, in units of the data.</param>
/// <param name="height">What it holds upwards.</param>
internal sealed class Thinning(double width, double height)
{
    /// <summary>Below this many marks none is left out.</summary>
    public const int FewMarks = 1500;

    // About two units of the drawing each.
    private const int Columns = 220;
    private const int Rows = 120;

    private readonly HashSet<(int, int)> _taken = [];

    /// <summary>Whether the mark at a place is kept.</summary>
    public bool Keeps(double x, double y) => _taken.Add(((int)Math.Floor(x / width * Columns), (int)Math.Floor(y / height * Rows)));
}
