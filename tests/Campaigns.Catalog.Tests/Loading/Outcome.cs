using System.Globalization;
using System.Text;
using Campaigns.Catalog.Loading;

namespace Campaigns.Catalog.Tests.Loading;

/// <summary>What came of a file, in one line of text that a table of cases can hold.</summary>
internal static class Outcome
{
    /// <summary>Rows as experiment/group=value and problems as code@line:column, parted by blanks.</summary>
    public static string OfMeasurements(byte[] content, DelimitedFileOptions? options = null)
    {
        using TestFile file = new(content);
        using MeasurementFile measurements = MeasurementFile.Open(file.Path, options ?? DelimitedFileOptions.Default);
        List<string> parts = [];
        while (measurements.Read(out MeasurementRow row))
        {
            string specimen = row.Specimen.IsEmpty ? "" : "/s" + Text(row.Specimen);
            string block = row.Block.IsEmpty ? "" : "/b" + Text(row.Block);
            string order = row.Order is long o ? "/o" + o.ToString(CultureInfo.InvariantCulture) : "";
            parts.Add($"{Text(row.Experiment)}/{Text(row.Group)}{specimen}{block}{order}={(row.IsMissing ? "NA" : row.Value.ToString())}");
        }

        parts.AddRange(Codes(measurements.Problems));
        return string.Join(' ', parts);
    }

    public static IEnumerable<string> Codes(ImportProblems problems) =>
        problems.Kept.Select(p => FormattableString.Invariant($"{p.Code}@{p.Line}{(p.Column.Length > 0 ? ":" + p.Column : "")}"));

    private static string Text(ReadOnlySpan<byte> utf8) => Encoding.UTF8.GetString(utf8);
}
