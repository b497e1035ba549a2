using System.Diagnostics;
using System.Globalization;
using System.Text;

namespace Campaigns.App.Tests.Commands;

/// <summary>A permutation test that takes long can be stopped, and others may work on the catalog beside it.</summary>
public sealed class LongTestTests : IDisposable
{
    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void Ctrl_C_during_a_long_permutation_test_ends_it_with_130_and_leaves_it_untested()
    {
        Assert.SkipWhen(OperatingSystem.IsWindows(), "needs kill");
        Ready(groups: 60, values: 200, level: "0.000001");
        string before = Results();
        Process process = Executable.Start(_place.Catalog, "test", "C");
        Thread.Sleep(1500);
        Assert.False(process.HasExited, "10,000,000 arrangements of 12,000 values take longer than that");
        using (var kill = Process.Start("kill", ["-INT", process.Id.ToString(CultureInfo.InvariantCulture)]))
        {
            kill.WaitForExit();
        }

        Ran ran = Executable.End(process, seconds: 30);
        Assert.Equal(130, ran.Code);
        Assert.Contains("Stopped", ran.Error, StringComparison.Ordinal);
        Assert.DoesNotContain("   at ", ran.Error, StringComparison.Ordinal);
        Assert.Equal(before, Results());
        Assert.Equal("ready", _place.Run("results", "C", "--format", "csv").Well().Csv.Value("E1", "status"));
    }

    [Fact]
    public void Excluding_while_a_test_runs_leaves_one_of_both_orders_and_a_whole_catalog()
    {
        Ready(groups: 2, values: 40, level: "0.00001");
        Process test = Executable.Start(_place.Catalog, "test", "C");
        Process exclude = Executable.Start(_place.Catalog, "exclude", "C", "E1", "--line", "2", "--reason", "r", "--as", "B");
        Ran excluded = Executable.End(exclude), tested = Executable.End(test);
        Assert.All([excluded, tested], r => Assert.True(r.Code is 0 or 4, $"exit {r.Code}: {r.Error}"));
        Assert.All([excluded, tested], r => Assert.DoesNotContain("   at ", r.Error, StringComparison.Ordinal));
        _place.Run("test", "C").Well();
        _place.Run("review", "C").Well();
        CsvText results = _place.Run("results", "C", "--format", "csv").Well().Csv;
        Assert.Equal(("tested", excluded.Code == 0 ? "79" : "80"), (results.Value("E1", "status"), results.Value("E1", "observations")));

        // The same steps one after the other.
        File.Delete(_place.Catalog);
        Ready(groups: 2, values: 40, level: "0.00001");
        if (excluded.Code == 0)
        {
            _place.Run("exclude", "C", "E1", "--line", "2", "--reason", "r", "--as", "B").Well();
        }

        _place.Run("test", "C").Well();
        Assert.Equal(results.Value("E1", "p"), _place.Run("results", "C", "--format", "csv").Well().Csv.Value("E1", "p"));
    }

    [Fact]
    public void A_catalog_that_may_not_be_written_is_read_and_refuses_exclusions()
    {
        if (OperatingSystem.IsWindows() || Environment.UserName == "root")
        {
            Assert.Skip("needs a user whose rights count");
            return;
        }

        _place.Run("run", _place.Campaign("C", null, Workplace.TwoExperiments)).Well();
        string before = Results();
        File.SetUnixFileMode(_place.Catalog, UnixFileMode.UserRead);
        _place.Run("exclude", "C", "E1", "--line", "2", "--reason", "r", "--as", "B").Refused(4);
        _place.Run("test", "C").Refused(4);
        Assert.Equal(before, Results());
        Assert.NotEmpty(_place.Run("show", "C", "E1", "--format", "json").Well().Out);
    }

    private string Results() => _place.Run("results", "C", "--format", "csv").Well().Out + _place.Run("comparisons", "C", "--format", "csv").Well().Out;

    private void Ready(int groups, int values, string level)
    {
        var random = new Random(3);
        var data = new StringBuilder("experiment,group,value\n");
        for (int i = 0; i < groups * values; i++)
        {
            data.Append(CultureInfo.InvariantCulture, $"E1,g{i % groups:00},{random.NextDouble():0.000000}\n");
        }

        string labels = string.Join('|', Enumerable.Range(0, groups).Select(g => FormattableString.Invariant($"g{g:00}")));
        _place.Run("start", "C", "--level", level).Well();
        _place.Run("plan", "C", _place.Write("p.csv", $"experiment,groups,test,follow_up\nE1,{labels},permutation,holm-pairs\n")).Well();
        _place.Run("seal", "C").Well();
        _place.Run("load", "C", _place.Write("m.csv", data.ToString())).Well();
    }
}
