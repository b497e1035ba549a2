using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Dashboard.Screen;
using Campaigns.Domain;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;
using Terminal.Gui.Views;

namespace Campaigns.App.Dashboard.Pages;

/// <summary>The list of experiments and the selected one in full: side by side where there is room, one over the other where there is not.</summary>
public sealed class ExperimentsPage : DashboardPage
{
    /// <summary>From this width on, list and detail stand side by side.</summary>
    public const int SideBySideWidth = 110;

    private const int NarrowestList = 62;
    private const int WidestList = 104;
    private const int NarrowestDetail = 48;
    private const int FilterLabel = 7;
    private const int FilterWidth = 22;
    private const int NoteRows = 2;
    private static readonly TimeSpan Standstill = TimeSpan.FromMilliseconds(250);

    private readonly Label _filterName = new() { Text = "filter", Width = FilterLabel };
    private readonly TextBox _filter = new() { X = FilterLabel, Width = FilterWidth };
    private readonly CanvasView _caption;
    private readonly CanvasView _list;
    private readonly CanvasView _note;
    private readonly CanvasView _marks;
    private readonly CanvasView _divider;
    private readonly CanvasView _detail;
    private readonly ScrollPane _scroll;
    private readonly Dictionary<Key, Action> _listKeys;
    private CampaignStanding? _measured;
    private ListLayout? _layout;
    private int _top;
    private int _listHeight = 1;
    private int _detailOf = -1;
    private int _awaited = -1;
    private bool _isDetailOpen;
    private bool _hasMarks;

    /// <summary>Makes the page.</summary>
    /// <param name="context">What it shows, and with what.</param>
    public ExperimentsPage(PageContext context)
        : base(context)
    {
        _scroll = new ScrollPane(PaintDetail);
        _caption = Part(PaintCaption);
        _list = Part(PaintList, takesKeys: true, () => Model.SelectedRow < 0 ? null : Model.SelectedRow - _top + ListPainter.HeaderRows);
        _note = Part(PaintNote);
        _marks = Part((width, height) => MarksPainter.Paint(Model.Marks, width, height, Glyphs));
        _divider = Part(PaintDivider);
        _detail = Part(_scroll.Paint, takesKeys: true);
        Add(_filterName, _filter, _caption, _list, _marks, _note, _divider, _detail);
        _listKeys = new()
        {
            [Key.CursorDown] = () => Model.Select(Model.SelectedRow + 1),
            [Key.CursorUp] = () => Model.Select(Model.SelectedRow - 1),
            [Key.PageDown] = () => Model.Select(Model.SelectedRow + _listHeight),
            [Key.PageUp] = () => Model.Select(Model.SelectedRow - _listHeight),
            [Key.Home] = () => Model.Select(0),
            [Key.End] = () => Model.Select(Model.RowCount - 1),
            [Key.Enter] = OpenDetail,
            [Key.S] = () => Model.SortByNeighbour(1),
            [Key.S.WithShift] = () => Model.SortByNeighbour(-1),
            [Key.R] = () => Model.SortBy(Model.SortColumn),
            [Key.M] = Model.MarkSelected,
            [Key.M.WithShift] = Model.MarkShown,
        };
        _filter.ValueChanged += (_, e) => Model.SetFilter(e.NewValue ?? "");
        _list.Clicked += ClickList;
        _list.Wheeled += rows => Model.Select(Model.SelectedRow + rows);
        _detail.Clicked += (_, _) => _detail.SetFocus();
        _detail.Wheeled += ScrollDetail;
        Model.Changed += FollowModel;
        FrameChanged += (_, _) => Arrange();
        Arrange();
    }

    /// <inheritdoc/>
    public override IReadOnlyList<(string Key, string Does)> Keys => _isDetailOpen
        ? [("Esc", "list"), ("Up/Down", "scroll"), ("Left/Right", "previous/next"), ("m", "mark"), ("F1", "help"), ("q", "quit")]
        : [("Enter", "detail"), ("/", "filter"), ("s", "sort"), ("r", "reverse"), ("m", "mark"), TurnKeys, ("F1", "help"), ("q", "quit"), ("F5", "reload")];

    /// <inheritdoc/>
    public override IReadOnlyList<(string Key, string Does)> Help =>
    [
        ("Up Down PgUp PgDn", "move in the list, scroll an open experiment"),
        ("Home End", "first, last"),
        ("Enter", "open the selected experiment; Enter or Esc closes it"),
        ("Left Right", "in an open experiment the one before and after"),
        ("s, Shift+s", "sort by the next column, by the one before (or click a column's name)"),
        ("r", "reverse the order"),
        ("m", "mark the selected experiment, or take its mark off; below the list, at most how many of the marked are false"),
        ("Shift+m", "mark all rows shown, or take their marks off"),
        ("/ or F3", "type a filter; Enter or Esc goes back to the list, Esc once more takes it off"),
        ("gloss primer", "as a filter: both words in code, title, response or status"),
        ("p<0.01 adjusted<=0.05", "also n, groups, statistic, with < <= > >= ="),
        ("survives:yes", "or survives:no, survives:open"),
        (ListPainter.SurvivalText(true, Glyphs), "survives: its adjusted p-value is at most the level"),
        (ListPainter.SurvivalText(false, Glyphs), "does not survive"),
        (ListPainter.SurvivalText(null, Glyphs), "has no result (the status says why) and counts as p = 1 in the family"),
        ("! behind a status", "what happened after the test, or not as planned, is told in the experiment's detail"),
        (Glyphs.Marked + " behind a code", "marked by you: " + MarksPainter.Meaning),
        ("numbers", "p with four decimals, below 0.0001 as 3.2e-7; others with four significant digits"),
    ];

    /// <inheritdoc/>
    public override View Entrance => _isDetailOpen ? _detail : _list;

    private bool IsWide => Frame.Width >= SideBySideWidth;

    private int ListWidth => IsWide ? Math.Clamp(Frame.Width - NarrowestDetail, NarrowestList, WidestList) : Frame.Width;

    /// <inheritdoc/>
    public override bool Back()
    {
        if (_filter.HasFocus)
        {
            _list.SetFocus();
        }
        else if (_isDetailOpen)
        {
            _isDetailOpen = false;
            Arrange();
            _list.SetFocus();
            ShowChange();
        }
        else if (Model.FilterText.Length > 0)
        {
            _filter.Text = "";
        }
        else
        {
            return false;
        }

        return true;
    }

    /// <inheritdoc/>
    protected override bool OnKeyDown(Key key)
    {
        if (_filter.HasFocus)
        {
            return ObeyInFilter(key);
        }

        if (key == new Key('/') || key == Key.F3)
        {
            _isDetailOpen = false;
            Arrange();
            _filter.SetFocus();
            return true;
        }

        if (_isDetailOpen || _detail.HasFocus)
        {
            return ObeyInDetail(key);
        }

        if (_listKeys.TryGetValue(key, out Action? action))
        {
            action();
            return true;
        }

        return false;
    }

    /// <inheritdoc/>
    protected override void Dispose(bool disposing)
    {
        if (disposing)
        {
            Model.Changed -= FollowModel;
        }

        base.Dispose(disposing);
    }

    private bool ObeyInFilter(Key key)
    {
        if (key == Key.Enter)
        {
            _list.SetFocus();
            return true;
        }

        if (key == Key.CursorDown || key == Key.CursorUp || key == Key.PageDown || key == Key.PageUp)
        {
            _listKeys[key]();
            return true;
        }

        return false;
    }

    private bool ObeyInDetail(Key key)
    {
        if (key == Key.CursorLeft || key == Key.CursorRight)
        {
            Model.Select(Model.SelectedRow + (key == Key.CursorRight ? 1 : -1));
            return true;
        }

        if (key == Key.Enter)
        {
            return Back();
        }

        if (key == Key.M)
        {
            Model.MarkSelected();
            return true;
        }

        bool isScrolled = _scroll.Obey(key);
        ShowChange();
        return isScrolled;
    }

    private void OpenDetail()
    {
        if (Model.Selected is not null)
        {
            _isDetailOpen = true;
            _scroll.ToTop();
            Arrange();
            _detail.SetFocus();
            ShowChange();
        }
    }

    private void ScrollDetail(int lines)
    {
        _scroll.Move(lines);
        _detail.SetNeedsDraw();
    }

    private void ClickList(int x, int y)
    {
        _list.SetFocus();
        if (y < ListPainter.HeaderRows)
        {
            if (ListPainter.ColumnAt(Columns(), _list.Frame.Width, x) is { } column)
            {
                Model.SortBy(column);
            }
        }
        else if (_top + y - ListPainter.HeaderRows is var row && row < Model.RowCount)
        {
            if (row == Model.SelectedRow)
            {
                OpenDetail();
            }

            Model.Select(row);
        }
    }

    // A filter may also be taken off by the model itself, and the first mark takes room from the list.
    private void FollowModel()
    {
        if (_hasMarks != Model.Marks.Count > 0)
        {
            Arrange();
        }

        if (_filter.Text != Model.FilterText)
        {
            _filter.Text = Model.FilterText;
        }
    }

    private void Arrange()
    {
        bool isListShown = IsWide || !_isDetailOpen;
        foreach (View part in new View[] { _filterName, _filter, _caption, _list })
        {
            part.Visible = isListShown;
        }

        _hasMarks = Model.Marks.Count > 0;
        _marks.Visible = isListShown && _hasMarks;
        _note.Visible = !IsWide && isListShown;
        _divider.Visible = IsWide;
        _detail.Visible = IsWide || _isDetailOpen;
        int captionX = FilterLabel + FilterWidth + 1;
        (_caption.X, _caption.Width, _caption.Height) = (captionX, Math.Max(0, ListWidth - captionX), 1);
        int below = IsWide ? 0 : NoteRows;
        int marks = _hasMarks ? MarksPainter.Rows : 0;
        (_list.Y, _list.Width, _list.Height) = (1, ListWidth - (IsWide ? 1 : 0), Dim.Fill(below + marks));
        (_marks.Y, _marks.Width, _marks.Height) = (Pos.AnchorEnd(below + MarksPainter.Rows), ListWidth, MarksPainter.Rows);
        (_note.Y, _note.Width, _note.Height) = (Pos.AnchorEnd(NoteRows), Dim.Fill(), NoteRows);
        (_divider.X, _divider.Width, _divider.Height) = (ListWidth, 1, Dim.Fill());
        (_detail.X, _detail.Width, _detail.Height) = (IsWide ? ListWidth + 2 : 1, Dim.Fill(), Dim.Fill());
    }

    private ListLayout Columns()
    {
        if (_layout is null || _measured != (object)Model.Standing)
        {
            (_measured, _layout) = (Model.Standing, new ListLayout(Model.Standing.Experiments));
        }

        return _layout;
    }

    private TextCanvas PaintList(int width, int height)
    {
        _listHeight = Math.Max(1, height - ListPainter.HeaderRows);
        _top = RowWindow.Follow(_top, Model.SelectedRow, Model.RowCount, _listHeight);
        return ListPainter.Paint(Model, Columns(), _top, width, height, Glyphs);
    }

    private TextCanvas PaintCaption(int width, int height)
    {
        TextCanvas canvas = new(width, height);
        bool isProblem = Model.FilterProblem is not null;
        canvas.Write(0, 0, CellText.Fit(Model.FilterProblem ?? ListPainter.Caption(Model), width, Glyphs.Cut), isProblem ? Ink.Warning : Ink.Quiet);
        return canvas;
    }

    private TextCanvas PaintNote(int width, int height) => SelectedNote.Paint(Model.Selected, width, height, Glyphs);

    private TextCanvas PaintDivider(int width, int height)
    {
        TextCanvas canvas = new(width, height);
        for (int y = 0; y < height; y++)
        {
            canvas.Put(0, y, Glyphs.Upright, _detail.HasFocus ? Ink.Heading : Ink.Axis);
        }

        return canvas;
    }

    private TextCanvas PaintDetail(int width)
    {
        if (_detailOf != Model.SelectedPosition)
        {
            _detailOf = Model.SelectedPosition;
            _scroll.ToTop();
        }

        if (Model.IsSelectedDetailSlow)
        {
            AwaitStandstill();
            return DetailPainter.PaintBefore(Model.Selected!, Model.Heading, Math.Max(20, width), Glyphs);
        }

        bool hadFailed = Model.Watch.HasFailed;
        ExperimentDetail? shown = Model.SelectedDetail();
        if (Model.Watch.HasFailed && !hadFailed)
        {
            AnnounceAfterDrawing();
        }

        if (shown is { } detail)
        {
            return DetailPainter.Paint(detail, Model.Standing, Model.Heading, Math.Max(20, width), Glyphs);
        }

        TextCanvas canvas = new(width, 1);
        canvas.Write(0, 0, Model.Watch.Sentence ?? "No experiment is selected.", Ink.Quiet);
        return canvas;
    }

    // Who pages through the list is not kept waiting for details that nobody reads.
    private void AwaitStandstill()
    {
        int position = Model.SelectedPosition;
        if (_awaited == position)
        {
            return;
        }

        _awaited = position;
        App?.AddTimeout(Standstill, () =>
        {
            if (_awaited == position)
            {
                _awaited = -1;
                if (Model.SelectedPosition == position && _detail.Visible)
                {
                    Model.SelectedDetail();
                    Model.Announce();
                }
            }

            return false;
        });
    }
}
