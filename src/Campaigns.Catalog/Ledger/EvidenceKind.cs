namespace Campaigns.Catalog.Ledger;

/// <summary>A kind of rows that an entry of the ledger speaks for.</summary>
/// <param name="Word">Its word in the ledger; never changed.</param>
/// <param name="IsLatestOnly">Whether the rows may be changed by a later entry, so that the latest one about an owner counts; otherwise the rows are written once.</param>
/// <param name="Owners">Statement of every owner with the range of its rows, 0 and 0 where there is no range.</param>
/// <param name="Rows">Statements of the rows of an owner, in a fixed order.</param>
internal sealed record EvidenceKind(string Word, bool IsLatestOnly, string Owners, string[] Rows)
{
    /// <summary>Rows of an owner that no range divides.</summary>
    public EvidenceRequest Of(long owner) => new(this, owner, 0, 0);

    /// <summary>Rows of an owner in a range.</summary>
    public EvidenceRequest Of(long owner, long first, long last) => new(this, owner, first, last);
}

/// <summary>Rows whose digest an entry is to carry.</summary>
/// <param name="Kind">Which kind.</param>
/// <param name="Owner">Whose.</param>
/// <param name="First">First of the range; 0 for none.</param>
/// <param name="Last">Last of the range; 0 for none.</param>
internal sealed record EvidenceRequest(EvidenceKind Kind, long Owner, long First, long Last);
