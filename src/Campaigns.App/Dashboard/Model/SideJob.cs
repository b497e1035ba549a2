using Campaigns.Catalog;

namespace Campaigns.App.Dashboard.Model;

/// <summary>Work on another thread that the screen's thread looks at now and then: nothing is ever called from there.</summary>
/// <typeparam name="T">What it gives.</typeparam>
public sealed class SideJob<T> : IDisposable
    where T : class
{
    private readonly CancellationTokenSource _stop = new();
    private readonly Task<T> _work;
    private volatile object? _progress;

    /// <summary>Begins.</summary>
    /// <param name="work">The work: it is given a way to tell its progress, and a wish to stop.</param>
    public SideJob(Func<Action<WorkProgress>, CancellationToken, T> work)
    {
        CancellationToken stop = _stop.Token;
        _work = Task.Run(() => work(p => _progress = p, stop), CancellationToken.None);
    }

    /// <summary>How far it said it was; null before it said anything.</summary>
    public WorkProgress? Progress => (WorkProgress?)_progress;

    /// <summary>Whether it ended, one way or another.</summary>
    public bool IsOver => _work.IsCompleted;

    /// <summary>What it gave; null while it runs, and where it gave nothing.</summary>
    public T? Result => _work.IsCompletedSuccessfully ? _work.Result : null;

    /// <summary>What it ended with; null while it runs, where it gave its result, and where it was stopped.</summary>
    public Exception? Fault => _work.Exception?.GetBaseException() is { } fault and not OperationCanceledException ? fault : null;

    /// <summary>Asks it to stop; it will end soon after.</summary>
    public void Stop() => _stop.Cancel();

    /// <summary>Asks it to stop, and leaves it to itself.</summary>
    public void Dispose()
    {
        _stop.Cancel();
        _ = _work.ContinueWith(
            work =>
            {
                // Nobody looks any more at what it threw.
                _ = work.Exception;
                _stop.Dispose();
            },
            CancellationToken.None, TaskContinuationOptions.None, TaskScheduler.Default);
    }
}
