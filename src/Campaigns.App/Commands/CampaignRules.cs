using Campaigns.App.Output;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;

namespace Campaigns.App.Commands;

/// <summary>Rules of a campaign's description that several commands check.</summary>
internal static class CampaignRules
{
    /// <summary>The correction for an error rate where none is named.</summary>
    public static string UsualCorrection(ErrorRate rate) => rate == ErrorRate.Familywise ? "holm" : "bh";

    /// <exception cref="UsageException">The code is no short name.</exception>
    public static void CheckCode(string code)
    {
        bool good = code.Length is > 0 and <= 60 && char.IsAsciiLetterOrDigit(code[0])
            && code.All(c => char.IsAsciiLetterOrDigit(c) || c is '-' or '_' or '.');
        if (!good)
        {
            throw new UsageException("A campaign's code has 1 to 60 letters, digits, hyphens, underscores or points, and begins with a letter or a digit.");
        }
    }

    /// <exception cref="UsageException">The text is too long.</exception>
    public static void CheckLength(string option, string text, int most)
    {
        if (text.Length > most)
        {
            throw new UsageException(FormattableString.Invariant($"{option} takes at most {most} characters, not {text.Length}: shorten it."));
        }
    }

    /// <summary>Says what should be known of a plan that is being sealed.</summary>
    public static void SayNotes(Host host, Campaign campaign, IReadOnlyList<PlannedExperiment> plan)
    {
        foreach (string note in FamilyPlan.Notes(campaign, plan))
        {
            host.Notice(note);
        }
    }

    /// <summary>Warns where the correction does not hold the error rate that the campaign is judged by.</summary>
    public static void WarnOfMismatch(Host host, Campaign campaign)
    {
        ErrorProcedure correction = FamilyVerdict.ProcedureOf(campaign);
        if (!CampaignText.Holds(campaign))
        {
            host.Notice($"Note: {correction.Name} does not hold the {CampaignText.RateWords(campaign.ErrorRate)} that '{campaign.Code}' names as its goal. {correction.Guarantee}");
        }
    }
}
