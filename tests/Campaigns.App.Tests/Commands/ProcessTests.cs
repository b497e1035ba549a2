using System.Diagnostics;
using System.Globalization;
using System.Text;
using Microsoft.Data.Sqlite;

namespace Campaigns.App.Tests.Commands;

public sealed class ProcessTests : IDisposable
{
    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void The_executable_gives_the_same_bytes_as_the_entry_in_process()
    {
        Ran ran = Executable.End(Executable.Start(_place.Catalog, "run", Workplace.Demo, "--format", "csv")).Well();
        Assert.Equal(_place.Run("survivors", "adhesion-screen", "--format", "csv").Well().Out, ran.Out);
        Executable.End(Executable.Start(_place.Catalog, "results", "nope", "--format", "json")).Refused(3, "There is no campaign 'nope'");
        Executable.End(Executable.Start(_place.Catalog, "resluts")).Refused(2, "did you mean 'results'?");
    }

    [Fact]
    public void A_reader_that_goes_away_ends_the_program_without_noise()
    {
        Assert.SkipWhen(OperatingSystem.IsWindows(), "needs a POSIX shell");
        string file = _place.Write("p.csv", "p\n" + string.Concat(Enumerable.Range(1, 30000).Select(i => FormattableString.Invariant($"{i / 30001.0:R}\n"))));
        foreach (string format in (string[])["csv", "json", "table"])
        {
            string script = $"set -o pipefail; \"$CAMPAIGNS_PROGRAM\" adjust '{file}' --format {format} --top 0 | head -1";
            Ran ran = Executable.End(Executable.Start("bash", _place.Catalog, ["-c", script]));
            Assert.Equal((0, ""), (ran.Code, ran.Error));
            Assert.Single(ran.Out.TrimEnd('\n').Split('\n'));
        }
    }

    [Theory]
    [InlineData("campaigns resu", "results")]
    [InlineData("campaigns results --fo", "--format")]
    [InlineData("campaigns results --format c", "csv")]
    [InlineData("campaigns run ", "")]
    [InlineData("campaigns run ./ca", "")]
    public void The_bash_script_completes_what_begins_with_the_word_and_leaves_files_to_the_shell(string line, string completed)
    {
        Assert.SkipWhen(OperatingSystem.IsWindows(), "needs bash");
        string words = string.Join(' ', line.Split(' ').Select(w => $"'{w}'"));
        string script = $"""
            PATH="$(dirname "$CAMPAIGNS_PROGRAM"):$PATH"
            source <(campaigns completion bash)
            COMP_LINE='{line}'; COMP_POINT={line.Length}; COMP_WORDS=({words}); COMP_CWORD={line.Split(' ').Length - 1}
            _campaigns
            echo "${"{COMPREPLY[*]}"}"
            """;
        Ran ran = Executable.End(Executable.Start("bash", _place.Catalog, ["-c", script])).Well();
        Assert.Equal((completed + "\n", ""), (ran.Out, ran.Error));
    }

    [Fact]
    public void A_full_disk_behind_standard_output_is_told_in_a_sentence()
    {
        Assert.SkipUnless(File.Exists("/dev/full"), "needs /dev/full");
        string file = _place.Write("p.csv", "p\n0.1\n");
        Ran ran = Executable.End(Executable.Start("sh", _place.Catalog, ["-c", $"\"$CAMPAIGNS_PROGRAM\" adjust '{file}' --format csv > /dev/full"]));
        Assert.Equal(1, ran.Code);
        Assert.Single(ran.Error.TrimEnd('\n').Split('\n'));
        Assert.Contains("check the disk", ran.Error, StringComparison.Ordinal);
    }

    [Fact]
    public void Interrupting_a_run_ends_it_with_130_and_the_next_one_completes()
    {
        Assert.SkipWhen(OperatingSystem.IsWindows(), "needs kill");
        string folder = MidSize(200);
        Process process = Executable.Start(_place.Catalog, "run", folder);
        Thread.Sleep(600);
        using (Process kill = Process.Start("kill", ["-INT", process.Id.ToString(CultureInfo.InvariantCulture)]))
        {
            kill.WaitForExit();
        }

        Ran ran = Executable.End(process);
        Assert.True(ran.Code is 130 or 0, $"{ran.Code} {ran.Error}");
        Assert.DoesNotContain("   at ", ran.Error, StringComparison.Ordinal);
        AssertWholeAndRight(folder, Expected(folder));
    }

    [Fact]
    public void Two_runs_at_once_leave_one_whole_catalog()
    {
        string folder = MidSize(100);
        Process[] both = [Executable.Start(_place.Catalog, "run", folder), Executable.Start(_place.Catalog, "run", folder)];
        Ran[] ends = [.. both.Select(p => Executable.End(p))];
        Assert.Contains(ends, e => e.Code == 0);
        Assert.All(ends, e => Assert.True(e.Code is 0 or 4, $"exit {e.Code}: {e.Error}"));
        Assert.All(ends, e => Assert.DoesNotContain("   at ", e.Error, StringComparison.Ordinal));
        AssertWholeAndRight(folder, Expected(folder));
        Assert.Equal("1", _place.Run("show", "mid", "--format", "csv").Well().Csv.Column("reviews")[0]);
    }

    [Fact]
    public void A_run_that_is_killed_at_any_moment_is_completed_by_the_next()
    {
        string folder = MidSize(100);
        string expected = Expected(folder);
        long began = Stopwatch.GetTimestamp();
        Executable.End(Executable.Start(_place.At("timing.db"), "run", folder)).Well();
        double whole = Stopwatch.GetElapsedTime(began).TotalMilliseconds;
        var random = new Random(20_260_302);
        for (int i = 0; i < 10; i++)
        {
            Process process = Executable.Start(_place.Catalog, "run", folder);
            Thread.Sleep((int)(whole * (0.1 + (0.9 * random.NextDouble()))));
            process.Kill();
            process.WaitForExit();
            process.Dispose();
            AssertWholeAndRight(folder, expected);
            foreach (string file in Directory.GetFiles(_place.Folder, "campaigns.db*"))
            {
                File.Delete(file);
            }
        }
    }

    private string Expected(string folder)
    {
        string catalog = _place.At("undisturbed.db");
        _place.Run("run", folder, "--catalog", catalog).Well();
        return _place.Run("results", "mid", "--catalog", catalog, "--format", "csv").Well().Out;
    }

    private void AssertWholeAndRight(string folder, string expected)
    {
        _place.Run("run", folder).Well();
        Assert.Equal(expected, _place.Run("results", "mid", "--format", "csv").Well().Out);
        using var connection = new SqliteConnection($"Data Source={_place.Catalog};Pooling=False");
        connection.Open();
        using SqliteCommand check = connection.CreateCommand();
        check.CommandText = "PRAGMA integrity_check";
        Assert.Equal("ok", check.ExecuteScalar());
    }

    /// <summary>A folder of six files of measurements on as many experiments a file as asked for, 24 values each.</summary>
    private string MidSize(int experimentsInFile)
    {
        var random = new Random(17);
        var plan = new StringBuilder("experiment,groups\n");
        string folder = _place.Campaign("mid", "", null);
        for (int week = 1; week <= 6; week++)
        {
            var data = new StringBuilder("experiment,group,value\n");
            for (int e = 0; e < experimentsInFile; e++)
            {
                plan.Append(CultureInfo.InvariantCulture, $"W{week}-{e},a|b|c\n");
                for (int i = 0; i < 24; i++)
                {
                    data.Append(CultureInfo.InvariantCulture, $"W{week}-{e},{"abc"[i % 3]},{10 + random.NextDouble() + (e % 5 == 0 ? i % 3 : 0):0.000}\n");
                }
            }

            _place.Write($"mid/measurements/week-{week}.csv", data.ToString());
        }

        _place.Write("mid/plan.csv", plan.ToString());
        return folder;
    }
}
