using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Dashboard.Screen;
using Campaigns.Catalog;
using Campaigns.Catalog.Ledger;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;
using Terminal.Gui.Views;

namespace Campaigns.App.Dashboard.Pages;

/// <summary>The record in words, searched by typing; the entry at hand in full; the head; and the proof that all of it is whole.</summary>
public sealed class LedgerPage : TwoPartPage
{
    /// <summary>Entries are sentences: below this width one column of them is easier to read than two.</summary>
    private const int RoomForSentences = 160;

    private const int FilterLabel = 7;
    private const int FilterWidth = 22;
    private static readonly TimeSpan Glance = TimeSpan.FromMilliseconds(100);
    private readonly LedgerModel _ledger;
    private readonly TextField _filter = new() { X = FilterLabel, Width = FilterWidth, Height = 1 };
    private readonly CanvasView _caption;
    private readonly CanvasView _head;

    /// <summary>Makes the page.</summary>
    /// <param name="context">What it shows, and with what.</param>
    public LedgerPage(PageContext context)
        : base(context)
    {
        _ledger = new LedgerModel(Model);
        _caption = Part(PaintCaption);
        (_caption.X, _caption.Width, _caption.Height) = (FilterLabel + FilterWidth + 1, Dim.Fill(), 1);
        _head = Part(PaintHead);
        (_head.Y, _head.Width, _head.Height) = (1, Dim.Fill(), 1);
        _filter.ValueChanged += (_, e) =>
        {
            _ledger.SetFilter(e.NewValue ?? "");
            ShowChange();
        };
        Add(new Label { Text = "filter", Width = FilterLabel }, _filter, _caption, _head);
    }

    /// <inheritdoc/>
    public override IReadOnlyList<(string Key, string Does)> Keys => _ledger.Proving is null
        ? [("/", "filter"), ("p", "prove"), ("r", "reverse"), ("c", _ledger.IsCampaignOnly ? "catalog" : "campaign"), TurnKeys, ("F1", "help"), ("q", "quit"), ("Space", "more text"), ("F5", "reload")]
        : [("Esc", "stop the proof"), TurnKeys, ("F1", "help"), ("q", "quit")];

    /// <inheritdoc/>
    public override IReadOnlyList<(string Key, string Does)> Help =>
    [
        .. MovingHelp,
        ("/ or F3", "type a filter; Enter or Esc goes back to the list, Esc once more takes it off"),
        ("withdraw coating", "as a filter: both words in what was done, to what, why, by whom, when, or in what changed"),
        ("action:exclude by:ada", "only such actions, only what an account or a name did"),
        ("experiment:E12", "what touched this experiment of the open campaign, whether or not the entry names it"),
        ("41:6f2c...", "a head that was printed earlier, in full: its entry, where the record holds it; the first 12 digits of a hash do too"),
        ("c", "the open campaign alone, or the whole catalog"),
        ("r", "the newest first, or the oldest"),
        ("p", "prove the record whole, as 'campaigns ledger verify' does, on the side; Esc stops it"),
        ("number:hash", "the head of the ledger: keep it outside this computer, and anybody can prove later that the record was only continued. To copy it, hold Shift while you select it with the mouse"),
        .. Legend(),
    ];

    /// <inheritdoc/>
    protected override bool IsBeside => Frame.Width >= RoomForSentences;

    /// <inheritdoc/>
    protected override int RowsAbove => 2;

    /// <inheritdoc/>
    protected override int HeaderRows => LedgerList.HeaderRows;

    /// <inheritdoc/>
    protected override int RowCount => _ledger.RowCount;

    /// <inheritdoc/>
    protected override int Row => _ledger.Row;

    /// <inheritdoc/>
    protected override string Subject => FormattableString.Invariant($"{_ledger.Selected?.Sequence} {_ledger.Proving is null} {_ledger.Proof is null}");

    /// <inheritdoc/>
    public override bool Back()
    {
        if (_ledger.StopProving() || _ledger.PutProofAway())
        {
            ShowChange();
            return true;
        }

        if (_filter.HasFocus)
        {
            List.SetFocus();
            return true;
        }

        if (base.Back())
        {
            return true;
        }

        if (_ledger.FilterText.Length > 0)
        {
            _filter.Text = "";
            return true;
        }

        return false;
    }

    /// <inheritdoc/>
    protected override int ListWidth(int width) => width - 76;

    /// <inheritdoc/>
    protected override void Select(int row) => _ledger.Select(row);

    /// <inheritdoc/>
    protected override TextCanvas PaintList(int top, int width, int height) => LedgerList.Paint(_ledger, top, width, height, Glyphs);

    /// <inheritdoc/>
    protected override TextCanvas PaintText(int width) => LedgerSheet.Paint(_ledger, width, Glyphs);

    /// <inheritdoc/>
    protected override void Open() => Sheet.SetFocus();

    /// <inheritdoc/>
    protected override bool OnKeyDown(Key key)
    {
        if (!_filter.HasFocus)
        {
            return base.OnKeyDown(key);
        }

        if (key == Key.Enter || key == Key.Tab)
        {
            List.SetFocus();
            return true;
        }

        // The list can be walked while the filter is typed.
        return (key == Key.CursorDown || key == Key.CursorUp || key == Key.PageDown || key == Key.PageUp) && base.OnKeyDown(key);
    }

    /// <inheritdoc/>
    protected override bool Obey(Key key)
    {
        if (key == new Key('/') || key == Key.F3)
        {
            _filter.SetFocus();
        }
        else if (key == Key.C)
        {
            _ledger.TurnScope();
        }
        else if (key == Key.R)
        {
            _ledger.TurnOrder();
        }
        else if (key == Key.P)
        {
            Prove();
        }
        else
        {
            return false;
        }

        SuperView?.SetNeedsDraw();
        return true;
    }

    /// <inheritdoc/>
    protected override void Dispose(bool disposing)
    {
        if (disposing)
        {
            _ledger.Dispose();
        }

        base.Dispose(disposing);
    }

    private void Prove()
    {
        if (_ledger.Proving is not null)
        {
            return;
        }

        _ledger.Prove();
        WorkProgress? shown = null;
        App?.AddTimeout(Glance, () =>
        {
            WorkProgress? before = _ledger.Proving;
            bool isAtWork = _ledger.Follow();
            if (!isAtWork || before != shown)
            {
                shown = before;
                ShowChange();
                SuperView?.SetNeedsDraw();
            }

            return isAtWork;
        });
    }

    private static IEnumerable<(string Key, string Does)> Legend() => Wording.LedgerText.Legend.Select(sentence => ("entries", sentence));

    private TextCanvas PaintCaption(int width, int height)
    {
        TextCanvas canvas = new(width, height);
        IReadOnlyList<string> caption = _ledger.Proving is { } progress ? [LedgerSheet.Progress(progress)] : _ledger.FilterProblem is { } problem ? [problem] : LedgerList.Caption(_ledger, Model.Standing.Campaign.Code);
        canvas.Write(0, 0, CellText.FirstThatFits(width, Glyphs.Cut, caption), _ledger.FilterProblem is null ? Ink.Quiet : Ink.Warning);
        return canvas;
    }

    /// <summary>The head stands alone at the beginning of its row, whole, so that it can be copied.</summary>
    private TextCanvas PaintHead(int width, int height)
    {
        TextCanvas canvas = new(width, height);
        LedgerHead head = _ledger.Head;
        int end = canvas.Write(0, 0, head.ToString(), Ink.Mean);
        canvas.Write(end + 2, 0, CellText.Fit(width - end > 24 ? "head of the ledger" : "head", width - end - 2, Glyphs.Cut), Ink.Quiet);
        return canvas;
    }
}
