using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Ledger;

/// <summary>Two editors of one campaign: whoever says which head was seen is refused where somebody else acted on the campaign after it.</summary>
internal static class UnchangedSince
{
    /// <summary>Looks whether the chain holds a head, before anything is changed.</summary>
    /// <param name="catalog">The open catalog, in a transaction.</param>
    /// <param name="seen">The head that was seen.</param>
    /// <exception cref="RecordException">It does not.</exception>
    public static void DemandHeld(Catalog catalog, LedgerHead seen)
    {
        if (!IsHeld(catalog, seen))
        {
            throw new RecordException(
                $"The ledger of '{catalog.Path}' does not hold the head {seen}: it is the head of another catalog, or the record was cut or written anew; nothing was changed. 'campaigns ledger verify --head {seen}' says more.");
        }
    }

    /// <summary>Looks, inside the transaction of a change, whether the campaign stands as it did at a head.</summary>
    /// <param name="catalog">The open catalog, in a transaction.</param>
    /// <param name="seen">The head that was seen.</param>
    /// <param name="campaign">The campaign that is about to be changed; null for the whole catalog.</param>
    /// <exception cref="ChangedSinceException">Something was done to the campaign since; the details say what.</exception>
    public static void Demand(Catalog catalog, LedgerHead seen, string? campaign)
    {
        LedgerEntry[] since = campaign is null ? [] : [.. new LedgerReader(catalog).Entries(new LedgerFilter { Campaign = campaign, From = seen.Sequence + 1 })];
        if (since.Length > 0)
        {
            throw new ChangedSinceException(
                FormattableString.Invariant($"The campaign '{campaign}' was changed since the head that you gave (entry {seen.Sequence}); nothing was changed now. Below stands what was done since; if you still want your change, repeat the command with the head in the last line."),
                since,
                LedgerWriter.Last(catalog).Head);
        }
    }

    private static bool IsHeld(Catalog catalog, LedgerHead seen)
    {
        if (seen.Sequence == 0)
        {
            return seen == LedgerHead.Empty;
        }

        using SqliteStatement entry = catalog.Prepare("SELECT hash FROM ledger WHERE sequence = ?1");
        return entry.Bind(1, seen.Sequence).Read() && entry.Text(0) == seen.Hash;
    }
}
