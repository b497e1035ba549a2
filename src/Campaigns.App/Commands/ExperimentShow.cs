using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Ledger;
using Campaigns.Domain;
using Campaigns.Statistics.FollowUps;

namespace Campaigns.App.Commands;

/// <summary>One experiment in full: for people as tables and sentences, for scripts as one JSON object, or (csv) one row a group with the experiment's figures beside it.</summary>
internal static class ExperimentShow
{
    public static void Write(Session session, CampaignStanding standing, ExperimentDetail detail, LedgerHead head)
    {
        switch (session.Format)
        {
            case RowFormat.Json:
                JsonRows.WriteObject(
                    ExperimentSections.Experiment(detail, head),
                    [
                        ("groups", ExperimentSections.Groups(detail)), ("variation", ExperimentSections.Variation(detail)), ("specimen_variation", ExperimentSections.Specimens(detail)),
                        ("tests", ExperimentSections.Tests(detail)), ("effects", EffectSection.Table(detail)), ("checks", ExperimentSections.Checks(detail)),
                        ("comparisons", ExperimentSections.Comparisons(detail)), ("exclusions", ExperimentSections.Exclusions(detail)),
                    ],
                    session.Host.Out);
                break;
            case RowFormat.Csv:
                session.Print(GroupsBesideExperiment(detail, head));
                break;
            default:
                ForPeople(session, standing, detail, head);
                break;
        }
    }

    private static void ForPeople(Session session, CampaignStanding standing, ExperimentDetail detail, LedgerHead head)
    {
        ExperimentResult result = detail.Result;
        session.Print(ExperimentSections.Groups(detail) with
        {
            Above = [$"{standing.Campaign.Code} / {result.Plan.Code}  {result.Plan.Title}", .. ExperimentNotes.Opening(detail)],
            Below = [.. ExperimentNotes.Groups(detail)],
        });
        Section(session, "Variation", ExperimentSections.Variation(detail), []);
        Section(session, "Specimens", ExperimentSections.Specimens(detail), ExperimentNotes.Specimens(detail));
        Section(session, "Test", ExperimentSections.Tests(detail), ExperimentNotes.Tests(standing, detail));
        Section(session, "Effects", EffectSection.Table(detail), ExperimentWording.Effects(standing, detail));
        ChecksForPeople(session, detail);
        Section(session, $"Comparisons ({FollowUpRegistry.Find(result.Plan.FollowUp)?.Name})", ExperimentSections.Comparisons(detail), ExperimentWording.Comparisons(standing.Overview, [result.Plan.FollowUp]));
        Section(session, "Exclusions", ExperimentSections.Exclusions(detail), []);
        session.Host.Out.WriteLine();
        TextTable.Sentences(session.Host, [.. result.Confirmation is null ? [] : ConfirmationText.Footnotes(standing.Campaign, standing.Experiments), .. CampaignText.Footnotes(standing.Overview, []), CampaignText.Caution, LedgerText.HeadLine(head)]);
    }

    private static void Section(Session session, string title, RowTable rows, IEnumerable<string> below)
    {
        if (rows.Rows.Any())
        {
            session.Host.Out.WriteLine();
            session.Print(rows with { Above = [title], Below = [.. below] });
        }
    }

    private static void ChecksForPeople(Session session, ExperimentDetail detail)
    {
        if (detail.Analysis.Checks.Count == 0)
        {
            return;
        }

        session.Host.Out.WriteLine();
        TextTable.Sentences(session.Host, [$"Checks ({ExperimentWording.ChecksAreAdvice})"]);
        TextTable.Sentences(session.Host, ExperimentNotes.Checks(detail).Select(c => $"- {c}"));
    }

    private static RowTable GroupsBesideExperiment(ExperimentDetail detail, LedgerHead head)
    {
        RowTable groups = ExperimentSections.Groups(detail);
        RowTable experiment = ExperimentSections.Experiment(detail, head);
        Cell[] facts = experiment.Rows.Single();
        return new RowTable([.. groups.Columns, .. experiment.Columns], groups.Rows.Select(g => (Cell[])[.. g, .. facts]));
    }
}
