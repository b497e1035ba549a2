using System.Buffers;

namespace Campaigns.Catalog.Exporting;

/// <summary>Writes lines of comma-separated values (RFC 4180), ended by a line feed.</summary>
/// <param name="writer">Where to.</param>
public sealed class CsvLine(TextWriter writer)
{
    private static readonly SearchValues<char> Quoted = SearchValues.Create(",\"\r\n");

    /// <summary>Writes one line.</summary>
    /// <param name="fields">Its fields.</param>
    public void Write(params ReadOnlySpan<string> fields)
    {
        for (int i = 0; i < fields.Length; i++)
        {
            if (i > 0)
            {
                writer.Write(',');
            }

            Field(fields[i]);
        }

        writer.Write('\n');
    }

    /// <summary>A number as it stands in a file; empty where there is none.</summary>
    public static string Number(double? value) => value is { } given ? given.ToString("R", System.Globalization.CultureInfo.InvariantCulture) : "";

    private void Field(string text)
    {
        bool quote = text.AsSpan().ContainsAny(Quoted) || text.StartsWith(' ') || text.EndsWith(' ');
        writer.Write(quote ? $"\"{text.Replace("\"", "\"\"", StringComparison.Ordinal)}\"" : text);
    }
}
