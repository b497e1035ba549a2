using Campaigns.App.Dashboard.Actions;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Dashboard.Screen;
using Terminal.Gui.Input;

namespace Campaigns.App.Dashboard.Dialogs;

/// <summary>Everything that can be done, to choose from.</summary>
internal sealed class ActionMenu : PopUp
{
    private const int UsualWidth = 72;
    private readonly ScrollPane _scroll;
    private int _selected;

    /// <summary>Makes the menu.</summary>
    /// <param name="glyphs">The signs.</param>
    /// <param name="theme">How meanings look.</param>
    public ActionMenu(GlyphSet glyphs, Theme theme)
        : base(glyphs, theme, UsualWidth) => _scroll = new ScrollPane(width => ActionMenuPainter.Paint(ActionList.All, _selected, width));

    /// <summary>What was chosen; null where nothing was.</summary>
    public DashboardAction? Chosen { get; private set; }

    /// <inheritdoc/>
    protected override string Heading => "actions";

    /// <inheritdoc/>
    protected override IReadOnlyList<(string Key, string Does, Key Pressed)> Keys =>
    [
        ("Enter", "begin", Key.Enter), ("Up/Down", "choose", Key.CursorDown), ("or its letter", "", Key.Empty), ("Esc", "close", Key.Esc),
    ];

    /// <inheritdoc/>
    protected override int WantedRows(int width) => ActionMenuPainter.RowsOf(ActionList.All, width, ActionList.All.Count - 1).Last + 1;

    /// <inheritdoc/>
    protected override TextCanvas PaintBody(int width, int height) => _scroll.Paint(width, height);

    /// <inheritdoc/>
    protected override void ClickBody(int x, int y)
    {
        if (ActionMenuPainter.ActionAt(ActionList.All, BodyWidth, y + _scroll.Top) is { } at)
        {
            Choose(ActionList.All[at]);
        }
    }

    /// <inheritdoc/>
    protected override void Obey(Key key)
    {
        int last = ActionList.All.Count - 1;
        if (key == Key.Esc)
        {
            App?.RequestStop(this);
        }
        else if (key == Key.Enter)
        {
            Choose(ActionList.All[_selected]);
        }
        else if (ActionList.Of(key.AsRune.Value) is { } action)
        {
            Choose(action);
        }
        else if (key == Key.CursorDown || key == Key.CursorUp || key == Key.Home || key == Key.End)
        {
            _selected = key == Key.Home ? 0 : key == Key.End ? last : Math.Clamp(_selected + (key == Key.CursorDown ? 1 : -1), 0, last);
            (int top, int bottom) = ActionMenuPainter.RowsOf(ActionList.All, BodyWidth, _selected);
            _scroll.Reveal(top, bottom);
            Redraw();
        }
    }

    private void Choose(DashboardAction action)
    {
        Chosen = action;
        App?.RequestStop(this);
    }
}
