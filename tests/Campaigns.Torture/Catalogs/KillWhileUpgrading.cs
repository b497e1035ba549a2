using System.Diagnostics;
using Campaigns.Catalog.Providers;

namespace Campaigns.Torture.Catalogs;

/// <summary>T2: an upgrade is killed at a random moment; the file is the old one to the byte or the new one, and the next upgrade ends soon and clears away what was left.</summary>
internal sealed class KillWhileUpgrading : TortureTest
{
    // On a machine that others use as well, an upgrade that nobody disturbs takes several seconds itself.
    private static readonly TimeSpan Soon = TimeSpan.FromSeconds(10);
    private const int TimesUsual = 4;

    public override string Key => "T2";

    public override string What => "kills while upgrading";

    public override int Full => 100;

    public override int Short => 10;

    public override void Run(Tally tally, int tries, Random random)
    {
        string[] fixtures = Fixture.All();
        TimeSpan usual = Usual(fixtures[0]);
        int replaced = 0;
        for (int i = 0; i < tries; i++)
        {
            string fixture = fixtures[i % fixtures.Length];

            // The first fifth is the start of the process; what is left reaches past the end.
            TimeSpan wait = usual * (0.2 + random.NextDouble());
            tally.Try(FormattableString.Invariant($"{Path.GetFileName(fixture)}, killed after {wait.TotalMilliseconds:F0} ms"), () => Fault(fixture, wait, Soon + (TimesUsual * usual), ref replaced));
        }

        Console.Error.WriteLine(FormattableString.Invariant($"T2: {tries - replaced} times the old file, {replaced} times the new one"));
    }

    private static string? Fault(string fixture, TimeSpan wait, TimeSpan most, ref int replaced)
    {
        using var bench = new Workbench();
        Fixture.Unpack(fixture, bench.Catalog);
        string before = Inspection.Hash(bench.Catalog);
        using (Process upgrade = bench.Start("upgrade"))
        {
            Thread.Sleep(wait);
            upgrade.Kill();
            upgrade.WaitForExit();
        }

        if (File.Exists(bench.Catalog + "-journal"))
        {
            return "the catalog has a journal";
        }

        int version = SqliteCatalogFile.ReadVersion(bench.Catalog);
        if (version == SqliteCatalogFile.SchemaVersion)
        {
            replaced++;
            if (Inspection.Fault(bench.Catalog) is { } fault)
            {
                return $"new, but {fault}";
            }
        }
        else if (Inspection.Hash(bench.Catalog) != before)
        {
            return FormattableString.Invariant($"neither old nor new: its header says schema {version}");
        }

        Ran next = bench.RunProcess(most, "upgrade");
        return next.Code != 0 ? $"the next upgrade ended with {next.Code}: {next.Error}"
            : version < SqliteCatalogFile.SchemaVersion && Inspection.Files(bench.Folder) is not ["campaigns.db"] ? $"left over: {string.Join(", ", Inspection.Files(bench.Folder))}"
            : Inspection.Fault(bench.Catalog);
    }

    private static TimeSpan Usual(string fixture)
    {
        using var bench = new Workbench();
        Fixture.Unpack(fixture, bench.Catalog);
        long start = Stopwatch.GetTimestamp();
        bench.RunProcess(TimeSpan.FromMinutes(2), "upgrade");
        return Stopwatch.GetElapsedTime(start);
    }
}
