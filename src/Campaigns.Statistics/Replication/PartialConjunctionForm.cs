namespace Campaigns.Statistics.Replication;

/// <summary>How the p-values that a partial conjunction keeps are made into one.</summary>
public enum PartialConjunctionForm
{
    /// <summary>The smallest times their number: valid under any dependence of the studies.</summary>
    Bonferroni,

    /// <summary>Simes' inequality: valid for independent studies, and under positive regression dependence.</summary>
    Simes,

    /// <summary>Fisher's sum of logarithms: valid for independent studies alone.</summary>
    Fisher,
}
