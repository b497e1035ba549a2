namespace Campaigns.Catalog.Loading;

/// <summary>A file could not be read at all: not there, not permitted, no file. The message is one sentence for people.</summary>
public sealed class LoadingException : Exception
{
    /// <summary>Makes the exception.</summary>
    /// <param name="message">What, where, and what to do.</param>
    public LoadingException(string message)
        : base(message)
    {
    }

    /// <summary>Makes the exception.</summary>
    /// <param name="message">What, where, and what to do.</param>
    /// <param name="cause">What the system said.</param>
    public LoadingException(string message, Exception cause)
        : base(message, cause)
    {
    }
}
