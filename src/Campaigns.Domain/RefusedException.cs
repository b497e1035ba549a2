namespace Campaigns.Domain;

/// <summary>The data or the plan was refused and nothing was changed. The message is one sentence for people; <see cref="Details"/> lists every problem where there are several.</summary>
public class RefusedException : Exception
{
    /// <summary>Makes the exception.</summary>
    /// <param name="message">What was refused, where, and what to do.</param>
    /// <param name="details">A sentence for each problem; empty where the message says it all.</param>
    public RefusedException(string message, IReadOnlyList<string>? details = null)
        : base(message)
    {
        Details = details ?? [];
    }

    /// <summary>A sentence for each problem.</summary>
    public IReadOnlyList<string> Details { get; }
}
