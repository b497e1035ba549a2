namespace Campaigns.Statistics.Corrections;

/// <summary>What kind of error a procedure holds at its level.</summary>
public enum ErrorRate
{
    /// <summary>Each test at the level on its own: nothing is held over the family.</summary>
    PerTest,

    /// <summary>The probability of at least one false rejection in the family.</summary>
    Familywise,

    /// <summary>The expected share of false rejections among all rejections.</summary>
    FalseDiscovery,
}
