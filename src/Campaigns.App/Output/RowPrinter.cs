namespace Campaigns.App.Output;

/// <summary>Prints rows in the format that was asked for.</summary>
internal static class RowPrinter
{
    /// <summary>Prints a table.</summary>
    /// <param name="host">Where to.</param>
    /// <param name="format">How.</param>
    /// <param name="table">The rows.</param>
    /// <param name="mostRows">Rows to show to people; 0 for all. Files get all.</param>
    public static void Print(Host host, RowFormat format, RowTable table, int mostRows = TextTable.UsualRows)
    {
        switch (format)
        {
            case RowFormat.Csv:
                CsvRows.Write(table, host.Out, forEyes: host.OutIsTerminal);
                break;
            case RowFormat.Json:
                JsonRows.Write(table, host.Out);
                break;
            default:
                TextTable.Write(table, host, mostRows);
                break;
        }
    }
}
