using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Dashboard.Screen;
using Campaigns.Statistics.Corrections;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;

namespace Campaigns.App.Dashboard.Pages;

/// <summary>The ranked p-values of a family beside the boundaries of several corrections, a level to look at, the p-values in bars, and every correction side by side.</summary>
public sealed class RankingPage : PicturesPage
{
    private const int SideWidth = 48;
    private const int LeastHistogram = 9;
    private const int LeastCorrections = 19;
    private const int MostFamilies = 7;
    private readonly RankingModel _ranking;
    private readonly CanvasView _above;
    private readonly CanvasView _plot;
    private readonly CanvasView _onLevel;
    private readonly CanvasView _ruler;
    private readonly CanvasView _below;
    private readonly CanvasView _histogram;
    private readonly CanvasView _corrections;
    private readonly CanvasView _families;
    private readonly Awaiter _awaiter;
    private bool _isNear;
    private (int Families, int View, bool IsLevelSaid) _arranged;

    /// <summary>Makes the page.</summary>
    /// <param name="context">What it shows, and with what.</param>
    public RankingPage(PageContext context)
        : base(context)
    {
        _ranking = new RankingModel(Model);
        _awaiter = new Awaiter(() => App, ShowChange);
        _above = Part((width, _) => RankingNotes.PaintAbove(_ranking, Procedure, width, Glyphs));
        _plot = Part(PaintPlot, takesKeys: true);
        _onLevel = Part((width, _) => RankingNotes.PaintOnLevel(_ranking, width, Glyphs));
        _ruler = Part((width, _) => LevelRuler.Paint(_ranking, width, Glyphs));
        _below = Part((width, _) => RankingNotes.PaintBelow(_ranking, Model.Selected, width, Glyphs));
        _histogram = Part((width, height) => HistogramPainter.Paint(_ranking.Histogram, width, height, Glyphs), takesKeys: true);
        _corrections = Part(PaintCorrections, takesKeys: true);
        _families = Part((width, height) => FamiliesPainter.Paint(_ranking, width, height, Glyphs), takesKeys: true);
        Add(_above, _plot, _onLevel, _ruler, _below, _histogram, _corrections, _families);
        _plot.Wheeled += Walk;
        _plot.Clicked += (x, _) => SelectRank(RankingPlot.RankAt(_ranking.Ranking, _isNear, _plot.Frame.Width, x));
        _ruler.Clicked += (x, _) => LookAt(LevelRuler.LevelAt(_ranking, _ruler.Frame.Width, x));
        _ruler.Wheeled += rows => MoveLevel(rows > 0 ? -1 : 1);
        _corrections.Clicked += (_, y) => TurnRow(y - CorrectionsPainter.HeaderRows);
        _families.Clicked += (_, y) => TurnFamily((FamiliesPainter.PlaceAt(_ranking, _families.Frame.Height, y) ?? _ranking.FamilyPlace) - _ranking.FamilyPlace);
        FrameChanged += (_, _) => Arrange();
        Arrange();
    }

    /// <inheritdoc/>
    public override IReadOnlyList<(string Key, string Does)> Keys =>
    [
        ("Left/Right", "rank"), ("+ -", "level"),
        .. IsTogether ? Array.Empty<(string, string)>() : [("n", NextView)],
        .. HasFamilies ? [("f", "family")] : Array.Empty<(string, string)>(),
        ("c b", "boundaries"), ("z", _isNear ? "whole" : "near"), ("m", "mark"), ("F1", "help"), ("q", "quit"), ("Enter", "experiment"), TurnKeys,
    ];

    /// <inheritdoc/>
    public override IReadOnlyList<(string Key, string Does)> Help =>
    [
        ("Left Right", "the rank before and after (or click in the picture, or turn the wheel)"),
        ("PgUp PgDn Home End", "a twentieth of the ranks, first, last"),
        ("Enter", "the experiment at this rank"),
        ("z", "the whole family, or near the boundary"),
        ("+ -", "look at a higher or lower level (or click on the row of levels): " + RankingNotes.NothingStored + "; Esc goes back to the sealed one"),
        ($"{Glyphs.Gained} {Glyphs.Lost}", "at the level that is looked at: would survive and does not, and the other way round"),
        ("n, Shift+n", "on small screens the next picture: boundaries, bars, corrections, families"),
        ("f, Shift+f", "the next family of the plan, the one before"),
        ("c, Shift+c", "point at the next correction, the one before; b draws its boundary with its letter or takes it off"),
        ("m", "mark the experiment at this rank, or take its mark off"),
        ("bars", "the p-values of all tested experiments; the line is what true nulls alone would give, by Storey's estimate of their share (2002)"),
    ];

    /// <inheritdoc/>
    protected override IReadOnlyList<CanvasView> Pictures => [_plot, _histogram, _corrections, _families];

    /// <inheritdoc/>
    protected override int ViewCount => HasFamilies ? 4 : 3;

    /// <inheritdoc/>
    protected override IReadOnlyList<string> ViewNames => ["ranking", "bars", "corrections", "families"];

    private ErrorProcedure? Procedure => _ranking.Standing.Families.Count > 1 ? Model.Find(_ranking.Family.Correction) : Model.Correction;

    private bool HasFamilies => Model.Standing.Families.Count > 1;

    private (int Families, int View, bool IsLevelSaid) State => (Model.Standing.Families.Count, View, _ranking.Exploration is not null || _ranking.WhyNoExploration is not null);

    /// <inheritdoc/>
    public override bool Back()
    {
        if (_ranking.Exploration is null)
        {
            return false;
        }

        LookAt(Model.Standing.Campaign.Level.Value);
        return true;
    }

    /// <inheritdoc/>
    protected override Dictionary<Key, Action> KeysOf() => new()
    {
        [Key.CursorRight] = () => Walk(1),
        [Key.CursorDown] = () => Walk(1),
        [Key.CursorLeft] = () => Walk(-1),
        [Key.CursorUp] = () => Walk(-1),
        [Key.PageDown] = () => Walk(Math.Max(10, _ranking.Ranking.Count / 20)),
        [Key.PageUp] = () => Walk(-Math.Max(10, _ranking.Ranking.Count / 20)),
        [Key.Home] = () => SelectRank(1),
        [Key.End] = () => SelectRank(_ranking.Ranking.Count),
        [Key.Enter] = () => Model.TurnTo(PageList.PlaceOf("Experiments")),
        [Key.M] = Model.MarkSelected,
        [Key.Z] = () =>
        {
            _isNear = !_isNear;
            ShowAll();
        },
        [new Key('+')] = () => MoveLevel(1),
        [new Key('=')] = () => MoveLevel(1),
        [new Key('-')] = () => MoveLevel(-1),
        [Key.N] = () => TurnView(1),
        [Key.N.WithShift] = () => TurnView(-1),
        [Key.F] = () => TurnFamily(1),
        [Key.F.WithShift] = () => TurnFamily(-1),
        [Key.C] = () => Point(1),
        [Key.C.WithShift] = () => Point(-1),
        [Key.B] = () =>
        {
            _ranking.TurnPointed();
            ShowChange();
        },
    };

    private void Walk(int ranks) => SelectRank(_ranking.Rank + ranks);

    private void SelectRank(int rank)
    {
        if (_ranking.Ranking is { Count: > 0 } ranking)
        {
            Model.SelectPosition(ranking.PositionAt(Math.Clamp(rank, 1, ranking.Count)));
        }
    }

    private void MoveLevel(int steps)
    {
        _ranking.MoveLevel(steps);
        ShowLevel();
    }

    private void LookAt(double? level)
    {
        if (level is { } given)
        {
            _ranking.LookAt(given);
            ShowLevel();
        }
    }

    private void TurnFamily(int step)
    {
        if (HasFamilies)
        {
            _ranking.TurnFamily(step);
            ShowChange();
        }
    }

    private void Point(int step)
    {
        if (!IsTogether && View != 2)
        {
            ShowView(2);
        }
        else
        {
            _ranking.Point(step);
        }

        ShowAll();
    }

    private void TurnRow(int row)
    {
        if (row >= 0 && row < _ranking.Rows.Count)
        {
            _ranking.PointAt(row);
            _ranking.TurnPointed();
            ShowChange();
        }
    }

    // Another campaign may have families where the last one had none.
    /// <inheritdoc/>
    protected override void Follow()
    {
        if (_arranged != State)
        {
            Arrange();
        }
    }

    // What a level changes is said in lines that the picture gives up.
    private void ShowLevel()
    {
        Follow();
        ShowAll();
    }

    /// <inheritdoc/>
    protected override void Arrange()
    {
        _arranged = State;
        int left = IsTogether ? Frame.Width - SideWidth - 1 : Frame.Width;
        foreach (CanvasView part in new[] { _above, _plot, _onLevel, _ruler, _below })
        {
            part.Visible = IsTogether || View == 0;
            part.Width = left;
        }

        int above = RankingNotes.RowsAbove(HasFamilies);
        _above.Height = above;
        const int Ruler = RankingNotes.RowsBelow + 1, Level = Ruler + RankingNotes.RowsOnLevel;
        (_plot.Y, _plot.Height) = (above, Dim.Fill(State.IsLevelSaid ? Level : Ruler));
        (_onLevel.Y, _onLevel.Height) = (Pos.AnchorEnd(Level), RankingNotes.RowsOnLevel);
        _onLevel.Visible &= State.IsLevelSaid;
        (_ruler.Y, _ruler.Height) = (Pos.AnchorEnd(Ruler), 1);
        (_below.Y, _below.Height) = (Pos.AnchorEnd(RankingNotes.RowsBelow), RankingNotes.RowsBelow);
        int families = HasFamilies ? Math.Min(MostFamilies, Model.Standing.Families.Count + FamiliesPainter.HeaderRows) : 0;
        int histogram = Math.Clamp(Frame.Height - families - LeastCorrections, LeastHistogram, Math.Max(LeastHistogram, Frame.Height / 2));
        int corrections = Math.Max(0, Frame.Height - families - histogram);
        Place(_histogram, 1, 0, histogram);
        Place(_corrections, 2, histogram, corrections);
        Place(_families, 3, histogram + corrections, families);
        _families.Visible &= HasFamilies;
    }

    private void Place(CanvasView part, int view, int y, int height)
    {
        part.Visible = IsTogether || View == view;
        part.X = IsTogether ? Frame.Width - SideWidth : 0;
        part.Y = IsTogether ? y : 0;
        part.Width = Dim.Fill();
        part.Height = IsTogether ? height : Dim.Fill();
    }

    private TextCanvas PaintPlot(int width, int height) =>
        RankingPlot.Paint(_ranking.Ranking, _ranking.Rank, _isNear, width, height, Glyphs, RankingOverlay.Of(_ranking));

    private TextCanvas PaintCorrections(int width, int height)
    {
        _awaiter.Await(() => _ranking.Outcomes?.IsDone != false);
        return CorrectionsPainter.Paint(_ranking, takesKeys: true, width, height, Glyphs);
    }
}
