using System.Text.RegularExpressions;

namespace Campaigns.App.Tests.Commands;

/// <summary>Small things that make a sentence read as one.</summary>
public sealed partial class WordingTests : IDisposable
{
    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void No_number_is_followed_by_a_noun_with_its_plural_in_brackets()
    {
        string source = Path.Combine(Workplace.Repository(), "src");
        string[] files = [.. Directory.GetFiles(source, "*.cs", SearchOption.AllDirectories).Where(f => !f.Split(Path.DirectorySeparatorChar).Contains("obj"))];
        Assert.True(files.Length > 300);
        Assert.All(files, f => Assert.DoesNotMatch(BracketedPlural(), File.ReadAllText(f)));
        Assert.Matches(BracketedPlural(), "$\"{count} blank line(s) were\"");
    }

    [Fact]
    public void A_head_or_a_digest_to_be_copied_ends_without_a_full_stop()
    {
        string folder = _place.Campaign("C", "experiment\nE1\nE2\n", Workplace.TwoExperiments);
        string[][] commands =
        [
            ["run", folder], ["show", "C"], ["show", "C", "E1"], ["show", "C", "--sealed-plan"], ["review", "C"], ["export", "C", "--out", _place.At("out")], ["ledger"], ["ledger", "verify"],
            ["backup", _place.At("copy.db")], ["restore-check", _place.At("copy.db")], ["start", "D"], ["plan", "D", _place.Write("p.csv", "experiment\nE1\n")], ["seal", "D"],
        ];
        int seen = 0;
        foreach (string[] command in commands)
        {
            string said = _place.Run(command).Well().Out;
            seen += LongHash().Count(said);
            Assert.DoesNotMatch(HashWithSign(), said);
        }

        string head = _place.Run("ledger", "verify", "--format", "csv").Csv.Column("head")[0];
        Assert.DoesNotMatch(HashWithSign(), _place.Run("ledger", "verify", "--head", head).Well().Out);
        Assert.InRange(seen, 11, 40);
    }

    [Fact]
    public void A_campaign_without_a_title_has_no_empty_brackets()
    {
        _place.Run("start", "P").Well();
        _place.Run("start", "Q", "--title", "Paints").Well();
        _place.Run("plan", "P", _place.Write("p.csv", "experiment\nE1\n")).Well();
        _place.Run("backup", _place.At("copy.db")).Well();
        string told = _place.Run("restore-check", _place.At("copy.db")).Well().Out;
        Assert.Contains("Campaign P: 1 experiment.", told, StringComparison.Ordinal);
        Assert.Contains("Campaign Q (Paints): 0 experiments.", told, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData(false)]
    [InlineData(true)]
    public void A_campaign_without_data_is_exported_without_files_that_a_run_would_refuse(bool isPlanned)
    {
        _place.Run("start", "P", "--correction", "holm").Well();
        if (isPlanned)
        {
            _place.Run("plan", "P", _place.Write("p.csv", "experiment\nE1\n")).Well();
        }

        _place.Run("export", "P", "--out", _place.At("out")).Well();
        Assert.Equal((isPlanned, false), (File.Exists(_place.At("out", "plan.csv")), Directory.Exists(_place.At("out", "measurements"))));
        _place.Variables["CAMPAIGNS_CATALOG"] = _place.At("again.db");
        Ran again = _place.Run("run", _place.At("out"));
        if (isPlanned)
        {
            Assert.Contains("There is no folder 'measurements', so nothing was loaded.", again.Well().Out, StringComparison.Ordinal);
            Assert.Equal(["E1"], _place.Run("results", "P", "--format", "csv").Well().Csv.Column("experiment"));
        }
        else
        {
            // Where nothing was planned there is nothing to run, and that is what is said, not that a file is broken.
            Assert.Equal((3, "The campaign 'P' has neither a plan nor data: put a plan.csv or measurements/*.csv into its folder.\n"), (again.Code, again.Error));
        }
    }

    [GeneratedRegex(@"\}( [a-z]+)+\(s\)")]
    private static partial Regex BracketedPlural();

    [GeneratedRegex("[0-9a-f]{64}")]
    private static partial Regex LongHash();

    [GeneratedRegex("[0-9a-f]{64}[.,;:]")]
    private static partial Regex HashWithSign();
}
