using System.CommandLine;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Streams;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>decisions: the standing decisions of a campaign that is judged as its experiments arrive.</summary>
internal sealed class DecisionsVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();

    public override Command Build() => new("decisions", Describe("The levels given to experiments as they started, and the decisions that stand, in the order of the stream.",
        "decisions PRIMERS --format csv"))
    {
        _code,
    };

    public override int Run(Session session)
    {
        string code = session.Get(_code);
        using Catalog.Catalog catalog = session.OpenCatalog();
        session.Print(catalog.Snapshot(() =>
        {
            IReadOnlyList<StreamStore.Line> lines = new StreamStore(catalog).Decisions(code);
            CampaignOverview overview = new OverviewReader(catalog).Read(new CampaignStore(catalog).Get(code));
            return DecisionRows.Of(lines) with
            {
                Above = [FormattableString.Invariant($"{code}: {Given(lines, overview)} were given a level, {lines.Count(l => l.Entry.DecidedAt is not null)} are decided, {overview.SurvivorCount} survive ({CampaignText.Goal(overview.Campaign)})")],
                Below = DecisionRows.Below(overview, lines),
            };
        }));
        return ExitCode.Done;
    }

    /// <summary>Withdrawn experiments keep their levels, and may have left the family.</summary>
    private static string Given(IReadOnlyList<StreamStore.Line> lines, CampaignOverview overview) => lines.Count(l => l.IsWithdrawn) is var withdrawn && withdrawn > 0
        ? FormattableString.Invariant($"{lines.Count} experiments ({withdrawn} withdrawn since; the family has {overview.FamilySize})")
        : FormattableString.Invariant($"{lines.Count} of {overview.FamilySize} experiments");
}
