using System.Collections.Concurrent;
using Terminal.Gui.App;

namespace Campaigns.App.Dashboard.Screen;

/// <summary>Work posted from any thread that is done on the screen's thread, before the next time it draws.</summary>
/// <remarks>The library's own queue costs time proportional to what waits in it, and holds a lock while it works.</remarks>
public sealed class ScreenThread : IDisposable
{
    private readonly ConcurrentQueue<Action> _waiting = new();
    private readonly IApplication _app;

    /// <summary>Makes a queue of work that is emptied once in every turn of the main loop.</summary>
    /// <param name="app">The application.</param>
    public ScreenThread(IApplication app)
    {
        _app = app;
        _app.Iteration += OnTurn;
    }

    /// <summary>Adds work.</summary>
    /// <param name="work">What to do on the screen's thread.</param>
    public void Post(Action work) => _waiting.Enqueue(work);

    /// <inheritdoc/>
    public void Dispose() => _app.Iteration -= OnTurn;

    // What work posts while it runs waits for the next turn: the loop never hangs here.
    private void OnTurn(object? sender, EventArgs<IApplication?> e)
    {
        for (int left = _waiting.Count; left > 0 && _waiting.TryDequeue(out Action? work); left--)
        {
            work();
        }
    }
}
