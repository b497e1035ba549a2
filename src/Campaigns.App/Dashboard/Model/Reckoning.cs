namespace Campaigns.App.Dashboard.Model;

/// <summary>Something that takes a while for a large campaign: reckoned beside the screen, and on the spot where it is small.</summary>
/// <typeparam name="T">What comes out.</typeparam>
/// <remarks>The work must read nothing but what does not change; a catalog is read before, on the screen's thread.</remarks>
public sealed class Reckoning<T>
    where T : class
{
    private readonly Task<T> _task;

    /// <summary>Starts the work.</summary>
    /// <param name="work">The work.</param>
    /// <param name="experiments">Experiments that it goes through.</param>
    public Reckoning(Func<T> work, int experiments)
    {
        if (experiments <= Reckoning.FewExperiments)
        {
            _task = Task.FromResult(work());
            return;
        }

        _task = Task.Run(work);
    }

    /// <summary>Whether it is done.</summary>
    public bool IsDone => _task.IsCompleted;

    /// <summary>What came out; null while it is not done.</summary>
    /// <remarks>What the work threw is thrown here.</remarks>
    public T? Result => _task.IsCompleted ? _task.GetAwaiter().GetResult() : null;
}

/// <summary>What all reckonings share.</summary>
public static class Reckoning
{
    /// <summary>Up to so many experiments the work is done on the spot: some 0.02 s for a dozen corrections.</summary>
    public const int FewExperiments = 5_000;
}
