namespace Campaigns.App.Output;

/// <summary>A column of a table.</summary>
/// <param name="Name">Name in files; frozen from release to release.</param>
/// <param name="Heading">Heading for people; null where the column is for scripts alone.</param>
/// <param name="IsNumeric">Whether it is set to the right.</param>
/// <param name="GivesWay">Where a line has no room for all columns, those with the greatest number go first; among equals the last.</param>
/// <param name="CutLast">Whether its text is cut last, as that of the first column is: a cut name could be another's, and a cut reason says nothing.</param>
/// <param name="NotWithout">Name of the column that it says nothing without, as one end of an interval; null where it stands alone.</param>
/// <param name="Wraps">Whether its text goes on below where it does not fit, instead of being cut: a reason is said in full.</param>
internal sealed record Column(string Name, string? Heading, bool IsNumeric = false, int GivesWay = 0, bool CutLast = false, string? NotWithout = null, bool Wraps = false);

/// <summary>Rows to print, in whichever format was asked for.</summary>
/// <param name="Columns">The columns, in order.</param>
/// <param name="Rows">The rows; as many cells as columns.</param>
internal sealed record RowTable(IReadOnlyList<Column> Columns, IEnumerable<Cell[]> Rows)
{
    /// <summary>Sentences above the table, for people alone.</summary>
    public IReadOnlyList<string> Above { get; init; } = [];

    /// <summary>Sentences below the table, for people alone: assumptions, names of procedures, cautions.</summary>
    public IReadOnlyList<string> Below { get; init; } = [];

    /// <summary>What people read where there are no rows.</summary>
    public string WhenEmpty { get; init; } = "There is nothing to show.";
}
