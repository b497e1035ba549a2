using Campaigns.Catalog;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.App.Dashboard.Model;

/// <summary>Everything the dashboard knows: the campaigns, the one that is open, the rows shown and their order, the selected experiment, the page. It knows no terminal.</summary>
/// <remarks>For one thread. Painters read it whenever they draw; <see cref="Changed"/> says that they should.</remarks>
public sealed class DashboardModel
{
    private const int KeptDetails = 64;

    // Some 0.02 s of checks and sorting.
    private const int ManyValues = 20_000;
    private readonly IDashboardSource _source;
    private readonly Func<string, ErrorProcedure?> _findCorrection;
    private readonly Dictionary<string, ExperimentDetail> _details = [];
    private ExperimentFilter _filter = ExperimentFilter.Read("", out _)!;
    private int[] _order = [];
    private int[] _rows = [];
    private string[]? _searchable;
    private Ranking? _ranking;
    private int _selectedRow;

    /// <summary>Makes the model; the first experiment in the plan's order is selected.</summary>
    /// <param name="source">Where everything comes from.</param>
    /// <param name="campaign">The campaign that is opened first.</param>
    /// <param name="findCorrection">The correction with a key, or null.</param>
    public DashboardModel(IDashboardSource source, string campaign, Func<string, ErrorProcedure?> findCorrection)
    {
        ArgumentNullException.ThrowIfNull(source);
        _source = source;
        _findCorrection = findCorrection;
        Watch = new CatalogWatch(source);
        Watch.Begin();
        Standing = source.Standing(campaign);
        Marks = new Marks(Standing);
        (Correction, Heading) = Read(Standing);
        Sort();
        Narrow(keep: -1);
    }

    /// <summary>Something that is shown has changed.</summary>
    public event Action? Changed;

    /// <summary>Where pages read what only they show.</summary>
    public IDashboardSource Source => _source;

    /// <summary>Whether what is shown is the catalog as it stands.</summary>
    public CatalogWatch Watch { get; }

    /// <summary>Counts how often a campaign was opened or loaded again: what was read for another count is out of date.</summary>
    public int Edition { get; private set; }

    /// <summary>The open campaign as it stood when it was last loaded.</summary>
    public CampaignStanding Standing { get; private set; }

    /// <summary>The campaign's correction; null where the program does not know it.</summary>
    public ErrorProcedure? Correction { get; private set; }

    /// <summary>What every page says about the campaign.</summary>
    public CampaignHeading Heading { get; private set; }

    /// <summary>The ranked p-values, ranked when they are first asked for.</summary>
    public Ranking Ranking => _ranking ??= new Ranking(Standing, Correction);

    /// <summary>The experiments that are marked.</summary>
    public Marks Marks { get; private set; }

    /// <summary>The column sorted by; null for the plan's order.</summary>
    public ExperimentColumn? SortColumn { get; private set; }

    /// <summary>Whether the largest comes first.</summary>
    public bool IsFalling { get; private set; }

    /// <summary>The filter as it was typed.</summary>
    public string FilterText { get; private set; } = "";

    /// <summary>What is wrong with the filter as it was typed, in one sentence; the rows shown are then those of the last one that could be read.</summary>
    public string? FilterProblem { get; private set; }

    /// <summary>The page shown, from 0.</summary>
    public int Page { get; private set; }

    /// <summary>Rows shown.</summary>
    public int RowCount => _rows.Length;

    /// <summary>The selected row, from 0; -1 where no row is shown.</summary>
    public int SelectedRow => _rows.Length == 0 ? -1 : _selectedRow;

    /// <summary>Position of the selected experiment in the campaign's list, from 0; -1 where no row is shown.</summary>
    public int SelectedPosition => _rows.Length == 0 ? -1 : _rows[_selectedRow];

    /// <summary>The selected experiment; null where no row is shown.</summary>
    public ExperimentResult? Selected => _rows.Length == 0 ? null : Standing.Experiments[_rows[_selectedRow]];

    /// <summary>The procedure with a key; null where the program does not know it.</summary>
    /// <param name="key">Exact.</param>
    public ErrorProcedure? Find(string key) => _findCorrection(key);

    /// <summary>The experiment in a row.</summary>
    /// <param name="row">Row from 0.</param>
    public ExperimentResult RowAt(int row) => Standing.Experiments[_rows[row]];

    /// <summary>Position in the campaign's list of the experiment in a row.</summary>
    /// <param name="row">Row from 0.</param>
    public int PositionAt(int row) => _rows[row];

    /// <summary>Whether the selected experiment in full must first be computed, and that may take a good part of a second: a permutation test draws up to millions of arrangements, and checks sort every value.</summary>
    public bool IsSelectedDetailSlow =>
        Selected is { } selected
        && !_details.ContainsKey(selected.Plan.Code)
        && selected.ObservationCount > 0
        && (selected.ObservationCount > ManyValues || GroupTestRegistry.Find(selected.Plan.Test)?.DrawsAtRandom == true);

    /// <summary>The selected experiment in full; null where no row is shown, and where it could not be read.</summary>
    public ExperimentDetail? SelectedDetail()
    {
        if (Selected is not { } selected)
        {
            return null;
        }

        if (!_details.TryGetValue(selected.Plan.Code, out ExperimentDetail? detail))
        {
            if (Watch.HasFailed)
            {
                return null;
            }

            if (_details.Count >= KeptDetails)
            {
                _details.Clear();
            }

            try
            {
                detail = _source.Detail(Standing, selected.Plan.Code);
            }
            catch (CatalogException error)
            {
                Watch.Fail(error);
                return null;
            }

            _details.Add(selected.Plan.Code, detail);
        }

        return detail;
    }

    /// <summary>Selects a row; beyond the ends the nearest.</summary>
    /// <param name="row">Row from 0.</param>
    public void Select(int row)
    {
        int nearest = Math.Clamp(row, 0, Math.Max(0, _rows.Length - 1));
        if (nearest != _selectedRow)
        {
            _selectedRow = nearest;
            Changed?.Invoke();
        }
    }

    /// <summary>Selects an experiment; a filter that hides it is taken off.</summary>
    /// <param name="position">Its position in the campaign's list, from 0.</param>
    public void SelectPosition(int position)
    {
        if (Array.IndexOf(_rows, position) < 0)
        {
            SetFilter("");
        }

        Select(Array.IndexOf(_rows, position));
    }

    /// <summary>Marks the selected experiment, or takes its mark off.</summary>
    public void MarkSelected()
    {
        if (_rows.Length > 0)
        {
            Marks.Turn(_rows[_selectedRow]);
            Changed?.Invoke();
        }
    }

    /// <summary>Marks every experiment shown, or, where all of them are marked, takes their marks off.</summary>
    public void MarkShown()
    {
        Marks.TurnAll(_rows);
        Changed?.Invoke();
    }

    /// <summary>Marks every survivor, or, where all of them are marked, takes their marks off.</summary>
    public void MarkSurvivors()
    {
        int[] survivors = [.. Enumerable.Range(0, Standing.Experiments.Count).Where(i => Standing.Experiments[i].Survives == true)];
        if (survivors.Length > 0)
        {
            Marks.TurnAll(survivors);
            Changed?.Invoke();
        }
    }

    /// <summary>Sorts by a column, the smallest first; by the same column again, the other way round. The selected experiment stays selected.</summary>
    /// <param name="column">The column; null for the plan's order.</param>
    public void SortBy(ExperimentColumn? column)
    {
        IsFalling = column == SortColumn && !IsFalling;
        SortColumn = column;
        int keep = SelectedPosition;
        Sort();
        Narrow(keep);
        Changed?.Invoke();
    }

    /// <summary>Sorts by the next or an earlier column; the plan's order is one of them.</summary>
    /// <param name="step">1 for the next, -1 for the one before.</param>
    public void SortByNeighbour(int step)
    {
        IReadOnlyList<ExperimentColumn> all = ExperimentColumn.All;
        int now = SortColumn is null ? 0 : all.ToList().IndexOf(SortColumn) + 1;
        int next = (now + step + all.Count + 1) % (all.Count + 1);
        SortBy(next == 0 ? null : all[next - 1]);
    }

    /// <summary>Shows only what a filter lets through. The selected experiment stays selected where it is shown.</summary>
    /// <param name="text">Words and conditions, see <see cref="ExperimentFilter"/>.</param>
    public void SetFilter(string text)
    {
        if (text == FilterText)
        {
            return;
        }

        FilterText = text;
        if (ExperimentFilter.Read(text, out string? problem) is { } filter)
        {
            int keep = SelectedPosition;
            _filter = filter;
            Narrow(keep);
        }

        FilterProblem = problem;
        Changed?.Invoke();
    }

    /// <summary>Turns to a page.</summary>
    /// <param name="page">Page from 0.</param>
    public void TurnTo(int page)
    {
        if (page != Page)
        {
            Page = page;
            Changed?.Invoke();
        }
    }

    /// <summary>Lets everything be drawn again, after something was found out while it was drawn.</summary>
    public void Announce() => Changed?.Invoke();

    /// <summary>Loads the open campaign again; order, filter, marks and, where it is still there, the selected experiment are kept.</summary>
    public void Reload()
    {
        string? code = Selected?.Plan.Code;
        Watch.Begin();
        Standing = _source.Standing(Standing.Campaign.Code);
        Marks.Follow(Standing);
        Take();
        Narrow(code is null ? -1 : Standing.Experiments.ToList().FindIndex(e => e.Plan.Code == code));
        Changed?.Invoke();
    }

    /// <summary>Opens another campaign of the catalog: in the plan's order, without filter and marks, the first experiment selected. The open one is loaded again.</summary>
    /// <param name="campaign">Its code.</param>
    public void Open(string campaign)
    {
        if (campaign == Standing.Campaign.Code)
        {
            Reload();
            return;
        }

        Watch.Begin();
        Standing = _source.Standing(campaign);
        Marks = new Marks(Standing);
        (FilterText, FilterProblem, SortColumn, IsFalling) = ("", null, null, false);
        Take();
        Narrow(keep: -1);
        Changed?.Invoke();
    }

    private void Take()
    {
        Edition++;
        _details.Clear();
        (_searchable, _ranking) = (null, null);
        (Correction, Heading) = Read(Standing);
        Sort();
    }

    private (ErrorProcedure?, CampaignHeading) Read(CampaignStanding standing)
    {
        ErrorProcedure? correction = _findCorrection(standing.Campaign.Correction);
        return (correction, new CampaignHeading(standing, correction));
    }

    private void Sort() => _order = ExperimentOrder.By(Standing.Experiments, SortColumn, IsFalling);

    private void Narrow(int keep)
    {
        IReadOnlyList<ExperimentResult> all = Standing.Experiments;
        if (FilterText.Length == 0)
        {
            _rows = _order;
        }
        else
        {
            string[] searchable = _searchable ??= [.. all.Select(ExperimentFilter.Searchable)];
            _rows = Array.FindAll(_order, position => _filter.Shows(all[position], searchable[position]));
        }

        _selectedRow = Math.Max(0, Array.IndexOf(_rows, keep));
    }
}
