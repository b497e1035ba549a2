using Campaigns.App.Wording;
using Campaigns.Catalog;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;
using Microsoft.Data.Sqlite;

namespace Campaigns.App.Commands;

/// <summary>What went wrong, for people; commands and dashboard say the same.</summary>
/// <param name="Code">An exit code of <see cref="ExitCode"/>; <see cref="ExitCode.Stopped"/> where somebody asked to stop.</param>
/// <param name="Sentence">What, where, and what to do.</param>
/// <param name="Details">A sentence for each problem, where there are several.</param>
internal sealed record Fault(int Code, string Sentence, IReadOnlyList<string> Details)
{
    private const int Busy = 5;
    private const int Locked = 6;
    private const int Interrupted = 9;

    /// <summary>Puts what was thrown into words.</summary>
    public static Fault Of(Exception thrown) => thrown switch
    {
        UsageException error => new(ExitCode.WrongUsage, error.Message, []),
        ChangedSinceException error => new(ExitCode.Refused, error.Message, [.. error.Since.Select(LedgerText.Sentence), $"--head {error.Head}"]),
        RefusedException error => new(ExitCode.Refused, error.Message, error.Details),
        LoadingException error => new(ExitCode.Refused, error.Message, []),
        RecordException error => new(ExitCode.RecordBroken, error.Message, []),
        CatalogException error => new(ExitCode.NoCatalog, error.Message, []),
        _ when thrown is OperationCanceledException || thrown.GetBaseException() is SqliteException { SqliteErrorCode: Interrupted } =>
            new(ExitCode.Stopped, "Stopped. Steps that were done are kept; the one that was under way left nothing behind.", []),
        _ when thrown.GetBaseException() is SqliteException beneath => new(
            ExitCode.NoCatalog,
            beneath.SqliteErrorCode is Busy or Locked
                ? "The catalog is locked by another program; wait until that one is done, or close it, and try again."
                : $"The catalog cannot be used: {beneath.Message}",
            []),
        IOException error when FileTrouble.IsDiskFull(error) =>
            new(ExitCode.OurFault, "Reading or writing failed: No space left on device; the output could not be written whole. Make room, check the disk, and ask again.", []),
        IOException or UnauthorizedAccessException =>
            new(ExitCode.OurFault, $"Reading or writing failed: {thrown.Message.TrimEnd('.')}; check the disk, and that you may use the file.", []),
        _ => new(ExitCode.OurFault, $"A fault of the program: {thrown.Message} ({thrown.GetType().Name}). Nothing was half-done; please report it with the command that you typed.", []),
    };
}
