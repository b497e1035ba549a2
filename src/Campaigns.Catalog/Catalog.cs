using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Providers;
using Microsoft.Data.Sqlite;

namespace Campaigns.Catalog;

/// <summary>An open catalog: one connection, on which everything of one command happens.</summary>
/// <remarks>
/// What is done once per experiment goes through prepared statements; every other question may use <see cref="Context"/>,
/// which is built when it is first asked for, because building it costs a third of a second that a small command should not pay.
/// </remarks>
public sealed class Catalog : IDisposable
{
    private const string BeginChange = "BEGIN IMMEDIATE";

    // Statements that are not yet disposed of. Held here, none is finalized on another thread while this one works on the connection, which does not lock itself.
    private readonly HashSet<SqliteStatement> _statements = [];

    private CatalogContext? _context;
    private int _depth;
    private int _recordedChanges;
    private CancellationToken _stop;
    private CancellationTokenRegistration _interrupt;

    // What the caller has seen of the ledger, where changes are to be refused that others outran; and what it will have seen once the transaction at hand is kept.
    private LedgerHead? _seen;
    private LedgerHead? _willHaveSeen;

    private Catalog(SqliteConnection connection, string path, TimeProvider clock, Actor actor, LedgerHead? seen)
    {
        _seen = seen;
        Connection = connection;
        Path = path;
        Clock = clock;
        Actor = actor;
    }

    /// <summary>The file.</summary>
    public string Path { get; }

    /// <summary>Where instants come from.</summary>
    public TimeProvider Clock { get; }

    /// <summary>Who acts.</summary>
    public Actor Actor { get; }

    /// <summary>The catalog through EF Core, on the same connection.</summary>
    public CatalogContext Context => _context ??= CatalogContext.On(Connection);

    internal SqliteConnection Connection { get; }

    /// <summary>The instant to be stored now, in microseconds since 1970 UTC.</summary>
    internal long Now => Instants.ToMicroseconds(Clock.GetUtcNow());

    /// <summary>Opens a catalog that exists.</summary>
    /// <param name="path">The file.</param>
    /// <param name="clock">Where instants come from.</param>
    /// <param name="actor">Who acts; null for the account of the process.</param>
    /// <param name="seen">The head of the ledger that the caller has seen: a change of a campaign that others changed after it is refused; null to take any.</param>
    /// <exception cref="CatalogException">Missing, unreadable, locked, damaged, foreign, older or newer.</exception>
    public static Catalog Open(string path, TimeProvider clock, Actor? actor = null, LedgerHead? seen = null)
    {
        ArgumentNullException.ThrowIfNull(path);
        return new Catalog(SqliteCatalogFile.Open(path), path, clock, actor ?? Actor.OfProcess, seen);
    }

    /// <summary>Opens a catalog that exists for reading alone: not one byte of it, nor of its folder, is written.</summary>
    /// <inheritdoc cref="Open"/>
    public static Catalog OpenReadOnly(string path, TimeProvider clock)
    {
        ArgumentNullException.ThrowIfNull(path);
        return On(SqliteCatalogFile.Open(path, SqliteOpenMode.ReadOnly), path, clock, Actor.OfProcess);
    }

    /// <summary>Opens a catalog for a proof, which names what another program changed in it; every other way of opening refuses such a one.</summary>
    /// <param name="path">The file.</param>
    /// <param name="clock">Where instants come from.</param>
    /// <param name="isReadOnly">Whether not one byte may be written, not even to roll back what was interrupted.</param>
    /// <exception cref="CatalogException">Missing, unreadable, locked, damaged, of another program, older or newer.</exception>
    public static Catalog OpenForProof(string path, TimeProvider clock, bool isReadOnly)
    {
        ArgumentNullException.ThrowIfNull(path);
        return On(SqliteCatalogFile.OpenAsItIs(path, isReadOnly ? SqliteOpenMode.ReadOnly : SqliteOpenMode.ReadWrite), path, clock, Actor.OfProcess);
    }

    /// <summary>A catalog on a connection that is open already.</summary>
    internal static Catalog On(SqliteConnection connection, string path, TimeProvider clock, Actor actor) => new(connection, path, clock, actor, null);

    /// <summary>Opens a catalog, creating an empty one where there is no file.</summary>
    /// <inheritdoc cref="Open"/>
    public static Catalog OpenOrCreate(string path, TimeProvider clock, Actor? actor = null, LedgerHead? seen = null)
    {
        if (!File.Exists(path) && !Directory.Exists(path))
        {
            SqliteCatalogFile.Create(path);
        }

        return Open(path, clock, actor, seen);
    }

    /// <summary>Ends what is under way when somebody asks to stop: a statement that runs is interrupted, and no other is begun.</summary>
    /// <param name="stop">The wish to stop.</param>
    public void StopOn(CancellationToken stop)
    {
        _stop = stop;
        _interrupt = stop.Register(() => SQLitePCL.raw.sqlite3_interrupt(Connection.Handle));
    }

    internal void ThrowIfStopped() => _stop.ThrowIfCancellationRequested();

    /// <summary>Does a piece of work in one transaction: all of it is kept, or nothing. Inside another one it joins that.</summary>
    /// <remarks>Whatever it changes must have been recorded in the ledger when it ends.</remarks>
    /// <param name="work">The work.</param>
    /// <exception cref="CatalogException">The catalog is locked, full, read-only or damaged; nothing was changed.</exception>
    /// <exception cref="Campaigns.Domain.RefusedException">Others changed the campaign after the head that the caller has seen; nothing was changed.</exception>
    public T Change<T>(Func<T> work) => InTransaction(BeginChange, work);

    /// <summary>Does a piece of work just as <see cref="Change"/> would, and takes all of it back: it shows what would come of it, every refusal among it, and not one row or entry is kept.</summary>
    /// <remarks>The right to write is held meanwhile, as the work itself would hold it.</remarks>
    /// <param name="work">The work.</param>
    /// <returns>What the work gave, and the head of the ledger that it started from: a change that names this head is refused where others changed the campaign since.</returns>
    /// <exception cref="CatalogException">The catalog is locked, full, read-only or damaged.</exception>
    /// <exception cref="InvalidOperationException">A transaction is open, which would be taken back, too.</exception>
    public (T Result, LedgerHead Seen) Rehearse<T>(Func<T> work)
    {
        ArgumentNullException.ThrowIfNull(work);
        return _depth > 0
            ? throw new InvalidOperationException("Nothing can be rehearsed inside a transaction.")
            : InTransaction(
                BeginChange,
                () =>
                {
                    LedgerHead seen = LedgerWriter.Last(this).Head;
                    return (work(), seen);
                },
                keep: false);
    }

    /// <summary>Demands, inside <see cref="Change"/> or <see cref="Rehearse"/>, that the catalog can be written: work that only reads before it is carried out would else not find out.</summary>
    /// <remarks>SQLite grants a transaction that may write on a file that cannot be written, and looks no sooner than at the first page. Here that is the header, rewritten with what it holds.</remarks>
    /// <exception cref="CatalogException">The file or its folder is read-only for this user.</exception>
    public void DemandWritable() => Run(FormattableString.Invariant($"PRAGMA user_version = {SqliteCatalogFile.SchemaVersion}"));

    /// <summary>Writes an entry for the action at hand, after its rows and inside its transaction.</summary>
    internal LedgerHead Record(LedgerAct act)
    {
        if (_willHaveSeen is { } seen)
        {
            UnchangedSince.Demand(this, seen, act.Campaign);
        }

        LedgerHead head = LedgerWriter.Append(this, act);
        _willHaveSeen = _seen is null ? null : head;
        _recordedChanges = TotalChanges;
        return head;
    }

    /// <summary>Reads several things as they stand at one moment, whatever another program writes meanwhile.</summary>
    /// <param name="work">The reading.</param>
    public T Snapshot<T>(Func<T> work) => InTransaction("BEGIN", work);

    private T InTransaction<T>(string begin, Func<T> work, bool keep = true)
    {
        ArgumentNullException.ThrowIfNull(work);
        if (_depth > 0)
        {
            return work();
        }

        if (begin == BeginChange)
        {
            WriteLock.Begin(Connection, Path, _stop);
        }
        else
        {
            Run(begin);
        }

        _depth++;
        _recordedChanges = TotalChanges;
        _willHaveSeen = _seen;
        try
        {
            if (_seen is { } seen && begin == BeginChange)
            {
                UnchangedSince.DemandHeld(this, seen);
            }

            T result = work();
            if (TotalChanges != _recordedChanges)
            {
                throw new InvalidOperationException("The catalog was changed without an entry in the ledger.");
            }

            if (!keep)
            {
                RollBack();
                return result;
            }

            Run("COMMIT");
            _seen = _willHaveSeen;
            return result;
        }
        catch
        {
            RollBack();
            throw;
        }
        finally
        {
            _depth--;
        }
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        _interrupt.Dispose();
        _context?.Dispose();
        foreach (SqliteStatement statement in _statements.ToArray())
        {
            statement.Dispose();
        }

        Connection.Dispose();
    }

    /// <summary>Statements that nobody has disposed of yet.</summary>
    internal int OpenStatements => _statements.Count;

    internal SqliteStatement Prepare(string sql) => Prepare(sql, takesAnything: false);

    /// <summary>A statement whose cells are given whatever kind they are of: for the proofs, which are to read a record to its end that was tampered with.</summary>
    internal SqliteStatement PrepareAsItIs(string sql) => Prepare(sql, takesAnything: true);

    private SqliteStatement Prepare(string sql, bool takesAnything)
    {
        ThrowIfStopped();
        return new SqliteStatement(Connection, sql, _statements, takesAnything);
    }

    private int TotalChanges => SQLitePCL.raw.sqlite3_total_changes(Connection.Handle);

    private void Run(string sql)
    {
        using var statement = new SqliteStatement(Connection, sql);
        statement.Run();
    }

    /// <summary>Rolls back; where SQLite has done so by itself (a full disk, a damaged page) there is nothing left to do.</summary>
    private void RollBack()
    {
        if (SQLitePCL.raw.sqlite3_get_autocommit(Connection.Handle) == 0)
        {
            Run("ROLLBACK");
        }
    }
}
