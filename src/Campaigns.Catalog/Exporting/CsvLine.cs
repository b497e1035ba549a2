using System.Buffers;

namespace Campaigns.Catalog.Exporting;

/// <summary>Writes lines of comma-separated values (RFC 4180), ended by a line feed.</summary>
/// <param name="writer">Where to.</param>
public sealed class CsvLine(TextWriter writer)
{
    private static readonly SearchValues<char> Quoted = SearchValues.Create(",\"\r\n");

    /// <summary>Writes one line.</summary>
    /// <param name="fields">Its fields.</param>
    public void Write(params ReadOnlySpan<CsvField> fields)
    {
        for (int i = 0; i < fields.Length; i++)
        {
            if (i > 0)
            {
                writer.Write(',');
            }

            Field(fields[i].Content);
        }

        writer.Write('\n');
    }

    /// <summary>A number as it stands in a file; empty where there is none.</summary>
    public static CsvField Number(double? value) => value is { } given ? CsvField.AsItStands(given.ToString("R", System.Globalization.CultureInfo.InvariantCulture)) : default;

    /// <summary>An instant as it stands in a file: UTC, to the second.</summary>
    public static CsvField Instant(DateTimeOffset at) =>
        CsvField.AsItStands(at.UtcDateTime.ToString("yyyy-MM-dd'T'HH:mm:ss'Z'", System.Globalization.CultureInfo.InvariantCulture));

    private void Field(string text)
    {
        bool quote = text.AsSpan().ContainsAny(Quoted) || text.StartsWith(' ') || text.EndsWith(' ');
        writer.Write(quote ? $"\"{text.Replace("\"", "\"\"", StringComparison.Ordinal)}\"" : text);
    }
}
