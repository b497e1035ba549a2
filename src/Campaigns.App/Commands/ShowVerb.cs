using System.CommandLine;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>show: one campaign, or one experiment, in full.</summary>
internal sealed class ShowVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Argument<string?> _experiment = new("EXPERIMENT") { Description = "An experiment of it.", Arity = ArgumentArity.ZeroOrOne };
    private readonly Option<bool> _observations = new("--observations") { Description = "Every observation of the experiment, with the file and the line that it came from." };
    private readonly Option<bool> _plan = new("--plan") { Description = "The plan as it stands, in the columns of a plan file." };
    private readonly Option<bool> _sealedPlan = new("--sealed-plan") { Description = "The plan as it was sealed, every amendment undone, in the columns of a plan file." };
    private readonly Option<bool> _amendments = new("--amendments") { Description = "Every change of the sealed plan: number, when, who, what, before, after, why." };
    private readonly Option<bool> _withdrawals = new("--withdrawals") { Description = "Every decision to withdraw an experiment, or to take it in again." };

    public override Command Build() => new("show", Describe("One campaign in full, or one of its experiments: group table, table of variation, result.", "show PRIMERS E07"))
    {
        _code, _experiment, _observations, _plan, _sealedPlan, _amendments, _withdrawals,
    };

    public override int Run(Session session)
    {
        bool[] asked = [session.Get(_plan), session.Get(_sealedPlan), session.Get(_amendments), session.Get(_withdrawals)];
        if (asked.Count(a => a) + (session.Typed.GetValue(_experiment) is null ? 0 : 1) > 1)
        {
            throw new UsageException("Ask for one thing at a time: an experiment, --plan, --sealed-plan, --amendments or --withdrawals.");
        }

        using Catalog.Catalog catalog = session.OpenCatalog();
        if (asked.Any(a => a))
        {
            session.Print(PlanHistory.Of(catalog, session.Get(_code), asked[0] ? PlanHistoryPart.Plan : asked[1] ? PlanHistoryPart.SealedPlan : asked[2] ? PlanHistoryPart.Amendments : PlanHistoryPart.Withdrawals));
            return ExitCode.Done;
        }

        return catalog.Snapshot(() =>
        {
            if (session.Get(_observations))
            {
                ObservationsTable.Print(session, catalog, session.Get(_code), session.Typed.GetValue(_experiment) ?? throw new UsageException("--observations needs the experiment: campaigns show CODE EXPERIMENT --observations."));
                return ExitCode.Done;
            }

            LedgerHead head = new LedgerReader(catalog).Head;
            CampaignStanding standing = new StandingReader(catalog).Read(session.Get(_code));
            if (session.Typed.GetValue(_experiment) is { } experiment)
            {
                ExperimentShow.Write(session, standing, new DetailReader(catalog).Read(standing, experiment), head);
            }
            else
            {
                ShowCampaign(session, catalog, standing, head);
            }

            return ExitCode.Done;
        });
    }

    private static void ShowCampaign(Session session, Catalog.Catalog catalog, CampaignStanding standing, LedgerHead head)
    {
        Campaign campaign = standing.Campaign;
        long id = new CampaignStore(catalog).Get(campaign.Code).Id;
        var loads = catalog.Context.Loads.Where(l => l.CampaignId == id).OrderBy(l => l.Id).ToList();
        var facts = new List<(string Name, string Label, Cell Value)>
        {
            ("campaign", "campaign", Cell.Text(campaign.Code)),
            ("title", "title", Cell.Text(campaign.Title)),
            ("purpose", "purpose", Cell.Text(campaign.Purpose)),
            ("error_rate", "holds", Cell.Text(campaign.ErrorRate.Word())),
            ("level", "level", Cell.Setting(campaign.Level.Value)),
            ("correction", "correction", Cell.Text(campaign.Correction)),
            ("default_test", "usual test", Cell.Text(campaign.DefaultTest)),
            ("default_follow_up", "usual follow-up", Cell.Text(campaign.DefaultFollowUp)),
            ("exploratory", "exploratory", Cell.Truth(campaign.IsExploratory)),
            ("opened_at", "opened", Cell.Text(Words.Instant(campaign.OpenedAt))),
            ("sealed_at", "sealed", Cell.Text(campaign.SealedAt is { } at ? Words.Instant(at) : null)),
            ("plan_digest", "plan digest", Cell.Text(campaign.PlanDigest)),
            ("experiments", "experiments", Cell.Whole(standing.FamilySize)),
            ("tested", "tested", Cell.Whole(standing.TestedCount)),
            ("survivors", "survivors", Cell.Whole(standing.SurvivorCount)),
            ("files_loaded", "files loaded", Cell.Whole(loads.Count)),
            ("rows_loaded", "rows loaded", Cell.Whole(loads.Sum(l => l.RowCount))),
            ("amendments", "amendments", Cell.Whole(loads.Count(l => l.AmendmentReason is not null))),
            ("plan_amendments", "plan amended", Cell.Whole(standing.AmendedPlan.Amendments)),
            ("withdrawn", "withdrawn", Cell.Whole(standing.Withdrawn.All)),
            ("exclusions", "left out", Cell.Whole(ExclusionStore.Standing(new ExclusionStore(catalog).All(campaign.Code)))),
            ("reviews", "reviews", Cell.Whole(standing.LastReview?.Number ?? 0)),
            ("streams", "streams", Cell.Whole(campaign.Streams.Count == 0 ? null : campaign.Streams.Count)),
            ("families", "families", Cell.Whole(standing.Families.Count)),
            ("review_interim", "", Cell.Truth(standing.LastReview?.IsInterim)),
            ("ledger_sequence", "", Cell.Whole(head.Sequence)),
            ("ledger_head", "", Cell.Text(head.ToString())),
        };
        if (session.Format != RowFormat.Table)
        {
            session.Print(new RowTable([.. facts.Select(f => new Column(f.Name, null))], [[.. facts.Select(f => f.Value)]]));
            return;
        }

        foreach ((_, string label, Cell value) in facts.Where(f => f.Value.Kind != CellKind.Empty && f.Label.Length > 0 && !IsIdle(f.Name, standing)))
        {
            WriteFact(session.Host, label, TextTable.Text(value));
        }

        session.Host.Out.WriteLine();
        if (campaign.JudgedFamilies.Count > 0)
        {
            session.Print(FamilyTable.Of(campaign, standing.Families));
            session.Host.Out.WriteLine();
        }

        session.Print(new RowTable(
            [new("file", "file"), new("rows", "rows", true), new("missing", "missing", true), new("loaded_at", "loaded"), new("sha256", "sha256"), new("amendment", "amendment", Wraps: true)],
            loads.Select(l => (Cell[])[Cell.Text(l.FileName), Cell.Whole(l.RowCount), Cell.Whole(l.MissingCount), Cell.Text(Words.Instant(DateTimeOffset.UnixEpoch.AddTicks(l.LoadedAt * TimeSpan.TicksPerMicrosecond))), Cell.Text(l.Sha256[..12]), Cell.Text(l.AmendmentReason)]))
        {
            WhenEmpty = "No file was loaded yet.",
        });
        session.Host.Out.WriteLine();
        foreach (PlanHistoryPart part in new[] { PlanHistoryPart.Amendments, PlanHistoryPart.Withdrawals })
        {
            RowTable deviations = PlanHistory.Of(catalog, campaign.Code, part);
            if (deviations.Rows.Any())
            {
                session.Print(deviations);
                session.Host.Out.WriteLine();
            }
        }

        session.Print(new RowTable(
            [new("review", "review", true), new("taken_at", "taken"), new("correction", "correction"), new("level", "level", true), new("family_size", "family", true), new("tested", "tested", true), new("survivors", "survivors", true), new("interim", "interim")],
            new ReviewStore(catalog).All(id).Select(r => (Cell[])[Cell.Whole(r.Number), Cell.Text(Words.Instant(r.At)), Cell.Text(r.Correction), Cell.Setting(r.Level.Value), Cell.Whole(r.FamilySize), Cell.Whole(r.TestedCount), Cell.Whole(r.SurvivorCount), Cell.Truth(r.IsInterim)]))
        {
            WhenEmpty = "No review was taken yet.",
            Below = [.. CampaignText.Footnotes(standing.Overview, standing.Experiments.Select(e => e.Plan.Test)), CampaignText.Caution, LedgerText.HeadLine(head)],
        });
    }

    /// <summary>Facts that say something only about a few campaigns.</summary>
    private static bool IsIdle(string fact, CampaignStanding standing) => fact switch
    {
        "families" => standing.Campaign.JudgedFamilies.Count == 0,
        "plan_amendments" => standing.AmendedPlan.Amendments == 0,
        "withdrawn" => standing.Withdrawn.All == 0,
        _ => false,
    };

    /// <summary>A label, and beside it the value, wrapped: a purpose may be long, and nothing of it is cut.</summary>
    private static void WriteFact(Host host, string label, string value)
    {
        const int indent = 17;
        foreach (string line in CellText.Wrap(value, host.Width - indent))
        {
            host.Out.WriteLine(label.PadRight(indent) + line);
            label = "";
        }
    }
}
