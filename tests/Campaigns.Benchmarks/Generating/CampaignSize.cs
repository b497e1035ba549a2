using System.Globalization;

namespace Campaigns.Benchmarks.Generating;

/// <summary>How large a synthetic campaign is: every experiment has the same number of groups, every group the same number of replicates.</summary>
internal readonly record struct CampaignSize(int Experiments, int Groups, int Replicates)
{
    public static CampaignSize Small { get; } = new(200, 4, 6);

    public static CampaignSize Medium { get; } = new(10_000, 5, 8);

    public static CampaignSize Large { get; } = new(100_000, 5, 10);

    public int RowsPerExperiment => Groups * Replicates;

    public int Rows => checked(Experiments * RowsPerExperiment);

    /// <summary>Reads S, M, L or EXPERIMENTSxGROUPSxREPLICATES; null where the text is neither or the campaign would be too large.</summary>
    public static CampaignSize? Parse(string text)
    {
        switch (text)
        {
            case "S":
                return Small;
            case "M":
                return Medium;
            case "L":
                return Large;
        }

        string[] parts = text.Split('x');
        return parts.Length == 3
            && int.TryParse(parts[0], NumberStyles.None, CultureInfo.InvariantCulture, out int experiments)
            && int.TryParse(parts[1], NumberStyles.None, CultureInfo.InvariantCulture, out int groups)
            && int.TryParse(parts[2], NumberStyles.None, CultureInfo.InvariantCulture, out int replicates)
            && experiments is > 0 and <= 999_999
            && groups is >= 2 and <= 99
            && replicates is >= 2 and <= 9_999
            && (long)experiments * groups * replicates <= 100_000_000
            && groups * replicates <= ushort.MaxValue
            ? new CampaignSize(experiments, groups, replicates)
            : null;
    }
}
