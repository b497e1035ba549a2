using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Ledger.Verifying;

/// <summary>Proves that a catalog's record is whole: the file, the chain of the ledger, the rows that its entries speak for, and that no row stands beside it.</summary>
/// <remarks>
/// Reads only, all of it as it stands at one moment. What it can prove is that the file was not changed in parts: whoever may write the file may replace it whole by an older copy,
/// or cut the end of the chain with everything that belongs to it, and only a head kept outside shows that.
/// </remarks>
/// <param name="catalog">The open catalog.</param>
public sealed class LedgerVerifier(Catalog catalog)
{
    /// <summary>Proves the record. O(bytes of the catalog).</summary>
    /// <param name="known">A head that was printed earlier and must be part of the chain; null for none.</param>
    /// <param name="progress">Told before each part of the proof which it is; null where nobody watches.</param>
    /// <exception cref="CatalogException">The catalog is locked, or cannot be read at all.</exception>
    /// <exception cref="OperationCanceledException">Somebody asked to stop; nothing is then said about the record.</exception>
    public LedgerProof Verify(LedgerHead? known = null, Action<WorkProgress>? progress = null) => catalog.Snapshot(() =>
    {
        BeginReading();
        var findings = new Findings();
        using var chain = new ChainProof(catalog, findings);
        var evidence = new EvidenceProof(catalog, findings);
        (string Name, Action Look)[] parts =
        [
            ("The file", () => new FileProof(catalog, findings).Run()),
            ("The ledger", () => chain.Run(known)),
            ("The evidence of the ledger", evidence.Run),
            ("The tables", () => new CoverageProof(catalog, findings, evidence).Run()),
            ("The kept files", () => new OriginalsProof(catalog, findings, evidence).Run()),
            ("The sealed plans", () => new PlanProof(catalog, findings).Run()),
        ];
        for (int i = 0; i < parts.Length; i++)
        {
            (string name, Action look) = parts[i];
            progress?.Invoke(new WorkProgress(string.Concat("proving t", name.AsSpan(1)), i, parts.Length, "parts"));
            findings.Look(name, look);
        }

        return new LedgerProof
        {
            Head = chain.Head,
            Entries = chain.Entries,
            Digests = evidence.Recomputed,
            ClockSteps = chain.ClockSteps,
            Known = known,
            Findings = findings.InOrder(),
            Remarks = findings.Remarks,
        };
    });

    /// <summary>The first reading takes the lock that holds the snapshot; one that somebody else holds is told as such, and not as damage.</summary>
    private void BeginReading()
    {
        using SqliteStatement first = catalog.Prepare("SELECT count(*) FROM sqlite_schema");
        first.Read();
    }
}
