using System.Diagnostics;
using Microsoft.Data.Sqlite;

namespace Campaigns.Torture.Catalogs;

/// <summary>T4: files that may not be read or written, that are not there, or that another program holds: a reason of one line with exit code 4, and not one byte changed; what may be read is read.</summary>
internal sealed class ShutOut : TortureTest
{
    private static readonly TimeSpan MostWait = TimeSpan.FromSeconds(30);

    /// <summary>Another account than the administrator, whom no permission stops.</summary>
    private static readonly string[] AsNobody = ["--reuid=65534", "--regid=65534", "--clear-groups"];

    public override string Key => "T4";

    public override string What => "no permission, no file, locked";

    public override int Full => 6;

    public override int Short => 6;

    public override void Run(Tally tally, int tries, Random random)
    {
        tally.Try("a folder in its place", () => Refused(bench => Directory.CreateDirectory(bench.Catalog), "folder", ["list"], ["start", "NEW"]));
        tally.Try("no file", () => Refused(_ => { }, "no catalog", ["list"], ["load", "C", "m.csv"], ["backup", "copy.db"], ["upgrade"]));
        tally.Try("locked by another program", Locked);
        if (!OperatingSystem.IsLinux() || !Environment.IsPrivilegedProcess || !SmallDisk.Run("setpriv", [.. AsNobody, "true"]) || !SmallDisk.Run("setpriv", [.. AsNobody, Workbench.Program, "--version"]))
        {
            Console.Error.WriteLine("T4: no other account can be taken on here; permissions were not tried.");
            return;
        }

        tally.Try("a file that may only be read", () => Permissions("444", "777", mayRead: true));
        tally.Try("a folder that may only be read", () => Permissions("666", "555", mayRead: true));
        tally.Try("file and folder that may only be read", () => Permissions("444", "555", mayRead: true));
        tally.Try("a file that may not even be read", () => Permissions("000", "777", mayRead: false));
        tally.Try("an interrupted action where nothing may be written", Interrupted);
        tally.Try("a disk that is read-only", ReadOnlyDisk);
    }

    private static string? Refused(Action<Workbench> prepare, string reason, params string[][] commands)
    {
        using var bench = new Workbench();
        prepare(bench);
        string[] before = Inspection.Files(bench.Folder);
        foreach (string[] words in commands)
        {
            if (Wrong(bench.RunProcess(MostWait, words), reason) is { } wrong)
            {
                return $"{words[0]}: {wrong}";
            }
        }

        return Inspection.Files(bench.Folder).SequenceEqual(before) ? null : "something was created";
    }

    private static string? Wrong(Ran ran, string reason) =>
        ran.Code == 4 && ran.Error.Contains(reason, StringComparison.Ordinal) && ran.Error.TrimEnd('\n').Split('\n').Length == 1 ? null : $"ended with {ran.Code}: {ran.Out}{ran.Error}";

    private static string? Locked()
    {
        using Workbench bench = WithCampaign();
        string before = Inspection.Hash(bench.Catalog);
        using SqliteConnection holder = Inspection.Open(bench.Catalog);
        Inspection.Texts(holder, "BEGIN EXCLUSIVE");
        long start = Stopwatch.GetTimestamp();
        foreach (string[] words in new string[][] { ["list"], ["start", "NEW"] })
        {
            if (Wrong(bench.RunProcess(MostWait, words), "locked by another program") is { } wrong)
            {
                return wrong;
            }
        }

        TimeSpan waited = Stopwatch.GetElapsedTime(start);
        Ran hinted = bench.RunProcess(MostWait, "list");
        return waited > MostWait ? "waited too long"
            : OperatingSystem.IsLinux() && !hinted.Error.Contains(FormattableString.Invariant($"process {Environment.ProcessId}"), StringComparison.Ordinal) ? $"the holder was not named: {hinted.Error}"
            : Inspection.Hash(bench.Catalog) != before ? "the file was changed" : null;
    }

    private static string? Permissions(string file, string folder, bool mayRead)
    {
        using Workbench bench = WithCampaign();
        SmallDisk.Run("chmod", file, bench.Catalog);
        SmallDisk.Run("chmod", folder, bench.Folder);
        return Tried(bench, mayRead, Path.GetTempPath());
    }

    private static string? ReadOnlyDisk()
    {
        using var bench = new Workbench();
        Directory.CreateDirectory(bench.At("disk"));
        using var disk = SmallDisk.Make(bench.At("disk"), 16 << 20);
        if (disk is null)
        {
            Console.Error.WriteLine("T4: no disk can be mounted here; a read-only one was not tried.");
            return null;
        }

        using Workbench made = WithCampaign();
        string catalog = Path.Combine(disk.Folder, "campaigns.db");
        File.Copy(made.Catalog, catalog);
        string before = Inspection.Hash(catalog);
        if (!disk.MakeReadOnly())
        {
            return "the disk could not be made read-only";
        }

        foreach (string[] words in Reading(bench.At("out"), bench.At("copy.db")))
        {
            Ran read = bench.RunProcess(MostWait, [.. words, "--catalog", catalog]);
            if (read.Code != 0)
            {
                return $"{words[0]} ended with {read.Code}: {read.Error}";
            }
        }

        return Wrong(bench.RunProcess(MostWait, "start", "NEW", "--catalog", catalog), "read-only") ?? (Inspection.Hash(catalog) == before && Inspection.Files(disk.Folder) is ["campaigns.db"] ? null : "something was changed");
    }

    /// <summary>A journal that a killed program left can only be rolled back by somebody who may write.</summary>
    private static string? Interrupted()
    {
        using Workbench bench = WithCampaign();
        using var hurt = new Workbench();
        using (SqliteConnection writer = Inspection.Open(bench.Catalog))
        {
            // A cache of few pages makes SQLite write into the file before the end, which it may only do once the journal is on the disk.
            foreach (string sql in new[] { "PRAGMA cache_size = 2", "BEGIN IMMEDIATE", "DROP TRIGGER IF EXISTS campaigns_are_kept", "CREATE TABLE many AS WITH RECURSIVE n(i) AS (SELECT 1 UNION ALL SELECT i + 1 FROM n WHERE i < 2000) SELECT i, hex(randomblob(400)) AS text FROM n" })
            {
                Inspection.Texts(writer, sql);
            }

            File.Copy(bench.Catalog, hurt.Catalog);
            File.Copy(bench.Catalog + "-journal", hurt.Catalog + "-journal");
        }

        string before = Inspection.Hash(hurt.Catalog);
        SmallDisk.Run("chmod", "444", hurt.Catalog, hurt.Catalog + "-journal");
        SmallDisk.Run("chmod", "555", hurt.Folder);
        Ran refused = RunAsNobody(hurt, "list");
        if (Wrong(refused, "interrupted") is { } wrong || Inspection.Hash(hurt.Catalog) != before)
        {
            return Wrong(refused, "interrupted") ?? "the file was changed";
        }

        // With the right to write it needs no manual step.
        SmallDisk.Run("chmod", "755", hurt.Folder);
        SmallDisk.Run("chmod", "644", hurt.Catalog, hurt.Catalog + "-journal");
        return hurt.RunProcess(MostWait, "list").Code == 0 ? Inspection.Fault(hurt.Catalog) : "it was not rolled back";
    }

    private static string? Tried(Workbench bench, bool mayRead, string elsewhere)
    {
        string before = Inspection.Hash(bench.Catalog);
        string place = Path.Combine(elsewhere, FormattableString.Invariant($"campaigns-torture-{Environment.ProcessId}"));
        try
        {
            foreach (string[] words in Reading(place + "-out", place + "-copy.db"))
            {
                Ran read = RunAsNobody(bench, words);
                if (mayRead ? read.Code != 0 : Wrong(read, "campaigns.db") is not null)
                {
                    return $"{words[0]} ended with {read.Code}: {read.Out}{read.Error}";
                }
            }

            Ran write = RunAsNobody(bench, "start", "NEW");
            return Wrong(write, "campaigns.db") ?? (Inspection.Hash(bench.Catalog) == before && Inspection.Files(bench.Folder) is ["campaigns.db"] ? null : "something was changed");
        }
        finally
        {
            File.Delete(place + "-copy.db");
            if (Directory.Exists(place + "-out"))
            {
                Directory.Delete(place + "-out", recursive: true);
            }
        }
    }

    private static string[][] Reading(string folder, string copy) =>
        [["list"], ["show", "C"], ["results", "C"], ["export", "C", "--out", folder], ["backup", copy]];

    private static Ran RunAsNobody(Workbench bench, params string[] words)
    {
        var start = new ProcessStartInfo("setpriv", [.. AsNobody, Workbench.Program, .. words, "--catalog", bench.Catalog]) { RedirectStandardOutput = true, RedirectStandardError = true, WorkingDirectory = Path.GetTempPath() };
        using Process process = Process.Start(start)!;
        string output = process.StandardOutput.ReadToEnd(), error = process.StandardError.ReadToEnd();
        process.WaitForExit();
        return new Ran(process.ExitCode, output, error);
    }

    private static Workbench WithCampaign()
    {
        var bench = new Workbench();
        bench.Run("start", "C");
        string file = Path.Combine(Path.GetTempPath(), FormattableString.Invariant($"campaigns-torture-{Environment.ProcessId}.csv"));
        File.WriteAllText(file, "experiment,group,value\nE,a,1\nE,a,2\nE,b,3\nE,b,4\n");
        bench.Run("load", "C", file);
        File.Delete(file);
        return bench;
    }
}
