using System.Buffers;
using System.Text;
using System.Text.Encodings.Web;
using System.Text.Json;

namespace Campaigns.App.Output;

/// <summary>Writes rows as one JSON array of objects.</summary>
internal static class JsonRows
{
    private const int FlushAt = 1 << 16;

    public static void Write(RowTable table, TextWriter writer)
    {
        var buffer = new ArrayBufferWriter<byte>();
        using var json = new Utf8JsonWriter(buffer, new JsonWriterOptions { Indented = true, NewLine = "\n", Encoder = JavaScriptEncoder.Default });
        JsonEncodedText[] names = [.. table.Columns.Select(c => JsonEncodedText.Encode(c.Name))];
        json.WriteStartArray();
        foreach (Cell[] row in table.Rows)
        {
            json.WriteStartObject();
            for (int i = 0; i < row.Length; i++)
            {
                json.WritePropertyName(names[i]);
                WriteCell(json, row[i]);
            }

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
