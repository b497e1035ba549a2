using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Output;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;
using Terminal.Gui.Views;

namespace Campaigns.App.Dashboard.Screen;

/// <summary>What is seen while a campaign is read: a large one takes a good part of a second, in which the screen's library gets ready beside it.</summary>
public sealed class OpeningScreen : Runnable
{
    private static readonly TimeSpan Pause = TimeSpan.FromMilliseconds(10);
    private readonly string _campaign;
    private readonly GlyphSet _glyphs;
    private readonly Func<bool> _isRead;

    /// <summary>Makes the screen; it stands until everything is read, or the user leaves.</summary>
    /// <param name="campaign">The campaign's code.</param>
    /// <param name="isRead">Whether the reading has come to its end, good or bad.</param>
    /// <param name="glyphs">The signs.</param>
    /// <param name="theme">How meanings look.</param>
    public OpeningScreen(string campaign, Func<bool> isRead, GlyphSet glyphs, Theme theme)
    {
        (_campaign, _isRead, _glyphs) = (campaign, isRead, glyphs);
        KeyBindings.Clear();
        Add(new CanvasView(Paint, theme) { Width = Dim.Fill(), Height = Dim.Fill() });
    }

    /// <summary>Whether the user left before everything was read.</summary>
    public bool IsLeft { get; private set; }

    /// <inheritdoc/>
    protected override void OnIsRunningChanged(bool newIsRunning)
    {
        base.OnIsRunningChanged(newIsRunning);
        if (newIsRunning)
        {
            App!.AddTimeout(Pause, () =>
            {
                if (_isRead())
                {
                    App?.RequestStop(this);
                }

                return !_isRead();
            });
        }
    }

    /// <inheritdoc/>
    protected override bool OnKeyDown(Key key)
    {
        if (key == TextBox.Suspend)
        {
            return false;
        }

        if (key == Key.Q || key == Key.Q.WithCtrl || key == Key.Esc)
        {
            IsLeft = true;
            App?.RequestStop(this);
        }

        return true;
    }

    private TextCanvas Paint(int width, int height)
    {
        TextCanvas canvas = new(width, height);
        canvas.Write(1, 0, CellText.Fit($"Reading {SafeText.Escape(_campaign)} ...", width - 2, _glyphs.Cut), Ink.Heading);
        canvas.Paste(KeysPainter.Paint([("q", "quit")], width), 0, height - 1);
        return canvas;
    }
}
