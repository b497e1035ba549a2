using Campaigns.Catalog;

namespace Campaigns.App.Dashboard.Model;

/// <summary>Work on a thread of its own. The screen's thread looks now and then how far it is: nothing is ever called from there, so nothing piles up.</summary>
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

        // It may wait for a lock or for the disk, so it takes no thread from those that others share.
        _work = Task.Factory.StartNew(() => work(p => _progress = p, stop), CancellationToken.None, TaskCreationOptions.LongRunning, TaskScheduler.Default);
    }

    /// <summary>How far it said it was; null before it said anything.</summary>
    public WorkProgress? Progress => (WorkProgress?)_progress;

    /// <summary>Whether it ended, one way or another.</summary>
    public bool IsOver => _work.IsCompleted;

    /// <summary>Whether it was asked to stop.</summary>
    public bool IsStopping => _stop.IsCancellationRequested;

    /// <summary>What it gave; null while it runs, and where it gave nothing.</summary>
    public T? Result => _work.IsCompletedSuccessfully ? _work.Result : null;

    /// <summary>What it threw; null while it runs, and where it gave its result.</summary>
    public Exception? Thrown => _work.Exception?.GetBaseException();

    /// <summary>What it ended with; null while it runs, where it gave its result, and where it was stopped.</summary>
    public Exception? Fault => Thrown is { } fault and not OperationCanceledException ? fault : null;

    /// <summary>Asks it to stop; it will end soon after.</summary>
    public void Stop() => _stop.Cancel();

    /// <summary>Asks it to stop, and waits a while for its end.</summary>
    /// <param name="patience">How long; what does not stop in time ends with the process, and the catalog takes back what was not finished.</param>
    /// <returns>Whether it has ended.</returns>
    public bool StopAndWait(TimeSpan patience)
    {
        Stop();
        return Task.WaitAny([_work], patience) == 0;
    }

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
