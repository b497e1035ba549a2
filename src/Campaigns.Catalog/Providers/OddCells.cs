using Campaigns.Catalog.Ledger;
using static SQLitePCL.raw;

namespace Campaigns.Catalog.Providers;

/// <summary>Says in words that a cell holds another kind of value than the program ever writes there.</summary>
internal static class OddCells
{
    /// <summary>The exception for such a cell.</summary>
    /// <param name="path">The catalog's file.</param>
    /// <param name="table">The table; null or empty where the value comes from no column.</param>
    /// <param name="column">The column; null or empty likewise.</param>
    /// <param name="held">SQLite's number of the kind that it holds.</param>
    /// <param name="wanted">That of the kind that belongs there; the same where the kind is right and its content is not.</param>
    public static RecordException Refuse(string path, string? table, string? column, int held, int wanted)
    {
        string place = string.IsNullOrEmpty(table) || string.IsNullOrEmpty(column) ? "one of its values" : $"'{column}' of the table '{table}'";
        string what = (held, wanted) switch
        {
            (SQLITE_TEXT, SQLITE_TEXT) => "bytes that are no text",
            (SQLITE_FLOAT, SQLITE_FLOAT) => "a number beyond all numbers",
            _ => Name(held),
        };
        return new RecordException($"The catalog '{path}' holds {what} in {place}, where {Name(wanted)} belongs: another program changed it, or the file is damaged. 'campaigns ledger verify' says what else was; restore the catalog from a backup.");
    }

    private static string Name(int kind) => kind switch
    {
        SQLITE_INTEGER => "a whole number",
        SQLITE_FLOAT => "a number",
        SQLITE_TEXT => "a text",
        SQLITE_BLOB => "packed bytes",
        _ => "nothing",
    };
}
