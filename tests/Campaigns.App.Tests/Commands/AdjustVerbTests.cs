using System.Globalization;
using System.Text;
using System.Text.Json;

namespace Campaigns.App.Tests.Commands;

public sealed class AdjustVerbTests : IDisposable
{
    // Benjamini and Hochberg (1995), section 4.1: fifteen hypotheses of a trial of thrombolysis; Bonferroni at 0.05 rejects 3, their procedure 4.
    private static readonly string[] Published =
        ["0.0001", "0.0004", "0.0019", "0.0095", "0.0201", "0.0278", "0.0298", "0.0344", "0.0459", "0.3240", "0.4262", "0.5719", "0.6528", "0.7590", "1.0000"];

    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    private string Column(params IEnumerable<string> p) => _place.Write("p.csv", $"p\n{string.Join('\n', p)}\n");

    [Fact]
    public void The_published_fifteen_give_three_and_four()
    {
        CsvText csv = _place.Run("adjust", Column(Published), "--format", "csv").Well().Csv;
        Assert.Equal(["p", "none", "bonferroni", "sidak", "holm", "holm-sidak", "hochberg", "hommel", "bh", "by"], csv.Columns[..10]);
        Assert.Equal(3, csv.Numbers("bonferroni").Count(p => p <= 0.05));
        Assert.Equal(4, csv.Numbers("bh").Count(p => p <= 0.05));

        // 15 * 0.0095 / 4, the largest adjusted p that the paper's procedure rejects.
        Assert.Equal(15 * 0.0095 / 4, csv.Numbers("bh")[3], 1e-15);
        Assert.Equal(Published, csv.Column("p"));
    }

    [Fact]
    public void Adjusted_p_values_equal_the_exact_reference()
    {
        string[] lines = [.. File.ReadLines(Path.Combine(Workplace.Repository(), "tests", "reference", "campaign", "adjust_exact.csv")).Where(l => !l.StartsWith('#'))];
        string[] header = lines[0].Split(',');
        string[] keys = ["bonferroni", "sidak", "holm", "holm-sidak", "hochberg", "hommel", "bh", "by"];
        IGrouping<string, string[]>[] sets = [.. lines.Skip(1).Select(l => l.Split(',')).GroupBy(r => r[0])];
        Assert.True(sets.Length >= 18, $"{sets.Length} sets");
        foreach (IGrouping<string, string[]> set in sets)
        {
            string[][] rows = [.. set];
            CsvText csv = _place.Run("adjust", Column(rows.Select(r => r[2])), "--correction", string.Join(',', keys), "--format", "csv").Well().Csv;
            Assert.Equal(["p", .. keys], csv.Columns);
            foreach (string key in keys)
            {
                double[] expected = [.. rows.Select(r => CsvText.Number(r[Array.IndexOf(header, key.Replace('-', '_'))]))];
                double[] actual = csv.Numbers(key);
                Assert.Equal(expected.Length, actual.Length);
                for (int i = 0; i < expected.Length; i++)
                {
                    Assert.True(Math.Abs(actual[i] - expected[i]) <= 1e-14 * expected[i], $"{set.Key} {key} {i + 1}: {actual[i]:R} for {expected[i]:R}");
                }
            }
        }
    }

    [Fact]
    public void Other_columns_pass_through_and_rows_keep_their_order()
    {
        string file = _place.Write("p.csv", "name,P value,remark\n\"b, \"\"x\"\"\",0.04,=1+1\nä,0.01,\" kept \"\n\"two\nlines\",0.03,@\n");
        CsvText csv = _place.Run("adjust", file, "--column", "P value", "--correction", "bonferroni,holm", "--format", "csv").Well().Csv;
        Assert.Equal(["name", "P value", "remark", "bonferroni", "holm"], csv.Columns);
        Assert.Equal(["b, \"x\"", "ä", "two\nlines"], csv.Column("name"));
        Assert.Equal(["=1+1", " kept ", "@"], csv.Column("remark"));
        Assert.Equal(["0.04", "0.01", "0.03"], csv.Column("P value"));
        Assert.Equal([0.12, 0.03, 0.09], csv.Numbers("bonferroni"));
        Assert.Equal([0.06, 0.03, 0.06], csv.Numbers("holm"));
    }

    [Fact]
    public void Rows_without_a_p_value_count_in_the_family_and_a_notice_says_so()
    {
        Ran ran = _place.Run("adjust", Column("0.01", "NA", "0.2"), "--correction", "holm", "--format", "csv").Well();
        Assert.Equal(["0.03", "", "0.4"], ran.Csv.Column("holm"));
        Assert.Contains("1 row(s) have no p-value; they count as p = 1 in the family of 3", ran.Error, StringComparison.Ordinal);
    }

    [Fact]
    public void A_larger_family_counts_and_a_smaller_one_is_refused()
    {
        string file = Column("0.01", "0.2");
        Assert.Equal([0.1, 1], _place.Run("adjust", file, "--correction", "bonferroni", "--family-size", "10", "--format", "csv").Well().Csv.Numbers("bonferroni"));
        _place.Run("adjust", file, "--family-size", "1", "--format", "csv").Refused(2, "--family-size 1", "2 p-values", "2 or more");
        Ran chosen = _place.Run("adjust", Column("0.01", "NA", "0.2"), "--family-size", "2", "--correction", "holm", "--format", "csv").Well();
        Assert.Equal(["0.02", "", "0.2"], chosen.Csv.Column("holm"));
    }

    [Fact]
    public void A_family_of_a_thousand_million_takes_no_time()
    {
        string file = Column("1e-12", "0.01");
        long began = TimeProvider.System.GetTimestamp();
        CsvText csv = _place.Run("adjust", file, "--family-size", "1000000000", "--format", "csv").Well().Csv;
        Assert.True(TimeProvider.System.GetElapsedTime(began) < TimeSpan.FromSeconds(2));
        Assert.Equal(1e-3, csv.Numbers("bonferroni")[0], 1e-17);
        Assert.Equal(1e-3, csv.Numbers("bh")[0], 1e-17);

        // The sum of 1/i up to 1e9 is 21.300481502347944 (ln n + Euler's constant + 1/(2n), from memory); Benjamini and Yekutieli (2001) multiply by it.
        Assert.Equal(0.021300481502347944, csv.Numbers("by")[0], 1e-15);
    }

    [Fact]
    public void Nought_one_and_the_smallest_values_are_taken()
    {
        CsvText csv = _place.Run("adjust", Column("0", "1", "1e-400", "5e-324"), "--format", "csv").Well().Csv;
        Assert.Equal(["0", "1", "1e-400", "5e-324"], csv.Column("p"));
        Assert.All(csv.Columns.Skip(1), key => Assert.Equal("0", csv.Column(key)[0]));
        Assert.All(csv.Columns.Skip(1), key => Assert.Equal("1", csv.Column(key)[1]));
        Assert.Matches("^[34]\\.?[0-9]*E-400$", csv.Column("bonferroni")[2]);
        Assert.All(csv.Columns.Skip(1), key => Assert.EndsWith("E-400", csv.Column(key)[2], StringComparison.Ordinal));
        Assert.Equal(2e-323, csv.Numbers("bonferroni")[3]);
    }

    [Theory]
    [InlineData("1.5", "between 0 and 1")]
    [InlineData("1.0000000000000000000001", "between 0 and 1")]
    [InlineData("-0.1", "between 0 and 1")]
    [InlineData("-1e-400", "between 0 and 1")]
    [InlineData("small", "small")]
    [InlineData("NaN", "NaN")]
    [InlineData("inf", "inf")]
    [InlineData("<0.001", "<0.001")]
    [InlineData("0,05", "0,05")]
    [InlineData("0.05*", "0.05*")]
    public void What_is_no_p_value_is_refused_with_its_line(string text, string reason) =>
        _place.Run("adjust", Column("0.5", "0.25", $"\"{text}\""), "--format", "csv").Refused(3, "p.csv line 4, column p", reason);

    [Fact]
    public void Every_bad_line_is_told()
    {
        Ran ran = _place.Run("adjust", Column("2", "0.5", "x"), "--format", "json").Refused(3, "Problems: 2", "line 2", "line 4");
        Assert.Equal(4, ran.Error.Split('\n').Length);
    }

    [Fact]
    public void Decimal_comma_with_semicolon_is_read()
    {
        string file = _place.Write("p.csv", "Versuch;p\r\nA;0,01\r\nB;0,04\r\n");
        CsvText csv = _place.Run("adjust", file, "--decimal", "comma", "--correction", "bh", "--format", "csv").Well().Csv;
        Assert.Equal(["0,01", "0,04"], csv.Column("p"));
        Assert.Equal([0.02, 0.04], csv.Numbers("bh"));
    }

    [Fact]
    public void Wrong_columns_and_corrections_are_named_with_the_nearest()
    {
        string file = _place.Write("p.csv", "name,p-value\nA,0.1\n");
        _place.Run("adjust", file, "--format", "csv").Refused(3, "p.csv has no column headed \"p\"", "\"p-value\"");
        _place.Run("adjust", file, "--column", "p-vlaue", "--format", "csv").Refused(3, "\"p-value\" may be it");
        _place.Run("adjust", file, "--correction", "holn", "--format", "csv").Refused(2, "'holn'", "did you mean 'holm'?", "bonferroni");
        _place.Run("adjust", file, "--correction", "", "--format", "csv").Refused(2, "There is no correction ''");
        _place.Run("adjust", file, "--column", " ", "--format", "csv").Refused(2, "--column must not be empty");
        _place.Run("adjust", _place.At("none.csv")).Refused(3, "none.csv is not there");
    }

    [Fact]
    public void A_column_that_would_come_twice_is_refused()
    {
        string file = _place.Write("p.csv", "p,bh,note,note\n0.1,0.2,a,b\n");
        _place.Run("adjust", file, "--format", "csv").Refused(3, "two columns 'bh'", "--correction");
        Assert.Equal(["p", "bh", "note", "note", "holm"], _place.Run("adjust", file, "--correction", "holm", "--format", "csv").Well().Csv.Columns);
        _place.Run("adjust", file, "--correction", "holm", "--format", "json").Refused(3, "two columns 'note'");
    }

    [Fact]
    public void Json_and_csv_say_the_same()
    {
        string file = Column("0.013", "NA", "1e-310", "1e-400", "0.5");
        CsvText csv = _place.Run("adjust", file, "--format", "csv").Well().Csv;
        using var json = JsonDocument.Parse(_place.Run("adjust", file, "--format", "json").Well().Out);
        Assert.Equal(csv.Rows.Count, json.RootElement.GetArrayLength());
        foreach ((JsonElement row, string[] fields) in json.RootElement.EnumerateArray().Zip(csv.Rows))
        {
            Assert.Equal(csv.Columns, row.EnumerateObject().Select(p => p.Name));
            Assert.Equal(fields, row.EnumerateObject().Select(p => p.Value.ValueKind switch { JsonValueKind.Null => "", JsonValueKind.String => p.Value.GetString()!, _ => p.Value.GetRawText() }));
        }
    }

    [Fact]
    public void Adjusted_values_read_back_as_the_same_doubles()
    {
        var random = new Random(20_260_302);
        string[] p = [.. Enumerable.Range(0, 500).Select(_ => Math.Pow(10, -20 * random.NextDouble()).ToString("R", CultureInfo.InvariantCulture))];
        CsvText csv = _place.Run("adjust", Column(p), "--format", "csv").Well().Csv;
        Assert.Equal(p.Select(CsvText.Number), csv.Numbers("none"));
        foreach (string key in csv.Columns.Skip(1))
        {
            Assert.All(csv.Column(key), text => Assert.Equal(text, CsvText.Number(text).ToString("R", CultureInfo.InvariantCulture)));
        }
    }

    [Fact]
    public void A_file_without_rows_is_refused()
    {
        _place.Run("adjust", _place.Write("p.csv", "p\n"), "--format", "csv").Refused(3, "p.csv: has no rows below its header");
        _place.Run("adjust", _place.Write("p.csv", ""), "--format", "csv").Refused(3, "p.csv");
    }

    [Fact]
    public void Adjust_makes_no_catalog()
    {
        _place.Run("adjust", Column("0.1")).Well();
        Assert.False(File.Exists(_place.Catalog));
    }

    [Fact]
    public void Long_files_show_their_first_rows_and_say_what_was_left_out()
    {
        var text = new StringBuilder();
        string file = Column(Enumerable.Range(1, 1000).Select(i => (i / 1000.0).ToString("R", CultureInfo.InvariantCulture)));
        Assert.Contains("... and 800 more rows", _place.Run("adjust", file).Well().Out, StringComparison.Ordinal);
        Assert.Contains("... and 997 more rows", _place.Run("adjust", file, "--top", "3").Well().Out, StringComparison.Ordinal);
        Assert.DoesNotContain("more rows", text.Append(_place.Run("adjust", file, "--top", "0").Well().Out).ToString(), StringComparison.Ordinal);
        Assert.Equal(1000, _place.Run("adjust", file, "--top", "3", "--format", "csv").Well().Csv.Rows.Count);
    }
}
