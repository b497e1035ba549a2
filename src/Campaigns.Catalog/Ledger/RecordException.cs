namespace Campaigns.Catalog.Ledger;

/// <summary>The record is not whole, or is not the one that was meant; nothing was changed.</summary>
/// <param name="message">One sentence: what, where, what to do.</param>
public sealed class RecordException(string message) : Exception(message);
