using Campaigns.Statistics.Corrections;

namespace Campaigns.Statistics.Planning.Laws;

/// <summary>How a correction uses levels that depend on rank alone.</summary>
internal enum Stepping
{
    /// <summary>It has no such levels: they depend on the other p-values too.</summary>
    None,

    /// <summary>One level for every rank.</summary>
    OneLevel,

    /// <summary>The p-values up to the greatest rank that is within its level survive.</summary>
    Up,

    /// <summary>The p-values below the least rank that is not within its level survive.</summary>
    Down,
}

/// <summary>Which correction steps how.</summary>
internal static class SteppingOf
{
    public static Stepping Correction(Correction correction) => correction switch
    {
        Uncorrected or Bonferroni or Sidak => Stepping.OneLevel,
        Hochberg or BenjaminiHochberg or BenjaminiYekutieli => Stepping.Up,
        Holm or HolmSidak => Stepping.Down,
        _ => Stepping.None,
    };
}
