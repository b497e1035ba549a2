using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;

namespace Campaigns.Catalog.Ledger;

/// <summary>What an action tells the ledger of itself; time, actor, version and chain are added there.</summary>
/// <param name="Action">A word of <see cref="LedgerAction"/>.</param>
/// <param name="Campaign">Code of the campaign; null where the whole catalog is meant.</param>
internal sealed record LedgerAct(string Action, string? Campaign)
{
    public string? Subject { get; init; }

    public string? Reason { get; init; }

    public IReadOnlyList<LedgerChange> Changes { get; init; } = [];

    public IReadOnlyList<EvidenceRequest> Evidence { get; init; } = [];
}

/// <summary>Continues the chain; inside the transaction of the action, after its rows.</summary>
internal static class LedgerWriter
{
    /// <summary>Appends an entry. O(bytes of the rows that it speaks for).</summary>
    public static LedgerHead Append(Catalog catalog, LedgerAct act)
    {
        (LedgerHead head, long lastAt) = Last(catalog);
        long now = catalog.Now;
        using var digester = new EvidenceDigester(catalog);
        var entry = new LedgerEntry
        {
            Sequence = head.Sequence + 1,
            At = Instants.FromMicroseconds(now),
            By = catalog.Actor,
            ProgramVersion = ProgramVersion.Current,
            Action = act.Action,
            Campaign = act.Campaign,
            Subject = act.Subject,
            Reason = act.Reason,
            Changes = now < lastAt ? [.. act.Changes, new LedgerChange(LedgerChange.Clock, Instants.Text(lastAt), Instants.Text(now))] : act.Changes,
            Evidence = [.. act.Evidence.Select(e => new LedgerEvidence(e.Kind.Word, e.Owner, e.First, e.Last, digester.Digest(e.Kind, e.Owner, e.First, e.Last)))],
            Hash = "",
        };
        entry = entry with { Hash = ChainHash.Of(head.Hash, entry) };
        Insert(catalog, entry, now);
        return new LedgerHead(entry.Sequence, entry.Hash);
    }

    /// <summary>The chain's end, and the instant of its last entry.</summary>
    public static (LedgerHead Head, long At) Last(Catalog catalog)
    {
        using SqliteStatement last = catalog.Prepare("SELECT sequence, hash, at FROM ledger ORDER BY sequence DESC LIMIT 1");
        return last.Read() ? (new LedgerHead(last.Integer(0), last.Text(1)), last.Integer(2)) : (LedgerHead.Empty, long.MinValue);
    }

    private static void Insert(Catalog catalog, LedgerEntry entry, long at)
    {
        using SqliteStatement insert = catalog.Prepare(
            """
            INSERT INTO ledger (sequence, at, account, acting_as, program_version, action, campaign, subject, reason, hash)
            VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8, ?9, ?10)
            """);
        insert.Bind(1, entry.Sequence).Bind(2, at).Bind(3, entry.By.Account).Bind(4, entry.By.ActingAs).Bind(5, entry.ProgramVersion)
            .Bind(6, entry.Action).Bind(7, entry.Campaign).Bind(8, entry.Subject).Bind(9, entry.Reason).Bind(10, entry.Hash).Run();
        if (entry.Changes.Count > 0)
        {
            using SqliteStatement change = catalog.Prepare("INSERT INTO ledger_changes (sequence, position, what, before, after) VALUES (?1, ?2, ?3, ?4, ?5)");
            for (int i = 0; i < entry.Changes.Count; i++)
            {
                change.Bind(1, entry.Sequence).Bind(2, i + 1L).Bind(3, entry.Changes[i].What).Bind(4, entry.Changes[i].Before).Bind(5, entry.Changes[i].After).Run();
            }
        }

        using SqliteStatement evidence = catalog.Prepare("INSERT INTO ledger_evidence (sequence, position, kind, owner, first, last, digest) VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7)");
        for (int i = 0; i < entry.Evidence.Count; i++)
        {
            LedgerEvidence e = entry.Evidence[i];
            evidence.Bind(1, entry.Sequence).Bind(2, i + 1L).Bind(3, e.Kind).Bind(4, e.Owner).Bind(5, e.First).Bind(6, e.Last).Bind(7, e.Digest).Run();
        }
    }
}
