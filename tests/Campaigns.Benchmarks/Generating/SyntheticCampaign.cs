namespace Campaigns.Benchmarks.Generating;

/// <summary>The readings of a synthetic campaign: one experiment in ten has real differences between its groups, the others have none.</summary>
internal sealed class SyntheticCampaign(CampaignSize size)
{
    // Purposes of draws; a bell takes three in a row.
    private const int Level = 1, Spread = 2, Real = 3, Effect = 10, Noise = 20, RunOrder = 30;

    public CampaignSize Size => size;

    /// <summary>The reading of a cell (group times replicates plus replicate) in units of the fourth decimal.</summary>
    public long Reading(int experiment, int cell)
    {
        int group = cell / size.Replicates;
        long level = 200_000 + Draws.Below(600_001, Level, experiment);      // 20 to 80
        long spread = 5_000 + Draws.Below(15_001, Spread, experiment);       // 0.5 to 2
        bool real = Draws.Below(10, Real, experiment) == 0;
        long effect = real ? Draws.Bell(Effect, ((long)experiment * size.Groups) + group) : 0;
        long noise = Draws.Bell(Noise, ((long)experiment * size.RowsPerExperiment) + cell);
        return level + (spread * (effect + noise) >> 16);
    }

    /// <summary>The cells of an experiment in the random order in which they were run.</summary>
    /// <param name="experiment">From 0.</param>
    /// <param name="cells">Takes them; as long as an experiment has rows.</param>
    public static void OrderOfRuns(int experiment, Span<ushort> cells)
    {
        for (int i = 0; i < cells.Length; i++)
        {
            cells[i] = (ushort)i;
        }

        for (int i = cells.Length - 1; i > 0; i--)
        {
            int j = Draws.Below(i + 1, RunOrder, ((long)experiment * cells.Length) + i);
            (cells[i], cells[j]) = (cells[j], cells[i]);
        }
    }
}
