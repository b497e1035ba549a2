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

    [Theory]
    [InlineData(2.0, "family extra hommel open level 0.02 recomputed")]
    [InlineData(0.2, "family extra hommel closed level 0.02 recomputed")]
    public void R_finds_the_decisions_of_every_family_behind_its_gate_and_with_its_weights(double shiftOfLast, string judged)
    {
        RProgram.SkipIfAbsent();
        _place.Run("run", ThreeFamilies.Folder(_place, shiftOfLast)).Well();
        _place.Run("export", "F", "--out", _place.At("out")).Well();
        (int code, string said) = Recompute();
        Assert.True(code == 0, said);
        Assert.Contains("family primary holm open level 0.03 recomputed", said, StringComparison.Ordinal);
        Assert.Contains("family secondary weighted-holm open level 0.02 recomputed", said, StringComparison.Ordinal);
        Assert.Contains(judged, said, StringComparison.Ordinal);
        Assert.Contains("7 experiments, 6 with a result", said, StringComparison.Ordinal);

        // The gate that the file names decides: without it the last family is judged at once.
        string families = File.ReadAllText(_place.At("out", "families.csv"));
        _place.Write("out/families.csv", families.Replace("hommel,,secondary,all", "bh,,,", StringComparison.Ordinal));
        (code, said) = Recompute();
        Assert.Equal(1, code);
        Assert.Contains("FAULT family extra was reviewed by hommel instead of bh", said, StringComparison.Ordinal);
    }

    [Fact]
    public void R_leaves_those_withdrawn_before_data_out_of_the_family_and_counts_the_others()
    {
        RProgram.SkipIfAbsent();
        _place.Run("run", _place.Campaign("C", "experiment,groups\nE1,a|b\nE2,a|b\nE3,a|b\nE4,a|b\n", Workplace.TwoExperiments)).Well();
        _place.Run("withdraw", "C", "E2", "E3", "--reason", "torn").Well();
        _place.Run("review", "C").Well();
        _place.Run("export", "C", "--out", _place.At("out")).Well();
        (int code, string said) = Recompute();
        Assert.True(code == 0, said);
        _place.Write("out/withdrawals.csv", File.ReadAllText(_place.At("out", "withdrawals.csv")).Replace("E3,true,false", "E3,true,true", StringComparison.Ordinal));
        (code, said) = Recompute();
        Assert.Equal(1, code);
        Assert.Contains("counts 3 instead of 4", said, StringComparison.Ordinal);
    }

    [Fact]
    public void Of_a_campaign_judged_as_experiments_arrive_R_recomputes_the_p_values_and_says_that_it_takes_the_levels()
    {
        RProgram.SkipIfAbsent();
        _place.Run("run", _place.Campaign("O", OnlineCampaign.Plan(8), OnlineCampaign.Measurements(1, 2, 3, 4, 5, 6), correction: "lord")).Well();
        _place.Run("export", "O", "--out", _place.At("out")).Well();
        (int code, string said) = Recompute();
        Assert.True(code == 0, said);
        Assert.Contains("the decisions are not recomputed", said, StringComparison.Ordinal);
        Assert.Contains("8 experiments, 6 with a result", said, StringComparison.Ordinal);
        string decisions = _place.At("out", "decisions.csv");
        File.WriteAllText(decisions, File.ReadAllText(decisions).Replace(",true,20", ",false,20", StringComparison.Ordinal));
        Assert.Contains("decision TRUE instead of false", Recompute().Said, StringComparison.Ordinal);
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
