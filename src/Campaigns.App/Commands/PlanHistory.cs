using Campaigns.App.Output;
using Campaigns.Catalog.Amending;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>What can be seen of how a plan came to be as it is.</summary>
internal enum PlanHistoryPart
{
    /// <summary>The plan as it stands.</summary>
    Plan,

    /// <summary>The plan as it was sealed.</summary>
    SealedPlan,

    /// <summary>Every change of the sealed plan.</summary>
    Amendments,

    /// <summary>Every decision to withdraw an experiment or to take it in again.</summary>
    Withdrawals,
}

/// <summary>A campaign's plan and its changes as rows.</summary>
internal static class PlanHistory
{
    /// <summary>One part of it.</summary>
    /// <exception cref="RefusedException">There is no such campaign, or it has no such plan.</exception>
    public static RowTable Of(Catalog.Catalog catalog, string code, PlanHistoryPart part) => catalog.Snapshot(() =>
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        return part switch
        {
            PlanHistoryPart.Plan => Plan(SealedPlan.Standing(catalog, stored.Id)) with { Above = [$"{code}: the plan as it stands"] },
            PlanHistoryPart.SealedPlan => AsSealed(catalog, stored),
            PlanHistoryPart.Amendments => Amendments(new PlanAmendmentReader(catalog).All(code)),
            _ => WithdrawVerb.Rows(new WithdrawalStore(catalog).All(code)) with { Above = ["Withdrawals"], WhenEmpty = "No experiment was ever withdrawn." },
        };
    });

    private static RowTable AsSealed(Catalog.Catalog catalog, StoredCampaign stored)
    {
        string code = stored.Campaign.Code;
        if (stored.Campaign is not { SealedAt: { } at, IsExploratory: false })
        {
            throw new RefusedException(stored.Campaign.IsExploratory
                ? $"The campaign '{code}' is exploratory: its experiments came from the data, so there is no sealed plan of them."
                : $"The plan of '{code}' is not sealed yet; 'campaigns show {code} --plan' gives it as it stands.");
        }

        return Plan(SealedPlan.Read(catalog, stored.Id)) with
        {
            Above = [$"{code}: the plan as it was sealed on {Words.Instant(at)}"],
            Below = [DigestSentence(stored.Campaign, SealedPlan.Digest(catalog, stored))],
        };
    }

    /// <summary>Whether the sealed plan is the one that was sealed.</summary>
    /// <param name="campaign">A sealed campaign.</param>
    /// <param name="digest">SHA-256 of its sealed plan, computed anew.</param>
    public static string DigestSentence(Campaign campaign, string? digest) =>
        $"Its SHA-256 {(digest == campaign.PlanDigest ? "is the one that the seal stored" : "is NOT the one that the seal stored: the record was changed")}: {campaign.PlanDigest}";

    /// <summary>A row an experiment, in the columns of a plan file.</summary>
    public static RowTable Plan(IReadOnlyList<PlannedExperiment> plan) => new(
        [new("experiment", "experiment"), .. PlanFields.All.Select(f => new Column(f.Name, plan.Any(e => f.Text(e) is not null) ? f.Name.Replace('_', ' ') : null, IsNumber(f.Name), f.Name is "groups" ? 1 : 2, Wraps: !IsNumber(f.Name)))],
        plan.Select(e => (Cell[])[Cell.Text(e.Code), .. PlanFields.All.Select(f => CellOf(f, e))]))
    {
        WhenEmpty = "The plan names no experiments.",
    };

    /// <summary>A row a change of the sealed plan.</summary>
    public static RowTable Amendments(IReadOnlyList<PlanAmendment> amendments) => new(
        [
            new("amendment", "amendment", true), new("at", null), new("by", null), new("experiment", "experiment", Wraps: true), new("field", "field", Wraps: true),
            new("before", "before", Wraps: true), new("after", "after", Wraps: true), new("reason", null),
        ],
        amendments.SelectMany(a => a.Changes.Select(c => (Cell[])
        [
            Cell.Whole(a.Number), Cell.Text(Words.Instant(a.At)), Cell.Text(a.NamedBy), Cell.Text(c.Experiment), Cell.Text(c.IsAdded ? "added" : c.Field), Cell.Text(c.Before), Cell.Text(c.IsAdded ? null : c.After), Cell.Text(a.Reason),
        ])))
    {
        Above = ["Amendments of the sealed plan", .. amendments.Select(a => FormattableString.Invariant($"Amendment {a.Number}, {Words.Instant(a.At)}, by {a.NamedBy}: {a.Reason}"))],
        WhenEmpty = "The plan was never amended.",
    };

    private static bool IsNumber(string field) => field is "replicates" or "smallest_effect" or "assumed_sd" or "weight";

    private static Cell CellOf(PlanField field, PlannedExperiment e) => field.Name switch
    {
        "replicates" => Cell.Whole(e.Replicates),
        "smallest_effect" => e.SmallestEffect is { } effect ? Cell.Setting(effect) : Cell.Empty,
        "assumed_sd" => e.AssumedStandardDeviation is { } sd ? Cell.Setting(sd) : Cell.Empty,
        "weight" => e.Weight is { } weight ? Cell.Setting(weight) : Cell.Empty,
        _ => Cell.Text(field.Text(e)),
    };
}
