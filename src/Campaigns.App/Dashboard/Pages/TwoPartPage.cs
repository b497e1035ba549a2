using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Screen;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;

namespace Campaigns.App.Dashboard.Pages;

/// <summary>A page with a list, and a text on what the list's keys point at: side by side where there is room, the list above the text where there is not.</summary>
public abstract class TwoPartPage : DashboardPage
{
    /// <summary>From this width on, list and text stand side by side.</summary>
    protected const int SideBySideWidth = 110;

    private readonly CanvasView _divider;
    private readonly ScrollPane _scroll;
    private readonly Dictionary<Key, Action> _listKeys;
    private string _about = "";
    private int _top;
    private int _room = 1;

    /// <summary>Makes the page.</summary>
    /// <param name="context">What it shows, and with what.</param>
    protected TwoPartPage(PageContext context)
        : base(context)
    {
        _scroll = new ScrollPane(PaintTextFromTop);
        List = Part(PaintListInView, takesKeys: true, () => Row < 0 ? null : Row - _top + HeaderRows);
        _divider = Part(PaintDivider);
        Sheet = Part(_scroll.Paint, takesKeys: true);
        Add(List, _divider, Sheet);
        _listKeys = new()
        {
            [Key.CursorDown] = () => Go(Row + 1),
            [Key.CursorUp] = () => Go(Row - 1),
            [Key.PageDown] = () => Go(Row + _room),
            [Key.PageUp] = () => Go(Row - _room),
            [Key.Home] = () => Go(0),
            [Key.End] = () => Go(RowCount - 1),
            [Key.Space] = PageText,
        };
        List.Clicked += ClickList;
        List.Wheeled += rows => Go(Row + rows);
        Sheet.Clicked += (_, _) => Sheet.SetFocus();
        Sheet.Wheeled += lines =>
        {
            _scroll.Move(lines);
            ShowChange();
        };
        FrameChanged += (_, _) => Arrange();
        VisibleChanged += (_, _) => Arrange();
    }

    /// <inheritdoc/>
    public override View Entrance => List;

    /// <summary>The list.</summary>
    protected CanvasView List { get; }

    /// <summary>The text.</summary>
    protected CanvasView Sheet { get; }

    /// <summary>What moves in list and text, for the help page.</summary>
    protected static IReadOnlyList<(string Key, string Does)> MovingHelp =>
    [
        ("Up Down PgUp PgDn", "move in the list"),
        ("Home End", "first, last"),
        ("Space", "the text a page further; after its end, from its beginning"),
        ("Tab", "into the text, where the same keys scroll; Esc goes back to the list"),
    ];

    /// <summary>Whether list and text stand side by side.</summary>
    protected virtual bool IsBeside => Frame.Width >= SideBySideWidth;

    /// <summary>Rows above both.</summary>
    protected abstract int RowsAbove { get; }

    /// <summary>Rows of column names in the list.</summary>
    protected abstract int HeaderRows { get; }

    /// <summary>Rows of the list.</summary>
    protected abstract int RowCount { get; }

    /// <summary>The selected row, from 0; -1 where there is none.</summary>
    protected abstract int Row { get; }

    /// <summary>What the text is about: while it stays the same, the text stays where it was scrolled to.</summary>
    protected abstract string Subject { get; }

    /// <summary>Selects a row; beyond the ends the nearest.</summary>
    /// <param name="row">Row from 0.</param>
    protected abstract void Select(int row);

    /// <summary>Rows for the list, its names included, where it stands above the text.</summary>
    /// <param name="room">Rows for both.</param>
    protected virtual int ListRows(int room) => room / 2;

    /// <summary>Cells for the list where it stands beside the text.</summary>
    /// <param name="width">Cells for both.</param>
    protected virtual int ListWidth(int width) => width / 2;

    /// <summary>Paints the list.</summary>
    /// <param name="top">The first row shown, from 0.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="height">Rows.</param>
    protected abstract TextCanvas PaintList(int top, int width, int height);

    /// <summary>Paints the text, as high as it needs.</summary>
    /// <param name="width">Cells across.</param>
    protected abstract TextCanvas PaintText(int width);

    /// <summary>Obeys a key that is the page's own.</summary>
    /// <param name="key">The key.</param>
    /// <returns>Whether it was one.</returns>
    protected abstract bool Obey(Key key);

    /// <summary>A row was clicked; its column names are above.</summary>
    /// <param name="x">Cell from 0.</param>
    /// <param name="y">Row from 0.</param>
    protected virtual void ClickHeader(int x, int y)
    {
    }

    /// <summary>A row that was selected already was clicked again, or Enter pressed on it.</summary>
    protected virtual void Open()
    {
    }

    /// <summary>Selects a row and shows it.</summary>
    /// <param name="row">Row from 0.</param>
    protected void Go(int row)
    {
        Select(row);
        ShowChange();
    }

    /// <inheritdoc/>
    public override bool Back()
    {
        if (Sheet.HasFocus)
        {
            List.SetFocus();
            ShowChange();
            return true;
        }

        return false;
    }

    /// <inheritdoc/>
    protected override bool OnKeyDown(Key key)
    {
        if (Obey(key))
        {
            ShowChange();
            return true;
        }

        if (key == Key.Tab || key == Key.Tab.WithShift)
        {
            (Sheet.HasFocus ? List : Sheet).SetFocus();
            ShowChange();
            return true;
        }

        if (Sheet.HasFocus)
        {
            bool isScrolled = _scroll.Obey(key);
            ShowChange();
            return isScrolled;
        }

        if (key == Key.Enter && Row >= 0)
        {
            Open();
            return true;
        }

        if (_listKeys.TryGetValue(key, out Action? move))
        {
            move();
            return true;
        }

        return false;
    }

    /// <summary>Puts the parts in their places.</summary>
    protected void Arrange()
    {
        int room = Math.Max(0, Frame.Height - RowsAbove);
        if (IsBeside)
        {
            int width = ListWidth(Frame.Width);
            (List.X, List.Y, List.Width, List.Height) = (0, RowsAbove, width, Dim.Fill());
            (_divider.X, _divider.Y, _divider.Width, _divider.Height) = (width, RowsAbove, 1, Dim.Fill());
            (Sheet.X, Sheet.Y, Sheet.Width, Sheet.Height) = (width + 2, RowsAbove, Dim.Fill(), Dim.Fill());
        }
        else
        {
            int rows = Visible ? Math.Clamp(ListRows(room), Math.Min(room, HeaderRows + 1), room) : room / 2;
            (List.X, List.Y, List.Width, List.Height) = (0, RowsAbove, Dim.Fill(), rows);
            (_divider.X, _divider.Y, _divider.Width, _divider.Height) = (0, RowsAbove + rows, Dim.Fill(), 1);
            (Sheet.X, Sheet.Y, Sheet.Width, Sheet.Height) = (1, RowsAbove + rows + 1, Dim.Fill(), Dim.Fill());
        }
    }

    private TextCanvas PaintListInView(int width, int height)
    {
        _room = Math.Max(1, height - HeaderRows);
        _top = RowWindow.Follow(_top, Math.Max(0, Row), RowCount, _room);
        return PaintList(_top, width, height);
    }

    private TextCanvas PaintTextFromTop(int width)
    {
        if (_about != Subject)
        {
            _about = Subject;
            _scroll.ToTop();
        }

        return PaintText(Math.Max(20, width));
    }

    private TextCanvas PaintDivider(int width, int height)
    {
        TextCanvas canvas = new(width, height);
        Ink ink = Sheet.HasFocus ? Ink.Heading : Ink.Axis;
        for (int y = 0; y < height; y++)
        {
            canvas.Repeat(0, y, width, width == 1 ? Glyphs.Upright : Glyphs.Across, ink);
        }

        return canvas;
    }

    private void PageText()
    {
        if (!_scroll.PageDown())
        {
            _scroll.ToTop();
        }

        ShowChange();
    }

    private void ClickList(int x, int y)
    {
        List.SetFocus();
        if (y < HeaderRows)
        {
            ClickHeader(x, y);
        }
        else if (_top + y - HeaderRows is var row && row < RowCount)
        {
            bool isAgain = row == Row;
            Select(row);
            if (isAgain)
            {
                Open();
            }
        }

        ShowChange();
    }
}
