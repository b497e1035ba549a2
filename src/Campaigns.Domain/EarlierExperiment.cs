using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>The experiment that a later one confirms, as far as its confirmation asks.</summary>
/// <param name="Campaign">Code of its campaign.</param>
/// <param name="Experiment">Its code.</param>
/// <param name="P">Its p-value; null without a result.</param>
/// <param name="Family">Name of its family in its campaign; empty for the one family.</param>
/// <param name="FamilySize">Experiments counted in that family.</param>
/// <param name="WasTestedBefore">Whether it was tested before its confirmation was sealed, so that it may have been chosen by its result.</param>
public sealed record EarlierExperiment(string Campaign, string Experiment, PValue? P, string Family, int FamilySize, bool WasTestedBefore)
{
    /// <summary>Whether its family counts it; not where it was withdrawn before any data.</summary>
    public bool IsInFamily { get; init; } = true;
}
