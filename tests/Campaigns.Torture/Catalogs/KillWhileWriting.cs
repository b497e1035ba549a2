using System.Diagnostics;
using System.Globalization;
using System.Text;

namespace Campaigns.Torture.Catalogs;

/// <summary>T1: a process that loads files, or does one small action after another, is killed at a random moment; what it acknowledged is there, and nothing half.</summary>
/// <remarks>A kill tests the death of a process, not a power cut: the operating system still holds the writes.</remarks>
internal sealed class KillWhileWriting : TortureTest
{
    private const int RowsPerFile = 4_000;
    private const int FileCount = 40;

    public override string Key => "T1";

    public override string What => "kills while writing";

    public override int Full => 200;

    public override int Short => 20;

    public override void Run(Tally tally, int tries, Random random)
    {
        using var files = new Workbench();
        string[] loads = [.. Enumerable.Range(1, FileCount).Select(i => files.Write(FormattableString.Invariant($"week-{i}.csv"), Measurements(i, random)))];
        for (int i = 0; i < tries; i++)
        {
            int wait = random.Next(1, 700);
            (string what, Func<Workbench, Process> start, string kept) = (i % 5) switch
            {
                0 or 1 => ("loads", bench => Worker.StartLoads(bench.Catalog, "C", loads), "SELECT file_name FROM loads"),
                2 or 3 => ("actions", bench => Worker.StartCampaigns(bench.Catalog, "K", 1000), "SELECT code FROM campaigns"),
                _ => OperatingSystem.IsWindows()
                    ? ("actions", bench => Worker.StartCampaigns(bench.Catalog, "K", 1000), "SELECT code FROM campaigns")
                    : ("commands", (Func<Workbench, Process>)Commands, "SELECT code FROM campaigns"),
            };
            tally.Try(FormattableString.Invariant($"try {i}, {what}, killed after {wait} ms"), () => Fault(start, kept, wait));
        }
    }

    private static string? Fault(Func<Workbench, Process> start, string kept, int wait)
    {
        using var bench = new Workbench();
        bench.Run("start", "C");
        using Process process = start(bench);
        var acknowledged = new List<string>();
        using var first = new ManualResetEventSlim();
        process.OutputDataReceived += (_, line) =>
        {
            if (Worker.Kept(line.Data) is { } what)
            {
                acknowledged.Add(what);
                first.Set();
            }
        };
        process.BeginOutputReadLine();

        // The clock of the kill runs from the first acknowledgement, so that no try is spent on the start of the process.
        bool began = first.Wait(TimeSpan.FromSeconds(60));
        Thread.Sleep(wait);
        process.Kill(entireProcessTree: true);
        process.WaitForExit();
        if (!began)
        {
            return $"nothing was acknowledged within a minute: {process.StandardError.ReadToEnd()}";
        }

        string? fault = Inspection.Fault(bench.Catalog) ?? Inspection.Missing(bench.Catalog, kept, acknowledged);
        if (fault is not null)
        {
            return fault;
        }

        // A journal that was never used may stay until the next change; after that there is one file.
        Ran next = bench.Run("start", "NEXT");
        return next.Code != 0 ? $"work does not go on: {next.Error}"
            : Inspection.Files(bench.Folder) is ["campaigns.db"] ? null : $"left over: {string.Join(", ", Inspection.Files(bench.Folder))}";
    }

    /// <summary>The program itself, a process for each command, in a shell's loop.</summary>
    private static Process Commands(Workbench bench)
    {
        var start = new ProcessStartInfo("/bin/sh", ["-c", "i=0; while [ $i -lt 1000 ]; do i=$((i+1)); \"$1\" start \"K-$i\" > /dev/null && echo \"kept K-$i\"; done", "sh", Workbench.Program]) { RedirectStandardOutput = true, RedirectStandardError = true };
        start.Environment["CAMPAIGNS_CATALOG"] = bench.Catalog;
        return Process.Start(start)!;
    }

    private static string Measurements(int number, Random random)
    {
        var text = new StringBuilder("experiment,group,value\n");
        for (int i = 0; i < RowsPerFile; i++)
        {
            text.Append(CultureInfo.InvariantCulture, $"E{number}-{i / 20},{(char)('a' + (i % 4))},{random.Next(1000, 9999) / 100.0:F2}\n");
        }

        return text.ToString();
    }
}
