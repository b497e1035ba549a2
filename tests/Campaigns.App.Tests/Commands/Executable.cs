using System.Diagnostics;

namespace Campaigns.App.Tests.Commands;

/// <summary>The real program as a process of its own.</summary>
internal static class Executable
{
    public static string Path { get; } = System.IO.Path.Combine(AppContext.BaseDirectory, OperatingSystem.IsWindows() ? "campaigns.exe" : "campaigns");

    public static Process Start(string catalog, params IEnumerable<string> arguments) => Start(Path, catalog, arguments);

    public static Process Start(string program, string catalog, IEnumerable<string> arguments)
    {
        var start = new ProcessStartInfo(program, arguments) { RedirectStandardOutput = true, RedirectStandardError = true, RedirectStandardInput = true };
        start.Environment["CAMPAIGNS_CATALOG"] = catalog;
        start.Environment["CAMPAIGNS_PROGRAM"] = Path;
        return Process.Start(start)!;
    }

    /// <summary>Waits for the end; a process that does not end is ended.</summary>
    public static Ran End(Process process, int seconds = 60)
    {
        using (process)
        {
            Task<string> standardOutput = process.StandardOutput.ReadToEndAsync(), standardError = process.StandardError.ReadToEndAsync();
            if (!process.WaitForExit(TimeSpan.FromSeconds(seconds)))
            {
                process.Kill(entireProcessTree: true);
                process.WaitForExit();
                Assert.Fail($"The process did not end in {seconds} s.");
            }

#pragma warning disable xUnit1031 // The process has ended, so both streams have, too.
            return new Ran(process.ExitCode, standardOutput.Result, standardError.Result);
#pragma warning restore xUnit1031
        }
    }
}
