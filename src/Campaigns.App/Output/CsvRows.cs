using Campaigns.Catalog.Exporting;

namespace Campaigns.App.Output;

/// <summary>Writes rows as comma-separated values.</summary>
internal static class CsvRows
{
    /// <param name="table">The rows.</param>
    /// <param name="writer">Where to.</param>
    /// <param name="forEyes">Whether a terminal shows it: then what it would obey is written as its code.</param>
    public static void Write(RowTable table, TextWriter writer, bool forEyes = false) =>
        Write(table, writer, (cell, text) => CsvField.AsItStands(forEyes ? SafeText.Escape(text) : text));

    /// <summary>Writes rows into a file that people may open in a spreadsheet: texts are guarded (<see cref="SpreadsheetText"/>). What goes to a script is exact.</summary>
    /// <param name="table">The rows.</param>
    /// <param name="writer">The file.</param>
    public static void WriteFile(RowTable table, TextWriter writer) =>
        Write(table, writer, (cell, text) => cell.Kind == CellKind.Text ? CsvField.FromString(text) : CsvField.AsItStands(text));

    private static void Write(RowTable table, TextWriter writer, Func<Cell, string, CsvField> field)
    {
        var line = new CsvLine(writer);
        line.Write([.. table.Columns.Select(c => (CsvField)c.Name)]);
        var fields = new CsvField[table.Columns.Count];
        foreach (Cell[] row in table.Rows)
        {
            for (int i = 0; i < row.Length; i++)
            {
                fields[i] = field(row[i], Text(row[i]));
            }

            line.Write(fields);
        }
    }

    /// <summary>A cell as it stands in a file.</summary>
    public static string Text(in Cell cell) => cell.Kind switch
    {
        CellKind.Empty => "",
        CellKind.Text => cell.AsText,
        CellKind.Whole => FormattableString.Invariant($"{cell.AsWhole}"),
        CellKind.Number => NumberText.RoundTrip(cell.AsNumber),
        CellKind.P => NumberText.RoundTrip(cell.AsP),
        CellKind.Truth => cell.AsTruth ? "true" : "false",
        _ => throw new InvalidOperationException("A cell is of one of the kinds above."),
    };
}
