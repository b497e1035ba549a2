using System.Globalization;
using System.Text;

namespace Campaigns.App.Tests.Commands;

/// <summary>Comma-separated values, read back strictly.</summary>
internal sealed record CsvText(string[] Columns, List<string[]> Rows)
{
    public static CsvText Read(string text)
    {
        List<string[]> rows = Records(text);
        Assert.NotEmpty(rows);
        Assert.All(rows, row => Assert.Equal(rows[0].Length, row.Length));
        return new CsvText(rows[0], rows[1..]);
    }

    /// <summary>RFC 4180, strictly: a quote stands only around a field or doubled inside one, and every record ends with a line feed.</summary>
    private static List<string[]> Records(string text)
    {
        List<string[]> rows = [];
        List<string> row = [];
        int at = 0;
        while (at < text.Length)
        {
            var field = new StringBuilder();
            if (text[at] == '"')
            {
                for (at++; text[at] != '"' || (at + 1 < text.Length && text[at + 1] == '"'); at++)
                {
                    at += text[at] == '"' ? 1 : 0;
                    field.Append(text[at]);
                }

                at++;
            }
            else
            {
                for (; text[at] is not (',' or '\n'); at++)
                {
                    Assert.NotEqual('"', text[at]);
                    field.Append(text[at]);
                }
            }

            row.Add(field.ToString());
            Assert.Contains(text[at], ",\n");
            if (text[at++] == '\n')
            {
                rows.Add([.. row]);
                row.Clear();
            }
        }

        Assert.Empty(row);
        return rows;
    }

    public string[] Column(string name)
    {
        int at = Array.IndexOf(Columns, name);
        Assert.True(at >= 0, $"no column {name}");
        return [.. Rows.Select(r => r[at])];
    }

    public double[] Numbers(string name) => [.. Column(name).Select(Number)];

    public string[] Row(string experiment) => Rows.Single(r => r[0] == experiment);

    public string Value(string experiment, string column) => Row(experiment)[Array.IndexOf(Columns, column)];

    public static double Number(string text) => double.Parse(text, NumberStyles.Float, CultureInfo.InvariantCulture);
}
