namespace Campaigns.Statistics.Corrections;

/// <summary>Every batch correction that the program offers, in the order in which people see them.</summary>
public static class CorrectionRegistry
{
    /// <summary>The corrections: none, then familywise error, then false discovery.</summary>
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
    ];

    /// <summary>The correction with a key, or null.</summary>
    /// <param name="key">Exact, lower case.</param>
    public static Correction? Find(string key) => All.FirstOrDefault(c => c.Key == key);
}
