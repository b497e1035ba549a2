using System.Diagnostics;
using System.Globalization;
using Campaigns.App.Tests.Commands;

namespace Campaigns.App.Tests.Dashboard;

/// <summary>The real program in a real terminal, one that the system's own script command makes.</summary>
public sealed class TerminalTests : IDisposable
{
    private const string Entered = "\e[?1049h";
    private const string Left = "\e[?1049l";
    private readonly Workplace _place = new();

    public TerminalTests() => _place.Run("run", _place.Campaign("pty", null, Workplace.TwoExperiments)).Well();

    public void Dispose() => _place.Dispose();

    [Theory]
    [InlineData("TERM", 143, "")]
    [InlineData("HUP", 129, "l")]
    [InlineData("INT", 130, "a")]
    [InlineData("QUIT", 131, "w")]
    [InlineData("TERM", 143, "v\r")]
    public void A_signal_gives_the_terminal_back_also_while_a_dialog_stands(string signal, int code, string keys)
    {
        using Process terminal = Open(keys);
        Send(signal);
        Ran ran = Executable.End(terminal);
        Assert.Equal(code, ran.Code);
        AssertGivenBack(ran.Out);
    }

    [Fact]
    public void Control_and_q_leave_with_0_from_a_dialog()
    {
        using Process terminal = Open("w");
        terminal.StandardInput.Write("\u0011");
        terminal.StandardInput.Flush();
        Ran ran = Executable.End(terminal);
        Assert.Equal(0, ran.Code);
        AssertGivenBack(ran.Out);
    }

    [Theory]
    [InlineData("")]
    [InlineData("w")]
    public void When_the_terminal_goes_away_the_program_ends(string keys)
    {
        using Process terminal = Open(keys);
        using Process program = Process.GetProcessById(Id());
        terminal.Kill();
        terminal.WaitForExit();
        bool hasEnded = program.WaitForExit(TimeSpan.FromSeconds(30));
        if (!hasEnded)
        {
            program.Kill();
        }

        Assert.True(hasEnded, "It went on without a terminal.");
        _place.Run("ledger", "verify").Well();
    }

    /// <summary>Starts the dashboard, waits until it stands, and types.</summary>
    private Process Open(string keys)
    {
        Assert.SkipUnless(File.Exists("/usr/bin/script") && !OperatingSystem.IsMacOS(), "needs the script command of util-linux");
        string started = $"unset DisableRealDriverIO NO_COLOR; export TERM=xterm; stty rows 24 cols 80; echo $$ > '{_place.At("id")}'; exec \"$CAMPAIGNS_PROGRAM\" dashboard pty";
        Process terminal = Executable.Start("script", _place.Catalog, ["-qefc", started, _place.At("screen")]);
        Await("Experiments]");
        foreach (char key in keys)
        {
            terminal.StandardInput.Write(key);
            terminal.StandardInput.Flush();
            Thread.Sleep(500);
        }

        if (keys.Length > 0)
        {
            Await("Esc");
        }

        return terminal;
    }

    private int Id() => int.Parse(File.ReadAllText(_place.At("id")), CultureInfo.InvariantCulture);

    private void Send(string signal)
    {
        using Process kill = Process.Start("kill", [$"-{signal}", Id().ToString(CultureInfo.InvariantCulture)]);
        kill.WaitForExit();
    }

    private void Await(string text)
    {
        for (long end = Environment.TickCount64 + 30_000; !(File.Exists(_place.At("screen")) && Screen().Contains(text, StringComparison.Ordinal)); Thread.Sleep(50))
        {
            Assert.True(Environment.TickCount64 < end, $"'{text}' never came.");
        }
    }

    private string Screen()
    {
        using var file = new FileStream(_place.At("screen"), FileMode.Open, FileAccess.Read, FileShare.ReadWrite);
        using var reader = new StreamReader(file);
        return reader.ReadToEnd();
    }

    /// <summary>Everything that was switched on is off: the other screen, the mouse, pasting in brackets, the keys' own modes; and the cursor is shown.</summary>
    private static void AssertGivenBack(string sent)
    {
        foreach ((string on, string off) in new[] { (Entered, Left), ("\e[?1003h", "\e[?1003l"), ("\e[?2004h", "\e[?2004l"), ("\e[?1h", "\e[?1l"), ("\e[?25l", "\e[?25h") })
        {
            Assert.True(sent.LastIndexOf(off, StringComparison.Ordinal) > sent.LastIndexOf(on, StringComparison.Ordinal), $"{on[1..]} was left on.");
        }
    }
}
