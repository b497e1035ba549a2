using System.Diagnostics;
using Campaigns.App.Commands;
using Campaigns.App.Output;

namespace Campaigns.Torture;

/// <summary>What a run of the program said.</summary>
/// <param name="Code">Its exit code.</param>
/// <param name="Out">Standard output.</param>
/// <param name="Error">Standard error.</param>
internal sealed record Ran(int Code, string Out, string Error);

/// <summary>A folder of its own with a catalog in it, and the program, as a process or inside this one.</summary>
internal sealed class Workbench : IDisposable
{
    /// <summary>The real program.</summary>
    public static string Program { get; } = Path.Combine(AppContext.BaseDirectory, OperatingSystem.IsWindows() ? "campaigns.exe" : "campaigns");

    public string Folder { get; } = Directory.CreateTempSubdirectory("campaigns-torture-").FullName;

    public string Catalog => At("campaigns.db");

    public TimeProvider Clock { get; init; } = TimeProvider.System;

    public string At(string name) => Path.Combine(Folder, name);

    public string Write(string name, string text) => Write(name, new System.Text.UTF8Encoding(false).GetBytes(text));

    public string Write(string name, byte[] bytes)
    {
        File.WriteAllBytes(At(name), bytes);
        return At(name);
    }

    /// <summary>Runs a command inside this process; fast, for tries that do not kill.</summary>
    public Ran Run(params IEnumerable<string> arguments)
    {
        using StringWriter standardOutput = new() { NewLine = "\n" }, standardError = new() { NewLine = "\n" };
        int code = CommandLine.Run([.. arguments], new Host
        {
            Out = standardOutput,
            Error = standardError,
            Clock = Clock,
            Variable = name => name == "CAMPAIGNS_CATALOG" ? Catalog : null,
        });
        return new Ran(code, standardOutput.ToString(), standardError.ToString());
    }

    /// <summary>Starts the program as a process; whoever starts it ends it.</summary>
    public Process Start(params IEnumerable<string> arguments)
    {
        var start = new ProcessStartInfo(Program, arguments) { RedirectStandardOutput = true, RedirectStandardError = true, RedirectStandardInput = true, WorkingDirectory = Folder };
        start.Environment["CAMPAIGNS_CATALOG"] = Catalog;
        return Process.Start(start)!;
    }

    /// <summary>Runs the program as a process to its end; one that does not end in time is ended and counts as exit code -1.</summary>
    public Ran RunProcess(TimeSpan most, params IEnumerable<string> arguments) => RunMeasured(most, arguments).Ran;

    /// <summary>Does the same, and tells the most memory that the process held, in megabytes; null where the system does not tell.</summary>
    public (Ran Ran, long? Peak) RunMeasured(TimeSpan most, params IEnumerable<string> arguments)
    {
        using Process process = Start(arguments);
        Task<string> standardOutput = process.StandardOutput.ReadToEndAsync(), standardError = process.StandardError.ReadToEndAsync();
        long? peak = null;
        long start = Stopwatch.GetTimestamp();
        bool ended;
        while (!(ended = process.WaitForExit(20)) && Stopwatch.GetElapsedTime(start) < most)
        {
            process.Refresh();
            peak = Math.Max(peak ?? 0, PeakOf(process));
        }

        if (!ended)
        {
            process.Kill(entireProcessTree: true);
            process.WaitForExit();
        }

        return (new Ran(ended ? process.ExitCode : -1, standardOutput.GetAwaiter().GetResult(), standardError.GetAwaiter().GetResult()), peak);
    }

    private static long PeakOf(Process process)
    {
        try
        {
            return process.PeakWorkingSet64 >> 20;
        }
        catch (InvalidOperationException)
        {
            // It has just ended.
            return 0;
        }
    }

    public void Dispose() => Directory.Delete(Folder, recursive: true);
}
