using System.Diagnostics;
using System.Globalization;

namespace Campaigns.App.Tests.Commands;

public sealed class BackupVerbTests
{
    [Fact]
    public void A_backup_prints_its_head_and_the_check_tells_what_is_in_it()
    {
        using var place = new Workplace();
        place.Run("start", "C", "--title", "Primers").Well();
        place.Run("load", "C", place.Write("m.csv", Workplace.TwoExperiments)).Well();
        string copy = place.At("copy.db");
        CsvText backup = place.Run("backup", copy, "--format", "csv").Well().Csv;
        string head = backup.Column("head")[0];
        Assert.StartsWith("2:", head, StringComparison.Ordinal);
        Assert.Equal(new FileInfo(copy).Length.ToString(CultureInfo.InvariantCulture), backup.Column("bytes")[0]);

        string told = place.Run("restore-check", copy, "--head", head).Well().Out;
        Assert.Contains("is whole", told, StringComparison.Ordinal);
        Assert.Contains("Campaign C (Primers): 2 experiments.", told, StringComparison.Ordinal);
        Assert.Contains("2026-03-02T09:30:00Z", told, StringComparison.Ordinal);
        Assert.Contains("contains the head", told, StringComparison.Ordinal);
        CsvText check = place.Run("restore-check", copy, "--format", "csv").Well().Csv;
        Assert.Equal(("true", "2", head), (check.Column("whole")[0], check.Column("experiments")[0], check.Column("head")[0]));
    }

    [Fact]
    public void A_copy_that_is_not_whole_ends_with_5_and_what_is_no_catalog_with_4()
    {
        using var place = new Workplace();
        place.Run("start", "C").Well();
        string copy = place.At("copy.db");
        place.Run("backup", copy).Well();
        place.Run("backup", copy).Refused(3, "--replace");
        place.Run("backup", copy, "--replace").Well();
        Ran notWhole = place.Run("restore-check", copy, "--head", $"9:{new string('0', 64)}");
        Assert.Equal(5, notWhole.Code);
        Assert.Contains("9", notWhole.Error, StringComparison.Ordinal);
        Assert.Contains("is not whole", notWhole.Out, StringComparison.Ordinal);
        place.Run("restore-check", copy, "--head", "9").Refused(2, "--head");
        place.Run("restore-check", place.Write("m.csv", Workplace.TwoExperiments)).Refused(4, "is no catalog");
        place.Run("restore-check", place.At("nowhere.db")).Refused(4, "no catalog");
    }

    [Theory]
    [InlineData("INT", 130)]
    [InlineData("TERM", 143)]
    [InlineData("HUP", 129)]
    public async Task A_signal_stops_long_work_cleanly_with_its_own_exit_code(string signal, int code)
    {
        Assert.SkipWhen(OperatingSystem.IsWindows(), "Signals are those of Unix.");
        using var place = new Workplace();
        string file = place.Write("p.csv", "p\n" + string.Concat(Enumerable.Repeat("0.25\n", 400_000)));
        using Process adjust = Executable.Start(place.Catalog, "adjust", file, "--format", "csv");

        // Nobody reads its rows, so that it stands still in the middle of them until the signal has come.
        Assert.NotEqual(-1, adjust.StandardOutput.Read());
        using (Process kill = Process.Start("kill", ["-s", signal, adjust.Id.ToString(CultureInfo.InvariantCulture)]))
        {
            await kill.WaitForExitAsync(TestContext.Current.CancellationToken);
        }

        await Task.Delay(TimeSpan.FromSeconds(1), TestContext.Current.CancellationToken);
        Ran ran = Executable.End(adjust);
        Assert.Equal((code, true), (ran.Code, ran.Error.StartsWith("Stopped.", StringComparison.Ordinal)));
        Assert.True(ran.Out.Length < 400_000 * 10);
    }
}
