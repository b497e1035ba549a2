namespace Campaigns.Statistics.CampaignPermutation;

/// <summary>What is computed from a response under every arrangement: always a share of variation between groups, from 0 to 1, with which the statistic of the test rises.</summary>
public enum PermutedStatistic
{
    /// <summary>Of the values: F of the one-way layout rises with it.</summary>
    Values,

    /// <summary>Of the midranks of the values: Kruskal and Wallis's H is N - 1 times it.</summary>
    Ranks,

    /// <summary>Of the variation within blocks, groups adjusted for blocks: F within blocks rises with it.</summary>
    WithinBlocks,
}
