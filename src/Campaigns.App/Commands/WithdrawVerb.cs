using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>withdraw: take experiments out of a campaign, with a reason and a name; nothing of them is deleted.</summary>
internal sealed class WithdrawVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Argument<string[]> _experiments = TypedOptions.NotBlank(new Argument<string[]>("EXPERIMENT") { Description = "The experiments; all of them are withdrawn, or none.", Arity = ArgumentArity.OneOrMore });
    private readonly Option<string> _reason = TypedOptions.NotBlank(new Option<string>("--reason") { Description = "Why; recorded and shown wherever the experiment is.", HelpName = "TEXT", Required = true });
    private readonly Option<bool> _takeBack = new("--take-back") { Description = "Take withdrawn experiments in again; that too is recorded." };

    public override Command Build() => new("withdraw", Describe("Take experiments out of a campaign, with a reason and a name. One that has no data leaves the family; one whose data came stays in it and counts with p = 1. Nothing is deleted, and every output says so.",
        "withdraw PRIMERS E07 E08 --reason \"resin no longer made\" --as \"A. Moss\""))
    {
        _code, _experiments, _reason, _takeBack, SharedOptions.Seen,
    };

    public override int Run(Session session)
    {
        string code = session.Get(_code);
        using Catalog.Catalog catalog = session.OpenCatalog();
        IReadOnlyList<Withdrawal> decisions = new WithdrawalStore(catalog).Decide(code, session.Get(_experiments), withdraw: !session.Get(_takeBack), session.Get(_reason).Trim(), session.Actor.Name);
        foreach (Withdrawal decision in decisions)
        {
            session.Say(WithdrawalText.Recorded(decision));
        }

        session.PrintForScripts(Rows(decisions));
        if (WithdrawalText.Next(new CampaignStore(catalog).Get(code).Campaign, decisions) is { } next)
        {
            session.Say(next);
        }

        return ExitCode.Done;
    }

    /// <summary>A row a decision.</summary>
    public static RowTable Rows(IEnumerable<Withdrawal> decisions) => new(
        [
            new("experiment", "experiment"), new("withdrawn", "withdrawn"), new("had_data", "had data"), new("after_results", "after results", GivesWay: 1), new("reason", "reason", CutLast: true, Wraps: true), new("by", "by", Wraps: true), new("at", "at", true),
        ],
        decisions.Select(d => (Cell[])
        [
            Cell.Text(d.Experiment), Cell.Truth(d.IsWithdrawn), Cell.Truth(d.HadData), Cell.Truth(d.AfterResults), Cell.Text(d.Reason), Cell.Text(d.NamedBy), Cell.Text(Words.Instant(d.At)),
        ]));
}
