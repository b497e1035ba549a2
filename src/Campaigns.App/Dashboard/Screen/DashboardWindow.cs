using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Pages;
using Campaigns.App.Dashboard.Paint;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;
using Terminal.Gui.Views;

namespace Campaigns.App.Dashboard.Screen;

/// <summary>The whole screen: heading, names of the pages, the page shown, keys.</summary>
public sealed class DashboardWindow : Runnable
{
    private readonly DashboardModel _model;
    private readonly IReadOnlyList<DashboardPage> _pages;
    private readonly PageStrip _names;
    private readonly CanvasView _heading;
    private readonly CanvasView _strip;
    private readonly CanvasView _keys;
    private int _shown;
    private int _before;

    /// <summary>Makes the screen.</summary>
    /// <param name="model">What is shown.</param>
    /// <param name="glyphs">The signs.</param>
    /// <param name="theme">How meanings look.</param>
    public DashboardWindow(DashboardModel model, GlyphSet glyphs, Theme theme)
    {
        _model = model;
        _shown = _before = model.Page;
        PageContext context = new(model, glyphs, theme);
        _pages = [.. PageList.All.Select(page => page.Make(context))];
        _names = new PageStrip([.. PageList.All.Select(p => p.Name)]);
        _heading = new CanvasView((width, _) => HeadingPainter.Paint(model.Heading, width, glyphs, Frame.Height), theme) { Width = Dim.Fill(), Height = Dim.Func(_ => HeadingPainter.HeightOf(model.Heading, Frame.Width, Frame.Height)) };
        _strip = new CanvasView((width, _) => _names.Paint(model.Page, width), theme) { Y = Pos.Bottom(_heading), Width = Dim.Fill(), Height = 1 };
        _keys = new CanvasView((width, _) => KeysPainter.Paint(_pages[model.Page].Keys, width), theme) { Y = Pos.AnchorEnd(1), Width = Dim.Fill(), Height = 1 };
        _strip.Clicked += (x, _) => TurnTo(_names.PageAt(x) ?? model.Page);
        Add(_heading, _strip);
        foreach (DashboardPage page in _pages)
        {
            (page.Y, page.Height, page.Visible) = (Pos.Bottom(_strip), Dim.Fill(1), page == _pages[model.Page]);
            Add(page);
        }

        Add(_keys);
        model.Changed += ShowChange;
    }

    /// <inheritdoc/>
    protected override void OnIsRunningChanged(bool newIsRunning)
    {
        base.OnIsRunningChanged(newIsRunning);
        if (newIsRunning)
        {
            _pages[_model.Page].Entrance.SetFocus();
        }
    }

    /// <inheritdoc/>
    protected override bool OnKeyDown(Key key)
    {
        if (key == Key.Q || key == Key.Q.WithCtrl)
        {
            App?.RequestStop(this);
        }
        else if (key == Key.Esc)
        {
            Back();
        }
        else if (key == Key.F1 || key == new Key('?'))
        {
            TurnTo(_pages.Count - 1);
        }
        else if (key == Key.F5)
        {
            _model.Reload();
        }
        else if (key.AsRune.Value - '1' is var page && page >= 0 && page < _pages.Count)
        {
            TurnTo(page);
        }
        else if (key != Key.CursorUp && key != Key.CursorDown && key != Key.CursorLeft && key != Key.CursorRight)
        {
            // Arrows that nobody used would move the focus.
            return base.OnKeyDown(key);
        }

        _keys.SetNeedsDraw();
        return true;
    }

    /// <inheritdoc/>
    protected override void Dispose(bool disposing)
    {
        if (disposing)
        {
            _model.Changed -= ShowChange;
        }

        base.Dispose(disposing);
    }

    private void Back()
    {
        if (!_pages[_model.Page].Back() && _model.Page == _pages.Count - 1)
        {
            TurnTo(_before);
        }
    }

    private void TurnTo(int page)
    {
        if (page != _model.Page)
        {
            _before = _model.Page;
            if (_pages[page] is HelpPage help)
            {
                help.Explain(PageList.All[_before].Name, _pages[_before]);
            }

            _model.TurnTo(page);
        }
    }

    private void ShowChange()
    {
        if (_shown != _model.Page)
        {
            _shown = _model.Page;
            for (int i = 0; i < _pages.Count; i++)
            {
                _pages[i].Visible = i == _shown;
            }

            _pages[_shown].Entrance.SetFocus();
        }

        foreach (CanvasView part in new[] { _heading, _strip, _keys })
        {
            part.SetNeedsDraw();
        }
    }
}
