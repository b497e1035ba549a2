namespace Campaigns.Catalog.Ledger.Verifying;

/// <summary>Collects what is wrong with a record.</summary>
internal sealed class Findings
{
    private readonly List<LedgerFinding> _all = [];

    public List<string> Remarks { get; } = [];

    public void Add(long? sequence, string? campaign, string what) => _all.Add(new LedgerFinding(sequence, campaign, what));

    /// <summary>Looks at one part of the record; where the file does not let it be read, that is what was found. A proof that somebody stopped has found nothing.</summary>
    /// <param name="part">What is looked at, for example "the chain".</param>
    /// <param name="look">The looking.</param>
    public void Look(string part, Action look)
    {
        try
        {
            look();
        }
#pragma warning disable CA1031 // A file that was tampered with may make any reader stumble; that it did is the finding.
        catch (Exception error) when (error is not (OutOfMemoryException or OperationCanceledException))
#pragma warning restore CA1031
        {
            Add(null, null, $"{part} cannot be read to the end: {error.Message.TrimEnd('.')}.");
        }
    }

    /// <summary>All of them, the lowest sequence first.</summary>
    public IReadOnlyList<LedgerFinding> InOrder() => [.. _all.OrderBy(f => f.Sequence ?? long.MaxValue)];
}
