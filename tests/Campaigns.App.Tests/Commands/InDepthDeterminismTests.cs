using System.Globalization;
using System.Text.RegularExpressions;

namespace Campaigns.App.Tests.Commands;

/// <summary>The same bytes whatever the order of the rows, the culture, and the number of times it is run; permutation p-values included.</summary>
public sealed class InDepthDeterminismTests : IDisposable
{
    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Theory]
    [InlineData("ordinary")]
    [InlineData("ties everywhere")]
    [InlineData("sixty groups")]
    [InlineData("offset of 1e12")]
    [InlineData("one block without a group")]
    [InlineData("several readings of a specimen")]
    public void The_order_of_the_rows_changes_no_result_and_no_comparison(string name)
    {
        string[] experiments = Layout.Of(name).Run(_place);
        string file = _place.At("C", "measurements", "week-01.csv");
        string[] lines = File.ReadAllLines(file);
        string[] rows = lines[1..];
        new Random(4711).Shuffle(rows);
        _place.Write("C/measurements/week-01.csv", string.Join('\n', [lines[0], .. rows]) + "\n");
        _place.Run("run", _place.At("C"), "--catalog", _place.At("shuffled.db")).Well();
        foreach (string[] command in (string[][])[["results", "C"], ["comparisons", "C"], ["survivors", "C"], .. experiments.Select(e => (string[])["show", "C", e])])
        {
            string straight = WithoutHead(_place.Run([.. command, "--format", "csv"]).Well().Out);
            Assert.Equal(straight, WithoutHead(_place.Run([.. command, "--format", "csv", "--catalog", _place.At("shuffled.db")]).Well().Out));
            Assert.NotEmpty(CsvText.Read(straight).Columns);
        }
    }

    /// <summary>The ledger knows the bytes of the file that was loaded, so its head is another for shuffled rows.</summary>
    private static string WithoutHead(string csv) => Regex.Replace(csv, "(?<=[0-9]:)[0-9a-f]{64}", "<hash>");

    [Fact]
    public void Twice_the_same_gives_the_same_bytes_in_every_format()
    {
        Assert.Equal(Whole(), Whole());

        static string Whole()
        {
            using var place = new Workplace();
            string[] experiments = Layout.Of("ordinary").Run(place);
            place.Run("exclude", "C", "f dunnett", "--line", "40", "--reason", "r", "--as", "B").Well();
            place.Run("test", "C").Well();
            place.Run("review", "C").Well();
            return HonestOutput.Of(place, "C", experiments).Replace(place.Folder, "FOLDER", StringComparison.Ordinal);
        }
    }

    [Theory]
    [InlineData("de_DE.UTF-8")]
    [InlineData("tr_TR.UTF-8")]
    public void The_language_of_the_machine_changes_nothing(string locale)
    {
        Assert.SkipWhen(OperatingSystem.IsWindows(), "needs env");
        Layout.Of("ordinary").Run(_place);
        string[][] commands =
        [
            ["results", "C", "--format", "csv"], ["comparisons", "C", "--format", "csv"], ["comparisons", "C", "--format", "json"],
            ["show", "C", "welch games-howell", "--format", "json"], ["show", "C", "permutation games-howell", "--format", "csv"],
        ];
        CultureInfo before = CultureInfo.CurrentCulture;
        var comma = (CultureInfo)CultureInfo.InvariantCulture.Clone();
        comma.NumberFormat.NumberDecimalSeparator = ",";
        comma.NumberFormat.NegativeSign = "−";
        foreach (string[] command in commands)
        {
            string plain = _place.Run(command).Well().Out;
            Assert.Equal(plain, Executable.End(Executable.Start("env", _place.Catalog, [$"LC_ALL={locale}", $"LANG={locale}", Executable.Path, .. command])).Well().Out);
            try
            {
                CultureInfo.CurrentCulture = comma;
                Assert.Equal(plain, _place.Run(command).Well().Out);
            }
            finally
            {
                CultureInfo.CurrentCulture = before;
            }
        }

        string file = _place.At("other.db");
        Executable.End(Executable.Start("env", file, [$"LC_ALL={locale}", Executable.Path, "run", _place.At("C")])).Well();
        Assert.Equal(_place.Run("results", "C", "--format", "csv").Well().Out, _place.Run("results", "C", "--format", "csv", "--catalog", file).Well().Out);
    }
}
