using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Dashboard.Screen;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;

namespace Campaigns.App.Dashboard.Pages;

/// <summary>What the campaign has risked test by test, the standing decisions of an online campaign, and at most how many of the marked experiments are false.</summary>
public sealed class RiskPage : PicturesPage
{
    private const int SideWidth = 62;
    private const int LeastBound = 17;
    private static readonly TimeSpan Pause = TimeSpan.FromMilliseconds(20);
    private readonly RiskModel _risk;
    private readonly CanvasView _curve;
    private readonly CanvasView _bound;
    private readonly CanvasView _words;
    private readonly CanvasView _decisions;
    private readonly ScrollPane _scroll;
    private readonly Awaiter _awaiter;
    private bool _isNear = true;
    private bool _wasOnline;
    private bool _isBeginning;

    /// <summary>Makes the page.</summary>
    /// <param name="context">What it shows, and with what.</param>
    public RiskPage(PageContext context)
        : base(context)
    {
        _risk = new RiskModel(Model);
        _awaiter = new Awaiter(() => App, ShowChange);
        _scroll = new ScrollPane(PaintWords);
        _curve = Part(PaintCurve, takesKeys: true);
        _bound = Part(PaintBound, takesKeys: true);
        _words = Part(_scroll.Paint, takesKeys: true);
        _decisions = Part((width, height) => DecisionsPainter.Paint(_risk, width, height, Glyphs), takesKeys: true);
        Add(_curve, _bound, _words, _decisions);
        _curve.Wheeled += _risk.Walk;
        _curve.Clicked += (x, _) => _risk.GoTo(RiskCurvePlot.TestAt(_risk.Points?.Count ?? 0, _curve.Frame.Width, x));
        _words.Wheeled += ScrollWords;
        _decisions.Wheeled += rows => _risk.GoToDecision(_risk.Decision + rows);
        _decisions.Clicked += (_, y) => _risk.GoToDecision(DecisionsPainter.PlaceAt(_risk, _decisions.Frame.Height, y) ?? _risk.Decision);
        FrameChanged += (_, _) => Arrange();
        Arrange();
    }

    /// <inheritdoc/>
    public override IReadOnlyList<(string Key, string Does)> Keys =>
    [
        IsWords ? ("Up/Down", "scroll") : ("Left/Right", IsDecisions ? "decision" : "test"),
        IsTogether ? ("Up/Down", "words") : ("n", NextView),
        ("m", "mark"), ("Shift+m", "survivors"), ("z", _isNear ? "all" : "near"), ("F1", "help"), ("q", "quit"), ("Enter", "experiment"), TurnKeys,
    ];

    /// <inheritdoc/>
    public override IReadOnlyList<(string Key, string Does)> Help =>
    [
        ("Left Right", "the test before and after in the order of testing (or click in the picture, or turn the wheel)"),
        ("PgUp PgDn Home End", "a twentieth of the tests, first, last"),
        ("m", "mark the experiment pointed at, or take its mark off; the bound changes at once"),
        ("Shift+m", "mark every survivor, or take their marks off"),
        ("Enter", "the experiment pointed at, in full"),
        ("n, Shift+n", "on small screens the next picture: risk, marked, words, decisions"),
        ("z", "bounds of the smallest p-values up to twice the survivors, or of all"),
        ("Up Down", "scroll the words; in the decisions, the one before and after"),
        ($"{Glyphs.Mean} {Glyphs.Survivor}", "the risk of at least one false positive without and with the correction, if nothing is real"),
        ("marked", MarksPainter.Meaning),
    ];

    /// <inheritdoc/>
    protected override IReadOnlyList<CanvasView> Pictures => [_curve, _bound, _words, _decisions];

    /// <inheritdoc/>
    protected override int ViewCount => _risk.IsOnline ? 4 : 3;

    /// <inheritdoc/>
    protected override IReadOnlyList<string> ViewNames => ["risk", "marked", "words", "decisions"];

    private bool IsWords => !IsTogether && View == 2;

    private bool IsDecisions => !IsTogether && View == 3;

    /// <inheritdoc/>
    protected override bool OnKeyDown(Key key)
    {
        bool isScroll = IsWords || (IsTogether && (key == Key.CursorUp || key == Key.CursorDown));
        if (isScroll && _scroll.Obey(key))
        {
            ShowChange();
            return true;
        }

        return base.OnKeyDown(key);
    }

    /// <inheritdoc/>
    protected override Dictionary<Key, Action> KeysOf() => new()
    {
        [Key.CursorRight] = () => Walk(1),
        [Key.CursorLeft] = () => Walk(-1),
        [Key.CursorDown] = () => Walk(1),
        [Key.CursorUp] = () => Walk(-1),
        [Key.PageDown] = () => Walk(Leap),
        [Key.PageUp] = () => Walk(-Leap),
        [Key.Home] = () => Walk(-Model.Standing.Experiments.Count),
        [Key.End] = () => Walk(Model.Standing.Experiments.Count),
        [Key.M] = Model.MarkSelected,
        [Key.M.WithShift] = Model.MarkSurvivors,
        [Key.Enter] = () => Model.TurnTo(PageList.PlaceOf("Experiments")),
        [Key.N] = () => TurnView(1),
        [Key.N.WithShift] = () => TurnView(-1),
        [Key.Z] = () =>
        {
            _isNear = !_isNear;
            ShowAll();
        },
    };

    private int Leap => Math.Max(10, (_risk.Points?.Count ?? 0) / 20);

    private void Walk(int steps)
    {
        if (IsDecisions)
        {
            _risk.GoToDecision(_risk.Decision + steps);
        }
        else
        {
            _risk.Walk(steps);
        }
    }

    private void ScrollWords(int lines)
    {
        _scroll.Move(lines);
        _words.SetNeedsDraw();
    }

    // The next campaign may be decided otherwise.
    /// <inheritdoc/>
    protected override void Follow()
    {
        if (_wasOnline != _risk.IsOnline)
        {
            Arrange();
        }
    }

    /// <inheritdoc/>
    protected override void Arrange()
    {
        _wasOnline = _risk.IsOnline;
        int left = Frame.Width - SideWidth - 1, half = Frame.Height / 2;
        int bound = _risk.IsOnline ? Math.Max(LeastBound, half + 4) : Frame.Height;
        Place(_curve, 0, 0, 0, left, half + 2);
        Place(_words, 2, 0, half + 3, left, Frame.Height - half - 3);
        Place(_bound, 1, left + 1, 0, SideWidth, bound);
        Place(_decisions, 3, left + 1, bound, SideWidth, Frame.Height - bound);
        _decisions.Visible &= _risk.IsOnline;
    }

    private void Place(CanvasView part, int view, int x, int y, int width, int height)
    {
        part.Visible = IsTogether || View == view;
        (part.X, part.Y) = IsTogether ? (x, y) : (0, 0);
        part.Width = IsTogether ? Math.Max(0, width) : Dim.Fill();
        part.Height = IsTogether ? Math.Max(0, height) : Dim.Fill();
    }

    // Of a large campaign the page is shown first: what it reads and reckons comes in steps, none of which keeps the keys waiting.
    private void Begin()
    {
        if (_risk.IsBegun)
        {
            _awaiter.Await(() => _risk.IsDone);
        }
        else if (_risk.IsLarge && App is { } app)
        {
            _ = _isBeginning ? null : app.AddTimeout(Pause, BeginNow);
            _isBeginning = true;
        }
        else
        {
            _risk.Begin();
        }
    }

    private bool BeginNow()
    {
        _isBeginning = false;
        _risk.Begin();
        ShowChange();
        return false;
    }

    private TextCanvas PaintBound(int width, int height)
    {
        Begin();
        return _risk.IsBegun ? BoundPainter.Paint(Model.Marks, Model.Ranking, _isNear, width, height, Glyphs, IsTogether ? -1 : Model.SelectedPosition) : OneLine("The bounds are reckoned in a moment.", width, Ink.Open);
    }

    private TextCanvas PaintCurve(int width, int height)
    {
        Begin();
        return RiskCurvePlot.Paint(_risk.Points, _risk.Test, width, height, Glyphs);
    }

    private TextCanvas PaintWords(int width)
    {
        if (_risk.Risk is not { } reckoning)
        {
            return OneLine($"This program knows no correction named {Model.Standing.Campaign.Correction}: what it holds cannot be said here.", width, Ink.Warning);
        }

        Begin();
        return reckoning.Result is { } risk ? RiskWordsPainter.Paint(Model.Standing, risk, width) : OneLine("The words are reckoned in a moment.", width, Ink.Open);
    }

    private TextCanvas OneLine(string text, int width, Ink ink)
    {
        TextCanvas canvas = new(width, 1);
        canvas.Write(1, 0, CellText.Fit(text, width - 1, Glyphs.Cut), ink);
        return canvas;
    }
}
