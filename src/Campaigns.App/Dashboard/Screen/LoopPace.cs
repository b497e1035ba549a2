using Terminal.Gui.App;
using Terminal.Gui.Input;

namespace Campaigns.App.Dashboard.Screen;

/// <summary>Lets the main loop look for keys often while they come, and seldom while nobody types: a loop that always turned fast would take a tenth of a core for nothing.</summary>
/// <remarks>The library sleeps between two turns, and so a key waits half a turn on average; its rate is one for the whole process.</remarks>
public sealed class LoopPace : IDisposable
{
    /// <summary>Turns a second while something happens.</summary>
    public const ushort Fast = 100;

    private static readonly TimeSpan Lasting = TimeSpan.FromSeconds(2);
    private readonly IApplication _app;
    private readonly TimeProvider _clock;
    private readonly ushort _slow = Application.MaximumIterationsPerSecond;
    private long _last;

    /// <summary>Begins fast, and sees to the pace from now on.</summary>
    /// <param name="app">The application, initialised.</param>
    /// <param name="clock">Tells how long nothing has happened.</param>
    public LoopPace(IApplication app, TimeProvider clock)
    {
        (_app, _clock) = (app, clock);
        _app.Keyboard.KeyDown += OnKey;
        _app.Mouse.MouseEvent += OnMouse;
        _app.Iteration += OnTurn;
        Hurry();
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        _app.Keyboard.KeyDown -= OnKey;
        _app.Mouse.MouseEvent -= OnMouse;
        _app.Iteration -= OnTurn;
        Application.MaximumIterationsPerSecond = _slow;
    }

    private void OnKey(object? sender, Key key) => Hurry();

    private void OnMouse(object? sender, Mouse mouse) => Hurry();

    private void OnTurn(object? sender, EventArgs<IApplication?> e) => Turn();

    /// <summary>Looks at the clock, as in every turn of the loop.</summary>
    internal void Turn()
    {
        if (_clock.GetElapsedTime(_last) > Lasting)
        {
            Application.MaximumIterationsPerSecond = _slow;
        }
    }

    private void Hurry()
    {
        _last = _clock.GetTimestamp();
        Application.MaximumIterationsPerSecond = Fast;
    }
}
