using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Ledger;

/// <summary>Which entries are asked for; what is null does not filter.</summary>
public sealed record LedgerFilter
{
    /// <summary>Code of a campaign.</summary>
    public string? Campaign { get; init; }

    /// <summary>Word of an action.</summary>
    public string? Action { get; init; }

    /// <summary>The earliest sequence.</summary>
    public long From { get; init; } = 1;
}

/// <summary>Reads the ledger as it stands; whether it is whole is for the verifier to say.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class LedgerReader(Catalog catalog)
{
    /// <summary>The chain's end: what is printed with every report.</summary>
    public LedgerHead Head => LedgerWriter.Last(catalog).Head;

    /// <summary>Entries in the order of the chain, with their changes and evidence. Three scans, whatever the number of entries.</summary>
    /// <param name="filter">Which.</param>
    public IEnumerable<LedgerEntry> Entries(LedgerFilter filter)
    {
        ArgumentNullException.ThrowIfNull(filter);
        using SqliteStatement entries = catalog.Prepare(
            """
            SELECT sequence, at, account, acting_as, program_version, action, campaign, subject, reason, hash FROM ledger
            WHERE sequence >= ?1 AND (?2 IS NULL OR campaign = ?2) AND (?3 IS NULL OR action = ?3) ORDER BY sequence
            """);
        using var changes = new Followed(catalog, "SELECT sequence, what, before, after FROM ledger_changes WHERE sequence >= ?1 ORDER BY sequence, position", filter.From);
        using var evidence = new Followed(catalog, "SELECT sequence, kind, owner, first, last, digest FROM ledger_evidence WHERE sequence >= ?1 ORDER BY sequence, position", filter.From);
        entries.Bind(1, filter.From).Bind(2, filter.Campaign).Bind(3, filter.Action);
        while (entries.Read())
        {
            long sequence = entries.Integer(0);
            yield return new LedgerEntry
            {
                Sequence = sequence,
                At = Instants.FromMicroseconds(entries.Integer(1)),
                By = new Actor(entries.Text(2), entries.NullableText(3)),
                ProgramVersion = entries.Text(4),
                Action = entries.Text(5),
                Campaign = entries.NullableText(6),
                Subject = entries.NullableText(7),
                Reason = entries.NullableText(8),
                Hash = entries.Text(9),
                Changes = changes.Of(sequence, row => new LedgerChange(row.Text(1), row.NullableText(2), row.NullableText(3))),
                Evidence = evidence.Of(sequence, row => new LedgerEvidence(row.Text(1), row.Integer(2), row.Integer(3), row.Integer(4), row.Text(5))),
            };
        }
    }

    /// <summary>Rows of a second table, read in step with the entries.</summary>
    private sealed class Followed : IDisposable
    {
        private readonly SqliteStatement _rows;
        private bool _more;

        public Followed(Catalog catalog, string sql, long from)
        {
            _rows = catalog.Prepare(sql);
            _more = _rows.Bind(1, from).Read();
        }

        public List<T> Of<T>(long sequence, Func<SqliteStatement, T> make)
        {
            while (_more && _rows.Integer(0) < sequence)
            {
                _more = _rows.Read();
            }

            var found = new List<T>();
            for (; _more && _rows.Integer(0) == sequence; _more = _rows.Read())
            {
                found.Add(make(_rows));
            }

            return found;
        }

        public void Dispose() => _rows.Dispose();
    }
}
