using Microsoft.Data.Sqlite;
using static SQLitePCL.raw;

namespace Campaigns.Catalog.Providers;

/// <summary>Waits for the right to write.</summary>
/// <remarks>
/// SQLite's own waiting asks ten times a second; a program that commits again and again, with hardly a pause between its transactions, would keep another one out until its patience ends.
/// Asked every few milliseconds, the pause is found. On a machine that is busy with other work a waiting program wakes late and misses pauses that short,
/// so whoever writes again and again leaves a longer one after every few transactions.
/// </remarks>
internal static class WriteLock
{
    /// <summary>How long one waits for another program, in milliseconds; the same as for reading.</summary>
    public const int Patience = 5000;

    private const int QuickAttempts = 50;
    private const int TransactionsBetweenPauses = 8;

    // Longer than any sleep of those who wait.
    private const int PauseMilliseconds = 6;

    private static int _begun;

    /// <summary>Begins a transaction that may write.</summary>
    /// <param name="connection">The connection.</param>
    /// <param name="path">The catalog's file.</param>
    /// <param name="stop">Ends the waiting.</param>
    /// <exception cref="CatalogException">The lock was not free in time, or the file cannot be written.</exception>
    public static void Begin(SqliteConnection connection, string path, CancellationToken stop)
    {
        if (Interlocked.Increment(ref _begun) % TransactionsBetweenPauses == 0)
        {
            Thread.Sleep(PauseMilliseconds);
        }

        long start = Environment.TickCount64;
        _ = sqlite3_busy_timeout(connection.Handle, 0);
        try
        {
            for (int attempt = 0; ; attempt++)
            {
                stop.ThrowIfCancellationRequested();
                int code = sqlite3_exec(connection.Handle, "BEGIN IMMEDIATE");
                if (code == SQLITE_OK)
                {
                    return;
                }

                if ((code & 0xff) != SQLITE_BUSY || Environment.TickCount64 - start >= Patience)
                {
                    throw SqliteErrors.Translate(code, sqlite3_errmsg(connection.Handle).utf8_to_string() ?? "", path);
                }

                Thread.Sleep(attempt < QuickAttempts ? 1 : 4);
            }
        }
        finally
        {
            _ = sqlite3_busy_timeout(connection.Handle, Patience);
        }
    }
}
