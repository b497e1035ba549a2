using System.Text;
using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Ledger.Verifying;

/// <summary>Proves the chain: sequences from 1 without gaps, and every hash recomputed from the entry before.</summary>
/// <remarks>Cells are taken as the bytes and types that stand in the file and never decoded, so that a text that only looks the same, or an instant beyond all calendars, is seen and stops nothing.</remarks>
/// <param name="catalog">The open catalog, in a snapshot.</param>
/// <param name="findings">Takes what is wrong.</param>
internal sealed class ChainProof(Catalog catalog, Findings findings) : IDisposable
{
    private static readonly string[] Cells = ["instant", "account", "name acted as", "program version", "action", "campaign", "subject", "reason"];

    private readonly ChainHash _hash = new();
    private bool _isOddlyTyped;

    /// <summary>The chain's end as it stands.</summary>
    public LedgerHead Head { get; private set; } = LedgerHead.Empty;

    /// <summary>Entries read.</summary>
    public long Entries { get; private set; }

    /// <summary>Entries whose instant stands before that of their predecessor.</summary>
    public long ClockSteps { get; private set; }

    /// <summary>Reads the whole chain. O(bytes).</summary>
    /// <param name="known">A head that must be part of it; null for none.</param>
    public void Run(LedgerHead? known)
    {
        using SqliteStatement entries = catalog.PrepareAsItIs(
            """
            SELECT sequence, at, account, acting_as, program_version, action, campaign, subject, reason, hash,
                (SELECT count(*) FROM ledger_changes c WHERE c.sequence = l.sequence), (SELECT count(*) FROM ledger_evidence e WHERE e.sequence = l.sequence)
            FROM ledger l ORDER BY sequence
            """);
        using SqliteStatement changes = catalog.PrepareAsItIs("SELECT position, what, before, after FROM ledger_changes WHERE sequence = ?1 ORDER BY position");
        using SqliteStatement evidence = catalog.PrepareAsItIs("SELECT position, kind, owner, first, last, digest FROM ledger_evidence WHERE sequence = ?1 ORDER BY position");
        byte[] previous = Encoding.ASCII.GetBytes(LedgerHead.Empty.Hash);
        long expected = 1, at = long.MinValue;
        bool isKnownHeld = known is null;
        while (entries.Read())
        {
            long sequence = entries.Integer(0);
            string? campaign = entries.NullableText(6);
            LookAtSequence(expected, sequence);
            string recomputed = Recompute(entries, changes, evidence, previous, sequence);
            if (_isOddlyTyped)
            {
                findings.Add(sequence, campaign, "A cell of this entry holds another kind of value, or stands at another place, than the program writes.");
            }

            if (!entries.IsText(9) || !entries.TextEquals(9, recomputed))
            {
                findings.Add(sequence, campaign, "The hash of this entry does not follow from the entry before it and its own content: one of them was changed.");
            }

            if (known is not null && known.Sequence == sequence)
            {
                isKnownHeld = true;
                LookAtKnown(known, entries.Text(9), campaign);
            }

            ClockSteps += entries.Integer(1) < at ? 1 : 0;
            at = entries.Integer(1);
            previous = entries.Blob(9).ToArray();
            Head = new LedgerHead(sequence, entries.Text(9));
            Entries++;
            expected = Math.Max(expected, unchecked(sequence + 1));
        }

        if (!isKnownHeld)
        {
            LookForKnown(known!);
        }

        LookForOrphans("ledger_changes", "SELECT DISTINCT sequence FROM ledger_changes c WHERE NOT EXISTS (SELECT 1 FROM ledger l WHERE l.sequence = c.sequence)");
        LookForOrphans("ledger_evidence", "SELECT DISTINCT sequence FROM ledger_evidence e WHERE NOT EXISTS (SELECT 1 FROM ledger l WHERE l.sequence = e.sequence)");
    }

    /// <inheritdoc/>
    public void Dispose() => _hash.Dispose();

    private void LookAtSequence(long expected, long sequence)
    {
        if (sequence < expected)
        {
            findings.Add(sequence, null, "An entry stands before the first one, which is 1.");
        }
        else if (sequence > expected)
        {
            findings.Add(expected, null, sequence == expected + 1 ? "This entry is missing." : FormattableString.Invariant($"The entries {expected} to {sequence - 1} are missing."));
        }
    }

    private string Recompute(SqliteStatement entry, SqliteStatement changes, SqliteStatement evidence, ReadOnlySpan<byte> previous, long sequence)
    {
        _isOddlyTyped = false;
        _hash.BeginEntry(previous);
        _hash.Integer(sequence);
        AddInteger(entry, 1);
        for (int column = 2; column < Cells.Length + 1; column++)
        {
            AddText(entry, column);
        }

        AddRows(changes, sequence, entry.Integer(10), row =>
        {
            AddText(row, 1);
            AddText(row, 2);
            AddText(row, 3);
        });
        AddRows(evidence, sequence, entry.Integer(11), row =>
        {
            AddText(row, 1);
            AddInteger(row, 2);
            AddInteger(row, 3);
            AddInteger(row, 4);
            AddText(row, 5);
        });
        return _hash.Finish();
    }

    private void AddRows(SqliteStatement rows, long sequence, long count, Action<SqliteStatement> add)
    {
        _hash.Integer(count);
        rows.Bind(1, sequence);
        for (long position = 1; rows.Read(); position++)
        {
            _isOddlyTyped |= !rows.IsInteger(0) || rows.Integer(0) != position;
            add(rows);
        }
    }

    private void AddInteger(SqliteStatement row, int column)
    {
        _isOddlyTyped |= !row.IsInteger(column);
        _hash.Integer(row.Integer(column));
    }

    private void AddText(SqliteStatement row, int column)
    {
        if (row.IsNull(column))
        {
            _hash.Text(null);
            return;
        }

        _isOddlyTyped |= !row.IsText(column);
        _hash.Utf8(row.Blob(column));
    }

    private void LookAtKnown(LedgerHead known, string hash, string? campaign)
    {
        if (hash != known.Hash)
        {
            findings.Add(known.Sequence, campaign, $"This entry is not the one of the head given, {known}: its hash is {hash}. The record was written anew from here or earlier, or the head is of another catalog.");
        }
    }

    private void LookForKnown(LedgerHead known)
    {
        if (known.Sequence == 0)
        {
            LookAtKnown(known, LedgerHead.Empty.Hash, null);
            return;
        }

        findings.Add(known.Sequence, null, known.Sequence > Head.Sequence
            ? FormattableString.Invariant($"The record was cut, or this is an older copy: the head given stands at entry {known.Sequence}, and the chain ends at {Head.Sequence}.")
            : "The entry of the head given is not there.");
    }

    private void LookForOrphans(string table, string sql)
    {
        using SqliteStatement orphans = catalog.PrepareAsItIs(sql);
        while (orphans.Read())
        {
            findings.Add(orphans.IsInteger(0) ? orphans.Integer(0) : null, null, $"The table {table} holds rows of an entry that is not there.");
        }
    }
}
