using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Providers;
using Campaigns.Domain;
using Microsoft.Data.Sqlite;

namespace Campaigns.App.Commands;

/// <summary>Turns what a command throws into a sentence and an exit code; nobody ever sees a stack trace.</summary>
internal static class Outcome
{
    private const int Busy = 5;
    private const int Locked = 6;
    private const int Interrupted = 9;

    public static int Of(Host host, Func<int> work)
    {
        try
        {
            int code = work();
            host.Out.Flush();
            return code;
        }
        catch (UsageException error)
        {
            return Fail(host, ExitCode.WrongUsage, error.Message);
        }
        catch (ChangedSinceException error)
        {
            return Fail(host, ExitCode.Refused, error.Message, [.. error.Since.Select(LedgerText.Sentence), $"--head {error.Head}"]);
        }
        catch (RefusedException error)
        {
            return Fail(host, ExitCode.Refused, error.Message, error.Details);
        }
        catch (LoadingException error)
        {
            return Fail(host, ExitCode.Refused, error.Message);
        }
        catch (RecordException error)
        {
            return Fail(host, ExitCode.RecordBroken, error.Message);
        }
        catch (CatalogException error)
        {
            return Fail(host, ExitCode.NoCatalog, error.Message);
        }
        catch (Exception error) when (error is OperationCanceledException || error.GetBaseException() is SqliteException { SqliteErrorCode: Interrupted })
        {
            return Fail(host, host.StoppedCode(), "Stopped. Steps that were done are kept; the one that was under way left nothing behind.");
        }
        catch (Exception error) when (error.GetBaseException() is SqliteException beneath)
        {
            return Fail(host, ExitCode.NoCatalog, beneath.SqliteErrorCode is Busy or Locked
                ? "The catalog is locked by another program; wait until that one is done, or close it, and try again."
                : $"The catalog cannot be used: {beneath.Message}");
        }
        catch (IOException error) when (IsClosedPipe(error))
        {
            return ExitCode.Done;
        }
        catch (IOException error) when (FileTrouble.IsDiskFull(error))
        {
            return Fail(host, ExitCode.OurFault, "Reading or writing failed: No space left on device; the output could not be written whole. Make room, check the disk, and ask again.");
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException)
        {
            return Fail(host, ExitCode.OurFault, $"Reading or writing failed: {error.Message.TrimEnd('.')}; check the disk, and that you may use the file.");
        }
#pragma warning disable CA1031 // The one catch-all of the program: a fault of ours ends in a sentence, too.
        catch (Exception error)
        {
            return Fail(host, ExitCode.OurFault, $"A fault of the program: {error.Message} ({error.GetType().Name}). Nothing was half-done; please report it with the command that you typed.");
        }
#pragma warning restore CA1031
    }

    /// <summary>Whoever read our output has seen enough ('campaigns results X | head').</summary>
    private static bool IsClosedPipe(IOException error) => (error.HResult & 0xffff) is 32 or 109;

    private static int Fail(Host host, int code, string message, IReadOnlyList<string>? details = null)
    {
        try
        {
            host.Out.Flush();
        }
        catch (IOException)
        {
            // The reader is gone; the error still has its own stream.
        }

        host.Error.WriteLine(SafeText.Escape(message));
        foreach (string detail in details ?? [])
        {
            host.Error.WriteLine($"  {SafeText.Escape(detail)}");
        }

        return code;
    }
}
