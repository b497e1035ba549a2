using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Ledger;
using Campaigns.Domain;
using Campaigns.Statistics.Checks;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;

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
        string unit = result.Plan.Unit.Length > 0 ? $" [{result.Plan.Unit}]" : "";
        session.Print(ExperimentSections.Groups(detail) with
        {
            Above =
            [
                $"{standing.Campaign.Code} / {result.Plan.Code}  {result.Plan.Title}",
                $"Response: {(result.Plan.Response.Length > 0 ? result.Plan.Response : "not named")}{unit}. Status: {result.Status.Sentence()}.{Missing(detail)}",
                .. result.Amendments.Select(ExperimentWording.Deviation),
                .. OnlineText.Decision(result.Entry) is { } decision ? [decision] : (string[])[],
                .. result.Confirmation is null ? (string[])[] : [ConfirmationText.Sentence(result)],
                .. detail.Analysis.UnitsNote is { } note ? [note] : (string[])[],
            ],
            Below = GroupNotes(detail),
        });
        Section(session, "Variation", ExperimentSections.Variation(detail), []);
        Section(session, "Specimens", ExperimentSections.Specimens(detail), detail.Analysis.Specimens is { RawComponent: < 0 }
            ? ["The variance between specimens was estimated below 0, as happens where specimens differ less than their readings, and is shown as 0."]
            : []);
        Section(session, "Test", ExperimentSections.Tests(detail), TestNotes(standing, detail));
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

    private static string Missing(ExperimentDetail detail) =>
        detail.MissingCount > 0 ? FormattableString.Invariant($" Marked as missing and left out: {detail.MissingCount}.") : "";

    private static string[] GroupNotes(ExperimentDetail detail) =>
    [
        .. ExperimentWording.MeanIntervals(detail) is { } intervals ? [intervals] : (string[])[],
        .. detail.Analysis.Letters is not null ? [ExperimentWording.Letters] : (string[])[],
    ];

    private static IEnumerable<string> TestNotes(CampaignStanding standing, ExperimentDetail detail)
    {
        ExperimentResult result = detail.Result;
        if (result.P is not { } p)
        {
            yield return result.LeftFamily ? WithdrawalText.NotCounted : ExperimentWording.NoResult;
        }
        else
        {
            yield return $"p = {NumberText.P(p)}, adjusted p = {NumberText.P(result.AdjustedP!.Value)}. {ExperimentWording.Verdict(result)}";
        }

        if (GroupTestRegistry.Find(result.Plan.Test) is { } test)
        {
            yield return ExperimentWording.Assumptions(test);
        }

        if (result.Resampling is { } resampling)
        {
            yield return ResamplingText.Sentence(resampling);
            if (ResamplingText.TooCoarse(resampling, standing.FamilyOf(result), result.GivenLevel) is { } warning)
            {
                yield return warning;
            }
        }

        if (detail.Analysis.Beside is not null)
        {
            yield return ExperimentWording.Beside;
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
        foreach (CheckLine line in detail.Analysis.Checks)
        {
            ExperimentCheck check = CheckRegistry.Find(line.Key)!;
            string word = line.Finding.Verdict == CheckVerdict.Warns ? "WARNS" : ExperimentWording.Word(line.Finding.Verdict);
            string rest = line.Finding.Verdict == CheckVerdict.NotPossible ? "" : $" {check.CannotSee}{(line.Finding.Verdict == CheckVerdict.Warns ? $" {check.Advice}" : "")}";
            TextTable.Sentences(session.Host, [$"- {line.Name} ({word}): {line.Finding.Saw}{rest}"]);
        }
    }

    private static RowTable GroupsBesideExperiment(ExperimentDetail detail, LedgerHead head)
    {
        RowTable groups = ExperimentSections.Groups(detail);
        RowTable experiment = ExperimentSections.Experiment(detail, head);
        Cell[] facts = experiment.Rows.Single();
        return new RowTable([.. groups.Columns, .. experiment.Columns], groups.Rows.Select(g => (Cell[])[.. g, .. facts]));
    }
}
