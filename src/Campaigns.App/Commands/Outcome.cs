using Campaigns.App.Output;

namespace Campaigns.App.Commands;

/// <summary>Turns what a command throws into a sentence and an exit code; nobody ever sees a stack trace.</summary>
internal static class Outcome
{
    public static int Of(Host host, Func<int> work)
    {
        try
        {
            int code = work();
            host.Out.Flush();
            return code;
        }
        catch (IOException error) when (IsClosedPipe(error))
        {
            return ExitCode.Done;
        }
#pragma warning disable CA1031 // The one catch-all of the program: a fault of ours ends in a sentence, too.
        catch (Exception error)
        {
            var fault = Fault.Of(error);
            return Fail(host, fault.Code == ExitCode.Stopped ? host.StoppedCode() : fault.Code, fault.Sentence, fault.Details);
        }
#pragma warning restore CA1031
    }

    /// <summary>Whoever read our output has seen enough ('campaigns results X | head').</summary>
    private static bool IsClosedPipe(IOException error) => (error.HResult & 0xffff) is 32 or 109;

    private static int Fail(Host host, int code, string message, IReadOnlyList<string> details)
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
        foreach (string detail in details)
        {
            host.Error.WriteLine($"  {SafeText.Escape(detail)}");
        }

        return code;
    }
}
