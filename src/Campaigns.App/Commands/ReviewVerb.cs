using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>review: apply the correction to the family and keep the outcome.</summary>
internal sealed class ReviewVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Option<string?> _family = TypedOptions.Word(
        "--family", "Count every planned experiment (the default), or tested ones alone (the review is then marked as interim).", "planned|tested", "planned", "tested");

    public override Command Build() => new("review", Describe("Apply the sealed correction to the family and store the review.", "review PRIMERS"))
    {
        _code, _family, SharedOptions.Seen,
    };

    public override int Run(Session session)
    {
        string code = session.Get(_code);
        using Catalog.Catalog catalog = session.OpenCatalog();
        ReviewHead review = Review(session, catalog, code, session.Get(_family) == "tested");
        session.Say(LedgerText.HeadLine(new LedgerReader(catalog).Head));
        session.PrintForScripts(new RowTable(
            [
                new Column("campaign", null), new Column("review", null, true), new Column("taken_at", null), new Column("correction", null), new Column("level", null, true),
                new Column("family_size", null, true), new Column("tested", null, true), new Column("survivors", null, true), new Column("interim", null),
            ],
            [
                [
                    Cell.Text(code), Cell.Whole(review.Number), Cell.Text(Words.Instant(review.At)), Cell.Text(review.Correction), Cell.Setting(review.Level.Value),
                    Cell.Whole(review.FamilySize), Cell.Whole(review.TestedCount), Cell.Whole(review.SurvivorCount), Cell.Truth(review.IsInterim),
                ],
            ]));
        return ExitCode.Done;
    }

    /// <summary>Takes a review and says what it holds.</summary>
    public static ReviewHead Review(Session session, Catalog.Catalog catalog, string code, bool testedOnly)
    {
        ReviewTaken taken = new ReviewStore(catalog).Take(code, testedOnly);
        ReviewHead review = taken.Review;
        string interim = review.IsInterim ? " Interim: only tested experiments were counted." : "";
        session.Say(taken.IsNew
            ? FormattableString.Invariant($"Review {review.Number} of {code}: {review.SurvivorCount} of {review.TestedCount} tested experiments survive, in a family of {review.FamilySize}.{interim}")
            : FormattableString.Invariant($"Nothing changed since review {review.Number} of {code}, which stands: {review.SurvivorCount} survivors in a family of {review.FamilySize}.{interim}"));
        SayFamilies(session, catalog, code);
        CampaignOverview overview = new OverviewReader(catalog).Read(new CampaignStore(catalog).Get(code));
        foreach (string line in CampaignText.Deviations(overview).Prepend(OnlineText.Awaiting(overview) ?? "").Where(line => line.Length > 0))
        {
            session.Say(line);
        }

        return review;
    }

    /// <summary>What a review of several families, or of experiments that share a control, should not leave unsaid.</summary>
    private static void SayFamilies(Session session, Catalog.Catalog catalog, string code)
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        if (!FamilyTally.IsNeeded(stored.Campaign))
        {
            return;
        }

        IReadOnlyList<FamilyStanding> families = new ReviewStore(catalog).Families(stored);
        foreach (FamilyStanding family in families.Where(_ => stored.Campaign.JudgedFamilies.Count > 0))
        {
            session.Say(FormattableString.Invariant($"{FamilyText.Line(stored.Campaign, family)} Survivors: {family.Survivors}."));
        }

        foreach (string warning in FamilyText.Warnings(stored.Campaign, families))
        {
            session.Host.Notice(warning);
        }
    }
}
