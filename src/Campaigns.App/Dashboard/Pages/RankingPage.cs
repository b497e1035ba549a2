using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Dashboard.Screen;
using Campaigns.App.Output;
using Campaigns.Domain;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;

namespace Campaigns.App.Dashboard.Pages;

/// <summary>The ranked p-values of the campaign beside the boundary of its correction; the keys walk along the ranks.</summary>
public sealed class RankingPage : DashboardPage
{
    private const int LinesAbove = 2;
    private const int LinesBelow = 2;
    private readonly CanvasView _picture;
    private bool _isNear;

    /// <summary>Makes the page.</summary>
    /// <param name="context">What it shows, and with what.</param>
    public RankingPage(PageContext context)
        : base(context)
    {
        _picture = Part(Paint, takesKeys: true);
        _picture.Width = Dim.Fill();
        _picture.Height = Dim.Fill();
        _picture.Wheeled += Walk;
        Add(_picture);
    }

    /// <inheritdoc/>
    public override IReadOnlyList<(string Key, string Does)> Keys =>
        [("Left/Right", "rank"), ("Enter", "experiment"), ("z", _isNear ? "whole family" : "near the boundary"), TurnKeys, ("F1", "help"), ("q", "quit")];

    /// <inheritdoc/>
    public override IReadOnlyList<(string Key, string Does)> Help =>
    [
        ("Left Right", "the rank before and after"),
        ("PgUp PgDn Home End", "a twentieth of the ranks, first, last"),
        ("Enter", "the experiment at this rank"),
        ("z", "the whole family, or near the boundary"),
    ];

    /// <inheritdoc/>
    public override View Entrance => _picture;

    private Ranking Ranking => Model.Ranking;

    private int Rank => Ranking.RankOf(Model.SelectedPosition);

    /// <inheritdoc/>
    protected override bool OnKeyDown(Key key)
    {
        int leap = Math.Max(10, Ranking.Count / 20);
        int? step = key == Key.CursorRight || key == Key.CursorDown ? 1
            : key == Key.CursorLeft || key == Key.CursorUp ? -1
            : key == Key.PageDown ? leap
            : key == Key.PageUp ? -leap
            : key == Key.Home ? -Ranking.Count
            : key == Key.End ? Ranking.Count
            : null;
        if (step is { } ranks)
        {
            Walk(ranks);
            return true;
        }

        if (key == Key.Z)
        {
            _isNear = !_isNear;
            ShowChange();
            SuperView?.SetNeedsDraw();
            return true;
        }

        if (key == Key.Enter)
        {
            Model.TurnTo(PageList.PlaceOf("Experiments"));
            return true;
        }

        return false;
    }

    private void Walk(int ranks)
    {
        if (Ranking.Count > 0)
        {
            Model.SelectPosition(Ranking.PositionAt(Math.Clamp(Rank + ranks, 1, Ranking.Count)));
        }
    }

    private TextCanvas Paint(int width, int height)
    {
        TextCanvas canvas = new(width, height);
        canvas.Write(1, 0, CellText.Fit(RankingPlot.BoundaryText(Ranking), width - 1, Glyphs.Cut), Ink.Boundary);
        canvas.Write(1, 1, CellText.Fit(AssumptionText(), width - 1, Glyphs.Cut), Ink.Quiet);
        canvas.Paste(RankingPlot.Paint(Ranking, Rank, _isNear, width, height - LinesAbove - LinesBelow, Glyphs), 0, LinesAbove);
        canvas.Write(1, height - 2, CellText.Fit(RankingPlot.Key(Ranking, Glyphs), width - 1, Glyphs.Cut), Ink.Quiet);
        canvas.Write(1, height - 1, CellText.Fit(SelectedText(), width - 1, Glyphs.Cut), Ink.Heading);
        return canvas;
    }

    private string AssumptionText() =>
        Model.Correction is null || Model.Heading.ValidUnder is null ? "" : $"{Model.Correction.Name} {Model.Heading.ValidUnder}.";

    private string SelectedText()
    {
        if (Model.Selected is not { } selected)
        {
            return "";
        }

        if (Rank == 0 || selected.P is not { } p || selected.AdjustedP is not { } adjusted)
        {
            return $"{selected.Plan.Code}: {selected.Status.Sentence()}";
        }

        string boundary = Ranking.BoundaryAt(Rank) is { } b ? $", boundary {NumberText.Screen(b, 3)}" : "";
        string survives = selected.Survives == true ? Glyphs.Survivor + " survives" : Glyphs.Other + " does not survive";
        return string.Create(CultureInfo.InvariantCulture, $"{selected.Plan.Code} {survives}: rank {Rank}, p {NumberText.P(p)}, adjusted {NumberText.P(adjusted)}{boundary}");
    }
}
