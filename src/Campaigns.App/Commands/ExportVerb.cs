using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.Catalog.Exporting;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>export: plan, measurements and results as tidy CSV.</summary>
internal sealed class ExportVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Option<string> _out = TypedOptions.NotBlank(new Option<string>("--out") { Description = "A folder that does not exist yet, or is empty.", HelpName = "FOLDER", Required = true });

    public override Command Build() => new("export", Describe("Write campaign, plan, measurements and results as tidy files; the folder can be run again with 'campaigns run'.",
        "export PRIMERS --out primers-export"))
    {
        _code, _out,
    };

    public override int Run(Session session)
    {
        string folder = session.Get(_out);
        using Catalog.Catalog catalog = session.OpenCatalog();
        CampaignStanding standing = new StandingReader(catalog).Read(session.Get(_code));
        var export = new CampaignExport(catalog);
        export.Write(standing, folder, writer => WriteResults(standing, writer), NumberText.RoundTrip);
        bool hasExclusions = File.Exists(Path.Combine(folder, CampaignExport.ExclusionsName));
        session.Say($"Wrote {standing.Campaign.Code} to '{folder}': campaign.json, {(standing.Campaign.IsExploratory ? "" : "plan.csv, ")}{(standing.Campaign.Families.Count > 0 ? $"{CampaignExport.FamiliesName}, " : "")}measurements/{CampaignExport.MeasurementsName}, {(hasExclusions ? $"{CampaignExport.ExclusionsName}, " : "")}{CampaignExport.ResultsName}, {CampaignExport.ReviewsName}.");
        if (standing.Campaign.Streams.Count > 0)
        {
            session.Say($"{CampaignExport.StreamsName} and {CampaignExport.DecisionsName} hold the streams and the decisions that stand; 'campaigns run' on the folder starts one stream of its own and decides in the plan's order.");
        }

        if (hasExclusions)
        {
            session.Say($"The measurements hold the excluded values too; 'campaigns run' does not exclude them again, {CampaignExport.ExclusionsName} tells which they are.");
        }

        session.PrintForScripts(new RowTable([new Column("campaign", null), new Column("folder", null)], [[Cell.Text(standing.Campaign.Code), Cell.Text(folder)]]));
        return ExitCode.Done;
    }

    private static void WriteResults(CampaignStanding standing, TextWriter writer) =>
        CsvRows.Write(new RowTable(ResultsVerb.Columns, standing.Experiments.Select(ResultsVerb.Row)), writer);
}
