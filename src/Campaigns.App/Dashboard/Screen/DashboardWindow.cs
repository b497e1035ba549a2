using Campaigns.App.Dashboard.Actions;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Dialogs;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Pages;
using Campaigns.App.Dashboard.Paint;
using Campaigns.Catalog;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;
using Terminal.Gui.Views;

namespace Campaigns.App.Dashboard.Screen;

/// <summary>The whole screen: heading, names of the pages, the page shown, keys.</summary>
public sealed class DashboardWindow : Runnable
{
    private readonly DashboardModel _model;
    private readonly PageContext _context;
    private readonly DashboardPage?[] _pages = new DashboardPage?[PageList.All.Count];
    private readonly PageStrip _names;
    private readonly CanvasView _heading;
    private readonly CanvasView _strip;
    private readonly CanvasView _keys;
    private readonly ActionDesk? _desk;
    private readonly GlyphSet _glyphs;
    private readonly Theme _theme;
    private int _shown;
    private int _before;

    /// <summary>Makes the screen.</summary>
    /// <param name="model">What is shown.</param>
    /// <param name="glyphs">The signs.</param>
    /// <param name="theme">How meanings look.</param>
    /// <param name="desk">Where actions open the catalog; null where nothing can be done.</param>
    public DashboardWindow(DashboardModel model, GlyphSet glyphs, Theme theme, ActionDesk? desk = null)
    {
        (_model, _desk, _glyphs, _theme) = (model, desk, glyphs, theme);
        _shown = _before = model.Page;
        _context = new PageContext(model, glyphs, theme);
        _names = new PageStrip([.. PageList.All.Select(p => p.Name)]);
        _heading = new CanvasView((width, _) => HeadingPainter.Paint(model.Heading, width, glyphs, Frame.Height), theme) { Width = Dim.Fill(), Height = Dim.Func(_ => HeadingPainter.HeightOf(model.Heading, Frame.Width, Frame.Height)) };
        _strip = new CanvasView((width, _) => _names.Paint(model.Page, width), theme) { Y = Pos.Bottom(_heading), Width = Dim.Fill(), Height = 1 };
        _keys = new CanvasView((width, _) => model.Watch.Sentence is { } trouble ? KeysPainter.Paint(trouble, width, glyphs) : KeysPainter.Paint(KeysOf(PageAt(model.Page)), width), theme) { Y = Pos.AnchorEnd(1), Width = Dim.Fill(), Height = 1 };
        _strip.Clicked += (x, _) => TurnTo(_names.PageAt(x) ?? model.Page);
        _keys.Clicked += (x, _) => PressAt(x);
        Add(_heading, _strip, _keys);
        PageAt(model.Page).Visible = true;
        model.Changed += ShowChange;
    }

    /// <inheritdoc/>
    protected override void OnIsRunningChanged(bool newIsRunning)
    {
        base.OnIsRunningChanged(newIsRunning);
        if (newIsRunning)
        {
            PageAt(_model.Page).Entrance.SetFocus();
        }
    }

    /// <inheritdoc/>
    protected override bool OnKeyDown(Key key)
    {
        if (key == Key.Q || key == Key.Q.WithCtrl || key == Key.C.WithCtrl)
        {
            App?.RequestStop(this);
        }
        else if (key == Key.Esc)
        {
            Back();
        }
        else if (key == Key.F1 || key == new Key('?'))
        {
            TurnTo(_pages.Length - 1);
        }
        else if (key == Key.F5)
        {
            _model.Reload();
        }
        else if (_desk is not null && key == Key.A)
        {
            ChooseAction();
        }
        else if (_desk is not null && ActionList.Of(key.AsRune.Value) is { } action)
        {
            Begin(action);
        }
        else if (key.AsRune.Value - '1' is var page && page >= 0 && page < _pages.Length)
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

    /// <summary>The keys below the page that is shown, the most needed first.</summary>
    internal IReadOnlyList<(string Key, string Does)> FooterKeys => KeysOf(PageAt(_model.Page));

    // Made when it is first turned to: whoever opens a campaign waits for one page only.
    private DashboardPage PageAt(int place)
    {
        if (_pages[place] is not { } page)
        {
            _pages[place] = page = PageList.All[place].Make(_context);
            (page.Y, page.Height, page.Visible) = (Pos.Bottom(_strip), Dim.Fill(1), false);
            Add(page);
        }

        return page;
    }

    private static (string Key, string Does) ActionKeys => ("a", "actions");

    // Before the keys that turn pages, which no page needs most.
    private List<(string Key, string Does)> KeysOf(DashboardPage page)
    {
        List<(string Key, string Does)> keys = [.. page.Keys];
        if (_desk is not null)
        {
            int place = keys.FindIndex(k => k.Does == DashboardPage.TurnKeys.Does);
            keys.Insert(place < 0 ? Math.Max(0, keys.Count - 2) : place, ActionKeys);
        }

        return keys;
    }

    // A click on a key's name or its word does what the key does; a filter that is being typed is left first, or it would take the letter.
    private void PressAt(int x)
    {
        DashboardPage page = PageAt(_model.Page);
        if (_model.Watch.Sentence is not null || KeysPainter.NameAt(KeysOf(page), _keys.Frame.Width, x) is not { } name)
        {
            return;
        }

        if (name == DashboardPage.TurnKeys.Key)
        {
            TurnTo((_model.Page + 1) % _pages.Length);
        }
        else if (KeyNames.Of(name) is { } key)
        {
            if (MostFocused is TextBox && KeyNames.IsLetter(name))
            {
                page.Entrance.SetFocus();
            }

            NewKeyDownEvent(key);
        }
    }

    private void ChooseAction()
    {
        using ActionMenu menu = new(_glyphs, _theme);
        Show(menu);
        if (menu.Chosen is { } action)
        {
            Begin(action);
        }
    }

    private void Begin(DashboardAction action)
    {
        using ActionRun run = new(action, _model, _desk!);
        using ActionDialog dialog = new(run, _glyphs, _theme);
        Show(dialog);
    }

    private void Show(PopUp popUp)
    {
        App!.Run(popUp);
        if (popUp.IsLeaving)
        {
            App.RequestStop(this);
        }

        SetNeedsDraw();
    }

    private void Back()
    {
        if (!PageAt(_model.Page).Back() && _model.Page == _pages.Length - 1)
        {
            TurnTo(_before);
        }
    }

    private void TurnTo(int page)
    {
        if (page != _model.Page)
        {
            _before = _model.Page;
            if (PageAt(page) is HelpPage help)
            {
                help.Explain(PageList.All[_before].Name, PageAt(_before));
            }

            _model.Watch.Look();
            _model.TurnTo(page);
        }
    }

    /// <summary>Goes on after something could not be read: what was read before stays on the screen, with the reason and what to do.</summary>
    /// <param name="error">What was thrown.</param>
    /// <returns>Whether it was of that kind; all else ends the dashboard.</returns>
    public bool Excuse(Exception error)
    {
        if (error is not CatalogException unread)
        {
            return false;
        }

        // What the experiments page shows is there already, but for single details, which it does not ask for until F5.
        _model.Watch.Fail(unread);
        _model.TurnTo(PageList.PlaceOf("Experiments"));
        SetNeedsDraw();
        return true;
    }

    private void ShowChange()
    {
        if (_shown != _model.Page)
        {
            _shown = _model.Page;
            DashboardPage shown = PageAt(_shown);
            foreach (DashboardPage page in _pages.OfType<DashboardPage>())
            {
                page.Visible = page == shown;
            }

            shown.Entrance.SetFocus();
        }

        foreach (CanvasView part in new[] { _heading, _strip, _keys })
        {
            part.SetNeedsDraw();
        }
    }
}
