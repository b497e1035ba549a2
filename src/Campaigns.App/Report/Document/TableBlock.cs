using Campaigns.App.Output;

namespace Campaigns.App.Report.Document;

/// <summary>A table with its caption, and below it what must be known to read it.</summary>
/// <param name="Caption">What the rows are, in a line.</param>
/// <param name="Columns">The columns that people see; the first names the row.</param>
/// <param name="Rows">The rows; as many cells as columns.</param>
internal sealed record TableBlock(string Caption, IReadOnlyList<Column> Columns, IReadOnlyList<Cell[]> Rows) : Block
{
    /// <summary>Rows that a report shows of one table: enough for every campaign that people read row by row, and few enough for a browser.</summary>
    public const int MostRows = 2000;

    /// <summary>Sentences above the rows.</summary>
    public IReadOnlyList<string> Above { get; init; } = [];

    /// <summary>Sentences below the rows: assumptions, procedures, meanings of columns.</summary>
    public IReadOnlyList<string> Below { get; init; } = [];

    /// <summary>What is read in the place of no rows.</summary>
    public string WhenEmpty { get; init; } = "There is nothing to show.";

    /// <summary>Anchors in this report to which names in the first column lead.</summary>
    public IReadOnlyDictionary<string, string> Links { get; init; } = NoLinks;

    /// <summary>Whether readers may put its rows into another order; false where the order says something.</summary>
    public bool MaySort { get; init; } = true;

    /// <summary>Place of the column whose "yes" sets a row apart; null for none.</summary>
    public int? SetsApart { get; init; }

    /// <summary>Whether a narrow screen shows each row as a card of its own, everything in sight, instead of scrolling sideways.</summary>
    public bool AsCards { get; init; }

    private static IReadOnlyDictionary<string, string> NoLinks { get; } = new Dictionary<string, string>();

    /// <summary>The rows of a command as people see them there, without the columns that only scripts get.</summary>
    /// <param name="caption">What the rows are.</param>
    /// <param name="table">The rows; where they are more than <see cref="MostRows"/>, the first of them are taken.</param>
    public static TableBlock Of(string caption, RowTable table)
    {
        int[] shown = [.. Enumerable.Range(0, table.Columns.Count).Where(c => table.Columns[c].Heading is not null)];
        List<Cell[]> rows = [.. table.Rows.Take(MostRows + 1).Select(row => (Cell[])[.. shown.Select(c => row[c])])];
        bool isCut = rows.Count > MostRows;
        int apart = Array.FindIndex(shown, c => table.Columns[c].Name == "survives");
        return new TableBlock(caption, [.. shown.Select(c => table.Columns[c])], isCut ? rows[..MostRows] : rows)
        {
            Above = table.Above,
            Below = isCut ? [CutSentence, .. table.Below] : table.Below,
            WhenEmpty = table.WhenEmpty,
            SetsApart = apart < 0 ? null : apart,
        };
    }

    /// <summary>The same with some of its columns, by name.</summary>
    public TableBlock Only(params string[] names)
    {
        int[] shown = [.. names.Select(n => IndexOf(n)).Where(i => i >= 0)];
        return this with
        {
            Columns = [.. shown.Select(i => Columns[i])],
            Rows = [.. Rows.Select(row => (Cell[])[.. shown.Select(i => row[i])])],
            SetsApart = SetsApart is { } apart && Array.IndexOf(shown, apart) is >= 0 and var place ? place : null,
        };
    }

    /// <summary>The same without columns that say nothing in any row.</summary>
    public TableBlock WithoutEmptyColumns() =>
        Rows.Count == 0 ? this : Only([.. Enumerable.Range(0, Columns.Count).Where(c => c == 0 || Rows.Any(row => row[c].Kind != CellKind.Empty)).Select(c => Columns[c].Name)]);

    private static string CutSentence => FormattableString.Invariant($"The first {MostRows} rows are shown; 'campaigns export' writes all of them.");

    private int IndexOf(string name)
    {
        for (int i = 0; i < Columns.Count; i++)
        {
            if (Columns[i].Name == name)
            {
                return i;
            }
        }

        return -1;
    }
}
