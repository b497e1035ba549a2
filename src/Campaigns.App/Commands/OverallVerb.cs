using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Combination;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>overall: whether anything at all is real in a campaign.</summary>
internal sealed class OverallVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();

    public override Command Build() => new("overall", Describe("One p-value for the whole campaign, is there anything at all, by several published tests; it supports no single experiment.",
        "overall PRIMERS"))
    {
        _code,
    };

    public override int Run(Session session)
    {
        using Catalog.Catalog catalog = session.OpenCatalog();
        session.Print(Table(new StandingReader(catalog).Read(session.Get(_code))));
        return ExitCode.Done;
    }

    private static RowTable Table(CampaignStanding standing)
    {
        PValue[] p = [.. standing.Experiments.Where(e => e.P is not null).Select(e => e.P!.Value)];
        int planned = standing.FamilySize;
        return new RowTable(
            [
                new("test", "key"), new("statistic", "statistic", true), new("p", "p", true), new("assumes", null), new("source", null),
                new("name", null), new("experiments", "of", true), new("reason", null),
            ],
            CombinationRegistry.All.Select(test =>
            {
                CombinationOutcome outcome = test.Combine(p, planned);
                return (Cell[])
                [
                    Cell.Text(test.Key), Cell.Number(outcome.Statistic), Cell.P(outcome.P), Cell.Text(test.Assumes), Cell.Text(test.Source),
                    Cell.Text(test.Name), Cell.Whole(test.CountsUntested ? planned : p.Length), Cell.Text(outcome.Reason),
                ];
            }))
        {
            Above = [FormattableString.Invariant($"{standing.Campaign.Code}: is anything real at all? {p.Length} results of {planned} planned experiments")],
            Below =
            [
                .. CombinationRegistry.All.Select(test => (Test: test, test.Combine(p, planned).Reason)).Where(t => t.Reason is not null).GroupBy(t => t.Reason).Select(g => $"No p-value by {string.Join(", ", g.Select(t => t.Test.Key))}: {g.Key}."),
                .. CombinationRegistry.All.Select(test => $"{test.Key}: {test.Name}. {test.Assumes}"),
                FormattableString.Invariant($"Of: the experiments that enter. Simes' tests count all {planned} planned ones, the untested as p = 1; the others take the {p.Length} tested ones alone."),
                "A small p says that something in the campaign is real. It supports no single experiment: which ones, the correction says, and how many of a set at most are false, 'campaigns bound'. Choosing the smallest of these p-values would undo what each of them holds.",
                .. CampaignText.Deviations(standing.Overview),
                CampaignText.Caution,
            ],
        };
    }
}
