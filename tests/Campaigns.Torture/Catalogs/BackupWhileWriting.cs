using System.Diagnostics;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Providers;

namespace Campaigns.Torture.Catalogs;

/// <summary>T12: backups are made while another process writes without a pause; each is whole, is a beginning of the ledger, and holds everything that was acknowledged before it began.</summary>
internal sealed class BackupWhileWriting : TortureTest
{
    private const int OfOneWriter = 20;

    public override string Key => "T12";

    public override string What => "backups while writing";

    public override int Full => 100;

    public override int Short => 5;

    public override void Run(Tally tally, int tries, Random random)
    {
        for (int done = 0; done < tries; done += OfOneWriter)
        {
            Series(tally, done, Math.Min(OfOneWriter, tries - done), random);
        }
    }

    private static void Series(Tally tally, int from, int count, Random random)
    {
        using var bench = new Workbench();
        bench.Run("start", "C");
        using Process writer = Worker.StartCampaigns(bench.Catalog, "K", 1_000_000);
        var acknowledged = new List<string>();
        writer.OutputDataReceived += (_, line) =>
        {
            if (Worker.Kept(line.Data) is { } what)
            {
                lock (acknowledged)
                {
                    acknowledged.Add(what);
                }
            }
        };
        writer.BeginOutputReadLine();
        var heads = new List<LedgerHead>();
        try
        {
            for (int i = 0; i < count; i++)
            {
                Thread.Sleep(random.Next(1, 100));
                tally.Try(FormattableString.Invariant($"backup {from + i}"), () => Fault(bench, Known(acknowledged), heads));
            }
        }
        finally
        {
            writer.Kill();
            writer.WaitForExit();
        }

        Campaigns.Catalog.Catalog.Open(bench.Catalog, TimeProvider.System).Dispose();
        tally.Try(FormattableString.Invariant($"the ledger continues backups {from} to {from + count - 1}"), () =>
            heads.Count != count ? "a backup gave no head"
            : heads.Select(head => CatalogCheck.Run(bench.Catalog, head, TimeProvider.System, CancellationToken.None).Faults).FirstOrDefault(faults => faults.Count > 0)?[0]);
    }

    private static string? Fault(Workbench bench, string[] before, List<LedgerHead> heads)
    {
        string copy = bench.At("copy.db");
        Ran backup = bench.RunProcess(TimeSpan.FromMinutes(1), "backup", copy, "--replace");
        if (backup.Code != 0)
        {
            return backup.Error;
        }

        string[] files = [.. Inspection.Files(bench.Folder).Where(f => f != "campaigns.db-journal")];
        if (files is not ["campaigns.db", "copy.db"])
        {
            return $"left over: {string.Join(", ", files)}";
        }

        CheckedCatalog check = CatalogCheck.Run(copy, null, TimeProvider.System, CancellationToken.None);
        if (check.Head is { } head)
        {
            heads.Add(head);
        }

        return check.Faults is [var first, ..] ? first : Inspection.Fault(copy) ?? Inspection.Missing(copy, "SELECT code FROM campaigns", before);
    }

    private static string[] Known(List<string> acknowledged)
    {
        lock (acknowledged)
        {
            return [.. acknowledged];
        }
    }
}
