namespace Campaigns.Statistics.Corrections;

/// <summary>Every batch correction that the program offers, in the order in which people see them.</summary>
public static class CorrectionRegistry
{
    /// <summary>The corrections, in the order in which they came into the program.</summary>
    public static IReadOnlyList<Correction> All { get; } =
    [
        new Uncorrected(),
        new Bonferroni(),
        new Sidak(),
        new Holm(),
        new HolmSidak(),
        new Hochberg(),
        new Hommel(),
        new BenjaminiHochberg(),
        new BenjaminiYekutieli(),
        new HommelAnyDependence(),
        new TwoStageBenjaminiHochberg(),
        new Storey(),
        new WeightedBonferroni(),
        new WeightedHolm(),
        new WeightedBenjaminiHochberg(),
    ];

    /// <summary>Those that need nothing but p-values, for callers that show every correction of a family without weights.</summary>
    public static IReadOnlyList<Correction> FromPAlone { get; } = [.. All.Where(c => !c.NeedsWeights)];

    /// <summary>The correction with a key, or null.</summary>
    /// <param name="key">Exact, lower case.</param>
    public static Correction? Find(string key) => All.FirstOrDefault(c => c.Key == key);
}
