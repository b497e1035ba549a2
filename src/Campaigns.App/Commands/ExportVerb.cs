using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Exporting;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>export: a campaign as tidy files that are read without this program, or its loaded files as they were.</summary>
internal sealed class ExportVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Option<string> _out = TypedOptions.NotBlank(new Option<string>("--out") { Description = "A folder that does not exist yet, or is empty.", HelpName = "FOLDER", Required = true });
    private readonly Option<bool> _originals = new("--originals") { Description = "The loaded files instead, byte for byte, with a list of them." };

    public override Command Build() => new("export", Describe("Write campaign, plan, measurements, results and record as tidy files with a dictionary of their columns; the folder can be run again with 'campaigns run'.",
        "export PRIMERS --out primers-export"))
    {
        _code, _out, _originals,
    };

    public override int Run(Session session)
    {
        using Catalog.Catalog catalog = session.OpenCatalog();
        return session.Get(_originals) ? Originals(session, catalog) : Tidy(session, catalog);
    }

    private int Tidy(Session session, Catalog.Catalog catalog)
    {
        string folder = session.Get(_out);
        (CampaignStanding standing, ExportedCampaign exported) = catalog.Snapshot(() =>
        {
            CampaignStanding now = new StandingReader(catalog).Read(session.Get(_code));
            return (now, new CampaignExport(catalog).Write(
                now,
                folder,
                [
                    (CampaignExport.ResultsName, writer => CsvRows.WriteFile(new RowTable(ResultsVerb.Columns, now.Experiments.Select(ResultsVerb.Row)), writer)),
                    (CampaignExport.ComparisonsName, writer => CsvRows.WriteFile(new RowTable(ComparisonsVerb.Columns, new ComparisonReader(catalog).All(now).Select(ComparisonsVerb.Row)), writer)),
                ],
                NumberText.RoundTrip));
        });
        session.Say($"Wrote {standing.Campaign.Code} to '{folder}': {string.Join(", ", exported.Files)}.");
        if (standing.Campaign.Streams.Count > 0)
        {
            session.Say($"{CampaignExport.StreamsName} and {CampaignExport.DecisionsName} hold the streams and the decisions that stand; 'campaigns run' on the folder starts one stream of its own and decides in the plan's order.");
        }

        if (exported.Files.Contains(CampaignExport.ExclusionsName))
        {
            session.Say($"The measurements hold the excluded values too; 'campaigns run' does not exclude them again, {CampaignExport.ExclusionsName} tells which they are.");
        }

        if (exported.Files.Contains(CampaignExport.SealedPlanName))
        {
            session.Say($"plan.csv is the plan as amended, {CampaignExport.SealedPlanName} the plan as it was sealed, and {CampaignExport.AmendmentsName} tells what changed between them; 'campaigns run' seals the amended one.");
        }

        session.Say(LedgerText.HeadLine(exported.Head));
        session.PrintForScripts(new RowTable(
            [new Column("campaign", null), new Column("folder", null), new Column("ledger_head", null)],
            [[Cell.Text(standing.Campaign.Code), Cell.Text(folder), Cell.Text(exported.Head.ToString())]]));
        return ExitCode.Done;
    }

    private int Originals(Session session, Catalog.Catalog catalog)
    {
        string folder = session.Get(_out), code = session.Get(_code);
        IReadOnlyList<WrittenOriginal> files = new OriginalsExport(catalog).Write(code, folder);
        int kept = files.Count(f => f.Name is not null);
        session.Say(FormattableString.Invariant($"Wrote {kept} loaded {(kept == 1 ? "file" : "files")} of {code} to '{folder}', byte for byte, and {OriginalsExport.ListName}."));
        if (files.Where(f => f.Name is null).Select(f => f.File.FileName).ToList() is { Count: > 0 } absent)
        {
            session.Host.Notice($"Note: an earlier version of the program loaded {string.Join(", ", absent)} and did not keep the bytes; the list has {(absent.Count == 1 ? "its" : "their")} SHA-256.");
        }

        session.PrintForScripts(new RowTable(
            [new("load", null, true), new("file", null), new("written_as", null), new("sha256", null), new("bytes", null, true)],
            files.Select(f => (Cell[])[Cell.Whole(f.File.Number), Cell.Text(f.File.FileName), Cell.Text(f.Name), Cell.Text(f.File.Sha256), Cell.Whole(f.File.ByteCount)])));
        return ExitCode.Done;
    }
}
