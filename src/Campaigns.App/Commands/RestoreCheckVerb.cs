using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Providers;

namespace Campaigns.App.Commands;

/// <summary>restore-check: whether a backup is whole, and what is in it.</summary>
internal sealed class RestoreCheckVerb : Verb
{
    private readonly Argument<string> _file = TypedOptions.NotBlank(new Argument<string>("FILE") { Description = "The backup, or any catalog that nobody writes." });
    private readonly Option<string?> _head = TypedOptions.NotBlank(new Option<string?>("--head") { Description = "A head of the ledger that was printed earlier; the file must continue it.", HelpName = "SEQUENCE:HASH" });

    public override Command Build() => new("restore-check", Describe("Check a backup from one end to the other without changing it: pages, references, structure and ledger; and say what is in it.",
        "restore-check campaigns-2026-03-02.db"))
    {
        _file, _head,
    };

    public override int Run(Session session)
    {
        string file = session.Get(_file);
        LedgerHead? head = null;
        if (session.Typed.GetValue(_head) is { } typed && !LedgerHead.TryParse(typed.Trim(), out head))
        {
            throw new UsageException($"--head: '{typed}' is no head of a ledger; it is printed as SEQUENCE:HASH, with 64 hexadecimal digits.");
        }

        CheckedCatalog check = CatalogCheck.Run(file, head, session.Host.Clock, session.Host.Cancel);
        foreach (string fault in check.Faults)
        {
            session.Host.Error.WriteLine(SafeText.Escape(fault));
        }

        Tell(session, file, check, head is not null);
        session.PrintForScripts(new RowTable(
            [new Column("file", null), new Column("whole", null), new Column("schema", null, true), new Column("campaigns", null, true), new Column("experiments", null, true), new Column("head", null), new Column("last_at", null)],
            [
                [
                    Cell.Text(file), Cell.Truth(check.Faults.Count == 0), Cell.Whole(check.Version), Cell.Whole(check.Campaigns.Count), Cell.Whole(check.Campaigns.Sum(c => c.Experiments)),
                    Cell.Text(check.Head?.ToString() ?? ""), Cell.Text(check.LastAt is { } at ? Instant(at) : ""),
                ],
            ]));
        return check.Faults.Count == 0 ? ExitCode.Done : ExitCode.RecordBroken;
    }

    private static void Tell(Session session, string file, CheckedCatalog check, bool wasHeld)
    {
        if (check.Faults.Count > 0)
        {
            session.Say(FormattableString.Invariant($"'{file}' is not whole ({Counted.Of(check.Faults.Count, "fault")}); do not restore it where another copy is at hand."));
            return;
        }

        session.Say($"'{file}' is whole: pages, references{(check.Head is null ? "" : ", structure and ledger")}.");
        foreach (CheckedCampaign campaign in check.Campaigns)
        {
            session.Say(FormattableString.Invariant($"Campaign {campaign.Code}{(campaign.Title.Length > 0 ? $" ({campaign.Title})" : "")}: {Counted.Of(campaign.Experiments, "experiment")}."));
        }

        if (check.Campaigns.Count == 0)
        {
            session.Say("It holds no campaigns.");
        }

        if (check.Head is not { } head)
        {
            session.Say($"It is of an older version, without a ledger; after it is put in place, 'campaigns upgrade' brings it up to date.");
            return;
        }

        session.Say(check.LastAt is { } at
            ? FormattableString.Invariant($"The ledger has {head.Sequence} entries, the last of {Instant(at)}; it ends with {head}")
            : "The ledger is empty.");
        session.Say(wasHeld ? "It contains the head that was given." : "Whether its end was cut off cannot be seen without a head that was printed earlier (--head).");
    }

    private static string Instant(DateTimeOffset at) => at.UtcDateTime.ToString("yyyy-MM-dd'T'HH:mm:ss'Z'", System.Globalization.CultureInfo.InvariantCulture);
}
