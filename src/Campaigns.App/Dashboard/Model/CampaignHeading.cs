using System.Globalization;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Online;

namespace Campaigns.App.Dashboard.Model;

/// <summary>What every page says about its campaign: what is held, how far it is, and what that means.</summary>
public sealed class CampaignHeading
{
    /// <summary>Words a campaign's heading.</summary>
    /// <param name="standing">The campaign as it stands.</param>
    /// <param name="correction">Its correction; null where the program does not know it.</param>
    public CampaignHeading(CampaignStanding standing, ErrorProcedure? correction)
    {
        Campaign campaign = standing.Campaign;
        Code = campaign.Code;
        Title = campaign.Title;
        Held = [ErrorRateWords(campaign.ErrorRate), "level " + NumberText.RoundTrip(campaign.Level.Value), campaign.JudgedFamilies.Count > 0 ? FamilyText.Procedures(campaign) : correction?.Name ?? campaign.Correction];
        Plan = campaign.IsExploratory ? "no plan before the data" : campaign.IsSealed ? "plan sealed" : "plan still open";
        Progress =
        [
            $"{Count(standing.TestedCount)} of {Count(standing.Experiments.Count)} planned tested",
            standing.SurvivorCount == 1 ? "1 survivor" : Count(standing.SurvivorCount) + " survivors",
        ];
        Family = campaign.JudgedFamilies.Count > 0 ? FamiliesOf(standing.Families) : standing.FamilySize == standing.Experiments.Count ? null : "family of " + Count(standing.FamilySize);
        ReviewTrouble = TroubleWith(standing);
        Review = standing.LastReview is not { } review ? "no review stored yet"
            : $"review {Count(review.Number)} of {review.At.UtcDateTime.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture)} " + (ReviewTrouble ?? "is up to date");
        ShortReview = standing.LastReview is { } last && ReviewTrouble is not null ? $"review {Count(last.Number)} {ReviewTrouble}".Replace(" is out of date:", ":", StringComparison.Ordinal) : standing.LastReview is null ? "no review yet" : Review;
        string stands = correction is OnlineProcedure ? "Each experiment is decided when it arrives, and its decision stands. " : "";
        Meaning = campaign.JudgedFamilies.Count > 0 ? string.Join(" ", [.. FamilyText.Guarantees(standing.Overview), FamilyText.Together(standing.Overview)])
            : correction is not null ? stands + correction.Guarantee
            : $"This program knows no correction named {campaign.Correction}: what it guarantees cannot be said here.";
        ValidUnder = correction is null || campaign.JudgedFamilies.Count > 0 ? null : DependenceWords(correction.ValidUnder);
    }

    /// <summary>The campaign's code, as it was given.</summary>
    public string Code { get; }

    /// <summary>The campaign's title, as it was given.</summary>
    public string Title { get; }

    /// <summary>Error rate, level and correction.</summary>
    public IReadOnlyList<string> Held { get; }

    /// <summary>Whether the plan is sealed.</summary>
    public string Plan { get; }

    /// <summary>Tested of planned, and survivors.</summary>
    public IReadOnlyList<string> Progress { get; }

    /// <summary>The size of the family, where it is not the number of planned experiments.</summary>
    public string? Family { get; }

    /// <summary>Whether the last stored review is up to date.</summary>
    public string Review { get; }

    /// <summary>The same without the day, where the review is not up to date: on a narrow screen the trouble matters more.</summary>
    public string ShortReview { get; }

    /// <summary>In what the last stored review is not up to date; null where it is, and before the first.</summary>
    public string? ReviewTrouble { get; }

    /// <summary>What the correction guarantees, in one sentence.</summary>
    public string Meaning { get; }

    /// <summary>What the guarantee supposes of the p-values' dependence; null where the correction is not known, and where families may have several.</summary>
    public string? ValidUnder { get; }

    /// <summary>An error rate in words.</summary>
    /// <param name="rate">The error rate.</param>
    public static string ErrorRateWords(ErrorRate rate) => rate switch
    {
        ErrorRate.PerTest => "error rate of each test alone",
        ErrorRate.Familywise => "familywise error rate",
        ErrorRate.FalseDiscovery => "false discovery rate",
        _ => throw new ArgumentOutOfRangeException(nameof(rate), rate, "No words for this error rate."),
    };

    /// <summary>A condition on dependence in words.</summary>
    /// <param name="dependence">The condition.</param>
    public static string DependenceWords(Dependence dependence) => dependence switch
    {
        Dependence.Any => "holds under any dependence between the tests",
        Dependence.Sidak => "supposes tests independent, or two-sided normal tests",
        Dependence.Simes => "supposes tests independent or positively dependent",
        Dependence.PositiveRegression => "supposes tests independent or positively dependent",
        Dependence.Independent => "supposes independent tests",
        Dependence.IndependentConservative => "supposes independent tests with conservative nulls",
        _ => throw new ArgumentOutOfRangeException(nameof(dependence), dependence, "No words for this dependence."),
    };

    private static string FamiliesOf(IReadOnlyList<FamilyStanding> families)
    {
        int closed = families.Count(f => !f.IsOpen);
        return (families.Count == 1 ? "1 family" : Count(families.Count) + " families") + (closed == 0 ? "" : ", " + Count(closed) + " closed");
    }

    private static string? TroubleWith(CampaignStanding standing)
    {
        if (standing.LastReview is not { } review)
        {
            return null;
        }

        return standing.AwaitingNewTest > 0 ? $"is out of date: {Count(standing.AwaitingNewTest)} await{(standing.AwaitingNewTest == 1 ? "s" : "")} a new test"
            : standing.ResultsSinceReview > 0 ? (review.IsInterim ? "is interim and behind by " : "is behind by ") + (standing.ResultsSinceReview == 1 ? "1 result" : Count(standing.ResultsSinceReview) + " results")
            : standing.DecisionsSinceReview > 0 ? "is behind by " + (standing.DecisionsSinceReview == 1 ? "1 decision" : Count(standing.DecisionsSinceReview) + " decisions")
            : review.Correction != standing.Campaign.Correction ? "used " + review.Correction
            : review.Level != standing.Campaign.Level ? "used level " + NumberText.RoundTrip(review.Level.Value)
            : review.IsInterim ? "is interim: tested ones only"
            : review.FamilySize != standing.FamilySize ? "counted a family of " + Count(review.FamilySize)
            : null;
    }

    private static string Count(int n) => n.ToString(CultureInfo.InvariantCulture);
}
