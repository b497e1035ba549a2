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
        Assert.Contains("1 row has no p-value; it counts as p = 1 in the family of 3", ran.Error, StringComparison.Ordinal);
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
    public void Blank_lines_of_a_single_column_are_told_and_weights_without_a_weighted_correction_are_refused()
    {
        string blank = _place.Write("blank.csv", "p\n0.001\n\n0.002\n");
        Ran ran = _place.Run("adjust", blank, "--correction", "bonferroni", "--format", "csv").Well();
        Assert.Equal(["0.002", "0.004"], ran.Csv.Column("bonferroni"));
        Assert.Contains("1 blank line was passed over and is not counted", ran.Error, StringComparison.Ordinal);
        Assert.DoesNotContain("blank", _place.Run("adjust", Column("0.001", "0.002"), "--correction", "bonferroni", "--format", "csv").Well().Error, StringComparison.Ordinal);
        string weighted = _place.Write("w.csv", "p,w\n0.001,1\n0.002,2\n");
        _place.Run("adjust", weighted, "--correction", "holm,lord", "--weights", "w").Refused(2, "takes weights");
    }

    [Fact]
    public void A_family_of_a_thousand_million_is_corrected()
    {
        string file = Column("1e-12", "0.01");
        CsvText csv = _place.Run("adjust", file, "--family-size", "1000000000", "--format", "csv").Well().Csv;
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

        // The two-stage procedure rejects three at 0.25/1.25 and then compares the last with 4 times the level of that stage: p = 1 survives from 1/3 on.
        Assert.All(csv.Columns.Skip(1), key => Assert.Equal(key == "bky" ? 1.0 / 3 : 1, csv.Numbers(key)[1], 1e-15));
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
    public void Weights_come_from_a_column_and_untested_rows_keep_theirs()
    {
        // Weights 2, 1, 1, 0.5, 0.5 and p = 0.01 ... 0.05: Genovese, Roeder and Wasserman's and Holm's worked out by hand.
        string file = _place.Write("w.csv", "p,importance\n0.01,4\n0.02,2\n0.03,2\n0.04,1\n0.05,1\n");
        CsvText csv = _place.Run("adjust", file, "--weights", "importance", "--correction", "weighted-bonferroni,weighted-holm,weighted-bh", "--format", "csv").Well().Csv;
        Assert.Equal([0.025, 0.1, 0.15, 0.4, 0.5], csv.Numbers("weighted-bonferroni"), (a, b) => Math.Abs(a - b) < 1e-15);
        Assert.Equal([0.025, 0.06, 0.06, 0.08, 0.08], csv.Numbers("weighted-holm"), (a, b) => Math.Abs(a - b) < 1e-15);
        Assert.Equal([0.025, 0.05, 0.05, 0.1, 0.1], csv.Numbers("weighted-bh"), (a, b) => Math.Abs(a - b) < 1e-15);

        string untested = _place.Write("w.csv", "p,w\n0.01,1\nNA,3\n0,0\n");
        csv = _place.Run("adjust", untested, "--weights", "w", "--format", "csv").Well().Csv;
        Assert.Equal(["0.04", "", "1"], csv.Column("weighted-bonferroni"));
        Assert.Equal(["0.015", "", "0"], csv.Column("bh"));
    }

    [Fact]
    public void Weighted_corrections_without_weights_and_weights_that_are_none_are_refused()
    {
        string file = _place.Write("w.csv", "p,w,half,nil\n0.01,-1,1,0\n0.02,x,,0\n");
        _place.Run("adjust", file, "--correction", "holm,weighted-holm").Refused(2, "'weighted-holm' needs a weight", "--weights COLUMN");
        Assert.DoesNotContain("weighted", string.Join(' ', _place.Run("adjust", file, "--format", "csv").Well().Csv.Columns), StringComparison.Ordinal);
        _place.Run("adjust", file, "--weights", "w").Refused(3, "w.csv line 2, column w", "0 or more, not -1", "w.csv line 3, column w", "Problems: 2");
        _place.Run("adjust", file, "--weights", "half").Refused(3, "w.csv line 3, column half", "The weight is missing");
        _place.Run("adjust", file, "--weights", "nil").Refused(3, "All weights", "'nil'");
        _place.Run("adjust", file, "--weights", "hlaf").Refused(3, "\"half\" may be it");
        _place.Run("adjust", file, "--weights", "half", "--family-size", "9").Refused(2, "leave out --family-size");
    }

    [Fact]
    public void Q_values_come_with_the_share_of_true_nulls_they_rest_on()
    {
        // Four of fifteen lie above 1/2: 4 / (15 * 0.5) = 0.533, and times the adjusted p of Benjamini and Hochberg.
        Ran table = _place.Run("adjust", Column(Published), "--q-values").Well();
        Assert.Contains("share of true nulls of 0.533 (lambda 0.5) among the 15 tested; other estimates: 0.421 (bootstrap choice of lambda), 0.795 (smoothing spline over lambda)", table.Out.ReplaceLineEndings(" "), StringComparison.Ordinal);
        Ran csv = _place.Run("adjust", Column(Published), "--q-values", "--correction", "bh", "--format", "csv").Well();
        Assert.Equal(["p", "bh", "q_value"], csv.Csv.Columns);
        Assert.All(csv.Csv.Numbers("bh").Zip(csv.Csv.Numbers("q_value")), pair => Assert.Equal(pair.First * 8 / 15, pair.Second, 1e-15));
        Assert.Contains("0.533", csv.Error, StringComparison.Ordinal);
        Assert.Contains("15 p-values are few", csv.Error, StringComparison.Ordinal);

        Ran none = _place.Run("adjust", Column("0.01", "0.02"), "--q-values", "--correction", "bh", "--format", "csv").Well();
        Assert.Equal(["", ""], none.Csv.Column("q_value"));
        Assert.Contains("not estimable", none.Error, StringComparison.Ordinal);
        _place.Run("adjust", _place.Write("p.csv", "p,q_value\n0.1,0.2\n"), "--q-values", "--format", "csv").Refused(3, "two columns 'q_value'");
    }

    [Fact]
    public void Adaptive_corrections_say_what_they_do_not_cover()
    {
        Ran chosen = _place.Run("adjust", Column(Published), "--correction", "bky,storey", "--format", "csv").Well();
        Assert.Contains("bky and storey: proved for independent p-values only", chosen.Error, StringComparison.Ordinal);
        Assert.Contains("storey: 15 p-values are few", chosen.Error, StringComparison.Ordinal);
        Assert.Equal(8, chosen.Csv.Numbers("bky").Count(p => p <= 0.05));
        Assert.DoesNotContain("independent p-values only", _place.Run("adjust", Column(Published), "--format", "csv").Well().Error, StringComparison.Ordinal);
        Assert.Contains("independent p-values only", _place.Run("adjust", Column(Published)).Well().Out, StringComparison.Ordinal);
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
