using System.Text;

namespace Campaigns.App.Tests.Commands;

public sealed class CatalogChoiceTests : IDisposable
{
    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void The_option_goes_before_the_variable()
    {
        _place.Run("start", "A").Well();
        _place.Run("start", "B", "--catalog", _place.At("other.db")).Well();
        Assert.Equal(["A"], _place.Run("list", "--format", "csv").Well().Csv.Column("campaign"));
        Assert.Equal(["B"], _place.Run("list", "--catalog", _place.At("other.db"), "--format", "csv").Well().Csv.Column("campaign"));
        Assert.Equal(["B"], _place.Run("--catalog", _place.At("other.db"), "list", "--format", "csv").Well().Csv.Column("campaign"));
    }

    [Theory]
    [InlineData("")]
    [InlineData(null)]
    public void Without_both_it_is_campaigns_db_in_the_current_folder(string? variable)
    {
        _place.Variables.Remove("CAMPAIGNS_CATALOG");
        if (variable is not null)
        {
            _place.Variables["CAMPAIGNS_CATALOG"] = variable;
        }

        Assert.False(File.Exists("campaigns.db"), "the tests' own folder holds no catalog");
        _place.Run("list").Refused(4, "There is no catalog 'campaigns.db'");
    }

    [Theory]
    [InlineData("list")]
    [InlineData("results", "A")]
    [InlineData("survivors", "A")]
    [InlineData("corrections", "A")]
    [InlineData("risk")]
    [InlineData("risk", "A")]
    [InlineData("show", "A")]
    [InlineData("show", "A", "E1")]
    [InlineData("export", "A", "--out", "never-made")]
    [InlineData("plan", "A", "plan.csv")]
    [InlineData("seal", "A")]
    [InlineData("load", "A", "m.csv")]
    [InlineData("test", "A")]
    [InlineData("review", "A")]
    [InlineData("dashboard", "A")]
    [InlineData("upgrade")]
    public void Only_start_and_run_make_a_catalog(params string[] arguments)
    {
        foreach (string format in (string[])["table", "csv", "json"])
        {
            _place.Run([.. arguments, "--format", format]).Refused(4, "There is no catalog", "--catalog");
        }

        Assert.Empty(Directory.EnumerateFileSystemEntries(_place.Folder));
        Assert.False(Directory.Exists("never-made"));
    }

    [Fact]
    public void A_file_that_is_no_catalog_is_left_as_it_is()
    {
        string file = _place.Write("notes.db", "Only notes.");
        foreach (string[] arguments in (string[][])[["list"], ["start", "A"], ["run", Workplace.Demo]])
        {
            _place.Run([.. arguments, "--catalog", file]).Refused(4, "is no catalog of this program");
        }

        Assert.Equal("Only notes.", File.ReadAllText(file));
        _place.Run("list", "--catalog", _place.Folder).Refused(4, "it is a folder");
        _place.Run("start", "A", "--catalog", _place.At("none", "c.db")).Refused(4, "its folder is not there");
    }

    [Fact]
    public void A_newer_catalog_is_refused_and_left_as_it_is()
    {
        _place.Run("start", "A").Well();
        byte[] bytes = File.ReadAllBytes(_place.Catalog);
        bytes[63] = 99;
        File.WriteAllBytes(_place.Catalog, bytes);
        _place.Run("list", "--format", "csv").Refused(4, "newer version", "99");
        _place.Run("start", "B").Refused(4, "newer version");
        Assert.Equal(bytes, File.ReadAllBytes(_place.Catalog));
    }

    [Fact]
    public void A_damaged_catalog_is_refused_in_a_sentence()
    {
        _place.Run("run", Workplace.Demo).Well();
        byte[] bytes = File.ReadAllBytes(_place.Catalog);
        Encoding.ASCII.GetBytes("noise that is no page of a database").CopyTo(bytes, 8192);
        bytes.AsSpan(8192 + 64, bytes.Length - 8192 - 64).Fill(0xA5);
        File.WriteAllBytes(_place.Catalog, bytes);
        Ran ran = _place.Run("results", "adhesion-screen", "--format", "csv");
        ran.Refused(4, "damaged");
    }

    [Fact]
    public void A_catalog_in_use_is_refused_as_locked()
    {
        _place.Run("start", "A").Well();
        using var other = new Microsoft.Data.Sqlite.SqliteConnection($"Data Source={_place.Catalog};Pooling=False");
        other.Open();
        using Microsoft.Data.Sqlite.SqliteCommand hold = other.CreateCommand();
        hold.CommandText = "BEGIN EXCLUSIVE";
        hold.ExecuteNonQuery();
        _place.Run("start", "B", "--format", "csv").Refused(4, "locked by another program", "try again");
    }

    [Fact]
    public void Campaigns_that_are_not_there_are_named_with_the_nearest()
    {
        _place.Run("start", "PRIMERS").Well();
        _place.Run("results", "PRIMRES", "--format", "csv").Refused(3, "no campaign 'PRIMRES'", "'PRIMERS' may be meant");
        _place.Run("show", "XYZ").Refused(3, "'campaigns list' shows");
        _place.Run("start", "PRIMERS").Refused(3, "'PRIMERS'");
    }
}
