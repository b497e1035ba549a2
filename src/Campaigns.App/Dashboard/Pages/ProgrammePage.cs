using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Dashboard.Screen;
using Campaigns.App.Wording;
using Campaigns.Catalog;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;

namespace Campaigns.App.Dashboard.Pages;

/// <summary>All campaigns of the catalog: what each holds, how far it is, what it risks, and what needs attention.</summary>
public sealed class ProgrammePage : TwoPartPage
{
    private static readonly TimeSpan Glance = TimeSpan.FromMilliseconds(100);
    private readonly ProgrammeModel _programme;
    private readonly CanvasView _caption;

    /// <summary>Makes the page.</summary>
    /// <param name="context">What it shows, and with what.</param>
    public ProgrammePage(PageContext context)
        : base(context)
    {
        _programme = new ProgrammeModel(Model);
        _caption = Part(PaintCaption);
        (_caption.Width, _caption.Height) = (Dim.Fill(), ProgrammeSheet.CaptionRows);
        Add(_caption);
        Model.Changed += Arrange;
    }

    /// <inheritdoc/>
    public override IReadOnlyList<(string Key, string Does)> Keys => _programme.Checking is null
        ? [("Enter", "open"), ("Space", "more text"), ("c", "checks"), TurnKeys, ("F1", "help"), ("q", "quit"), ("F5", "reload")]
        : [("Esc", "stop the checks"), ("Enter", "open"), TurnKeys, ("F1", "help"), ("q", "quit")];

    /// <inheritdoc/>
    public override IReadOnlyList<(string Key, string Does)> Help =>
    [
        .. MovingHelp,
        ("Enter", "open the selected campaign and turn to its experiments (or click its row twice)"),
        ("c", "open the selected campaign and make the checks of its survivors, on the side; Esc stops them"),
        (Glyphs.Marked + " behind a code", "the campaign that is open"),
        ("!", "how many kinds of things wait in the campaign: the text says which"),
        ("holds, level, by", "the error rate, its level, and the key of the correction"),
        ("tested", "experiments with a result / all that are planned"),
        ("hits", "experiments whose own p is at most the level: what would count without correction"),
        ("survive", "experiments that survive the correction"),
        ("risk so far", "of at least one false positive without correction, if nothing is real and the tests are independent; " + RiskSpark.Key(Glyphs)),
    ];

    /// <inheritdoc/>
    protected override bool IsBeside => false;

    /// <inheritdoc/>
    protected override int RowsAbove => ProgrammeSheet.CaptionRows;

    /// <inheritdoc/>
    protected override int HeaderRows => ProgrammeList.HeaderRows;

    /// <inheritdoc/>
    protected override int RowCount => _programme.Campaigns.Count;

    /// <inheritdoc/>
    protected override int Row => _programme.Row;

    /// <inheritdoc/>
    protected override string Subject => _programme.Selected?.Overview.Campaign.Code ?? "";

    /// <inheritdoc/>
    public override bool Back() => base.Back() || _programme.StopChecking();

    /// <inheritdoc/>
    protected override int ListRows(int room) => Math.Min(RowCount + HeaderRows, room * 2 / 5);

    /// <inheritdoc/>
    protected override void Select(int row) => _programme.Select(row);

    /// <inheritdoc/>
    protected override TextCanvas PaintList(int top, int width, int height) =>
        ProgrammeList.Paint(_programme.Campaigns, _programme.OpenCampaign, _programme.Row, top, width, height, Glyphs);

    /// <inheritdoc/>
    protected override TextCanvas PaintText(int width) => ProgrammeSheet.Paint(_programme, width, Glyphs);

    /// <inheritdoc/>
    protected override void Open()
    {
        if (_programme.Selected is { } selected)
        {
            if (!_programme.IsOpenSelected)
            {
                Model.Open(selected.Overview.Campaign.Code);
            }

            Model.TurnTo(PageList.PlaceOf("Experiments"));
        }
    }

    /// <inheritdoc/>
    protected override bool Obey(Key key)
    {
        if (key != Key.C)
        {
            return false;
        }

        if (_programme.Checking is null)
        {
            _programme.Check();
            WorkProgress? shown = null;
            App?.AddTimeout(Glance, () =>
            {
                WorkProgress? before = _programme.Checking;
                bool isAtWork = _programme.Follow();
                if (!isAtWork || before != shown)
                {
                    shown = before;
                    ShowChange();
                    SuperView?.SetNeedsDraw();
                }

                return isAtWork;
            });
        }

        SuperView?.SetNeedsDraw();
        return true;
    }

    /// <inheritdoc/>
    protected override void Dispose(bool disposing)
    {
        if (disposing)
        {
            Model.Changed -= Arrange;
            _programme.Dispose();
        }

        base.Dispose(disposing);
    }

    // The text says all of it.
    private const string Below = " (all: below)";

    private TextCanvas PaintCaption(int width, int height)
    {
        TextCanvas canvas = new(width, height);
        bool waits = _programme.Campaigns.Any(c => c.Count > 0);
        IReadOnlyList<string> lines = CellText.Wrap(AttentionText.Total(_programme.Campaigns, _programme.OpenCampaign, _programme.Checks), Math.Max(1, width - 2));
        for (int y = 0; y < Math.Min(height, lines.Count); y++)
        {
            bool isCut = y == height - 1 && lines.Count > height;
            canvas.Write(1, y, isCut ? CellText.Fit(lines[y] + " " + lines[y + 1], width - 2 - Below.Length, Glyphs.Cut) + Below : lines[y], waits ? Ink.Warning : Ink.Text);
        }

        return canvas;
    }
}
