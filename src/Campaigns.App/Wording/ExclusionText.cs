using Campaigns.Domain;

namespace Campaigns.App.Wording;

/// <summary>Observations that are left out, in words.</summary>
internal static class ExclusionText
{
    /// <summary>A decision that was recorded, in a sentence.</summary>
    public static string Recorded(ExcludedObservation decision) => $"Recorded: {decision.Sentence}.";

    /// <summary>The same decision before it is made.</summary>
    public static string Foreseen(ExcludedObservation decision) => $"To be recorded: {decision.Experiment}, {decision.Sentence}.";

    /// <summary>What puts a decision in force, in a sentence; null where nothing has to.</summary>
    /// <param name="campaign">The campaign.</param>
    /// <param name="steps">How what puts it in force is named; null for commands.</param>
    public static string? Next(Campaign campaign, StepNames? steps = null) => campaign.IsSealed
        ? $"{Sentence.Start((steps ?? StepNames.Commands).Test(campaign.Code))} and {(steps ?? StepNames.Commands).Review(campaign.Code)} put this in force; until then the experiment counts as not tested."
        : null;
}
