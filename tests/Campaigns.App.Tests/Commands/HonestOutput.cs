using System.Globalization;
using System.Text.Json;
using System.Text.RegularExpressions;

namespace Campaigns.App.Tests.Commands;

/// <summary>All that the commands say of a campaign, held against what no output may contain: p = 0, NaN, infinity, an empty sentence, csv or JSON that does not parse.</summary>
internal static partial class HonestOutput
{
    private static readonly string[] ProbabilityColumns = ["p", "adjusted_p"];

    /// <summary>Runs every reading command of the campaign in every format.</summary>
    /// <returns>All of it, to look for more.</returns>
    public static string Of(Workplace place, string campaign, params string[] experiments)
    {
        string[][] commands =
        [
            ["results", campaign], ["comparisons", campaign], ["survivors", campaign], ["corrections", campaign, "--by-experiment"], ["show", campaign],
            .. experiments.Select(e => (string[])["show", campaign, e]),
        ];
        return string.Concat(commands.Select(command => Of(place, command)));
    }

    /// <summary>Runs one command in every format.</summary>
    public static string Of(Workplace place, string[] command)
    {
        Ran csv = place.Run([.. command, "--format", "csv"]).Well();
        Read(csv.Csv);
        Ran json = place.Run([.. command, "--format", "json"]).Well();
        using (var document = JsonDocument.Parse(json.Out))
        {
            Read(document.RootElement, "");
        }

        string table = place.Run(command).Well().Out;
        Match match = Dishonest().Match(table);
        Assert.False(match.Success, $"{string.Join(' ', command)}: '{match.Value}' in\n{table}");
        return csv.Out + json.Out + table;
    }

    private static void Read(CsvText csv)
    {
        foreach (string[] row in csv.Rows)
        {
            for (int i = 0; i < row.Length; i++)
            {
                Assert.DoesNotMatch(NotANumber(), row[i]);
                if (row[i].Length > 0 && ProbabilityColumns.Contains(csv.Columns[i]))
                {
                    AssertProbability(row[i]);
                }
            }
        }
    }

    private static void Read(JsonElement element, string name)
    {
        switch (element.ValueKind)
        {
            case JsonValueKind.Object:
                foreach (JsonProperty property in element.EnumerateObject())
                {
                    Read(property.Value, property.Name);
                }

                break;
            case JsonValueKind.Array:
                foreach (JsonElement item in element.EnumerateArray())
                {
                    Read(item, name);
                }

                break;
            case JsonValueKind.Number when ProbabilityColumns.Contains(name):
                AssertProbability(element.GetRawText());
                break;
            case JsonValueKind.Number:
                Assert.True(Math.Abs(element.GetDouble()) < double.MaxValue, $"{name}: {element.GetRawText()}");
                break;
            case JsonValueKind.String:
                Assert.DoesNotMatch(NotANumber(), element.GetString());
                Assert.NotEqual("", element.GetString()!.Trim(' ', '.'));
                break;
        }
    }

    /// <summary>In (0, 1]; one below the range of doubles has a mantissa other than nought.</summary>
    private static void AssertProbability(string text)
    {
        Assert.True(text.Split('E', 'e')[0].Any(c => c is >= '1' and <= '9'), $"a p-value of {text}");
        Assert.InRange(double.Parse(text, NumberStyles.Float, CultureInfo.InvariantCulture), 0, 1);
    }

    [GeneratedRegex(@"^-?(NaN|Infinity|∞|1\.7976931348623157E\+308)$", RegexOptions.IgnoreCase)]
    private static partial Regex NotANumber();

    [GeneratedRegex(@"\bNaN\b|[Ii]nfinity|∞|\bp = 0(?![.\d])|[ (]-?0(\.0+)?e[+-]?\d|1\.79\d*e308|\(\)|: \.|\. \.|(?m)^ *\.(?!\.\.)|\bin \.|, ,|\{\d")]
    private static partial Regex Dishonest();
}
