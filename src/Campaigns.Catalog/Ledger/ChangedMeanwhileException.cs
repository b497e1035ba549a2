using Campaigns.Domain;

namespace Campaigns.Catalog.Ledger;

/// <summary>A change was refused because others changed the campaign after the head that the caller had seen. <see cref="RefusedException.Details"/> lists what was done since, an entry a line.</summary>
/// <param name="message">What was refused, and what to do.</param>
/// <param name="since">What was done since.</param>
public sealed class ChangedMeanwhileException(string message, IReadOnlyList<string> since) : RefusedException(message, since);
