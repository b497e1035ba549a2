using System.Globalization;
using System.Security.Cryptography;
using System.Text;
using System.Text.Json;
using Campaigns.Catalog.Exporting;

namespace Campaigns.App.Tests.Commands;

public sealed class ExportRecordTests : IDisposable
{
    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void Every_column_of_every_file_is_in_the_dictionary_and_every_line_of_it_is_a_column()
    {
        _place.Run("run", Workplace.Demo).Well();
        _place.Run("exclude", "adhesion-screen", "GS-01", "--line", Line("GS-01"), "--reason", "torn").Well();
        Export("adhesion-screen", "demo");
        AssertDescribed("demo");
        _place.Run("plan", "adhesion-screen", _place.Write("more.csv", "experiment,groups\nGS-99,a|b\nGS-98,a|b\n"), "--reason", "a new resin").Well();
        _place.Run("withdraw", "adhesion-screen", "GS-99", "--reason", "no resin left").Well();
        Export("adhesion-screen", "changed");
        AssertDescribed("changed");
        _place.Run("run", _place.Campaign("X", null, Workplace.TwoExperiments)).Well();
        Export("X", "exploratory");
        AssertDescribed("exploratory");
        string folder = _place.Campaign("F", "experiment,groups,family\nE1,a|b,one\nE2,a|b,two\n", Workplace.TwoExperiments, correction: "holm");
        _place.Write("F/families.csv", "family,level\none,0.02\ntwo,0.03\n");
        _place.Run("run", folder).Well();
        Export("F", "families");
        AssertDescribed("families");
        _place.Run("run", _place.Campaign("O", "experiment,groups\nE1,a|b\nE2,a|b\n", Workplace.TwoExperiments, correction: "lord")).Well();
        Export("O", "online");
        AssertDescribed("online");
        string[] seen = [.. new[] { "demo", "changed", "exploratory", "families", "online" }.SelectMany(f => CsvText.Read(File.ReadAllText(_place.At(f, "dictionary.csv"))).Column("file")).Distinct()];
        Assert.Empty(ColumnMeanings.All.Select(c => c.File).Distinct().Except(seen));
    }

    [Fact]
    public void The_plan_as_it_was_sealed_goes_out_beside_the_amended_one_and_has_the_digest_of_the_seal()
    {
        string plan = "experiment,title,groups\nE1,first,a|b\nE2,-second,a|b\n";
        _place.Run("run", _place.Campaign("C", plan, Workplace.TwoExperiments)).Well();
        string digest = Digest("C");
        Export("C", "before");
        Assert.False(File.Exists(_place.At("before", "sealed-plan.csv")));
        _place.Run("plan", "C", _place.Write("amended.csv", plan.Replace("-second", "+later", StringComparison.Ordinal) + "E3,third,a|b\n"), "--reason", "=new resin").Well();
        Assert.Contains("sealed-plan.csv the plan as it was sealed", _place.Run("export", "C", "--out", _place.At("after")).Well().Out.ReplaceLineEndings(" "), StringComparison.Ordinal);
        Assert.Equal(File.ReadAllText(_place.At("before", "plan.csv")), File.ReadAllText(_place.At("after", "sealed-plan.csv")));
        CsvText now = CsvText.Read(File.ReadAllText(_place.At("after", "plan.csv")));
        Assert.Equal(["first", "'+later", "third"], now.Column("title"));
        CsvText amendments = CsvText.Read(File.ReadAllText(_place.At("after", "amendments.csv")));
        Assert.Equal(["1,E2,title,'-second,'+later,'=new resin", "1,E3,added,,,'=new resin"], amendments.Rows.Select(r => string.Join(',', r[..6])));

        // The sealed plan in the place of the amended one is sealed to the same digest.
        File.Copy(_place.At("after", "sealed-plan.csv"), _place.At("after", "plan.csv"), overwrite: true);
        _place.Variables["CAMPAIGNS_CATALOG"] = _place.At("again.db");
        _place.Run("run", _place.At("after")).Well();
        Assert.Equal(digest, Digest("C"));
    }

    [Fact]
    public void A_campaign_whose_names_begin_with_formula_signs_is_exported_and_run_to_the_same_plan_digest_and_results()
    {
        string[] codes = ["=1+1", "+E", "-E", "@E", "'=E", "''", "\uFF1DE", "E"];
        string plan = "experiment,title,response,unit,groups,control,follow_up,family,shared_control\n" + string.Concat(codes.Select(c => $"{Typed(c)},-title,@response,=unit,{Typed("=a|-b|'=c")},-b,dunnett,+family,=tray\n"));
        string values = "experiment,group,value,specimen,block\n" + string.Concat(codes.SelectMany((c, e) => Enumerable.Range(0, 12).Select(i =>
            FormattableString.Invariant($"{Typed(c)},{Typed(((string[])["=a", "-b", "'=c"])[i % 3])},-{1 + (e * (i % 3)) + (i * i % 5 * 0.25)},=s{i},+day\n"))));
        _place.Run("run", _place.Campaign("C", plan, values, correction: "holm")).Well();
        Assert.Equal(codes, JsonDocument.Parse(_place.Run("results", "C", "--format", "json").Well().Out).RootElement.EnumerateArray().Select(r => r.GetProperty("experiment").GetString()));
        string digest = Digest("C"), results = _place.Run("results", "C", "--format", "csv").Well().Out, comparisons = _place.Run("comparisons", "C", "--format", "csv").Well().Out;
        Export("C", "out");
        Assert.All(Directory.GetFiles(_place.At("out"), "*.csv", SearchOption.AllDirectories).SelectMany(f => CsvText.Read(File.ReadAllText(f)).Rows).SelectMany(r => r),
            cell => Assert.True(cell.Length == 0 || !"=+@\uFF1D".Contains(cell[0], StringComparison.Ordinal) && (cell[0] != '-' || double.TryParse(cell, CultureInfo.InvariantCulture, out _)), cell));
        _place.Variables["CAMPAIGNS_CATALOG"] = _place.At("again.db");
        _place.Run("run", _place.At("out")).Well();
        Assert.Equal((digest, results, comparisons), (Digest("C"), _place.Run("results", "C", "--format", "csv").Well().Out, _place.Run("comparisons", "C", "--format", "csv").Well().Out));
    }

    [Fact]
    public void The_record_names_the_head_of_the_ledger_and_the_digest_of_every_file()
    {
        _place.Run("run", Workplace.Demo).Well();
        string head = _place.Run("export", "adhesion-screen", "--out", _place.At("out"), "--format", "csv").Well().Csv.Column("ledger_head").Single();
        using var record = JsonDocument.Parse(File.ReadAllText(_place.At("out", "record.json")));
        Assert.Equal("adhesion-screen", record.RootElement.GetProperty("campaign").GetString());
        Assert.Equal(head, record.RootElement.GetProperty("ledger_head").GetString());
        Assert.StartsWith(FormattableString.Invariant($"{record.RootElement.GetProperty("ledger_sequence").GetInt64()}:"), head, StringComparison.Ordinal);
        Assert.Equal("2026-03-02T09:30:00Z", record.RootElement.GetProperty("exported_at").GetString());
        var files = record.RootElement.GetProperty("files").EnumerateObject().ToDictionary(p => p.Name, p => p.Value.GetString());
        Assert.Equal(Directory.GetFiles(_place.At("out"), "*", SearchOption.AllDirectories).Length - 1, files.Count);
        Assert.All(files, f => Assert.Equal(Convert.ToHexStringLower(SHA256.HashData(File.ReadAllBytes(_place.At(["out", .. f.Key.Split('/')])))), f.Value));
        CsvText ledger = CsvText.Read(File.ReadAllText(_place.At("out", "ledger.csv")));
        Assert.Equal(head, $"{ledger.Column("sequence").Last()}:{ledger.Column("hash").Last()}");
    }

    [Fact]
    public void Loaded_files_come_back_byte_for_byte_under_safe_names()
    {
        _place.Run("start", "C").Well();
        byte[] one = [0xEF, 0xBB, 0xBF, .. Encoding.UTF8.GetBytes("experiment;group;value\r\nE1;a;1,5\r\nE1;b;2\r\n")], two = Encoding.UTF8.GetBytes("experiment,group,value\nE2,a,1\nE2,b,2");
        string first = _place.Write("x/week.csv", ""), second = _place.Write("y/week.csv", "");
        File.WriteAllBytes(first, one);
        File.WriteAllBytes(second, two);
        _place.Run("load", "C", first, "--decimal", "comma").Well();
        _place.Run("load", "C", second).Well();
        CsvText rows = _place.Run("export", "C", "--originals", "--out", _place.At("back"), "--format", "csv").Well().Csv;
        Assert.Equal(["week.csv", "week-2.csv"], rows.Column("written_as"));
        Assert.Equal(one, File.ReadAllBytes(_place.At("back", "week.csv")));
        Assert.Equal(two, File.ReadAllBytes(_place.At("back", "week-2.csv")));
        CsvText list = CsvText.Read(File.ReadAllText(_place.At("back", "originals.csv")));
        Assert.Equal(["utf-8 with mark", "utf-8"], list.Column("encoding"));
        Assert.Equal(["semicolon", "comma"], list.Column("separator"));
        Assert.Equal(["comma", "point"], list.Column("decimal"));
        Assert.Equal("experiment=experiment,group=group,value=value", list.Column("columns")[0]);
        _place.Run("export", "C", "--originals", "--out", _place.At("back")).Refused(3, "not an empty folder");
    }

    [Fact]
    public void Every_observation_is_traced_to_file_and_line()
    {
        _place.Run("start", "C").Well();
        _place.Run("load", "C", _place.Write("m.csv", "experiment,group,value,block,order\nE1,-a,-1.50,d1,4\nE2,b,7,,\nE1,b,2,,\n")).Well();
        CsvText rows = _place.Run("show", "C", "E1", "--observations", "--format", "csv").Well().Csv;
        Assert.Equal(["-a,-1.50,m.csv,2,,d1,4,false", "b,2.00,m.csv,4,,,,false"], rows.Rows.Select(r => string.Join(',', r)));
        _place.Run("show", "C", "--observations").Refused(2, "--observations needs the experiment");
        _place.Run("show", "C", "E9", "--observations").Refused(3, "no experiment 'E9'");
    }

    [Theory]
    [InlineData("=1+1", "'=1+1")]
    [InlineData("+5", "'+5")]
    [InlineData("-", "'-")]
    [InlineData("@x", "'@x")]
    [InlineData("\tx", "'\tx")]
    [InlineData(" \"=x", "' \"=x")]
    [InlineData("\uFF1Dx", "'\uFF1Dx")]
    [InlineData("'=x", "''=x")]
    [InlineData("'x", "'x")]
    [InlineData("'", "'")]
    [InlineData("", "")]
    [InlineData("a-b", "a-b")]
    public void A_text_that_would_start_a_formula_is_guarded_and_comes_back(string text, string guarded)
    {
        Assert.Equal(guarded, SpreadsheetText.Guarded(text));
        Assert.Equal(text, SpreadsheetText.Restored(guarded));
        Assert.Equal(text, Encoding.UTF8.GetString(SpreadsheetText.Restored(Encoding.UTF8.GetBytes(guarded))));
    }

    [Fact]
    public void Rows_for_a_script_are_exact()
    {
        string file = _place.Write("p.csv", "name,shift,p\n=a,-1.5,0.01\n'+b,+2,0.5\n");
        CsvText rows = _place.Run("adjust", file, "--correction", "holm", "--format", "csv").Well().Csv;
        Assert.Equal(["=a,-1.5", "'+b,+2"], rows.Rows.Select(r => $"{r[0]},{r[1]}"));
    }

    /// <summary>A text as a file has to have it so that it is read as it is: one that looks guarded is guarded.</summary>
    private static string Typed(string text) => text.StartsWith("'=", StringComparison.Ordinal) ? "'" + text : text;

    private string Digest(string campaign) => _place.Run("show", campaign, "--format", "csv").Well().Csv.Column("plan_digest")[0];

    private void Export(string campaign, string folder) => _place.Run("export", campaign, "--out", _place.At(folder)).Well();

    private string Line(string experiment) =>
        _place.Run("show", "adhesion-screen", experiment, "--observations", "--format", "csv").Well().Csv.Column("line")[0];

    private void AssertDescribed(string folder)
    {
        CsvText dictionary = CsvText.Read(File.ReadAllText(_place.At(folder, "dictionary.csv")));
        var described = dictionary.Rows.ToLookup(r => r[0], r => r[1], StringComparer.Ordinal);
        string[] files = [.. Directory.GetFiles(_place.At(folder), "*.csv", SearchOption.AllDirectories).Select(f => Path.GetRelativePath(_place.At(folder), f).Replace('\\', '/')).Order(StringComparer.Ordinal)];
        Assert.Equal(files, described.Select(d => d.Key).Order(StringComparer.Ordinal));
        Assert.All(files, f => Assert.Equal(CsvText.Read(File.ReadAllText(_place.At([folder, .. f.Split('/')]))).Columns, described[f]));
        Assert.All(dictionary.Rows, r => Assert.True(r[2].Length > 0 && r[4].Length > 0, r[1]));
    }
}
