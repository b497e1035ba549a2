using System.Buffers;
using System.Text;
using System.Text.Encodings.Web;
using System.Text.Json;

namespace Campaigns.App.Output;

/// <summary>Writes rows as one JSON array of objects.</summary>
internal static class JsonRows
{
    private const int FlushAt = 1 << 16;

    /// <summary>Writes one object: the single row of a table, and further tables as arrays of objects beside it.</summary>
    /// <param name="row">A table of one row.</param>
    /// <param name="parts">The further tables, by name.</param>
    /// <param name="writer">Where to.</param>
    public static void WriteObject(RowTable row, IReadOnlyList<(string Name, RowTable Rows)> parts, TextWriter writer)
    {
        var buffer = new ArrayBufferWriter<byte>();
        using (var json = new Utf8JsonWriter(buffer, new JsonWriterOptions { Indented = true, NewLine = "\n", Encoder = JavaScriptEncoder.Default }))
        {
            json.WriteStartObject();
            WriteCells(json, Names(row), row.Rows.Single());
            foreach ((string name, RowTable rows) in parts)
            {
                json.WriteStartArray(name);
                JsonEncodedText[] names = Names(rows);
                foreach (Cell[] cells in rows.Rows)
                {
                    json.WriteStartObject();
                    WriteCells(json, names, cells);
                    json.WriteEndObject();
                }

                json.WriteEndArray();
            }

            json.WriteEndObject();
        }

        writer.Write(Encoding.UTF8.GetString(buffer.WrittenSpan));
        writer.Write('\n');
    }

    public static void Write(RowTable table, TextWriter writer)
    {
        var buffer = new ArrayBufferWriter<byte>();
        using var json = new Utf8JsonWriter(buffer, new JsonWriterOptions { Indented = true, NewLine = "\n", Encoder = JavaScriptEncoder.Default });
        JsonEncodedText[] names = Names(table);
        json.WriteStartArray();
        foreach (Cell[] row in table.Rows)
        {
            json.WriteStartObject();
            WriteCells(json, names, row);
            json.WriteEndObject();
            if (json.BytesPending + buffer.WrittenCount > FlushAt)
            {
                Flush();
            }
        }

        json.WriteEndArray();
        Flush();
        writer.Write('\n');

        void Flush()
        {
            json.Flush();
            writer.Write(Encoding.UTF8.GetString(buffer.WrittenSpan));
            buffer.ResetWrittenCount();
        }
    }

    private static JsonEncodedText[] Names(RowTable table) => [.. table.Columns.Select(c => JsonEncodedText.Encode(c.Name))];

    private static void WriteCells(Utf8JsonWriter json, JsonEncodedText[] names, Cell[] row)
    {
        for (int i = 0; i < row.Length; i++)
        {
            json.WritePropertyName(names[i]);
            WriteCell(json, row[i]);
        }
    }

    private static void WriteCell(Utf8JsonWriter json, in Cell cell)
    {
        switch (cell.Kind)
        {
            case CellKind.Empty:
                json.WriteNullValue();
                break;
            case CellKind.Text:
                json.WriteStringValue(cell.AsText);
                break;
            case CellKind.Truth:
                json.WriteBooleanValue(cell.AsTruth);
                break;
            default:
                json.WriteRawValue(CsvRows.Text(cell));
                break;
        }
    }
}
