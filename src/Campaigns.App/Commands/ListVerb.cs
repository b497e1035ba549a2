using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;

namespace Campaigns.App.Commands;

/// <summary>list: the campaigns of the catalog.</summary>
internal sealed class ListVerb : Verb
{
    public override Command Build() => new("list", Describe("The campaigns of the catalog.", "list"));

    public override int Run(Session session)
    {
        using Catalog.Catalog catalog = session.OpenCatalog();
        var overview = new OverviewReader(catalog);
        session.Print(new RowTable(
            [
                new("campaign", "campaign"), new("title", "title"), new("error_rate", "holds"), new("level", "level", true), new("correction", "correction"),
                new("experiments", "experiments", true), new("tested", "tested", true), new("survivors", "survivors", true),
                new("reviews", "reviews", true), new("sealed", "sealed"), new("exploratory", "exploratory"), new("families", null, true), new("review_interim", null),
            ],
            new CampaignStore(catalog).All().Select(overview.Read).Select(c => new[]
            {
                Cell.Text(c.Campaign.Code), Cell.Text(c.Campaign.Title), Cell.Text(c.Campaign.ErrorRate.Word()), Cell.Setting(c.Campaign.Level.Value), Cell.Text(c.Campaign.Correction),
                Cell.Whole(c.FamilySize), Cell.Whole(c.TestedCount), Cell.Whole(c.SurvivorCount),
                Cell.Whole(c.LastReview?.Number ?? 0), Cell.Truth(c.Campaign.IsSealed), Cell.Truth(c.Campaign.IsExploratory), Cell.Whole(c.Families.Count), Cell.Truth(c.LastReview?.IsInterim),
            }))
        {
            WhenEmpty = "The catalog holds no campaigns yet; 'campaigns start CODE' opens one.",
        });
        return ExitCode.Done;
    }
}
