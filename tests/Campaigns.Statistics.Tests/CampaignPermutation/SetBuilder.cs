using System.Numerics;
using Campaigns.Statistics.CampaignPermutation;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.Tests.CampaignPermutation;

/// <summary>Sets of specimens from plain arrays.</summary>
internal static class SetBuilder
{
    public static SpecimenSet Set(int[] groups, params BigInteger[][] responses) => Set(groups, [], [.. responses.Select(r => (r, PermutedStatistic.Values))]);

    public static SpecimenSet Set(int[] groups, int[] blocks, params (BigInteger[] Values, PermutedStatistic Statistic)[] responses)
    {
        ushort[] labels = [.. groups.Select(g => (ushort)g)];
        var set = new SpecimenSet(labels, blocks);
        foreach ((BigInteger[] values, PermutedStatistic statistic) in responses)
        {
            set.Add(new GroupedSample(values, 0, labels, labels.Max() + 1) { Blocks = blocks }, statistic);
        }

        return set;
    }

    public static BigInteger[] Whole(params long[] values) => [.. values.Select(v => (BigInteger)v)];
}
