using Campaigns.Catalog.Exporting;

namespace Campaigns.App.Output;

/// <summary>Writes rows as comma-separated values.</summary>
internal static class CsvRows
{
    /// <param name="table">The rows.</param>
    /// <param name="writer">Where to.</param>
    /// <param name="forEyes">Whether a terminal shows it: then what it would obey is written as its code.</param>
    public static void Write(RowTable table, TextWriter writer, bool forEyes = false)
    {
        var line = new CsvLine(writer);
        line.Write([.. table.Columns.Select(c => (CsvField)c.Name)]);
        var fields = new CsvField[table.Columns.Count];
        foreach (Cell[] row in table.Rows)
        {
            for (int i = 0; i < row.Length; i++)
            {
                string text = forEyes ? SafeText.Escape(Text(row[i])) : Text(row[i]);
                fields[i] = row[i].Kind == CellKind.Text && !row[i].IsPassedOn ? text : CsvField.AsItStands(text);
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
