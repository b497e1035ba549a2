using Campaigns.Domain;

namespace Campaigns.Catalog.Ledger;

/// <summary>A change was refused because others changed the campaign after the head that the caller had seen. Nothing was changed.</summary>
/// <param name="message">What was refused, and what to do.</param>
/// <param name="since">The entries of the campaign since that head.</param>
/// <param name="head">The head as it stands now.</param>
public sealed class ChangedSinceException(string message, IReadOnlyList<LedgerEntry> since, LedgerHead head)
    : RefusedException(message, [.. since.Select(e => FormattableString.Invariant($"entry {e.Sequence}: {e.Action}")), $"--head {head}"])
{
    /// <summary>What was done since, oldest first; never empty.</summary>
    public IReadOnlyList<LedgerEntry> Since { get; } = since;

    /// <summary>The head as it stands now: whoever has looked at what was done since may repeat the change with it.</summary>
    public LedgerHead Head { get; } = head;
}
