using Campaigns.App.Output;
using Campaigns.Catalog;
using Microsoft.Extensions.Time.Testing;

namespace Campaigns.App.Tests.Output;

public sealed class ProgressLineTests
{
    [Fact]
    public void Progress_begins_after_half_a_second_and_leaves_an_empty_line()
    {
        string shown = Shown(isTerminal: true, width: 60);
        string[] lines = shown.Split('\r');
        Assert.Equal("loading week-01.csv: 50 %, 1.0 MB/s, 1 s left", lines[1].TrimEnd());
        Assert.Equal("loading week-01.csv: 70 %, 1.0 MB/s, 0 s left", lines[2].TrimEnd());
        Assert.Equal(("", ""), (lines[^2].Trim(), lines[^1]));
        Assert.DoesNotContain('\n', shown);
    }

    [Fact]
    public void Progress_is_cut_to_the_width_and_shows_no_commands_to_the_terminal()
    {
        Assert.All(Shown(isTerminal: true, width: 40).Split('\r'), line => Assert.True(line.Length < 40));
        Assert.DoesNotContain('\u001b', Shown(isTerminal: true, width: 60, name: "a\u001b[2Jb"));
    }

    [Fact]
    public void Nobody_watching_means_no_progress() => Assert.Equal("", Shown(isTerminal: false, width: 60));

    private static string Shown(bool isTerminal, int width, string name = "week-01.csv")
    {
        var clock = new FakeTimeProvider();
        using var error = new StringWriter();
        var host = new Host { Out = TextWriter.Null, Error = error, Clock = clock, Variable = _ => null, ErrorIsTerminal = isTerminal, Width = width };
        using (var line = new ProgressLine(host))
        {
            for (int step = 0; step <= 9; step++)
            {
                line.Report(new WorkProgress($"loading {name}", step * 100_000, 1_000_000, "bytes"));
                clock.Advance(TimeSpan.FromMilliseconds(100));
            }
        }

        return error.ToString();
    }
}
