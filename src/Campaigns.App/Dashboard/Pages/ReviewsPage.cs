using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Dashboard.Screen;
using Campaigns.Domain;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;

namespace Campaigns.App.Dashboard.Pages;

/// <summary>Which experiment survived in which review; what was gained and lost between two of them, and why.</summary>
public sealed class ReviewsPage : TwoPartPage
{
    private const int CaptionRows = 2;
    private static readonly TimeSpan Standstill = TimeSpan.FromMilliseconds(250);
    private readonly ReviewsModel _reviews;
    private readonly CanvasView _caption;
    private int _first;
    private (int, int)? _awaited;

    /// <summary>Makes the page.</summary>
    /// <param name="context">What it shows, and with what.</param>
    public ReviewsPage(PageContext context)
        : base(context)
    {
        _reviews = new ReviewsModel(Model);
        _caption = Part(PaintCaption);
        (_caption.Width, _caption.Height) = (Dim.Fill(), CaptionRows);
        Add(_caption);
    }

    /// <inheritdoc/>
    public override IReadOnlyList<(string Key, string Does)> Keys =>
        [("Left/Right", "review"), ("v", "new"), ("h", _reviews.Held is null ? "hold" : "let go"), ("c", _reviews.ShowsAll ? "changed" : "all"), TurnKeys, ("F1", "help"), ("q", "quit"), ("Enter", "experiment"), ("Space", "more text"), ("F5", "reload")];

    /// <inheritdoc/>
    public override IReadOnlyList<(string Key, string Does)> Help =>
    [
        .. MovingHelp,
        ("Left Right", "the review before and after (or click its column); it stands in brackets"),
        ("h", "hold the review at hand, so that the one you go to is compared with it; h there again or Esc lets it go"),
        ("c", "all experiments, or only those that changed: they survive in one review and not in another"),
        ("Enter", "turn to the selected experiment as it stands today"),
        ("v", "take a new review"),
        (ListPainter.SurvivalText(true, Glyphs), "survived in that review"),
        (ListPainter.SurvivalText(false, Glyphs), "did not survive"),
        (ListPainter.SurvivalText(null, Glyphs), "no line in that review: it had no result that counted then (not tested, awaiting a new test, or withdrawn)"),
        (Glyphs.Marked + " behind a number", "the review that is held"),
        ("survive, tested, family", "survivors, experiments with a result, and hypotheses counted, as the review found them"),
        (Glyphs.Warns + " behind a family", "an interim review: it counted tested experiments only"),
        ("+ -", "gained, lost"),
    ];

    /// <inheritdoc/>
    protected override int RowsAbove => CaptionRows;

    /// <inheritdoc/>
    protected override int HeaderRows => ReviewMatrix.HeaderRows;

    /// <inheritdoc/>
    protected override int RowCount => _reviews.Rows.Count;

    /// <inheritdoc/>
    protected override int Row => _reviews.Row;

    /// <inheritdoc/>
    protected override string Subject => FormattableString.Invariant($"{Model.Standing.Campaign.Code} {Model.Edition} {_reviews.Review} {_reviews.Held}");

    /// <inheritdoc/>
    public override bool Back()
    {
        bool isBack = base.Back() || _reviews.LetGo();
        ShowChange();
        return isBack;
    }

    /// <inheritdoc/>
    protected override int ListRows(int room) => Math.Min(HeaderRows + Math.Max(1, RowCount), Math.Max(HeaderRows + 3, room * 3 / 5));

    /// <inheritdoc/>
    protected override int ListWidth(int width) => Math.Clamp(width / 2, 60, 90);

    /// <inheritdoc/>
    protected override void Select(int row) => _reviews.Select(row);

    /// <inheritdoc/>
    protected override TextCanvas PaintList(int top, int width, int height)
    {
        return ReviewMatrix.Paint(_reviews, FirstReview(width), top, width, height, Glyphs);
    }

    /// <inheritdoc/>
    protected override TextCanvas PaintText(int width)
    {
        bool isSlow = _reviews.IsComparisonSlow;
        if (isSlow)
        {
            AwaitStandstill();
        }

        return ReviewSheet.Paint(_reviews, Model.Standing.Campaign.Code, isSlow, width, Glyphs);
    }

    /// <inheritdoc/>
    protected override void Open()
    {
        string code = _reviews.Rows[_reviews.Row].Code;
        IReadOnlyList<ExperimentResult> experiments = Model.Standing.Experiments;
        for (int i = 0; i < experiments.Count; i++)
        {
            if (experiments[i].Plan.Code == code)
            {
                Model.SelectPosition(i);
                Model.TurnTo(PageList.PlaceOf("Experiments"));
                return;
            }
        }
    }

    /// <inheritdoc/>
    protected override void ClickHeader(int x, int y)
    {
        if (ReviewMatrix.ReviewAt(_reviews, _first, List.Frame.Width, x) is { } review)
        {
            _reviews.GoTo(review);
        }
    }

    /// <inheritdoc/>
    protected override bool Obey(Key key)
    {
        if (key == Key.CursorLeft || key == Key.CursorRight)
        {
            _reviews.GoTo(_reviews.Review + (key == Key.CursorRight ? 1 : -1));
            return true;
        }

        if (key == Key.H)
        {
            _reviews.Hold();
        }
        else if (key == Key.C)
        {
            _reviews.ShowAll();
            Arrange();
        }
        else
        {
            return false;
        }

        SuperView?.SetNeedsDraw();
        return true;
    }

    private TextCanvas PaintCaption(int width, int height)
    {
        TextCanvas canvas = new(width, height);
        if (_reviews.Review < 0)
        {
            canvas.Write(1, 0, CellText.Fit("No review was taken yet.", width - 1, Glyphs.Cut), Ink.Open);
            return canvas;
        }

        string rows = _reviews.ShowsAll
            ? FormattableString.Invariant($"all {_reviews.Experiments.Count} experiments, {_reviews.ChangedCount} of them changed over the reviews")
            : FormattableString.Invariant($"{_reviews.ChangedCount} of {_reviews.Experiments.Count} experiments changed over the reviews");
        int room = ReviewMatrix.Room(_reviews, List.Frame.Width), first = FirstReview(List.Frame.Width), all = _reviews.Reviews.Count;
        string columns = room >= all ? "" : FormattableString.Invariant($"; reviews {first + 1} to {Math.Min(all, first + room)} of {all}");
        canvas.Write(1, 0, CellText.Fit(rows + columns, width - 1, Glyphs.Cut), Ink.Quiet);
        string selected = _reviews.Row < 0 ? "" : ReviewSheet.Line(_reviews.Rows[_reviews.Row], _reviews.Reviews[_reviews.Review].Head, _reviews.Review, Glyphs);
        canvas.Write(1, 1, CellText.Fit(selected, width - 1, Glyphs.Cut), Ink.Heading);
        return canvas;
    }

    private int FirstReview(int width) => _first = RowWindow.Follow(_first, Math.Max(0, _reviews.Review), _reviews.Reviews.Count, ReviewMatrix.Room(_reviews, width));

    // Who walks along the reviews is not kept waiting for comparisons that nobody reads.
    private void AwaitStandstill()
    {
        (int, int)? pair = _reviews.Compared;
        if (_awaited == pair)
        {
            return;
        }

        _awaited = pair;
        App?.AddTimeout(Standstill, () =>
        {
            if (_awaited == pair)
            {
                _awaited = null;
                if (Visible && _reviews.Compared == pair)
                {
                    _reviews.Comparison();
                    ShowChange();
                }
            }

            return false;
        });
    }
}
