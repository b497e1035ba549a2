using Campaigns.App.Commands;
using Campaigns.App.Wording;
using Campaigns.Domain;

namespace Campaigns.App.Figures;

/// <summary>Sentences that stand below several figures.</summary>
internal static class FigureWords
{
    /// <summary>Without a result nothing can be ranked, corrected or risked.</summary>
    public static string NothingTested(CampaignStanding standing) => $"No picture: no experiment of {standing.Campaign.Code} has a result yet; 'campaigns test {standing.Campaign.Code}' tests those that are complete.";

    /// <summary>What the campaign's procedure is, and what it holds under which assumptions.</summary>
    public static string Procedure(CampaignStanding standing)
    {
        string guarantee = standing.Campaign.JudgedFamilies.Count == 0
            ? FamilyVerdict.ProcedureOf(standing.Campaign).Guarantee
            : string.Join(" ", FamilyText.Guarantees(standing.Overview));
        return $"Correction: {CampaignText.Goal(standing.Campaign)}. {guarantee}";
    }

    /// <summary>How many survive, of how many, in a sentence.</summary>
    public static string Survivors(CampaignStanding standing) =>
        FormattableString.Invariant($"{standing.SurvivorCount} of {standing.TestedCount} tested experiments survive, in a family of {standing.FamilySize}.");

    /// <summary>"1 experiment" or "3 experiments".</summary>
    public static string Count(int number, string one, string several) => FormattableString.Invariant($"{number} {(number == 1 ? one : several)}");
}
