namespace Campaigns.Catalog;

/// <summary>The catalog's file cannot be used: it is missing, unreadable, locked, damaged, foreign, or newer than this program. The message is one sentence for people.</summary>
public sealed class CatalogException : Exception
{
    /// <summary>Makes the exception.</summary>
    /// <param name="message">What is wrong, where, and what to do.</param>
    /// <param name="inner">The error beneath; null where there is none.</param>
    public CatalogException(string message, Exception? inner = null)
        : base(message, inner)
    {
    }
}
