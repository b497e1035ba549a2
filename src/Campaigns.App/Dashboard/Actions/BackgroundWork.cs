using Campaigns.Catalog;

namespace Campaigns.App.Dashboard.Actions;

/// <summary>Work on a thread of its own. The screen looks now and then how far it is: nothing is posted, so nothing piles up.</summary>
/// <typeparam name="T">What it gives.</typeparam>
internal sealed class BackgroundWork<T> : IDisposable
{
    private readonly Lock _gate = new();
    private readonly CancellationTokenSource _cancel = new();
    private readonly Thread _thread;
    private WorkProgress? _progress;
    private (T? Result, Exception? Thrown)? _end;

    /// <summary>Begins.</summary>
    /// <param name="work">What to do; it reports how far it is, and stops when it is asked to.</param>
    public BackgroundWork(Func<Action<WorkProgress>, CancellationToken, T> work)
    {
        _thread = new Thread(() => Run(work)) { IsBackground = true, Name = "carrying out an action" };
        _thread.Start();
    }

    /// <summary>How far it is; null before its first report.</summary>
    public WorkProgress? Progress
    {
        get
        {
            lock (_gate)
            {
                return _progress;
            }
        }
    }

    /// <summary>What it gave or threw; null while it works.</summary>
    public (T? Result, Exception? Thrown)? End
    {
        get
        {
            lock (_gate)
            {
                return _end;
            }
        }
    }

    /// <summary>Whether it was asked to stop.</summary>
    public bool IsStopping => _cancel.IsCancellationRequested;

    /// <summary>Asks it to stop.</summary>
    public void Stop() => _cancel.Cancel();

    /// <summary>Asks it to stop, and waits a while for its end.</summary>
    /// <param name="patience">How long; what does not stop in time ends with the process, and the catalog takes back what was not finished.</param>
    /// <returns>Whether it has ended.</returns>
    public bool StopAndWait(TimeSpan patience)
    {
        Stop();
        return _thread.Join(patience);
    }

    /// <inheritdoc/>
    public void Dispose() => _cancel.Dispose();

    private void Run(Func<Action<WorkProgress>, CancellationToken, T> work)
    {
        (T? Result, Exception? Thrown) end;
        try
        {
            end = (work(Report, _cancel.Token), null);
        }
#pragma warning disable CA1031 // Handed over to the screen, which says what happened.
        catch (Exception thrown)
        {
            end = (default, thrown);
        }
#pragma warning restore CA1031
        lock (_gate)
        {
            _end = end;
        }
    }

    private void Report(WorkProgress progress)
    {
        lock (_gate)
        {
            _progress = progress;
        }
    }
}
