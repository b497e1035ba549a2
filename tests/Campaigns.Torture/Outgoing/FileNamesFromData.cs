using System.Globalization;
using Microsoft.Data.Sqlite;

namespace Campaigns.Torture.Outgoing;

/// <summary>T21: names that came with data lead nowhere outside the folder that was asked for, and nothing that is there is written over.</summary>
internal sealed class FileNamesFromData : TortureTest
{
    private static readonly string[] Bad =
    [
        "../x.csv", "../../x.csv", "/tmp/x.csv", "/x", "C:\\x.csv", "C:x", "\\\\host\\share\\x", "..", ".", "...", "", " ", "CON", "con.csv", "NUL.txt", "LPT1", "COM9.csv", "AUX.", "x.csv.", "x.csv ",
        "originals.csv", "ORIGINALS.CSV", "a/b/c.csv", "a\\b.csv", "-rf", "--out", "~root", ".bashrc", "x\ny.csv", "x\0y.csv", "\u202Evsc.exe", "x:stream", "a*?.csv", "\u00E9.csv", "e\u0301.csv", "=1+1.csv", "\u200B", "|",
        new string('n', 300), new string('n', 300) + ".csv", new string('\u5B57', 300) + ".csv", "n." + new string('e', 300), new string('\u0130', 150), string.Concat(Enumerable.Repeat("../", 60)) + "etc",
    ];

    public override string Key => "T21";

    public override string What => "file names from data";

    public override int Full => 200;

    public override int Short => 24;

    public override void Run(Tally tally, int tries, Random random)
    {
        for (int i = 0; i < tries; i++)
        {
            string[] names = [.. Enumerable.Range(0, 3).Select(n => n == 0 && random.Next(3) == 0 ? "x.csv" : Bad[(i + (n * random.Next(Bad.Length))) % Bad.Length])];
            int trap = i % 6;
            tally.Try(string.Create(CultureInfo.InvariantCulture, $"try {i}, trap {trap}, names {string.Join(" ", names.Select(n => $"'{n}'"))}"), () => Fault(names, trap));
        }
    }

    private static string? Fault(string[] names, int trap)
    {
        using var bench = new Workbench();
        bench.Run("start", "C");
        for (int i = 0; i < names.Length; i++)
        {
            bench.Run("load", "C", bench.Write($"week-{i}.csv", string.Create(CultureInfo.InvariantCulture, $"experiment,group,value\nE,a,{i}\nE,b,2\n")));
        }

        Rename(bench.Catalog, names);
        string folder = bench.At("asked"), outside = bench.At("outside");
        Directory.CreateDirectory(outside);
        File.WriteAllText(Path.Combine(outside, "kept.txt"), "kept");
        if (SetTrap(trap, folder, outside))
        {
            if (FaultOf(bench, folder, names.Length, refused: true) is { } fault)
            {
                return fault;
            }

            RemoveTrap(folder);
        }

        return FaultOf(bench, folder, names.Length, refused: false);
    }

    private static string? FaultOf(Workbench bench, string folder, int files, bool refused)
    {
        string before = Listing(bench.Folder, folder);
        foreach (string[] more in (string[][])[["--originals"], []])
        {
            Ran ran = bench.Run(["export", "C", "--out", folder, .. more]);
            if (ran.Code != (refused ? 3 : 0))
            {
                return $"export {string.Concat(more)} ended with {ran.Code}: {ran.Error}";
            }

            if (Listing(bench.Folder, folder) != before)
            {
                return $"outside the folder: {Listing(bench.Folder, folder)} instead of {before}";
            }

            if (refused)
            {
                continue;
            }

            if (FaultInside(folder, files, more.Length > 0) is { } fault)
            {
                return fault;
            }

            // A second export must not touch what the first wrote.
            if (bench.Run(["export", "C", "--out", folder, .. more]).Code != 3)
            {
                return "a folder was written over";
            }

            Directory.Delete(folder, recursive: true);
        }

        return null;
    }

    /// <summary>Puts something in the way.</summary>
    /// <returns>Whether the export has to be refused.</returns>
    private static bool SetTrap(int trap, string folder, string outside)
    {
        switch (trap)
        {
            case 1:
                File.CreateSymbolicLink(folder, outside);
                return true;
            case 2:
                File.CreateSymbolicLink(folder, Path.Combine(outside, "not there"));
                return true;
            case 3:
                File.WriteAllText(folder, "a file");
                return true;
            case 4:
                Directory.CreateDirectory(folder);
                File.WriteAllText(Path.Combine(folder, "mine.csv"), "mine");
                return true;
            case 5:
                // Where the program would make its draft, somebody has put a link.
                File.CreateSymbolicLink($"{folder}.new-{Environment.ProcessId}", outside);
                return false;
            default:
                return false;
        }
    }

    /// <summary>Takes away what was put in the place of the folder.</summary>
    private static void RemoveTrap(string folder)
    {
        if (new FileInfo(folder).LinkTarget is not null || File.Exists(folder))
        {
            File.Delete(folder);
        }
        else
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    private static string? FaultInside(string folder, int files, bool originals)
    {
        string[] written = Directory.GetFileSystemEntries(folder, "*", SearchOption.AllDirectories);
        if (written.Any(f => new FileInfo(f).LinkTarget is not null))
        {
            return "a link was written";
        }

        if (!originals)
        {
            return null;
        }

        return written.Length != files + 1 ? $"{written.Length} entries instead of {files + 1}: {string.Join(" ", written)}"
            : Enumerable.Range(0, files).All(i => written.Any(f => File.ReadAllText(f) == string.Create(CultureInfo.InvariantCulture, $"experiment,group,value\nE,a,{i}\nE,b,2\n"))) ? null
            : "the bytes of a file did not come back";
    }

    /// <summary>Everything outside the folder, with the content of its files.</summary>
    private static string Listing(string root, string folder) => string.Join(
        "; ",
        Directory.GetFileSystemEntries(root, "*", new EnumerationOptions { RecurseSubdirectories = true, AttributesToSkip = FileAttributes.None, MaxRecursionDepth = 3 })
            .Where(f => (f == folder ? new FileInfo(f).LinkTarget is not null || File.Exists(f) : !f.StartsWith(folder + Path.DirectorySeparatorChar, StringComparison.Ordinal)) && !Path.GetFileName(f).StartsWith("campaigns.db", StringComparison.Ordinal))
            .Order(StringComparer.Ordinal)
            .Select(f => $"{f} {(new FileInfo(f).LinkTarget is { } target ? $"-> {target}" : File.Exists(f) ? Convert.ToHexString(System.Security.Cryptography.SHA256.HashData(File.ReadAllBytes(f)))[..8] : "folder")}"));

    /// <summary>Gives the loaded files names that no file system would have let them have, as a catalog from elsewhere may hold them.</summary>
    private static void Rename(string catalog, string[] names)
    {
        using var connection = new SqliteConnection(new SqliteConnectionStringBuilder { DataSource = catalog, Pooling = false }.ToString());
        connection.Open();
        using SqliteCommand command = connection.CreateCommand();
        command.CommandText = "DROP TRIGGER loads_are_kept";
        command.ExecuteNonQuery();
        command.CommandText = "UPDATE loads SET file_name = $name WHERE id = $id";
        for (int i = 0; i < names.Length; i++)
        {
            command.Parameters.Clear();
            command.Parameters.AddWithValue("$name", names[i]);
            command.Parameters.AddWithValue("$id", i + 1);
            command.ExecuteNonQuery();
        }
    }
}
