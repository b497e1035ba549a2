using Terminal.Gui.App;

namespace Campaigns.App.Dashboard.Screen;

/// <summary>Shows a page again as soon as something that is reckoned beside the screen is done.</summary>
/// <param name="app">The application; null before it runs.</param>
/// <param name="show">Draws the page again.</param>
public sealed class Awaiter(Func<IApplication?> app, Action show)
{
    private static readonly TimeSpan Pause = TimeSpan.FromMilliseconds(60);
    private bool _isWaiting;

    /// <summary>Waits for something; it may be called at every draw.</summary>
    /// <param name="isDone">Whether it is done.</param>
    public void Await(Func<bool> isDone)
    {
        if (_isWaiting || isDone() || app() is not { } running)
        {
            return;
        }

        _isWaiting = true;
        running.AddTimeout(Pause, () =>
        {
            if (!isDone())
            {
                return true;
            }

            _isWaiting = false;
            show();
            return false;
        });
    }
}
