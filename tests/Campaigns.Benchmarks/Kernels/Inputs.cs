using Campaigns.Benchmarks.Generating;
using Campaigns.Statistics.CampaignPermutation;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Permutation;

namespace Campaigns.Benchmarks.Kernels;

/// <summary>Repeatable inputs of the kernels.</summary>
internal static class Inputs
{
    /// <summary>P-values of which more are small than under the null alone: squares of uniform numbers.</summary>
    public static double[] PValues(int count)
    {
        var p = new double[count];
        for (int i = 0; i < count; i++)
        {
            double uniform = Uniform(50, i);
            p[i] = uniform * uniform;
        }

        return p;
    }

    /// <summary>F statistics between 0 and about 25: exponential with mean 2.</summary>
    public static double[] FStatistics(int count)
    {
        var f = new double[count];
        for (int i = 0; i < count; i++)
        {
            f[i] = -2 * Math.Log(Uniform(51, i));
        }

        return f;
    }

    /// <summary>Experiments of 4 groups with 6 values each, typed with 4 decimals, ready to be permuted.</summary>
    public static PermutationScores[] Experiments(int count)
    {
        var campaign = new SyntheticCampaign(new CampaignSize(count, 4, 6));
        ushort[] groups = [.. Enumerable.Range(0, 24).Select(cell => (ushort)(cell / 6))];
        return [.. Enumerable.Range(0, count).Select(experiment =>
        {
            long[] mantissas = [.. Enumerable.Range(0, 24).Select(cell => campaign.Reading(experiment, cell))];
            return PermutationScores.Of(new GroupedSample(mantissas, 4, groups, 4));
        })];
    }

    /// <summary>Responses on the same 4 groups of 6 specimens, typed with 4 decimals.</summary>
    public static SpecimenSet Responses(int count)
    {
        var campaign = new SyntheticCampaign(new CampaignSize(count, 4, 6));
        ushort[] groups = [.. Enumerable.Range(0, 24).Select(cell => (ushort)(cell / 6))];
        var set = new SpecimenSet(groups, []);
        for (int response = 0; response < count; response++)
        {
            long[] mantissas = [.. Enumerable.Range(0, 24).Select(cell => campaign.Reading(response, cell))];
            set.Add(new GroupedSample(mantissas, 4, groups, 4), PermutedStatistic.Values);
        }

        return set;
    }

    /// <summary>Studentized ranges between 0 and 12.</summary>
    public static double[] RangeStatistics(int count)
    {
        var q = new double[count];
        for (int i = 0; i < count; i++)
        {
            q[i] = 12 * Uniform(52, i);
        }

        return q;
    }

    /// <summary>Lambdas of treatments of 10, 11, ... values against a control of 10.</summary>
    public static double[] Lambdas(int treatments) => [.. Enumerable.Range(10, treatments).Select(n => Math.Sqrt(n / (n + 10.0)))];

    /// <summary>What is known of the groups of many experiments of five groups of ten values each.</summary>
    public static GroupEstimates[] Estimates(int experiments)
    {
        var campaign = new SyntheticCampaign(new CampaignSize(experiments, 5, 10));
        ushort[] groups = [.. Enumerable.Range(0, 50).Select(cell => (ushort)(cell / 10))];
        var estimates = new GroupEstimates[experiments];
        for (int e = 0; e < experiments; e++)
        {
            long[] mantissas = [.. Enumerable.Range(0, 50).Select(cell => campaign.Reading(e, cell))];
            estimates[e] = GroupEstimates.OneWay(new GroupedSample(mantissas, 4, groups, 5))!;
        }

        return estimates;
    }

    /// <summary>Above 0 and below 1.</summary>
    private static double Uniform(int purpose, int index) => ((Draws.Bits(purpose, index) >> 11) + 0.5) / (1L << 53);
}
