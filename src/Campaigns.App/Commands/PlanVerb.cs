using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Plans;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>plan: register or change experiments, before sealing freely, afterwards as an amendment.</summary>
internal sealed class PlanVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Argument<string> _file = TypedOptions.NotBlank(new Argument<string>("FILE") { Description = "A plan file: one row an experiment; only the column experiment is required." });
    private readonly Option<string?> _reason = TypedOptions.NotBlank(new Option<string?>("--reason") { Description = "Why; a sealed plan is changed only with a reason, as an amendment that every output mentions.", HelpName = "TEXT" });

    public override Command Build() => new("plan", Describe("Register experiments from a plan file, or change registered ones. A sealed plan is amended, with --reason: experiments may be added, and what decides over others stays.",
        "plan PRIMERS plan.csv"))
    {
        _code, _file, _reason, SharedOptions.DecimalMark, SharedOptions.Separator, SharedOptions.Columns, SharedOptions.Seen,
    };

    public override int Run(Session session)
    {
        string code = session.Get(_code);
        using Catalog.Catalog catalog = session.OpenCatalog();
        Campaign campaign = new CampaignStore(catalog).Get(code).Campaign;
        IReadOnlyList<PlannedExperiment> plan = Read(session, campaign, session.Get(_file));
        PlanChange change = new PlanStore(catalog).Register(code, plan, session.Typed.GetValue(_reason)?.Trim());
        string next = !campaign.IsSealed ? $"Next: 'campaigns seal {code}'."
            : change.Added + change.Changed == 0 ? "Nothing was amended."
            : $"Recorded as an amendment of the sealed plan; 'campaigns show {code} --amendments' lists it.";
        session.Say(FormattableString.Invariant($"Plan of {code}: {Counted.Of(change.Added, "experiment")} added, {change.Changed} changed, {change.Unchanged} as before. {next}"));
        session.PrintForScripts(new RowTable(
            [new Column("campaign", null), new Column("added", null, true), new Column("changed", null, true), new Column("unchanged", null, true)],
            [[Cell.Text(code), Cell.Whole(change.Added), Cell.Whole(change.Changed), Cell.Whole(change.Unchanged)]]));
        return ExitCode.Done;
    }

    /// <summary>Reads a plan file whole.</summary>
    /// <exception cref="RefusedException">The file has problems.</exception>
    public static IReadOnlyList<PlannedExperiment> Read(Session session, Campaign campaign, string path)
    {
        PlanFileResult plan = PlanFile.Read(
            path, SharedOptions.Reading(session, PlanFile.ColumnNames), new PlanDefaults(campaign.DefaultTest, campaign.DefaultFollowUp), Session.KnownKeys);
        if (!plan.Problems.IsEmpty)
        {
            throw new RefusedException(
                FormattableString.Invariant($"The plan '{path}' was refused; nothing was changed. Problems: {plan.Problems.Count}."),
                [.. plan.Problems.Sentences()]);
        }

        Notices.IgnoredColumns(session.Host, path, plan.IgnoredColumns);
        return plan.Experiments;
    }
}
