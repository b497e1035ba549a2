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

    /// <summary>Code of an experiment of <see cref="Campaign"/>: entries that planned, sealed, brought values for, tested, decided or changed it. A plan's entry is taken wherever it may have registered it.</summary>
    public string? Experiment { get; init; }

    /// <summary>Who: the account, or the name that it acted as.</summary>
    public string? By { get; init; }

    /// <summary>The earliest instant.</summary>
    public DateTimeOffset? Since { get; init; }

    /// <summary>The instant before which entries are taken.</summary>
    public DateTimeOffset? Before { get; init; }
}

/// <summary>Reads the ledger as it stands; whether it is whole is for the verifier to say.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class LedgerReader(Catalog catalog)
{
    /// <summary>The chain's end: what is printed with every report.</summary>
    public LedgerHead Head => LedgerWriter.Last(catalog).Head;

    /// <summary>Entries in the order of the chain, with their changes and evidence. Three scans, whatever the number of entries.</summary>
    /// <param name="filter">Which.</param>
    /// <exception cref="RecordException">An entry holds an instant that is none, so that it was not this program that wrote it.</exception>
    public IEnumerable<LedgerEntry> Entries(LedgerFilter filter)
    {
        ArgumentNullException.ThrowIfNull(filter);
        using SqliteStatement entries = catalog.Prepare(
            """
            SELECT sequence, at, account, acting_as, program_version, action, campaign, subject, reason, hash FROM ledger
            WHERE sequence >= ?1 AND (?2 IS NULL OR campaign = ?2) AND (?3 IS NULL OR action = ?3) AND (?4 IS NULL OR acting_as = ?4 OR account = ?4)
                AND (?5 IS NULL OR at >= ?5) AND (?6 IS NULL OR at < ?6)
            ORDER BY sequence
            """);
        using var changes = new Followed(catalog, "SELECT sequence, what, before, after FROM ledger_changes WHERE sequence >= ?1 ORDER BY sequence, position", filter.From);
        using var evidence = new Followed(catalog, "SELECT sequence, kind, owner, first, last, digest FROM ledger_evidence WHERE sequence >= ?1 ORDER BY sequence, position", filter.From);
        entries.Bind(1, filter.From).Bind(2, filter.Campaign).Bind(3, filter.Action).Bind(4, filter.By).Bind(5, Microseconds(filter.Since)).Bind(6, Microseconds(filter.Before));
        HashSet<long>? about = filter.Experiment is null ? null : new ExperimentEntries(catalog).Of(filter.Campaign!, filter.Experiment);
        while (entries.Read())
        {
            long sequence = entries.Integer(0);
            if (about?.Contains(sequence) == false)
            {
                continue;
            }

            yield return new LedgerEntry
            {
                Sequence = sequence,
                At = Instant(sequence, entries.Integer(1)),
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

    private static long? Microseconds(DateTimeOffset? instant) => instant is { } given ? Instants.ToMicroseconds(given) : null;

    private static DateTimeOffset Instant(long sequence, long microseconds) => Instants.IsInstant(microseconds)
        ? Instants.FromMicroseconds(microseconds)
        : throw new RecordException(FormattableString.Invariant($"Entry {sequence} of the ledger holds {microseconds} for its instant, which is none: the record was tampered with. 'campaigns ledger verify' says what else was."));

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
