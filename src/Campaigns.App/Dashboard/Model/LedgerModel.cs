using Campaigns.Catalog;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Ledger.Verifying;

namespace Campaigns.App.Dashboard.Model;

/// <summary>What the ledger page knows: the entries, which of them are shown in which order, the one selected, the head, and the proof of the record.</summary>
/// <remarks>Read when it is first asked for, and again after a campaign was opened or loaded again. For one thread.</remarks>
/// <param name="model">The dashboard.</param>
public sealed class LedgerModel(DashboardModel model) : IDisposable
{
    private IReadOnlyList<LedgerEntry> _entries = [];
    private LedgerHead _head = LedgerHead.Empty;
    private int[] _rows = [];
    private int _edition = -1;
    private int _row;
    private SideJob<LedgerProof>? _proving;

    /// <summary>The chain's end when the entries were read.</summary>
    public LedgerHead Head
    {
        get
        {
            Refresh();
            return _head;
        }
    }

    /// <summary>Entries in the whole catalog.</summary>
    public int EntryCount
    {
        get
        {
            Refresh();
            return _entries.Count;
        }
    }

    /// <summary>Rows shown.</summary>
    public int RowCount
    {
        get
        {
            Refresh();
            return _rows.Length;
        }
    }

    /// <summary>The selected row, from 0; -1 where no row is shown.</summary>
    public int Row => RowCount == 0 ? -1 : _row;

    /// <summary>The selected entry; null where no row is shown.</summary>
    public LedgerEntry? Selected => Row < 0 ? null : At(_row);

    /// <summary>Whether entries of the open campaign alone are shown.</summary>
    public bool IsCampaignOnly { get; private set; }

    /// <summary>Whether the oldest entry comes first.</summary>
    public bool IsOldestFirst { get; private set; }

    /// <summary>The filter as it was typed.</summary>
    public string FilterText { get; private set; } = "";

    /// <summary>What is wrong with the filter as it was typed, in one sentence; null where nothing is.</summary>
    public string? FilterProblem { get; private set; }

    /// <summary>What came of proving the record; null before it was proved.</summary>
    public LedgerProof? Proof { get; private set; }

    /// <summary>Why the record could not be proved, in a sentence; null where it could.</summary>
    public string? Problem { get; private set; }

    /// <summary>How far the proof is; null where none is under way.</summary>
    public WorkProgress? Proving => _proving is null ? null : _proving.Progress ?? new WorkProgress("proving the record", 0, 0, "parts");

    /// <summary>The entry in a row.</summary>
    /// <param name="row">Row from 0.</param>
    public LedgerEntry At(int row) => _entries[_rows[row]];

    /// <summary>Selects a row; beyond the ends the nearest.</summary>
    /// <param name="row">Row from 0.</param>
    public void Select(int row) => _row = Math.Clamp(row, 0, Math.Max(0, RowCount - 1));

    /// <summary>Shows only what a filter lets through. The selected entry stays selected where it is shown.</summary>
    /// <param name="text">Words and conditions, see <see cref="LedgerSearch"/>.</param>
    public void SetFilter(string text)
    {
        if (text != FilterText)
        {
            FilterText = text;
            Narrow();
        }
    }

    /// <summary>Shows the entries of the open campaign alone, or of the whole catalog.</summary>
    public void TurnScope()
    {
        IsCampaignOnly = !IsCampaignOnly;
        Narrow();
    }

    /// <summary>Puts the newest first, or the oldest.</summary>
    public void TurnOrder()
    {
        IsOldestFirst = !IsOldestFirst;
        Narrow();
    }

    /// <summary>Begins to prove the record, on another thread.</summary>
    public void Prove()
    {
        if (_proving is null)
        {
            (Proof, Problem) = (null, null);
            _proving = new SideJob<LedgerProof>(model.Source.Verify);
        }
    }

    /// <summary>Asks the proof to stop.</summary>
    /// <returns>Whether one was under way.</returns>
    public bool StopProving()
    {
        _proving?.Stop();
        return _proving is not null;
    }

    /// <summary>Takes what was found off the screen.</summary>
    /// <returns>Whether there was anything.</returns>
    public bool PutProofAway()
    {
        bool had = Proof is not null || Problem is not null;
        (Proof, Problem) = (null, null);
        return had;
    }

    /// <summary>Takes what the other thread has done since.</summary>
    /// <returns>Whether it is still at work.</returns>
    public bool Follow()
    {
        if (_proving is { IsOver: true } over)
        {
            (Proof, Problem) = (over.Result, over.Fault?.Message);
            _proving = null;
            over.Dispose();
        }

        return _proving is not null;
    }

    /// <inheritdoc/>
    public void Dispose() => _proving?.Dispose();

    private void Refresh()
    {
        if (_edition == model.Edition)
        {
            return;
        }

        long? selected = _row < _rows.Length ? At(_row).Sequence : null;
        bool wasFirst = _row == 0;
        _edition = model.Edition;
        (_entries, _head) = model.Source.Ledger(new LedgerFilter());
        Narrow(wasFirst ? null : selected);
    }

    private void Narrow() => Narrow(Selected?.Sequence);

    private void Narrow(long? keep)
    {
        Refresh();
        LedgerSearch search = LedgerSearch.Read(FilterText);
        HashSet<long>? about = About(search.Experiment);
        string open = model.Standing.Campaign.Code;
        List<int> rows = [];
        for (int i = 0; i < _entries.Count; i++)
        {
            LedgerEntry entry = _entries[i];
            if ((!IsCampaignOnly || entry.Campaign == open) && about?.Contains(entry.Sequence) != false && search.Shows(entry))
            {
                rows.Add(i);
            }
        }

        if (!IsOldestFirst)
        {
            rows.Reverse();
        }

        _rows = [.. rows];
        _row = keep is { } sequence ? Math.Max(0, rows.FindIndex(i => _entries[i].Sequence == sequence)) : 0;
    }

    /// <summary>The entries that touched an experiment; null where none is asked for, or the campaign has no such experiment, which is then said.</summary>
    private HashSet<long>? About(string? experiment)
    {
        FilterProblem = null;
        if (experiment is null)
        {
            return null;
        }

        string campaign = model.Standing.Campaign.Code;
        if (!model.Standing.Experiments.Any(e => e.Plan.Code == experiment))
        {
            FilterProblem = $"The campaign {campaign} has no experiment {experiment}.";
            return null;
        }

        return [.. model.Source.Ledger(new LedgerFilter { Campaign = campaign, Experiment = experiment }).Entries.Select(e => e.Sequence)];
    }
}
