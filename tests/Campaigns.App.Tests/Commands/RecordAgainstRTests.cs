using System.Diagnostics;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.App.Tests.Commands;

/// <summary>A reader without the program: R recomputes a campaign from its export alone.</summary>
public sealed class RecordAgainstRTests : IDisposable
{
    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Theory]
    [InlineData("adhesion-screen", 48, 46)]
    [InlineData("nist-one-way", 11, 11)]
    [InlineData("published-classics", 10, 10)]
    [InlineData("published-designs", 12, 12)]
    public void R_finds_the_same_p_values_and_decisions_from_the_export_alone(string campaign, int experiments, int tested)
    {
        RProgram.SkipIfAbsent();
        Export(campaign);
        (int code, string said) = Recompute();
        Assert.True(code == 0, said);
        Assert.Contains(FormattableString.Invariant($"{experiments} experiments, {tested} with a result"), said, StringComparison.Ordinal);
        Assert.Contains(" 0 faults", said, StringComparison.Ordinal);
    }

    [Fact]
    public void R_finds_a_value_and_a_decision_that_were_changed_after_the_export()
    {
        RProgram.SkipIfAbsent();
        Export("published-classics");
        string measurements = _place.At("out", "measurements", "measurements.csv");
        string[] lines = File.ReadAllLines(measurements);
        string[] cells = lines[1].Split(',');
        cells[2] += "1";
        lines[1] = string.Join(',', cells);
        File.WriteAllLines(measurements, lines);
        (int code, string said) = Recompute();
        Assert.Equal(1, code);
        Assert.Contains($"FAULT {cells[0]} f statistic", said, StringComparison.Ordinal);
    }

    private void Export(string campaign)
    {
        _place.Run("run", Path.Combine(Workplace.Repository(), "campaigns", campaign)).Well();
        _place.Run("export", campaign, "--out", _place.At("out")).Well();
    }

    private (int Code, string Said) Recompute()
    {
        var start = new ProcessStartInfo("Rscript", ["--vanilla", Path.Combine(Workplace.Repository(), "tests", "reference", "record.R"), _place.At("out")])
        {
            RedirectStandardOutput = true,
            RedirectStandardError = true,
        };
        using Process process = Process.Start(start)!;
        Task<string> errors = process.StandardError.ReadToEndAsync(TestContext.Current.CancellationToken);
        string output = process.StandardOutput.ReadToEnd();
        process.WaitForExit();
#pragma warning disable xUnit1031 // The stream has ended with the process.
        return (process.ExitCode, output + errors.Result);
#pragma warning restore xUnit1031
    }
}
