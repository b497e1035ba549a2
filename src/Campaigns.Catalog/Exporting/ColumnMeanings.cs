namespace Campaigns.Catalog.Exporting;

/// <summary>What every column of every exported file means, so that the files can be read without this program.</summary>
public static class ColumnMeanings
{
    /// <summary>Name of the file in which the dictionary is written.</summary>
    public const string FileName = "dictionary.csv";

    private static readonly string[] OwnColumns = ["file", "column", "type", "values", "meaning"];

    /// <summary>Every column, file by file in the order in which they stand there.</summary>
    public static IReadOnlyList<DescribedColumn> All { get; } = [.. ColumnMeaningsText.Files.SelectMany(f => Columns(f.File, f.Text))];

    /// <summary>Writes the part about some files.</summary>
    /// <param name="files">Their names.</param>
    /// <param name="writer">Where to.</param>
    public static void Write(IReadOnlySet<string> files, TextWriter writer)
    {
        ArgumentNullException.ThrowIfNull(files);
        ArgumentNullException.ThrowIfNull(writer);
        var csv = new CsvLine(writer);
        csv.Write([.. OwnColumns.Select(c => (CsvField)c)]);
        foreach (DescribedColumn c in All.Where(c => files.Contains(c.File)))
        {
            csv.Write(c.File, c.Column, c.Type, c.Values, c.Meaning);
        }
    }

    private static IEnumerable<DescribedColumn> Columns(string file, string text) =>
        text.Split('\n').Select(line => line.Split('|')).Select(parts => new DescribedColumn(file, parts[0], parts[1], parts[2], parts[3]));
}

/// <summary>What a column means.</summary>
/// <param name="File">The file that has it.</param>
/// <param name="Column">Its name.</param>
/// <param name="Type">"text", "number", "whole number", "truth" or "instant" (UTC).</param>
/// <param name="Values">Values, range or unit of measure; empty where any may stand.</param>
/// <param name="Meaning">What it says.</param>
public sealed record DescribedColumn(string File, string Column, string Type, string Values, string Meaning);
