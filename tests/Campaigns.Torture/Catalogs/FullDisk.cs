using System.Globalization;
using System.Text;

namespace Campaigns.Torture.Catalogs;

/// <summary>T3: the catalog's disk becomes full; the program says so, ends with 4, keeps what it acknowledged and leaves nothing beside it.</summary>
/// <remarks>Exit code 4, as for every other reason why the catalog cannot be used: neither data nor plan was refused. What is written elsewhere (export, backup) is refused with 3.</remarks>
internal sealed class FullDisk : TortureTest
{
    private const int Step = 64 << 10;

    public override string Key => "T3";

    public override string What => "full disks";

    public override int Full => 64;

    public override int Short => 6;

    public override void Run(Tally tally, int tries, Random random)
    {
        for (int i = 0; i < tries; i++)
        {
            // A short run takes sizes from the whole range.
            int size = Step * (tries < Full ? 1 + (i * (Full - 1) / Math.Max(1, tries - 1)) : 1 + (i % Full));
            using var bench = new Workbench();
            Directory.CreateDirectory(bench.At("disk"));
            using var disk = SmallDisk.Make(bench.At("disk"), size);
            if (disk is null)
            {
                tally.Skip("no file system of a chosen size can be mounted");
                return;
            }

            tally.Try(FormattableString.Invariant($"{size / 1024} kB"), () => Fault(bench, disk, random));
        }
    }

    private static string? Fault(Workbench bench, SmallDisk disk, Random random)
    {
        string catalog = Path.Combine(disk.Folder, "campaigns.db");
        Ran start = bench.Run("start", "C", "--catalog", catalog);
        if (start.Code != 0)
        {
            return start.Code != 4 || !start.Error.Contains("full", StringComparison.Ordinal) ? $"creating ended with {start.Code}: {start.Error}"
                : Inspection.Files(disk.Folder).Length is 0 || Inspection.Files(disk.Folder) is ["campaigns.db"] && Inspection.Fault(catalog) is null ? null
                : $"creating left {string.Join(", ", Inspection.Files(disk.Folder))}";
        }

        var loaded = new List<string>();
        Ran load;
        do
        {
            string name = FormattableString.Invariant($"week-{loaded.Count}.csv");
            load = bench.Run("load", "C", bench.Write(name, Measurements(loaded.Count, random)), "--catalog", catalog);
            if (load.Code == 0)
            {
                loaded.Add(name);
            }
        }
        while (load.Code == 0 && loaded.Count < 500);
        if (load.Code != 4 || !load.Error.Contains("full", StringComparison.Ordinal) || load.Error.TrimEnd('\n').Contains('\n'))
        {
            return $"the load ended with {load.Code}: {load.Error}";
        }

        string? fault = LeftOver(disk, "the load") ?? Inspection.Fault(catalog) ?? Inspection.Missing(catalog, "SELECT file_name FROM loads", loaded);
        if (fault is not null)
        {
            return fault;
        }

        // On the same full disk there is no room for copies either, unless the file is small beside what is free.
        string copy = Path.Combine(disk.Folder, "copy.db"), folder = Path.Combine(disk.Folder, "out");
        foreach (string[] words in new string[][] { ["backup", copy], ["export", "C", "--out", folder] })
        {
            Ran ran = bench.Run([.. words, "--catalog", catalog]);
            if (ran.Code == 0)
            {
                continue;
            }

            if (ran.Code != 3 || !ran.Error.Contains("full", StringComparison.Ordinal) || ran.Error.Contains(".draft-", StringComparison.Ordinal) || ran.Error.Contains(".new-", StringComparison.Ordinal))
            {
                return $"{words[0]} ended with {ran.Code}: {ran.Error}";
            }

            if (LeftOver(disk, words[0]) is { } left)
            {
                return left;
            }
        }

        return Inspection.Fault(catalog);
    }

    private static string? LeftOver(SmallDisk disk, string step)
    {
        string[] files = [.. Inspection.Files(disk.Folder).Except(["campaigns.db", "copy.db"], StringComparer.Ordinal)];
        return files.Length == 0 ? null : $"{step} left {string.Join(", ", files)}";
    }

    private static string Measurements(int number, Random random)
    {
        var text = new StringBuilder("experiment,group,value\n");
        for (int i = 0; i < 5_000; i++)
        {
            text.Append(CultureInfo.InvariantCulture, $"E{number}-{i / 50},{(char)('a' + (i % 4))},{random.Next(100_000, 999_999) / 1000.0:F3}\n");
        }

        return text.ToString();
    }
}
