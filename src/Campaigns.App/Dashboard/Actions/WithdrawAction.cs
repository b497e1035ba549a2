using Campaigns.App.Dashboard.Model;
using Campaigns.App.Wording;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Actions;

/// <summary>Takes experiments out of the campaign, or in again.</summary>
internal sealed class WithdrawAction : DashboardAction
{
    private const int MostNamed = 10;
    private const string Experiments = "experiments";
    private const string Decision = "decision";
    private const string Reason = "reason";
    private const string Out = "withdraw";
    private const string In = "take in again";

    /// <inheritdoc/>
    public override char Key => 'w';

    /// <inheritdoc/>
    public override string Name => "withdraw experiments";

    /// <inheritdoc/>
    public override string Does => "Takes experiments out of the campaign with a reason, or in again. Nothing is deleted, and every output says so.";

    /// <inheritdoc/>
    public override IReadOnlyList<ActionField> Fields(DashboardModel model, ActionDesk desk)
    {
        IReadOnlyList<ExperimentResult> all = model.Standing.Experiments;
        ExperimentResult[] chosen = model.Marks.Count > 0 ? [.. all.Where((_, i) => model.Marks.Has(i))] : model.Selected is { } selected ? [selected] : [];
        bool areOut = chosen.Length > 0 && chosen.All(e => e.Status == ExperimentStatus.Withdrawn);
        return
        [
            new(Experiments, "Their codes, parted by commas: the marked ones, or else the selected one, stand here at first. All are taken out, or none.", CodeList.Write(chosen.Select(e => e.Plan.Code)))
            {
                IfEmpty = "Which experiments? Type their codes, parted by commas.",
                Suggest = values => CodeList.Complete(values[Experiments], all.Select(e => (e.Plan.Code, e.Plan.Title))),
            },
            new(Decision, "Take them out, or take in again what was taken out; both are recorded.", areOut ? In : Out) { Words = [Out, In] },
            new(Reason, "Why; recorded, and shown wherever the experiment is.", "") { IfEmpty = "Why? A reason is recorded with every such decision." },
        ];
    }

    /// <inheritdoc/>
    public override Preview Rehearse(ActionWork work)
    {
        CampaignOverview before = Overview(work);
        IReadOnlyList<Withdrawal> decisions = Decide(work);
        string[] more = decisions.Count > MostNamed ? [FormattableString.Invariant($"And so for {decisions.Count - MostNamed} more, {decisions.Count} in all.")] : [];
        return new Preview([.. decisions.Take(MostNamed).Select(WithdrawalText.Foreseen), .. more, .. DecisionPreview.Of(before, Overview(work), decisions.Any(d => d.AfterResults))]);
    }

    /// <inheritdoc/>
    public override IReadOnlyList<string> CarryOut(ActionWork work)
    {
        IReadOnlyList<Withdrawal> decisions = Decide(work);
        List<string> sentences = [.. decisions.Select(WithdrawalText.Recorded)];
        if (WithdrawalText.Next(new CampaignStore(work.Catalog).Get(work.Campaign).Campaign, decisions, work.Steps) is { } next)
        {
            sentences.Add(next);
        }

        return sentences;
    }

    private static CampaignOverview Overview(ActionWork work) => new OverviewReader(work.Catalog).Read(new CampaignStore(work.Catalog).Get(work.Campaign));

    private static IReadOnlyList<Withdrawal> Decide(ActionWork work) =>
        new WithdrawalStore(work.Catalog).Decide(work.Campaign, CodeList.Read(work.Values[Experiments]), withdraw: work.Values[Decision] == Out, work.Values[Reason], work.Catalog.Actor.Name);
}
