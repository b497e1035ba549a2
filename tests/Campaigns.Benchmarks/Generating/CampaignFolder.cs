using System.Globalization;
using System.Text;

namespace Campaigns.Benchmarks.Generating;

/// <summary>Writes a synthetic campaign as a campaign folder.</summary>
internal static class CampaignFolder
{
    private const int ShuffleRows = 40;

    /// <param name="campaign">What to write.</param>
    /// <param name="folder">Created where it does not exist; files of the same names are replaced.</param>
    /// <param name="shuffled">Whether the rows of the whole campaign come in one random order; else experiment by experiment, each in its run order.</param>
    /// <param name="planned">Whether a plan is written as well.</param>
    public static void Write(SyntheticCampaign campaign, string folder, bool shuffled, bool planned)
    {
        Directory.CreateDirectory(Path.Combine(folder, "measurements"));
        File.WriteAllText(Path.Combine(folder, "campaign.json"), Description(Path.GetFileName(Path.GetFullPath(folder)), campaign.Size));
        if (planned)
        {
            WritePlan(campaign.Size, Path.Combine(folder, "plan.csv"));
        }

        using var output = new FileStream(Path.Combine(folder, "measurements", "measurements.csv"), FileMode.Create, FileAccess.Write, FileShare.None, 1 << 20);
        var rows = new RowWriter(output, campaign);
        if (shuffled)
        {
            WriteShuffled(campaign, rows);
        }
        else
        {
            WriteInSequence(campaign, rows);
        }

        rows.Flush();
    }

    public static string ExperimentCode(int experiment) => string.Create(CultureInfo.InvariantCulture, $"EXP-{experiment + 1:D6}");

    private static void WriteInSequence(SyntheticCampaign campaign, RowWriter rows)
    {
        var cells = new ushort[campaign.Size.RowsPerExperiment];
        for (int experiment = 0; experiment < campaign.Size.Experiments; experiment++)
        {
            SyntheticCampaign.OrderOfRuns(experiment, cells);
            for (int run = 0; run < cells.Length; run++)
            {
                rows.Write(experiment, cells[run], run + 1);
            }
        }
    }

    private static void WriteShuffled(SyntheticCampaign campaign, RowWriter rows)
    {
        int perExperiment = campaign.Size.RowsPerExperiment;
        var cells = new ushort[campaign.Size.Rows];
        for (int experiment = 0; experiment < campaign.Size.Experiments; experiment++)
        {
            SyntheticCampaign.OrderOfRuns(experiment, cells.AsSpan(experiment * perExperiment, perExperiment));
        }

        int[] sequence = [.. Enumerable.Range(0, campaign.Size.Rows)];
        for (int i = sequence.Length - 1; i > 0; i--)
        {
            int j = Draws.Below(i + 1, ShuffleRows, i);
            (sequence[i], sequence[j]) = (sequence[j], sequence[i]);
        }

        foreach (int row in sequence)
        {
            rows.Write(row / perExperiment, cells[row], (row % perExperiment) + 1);
        }
    }

    private static void WritePlan(CampaignSize size, string path)
    {
        string groups = string.Join('|', Enumerable.Range(1, size.Groups).Select(g => string.Create(CultureInfo.InvariantCulture, $"G{g}")));
        using var plan = new StreamWriter(path, append: false, new UTF8Encoding(encoderShouldEmitUTF8Identifier: false), 1 << 16);
        plan.Write("experiment,response,groups,replicates\n");
        for (int experiment = 0; experiment < size.Experiments; experiment++)
        {
            plan.Write(string.Create(CultureInfo.InvariantCulture, $"{ExperimentCode(experiment)},synthetic response,{groups},{size.Replicates}\n"));
        }
    }

    private static string Description(string code, CampaignSize size) => string.Create(CultureInfo.InvariantCulture, $$"""
        {
          "code": "{{code}}",
          "title": "Synthetic campaign of {{size.Experiments}} experiments",
          "purpose": "Made for measuring speed; one experiment in ten has real differences.",
          "errorRate": "false-discovery",
          "level": 0.05,
          "correction": "bh",
          "test": "f",
          "followUp": "none"
        }

        """);
}
