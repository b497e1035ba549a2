using Campaigns.Catalog;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Model;

/// <summary>What the programme page knows: every campaign in figures and what of it needs attention, the one selected, and the checks of the open campaign's survivors.</summary>
/// <remarks>Read when it is first asked for, and again after a campaign was opened or loaded again. For one thread.</remarks>
/// <param name="model">The dashboard.</param>
public sealed class ProgrammeModel(DashboardModel model) : IDisposable
{
    private IReadOnlyList<CampaignAttention> _campaigns = [];
    private int _edition = -1;
    private int _row;
    private SideJob<SurvivorChecks>? _checking;

    /// <summary>The campaigns in the order in which they were opened.</summary>
    public IReadOnlyList<CampaignAttention> Campaigns
    {
        get
        {
            Refresh();
            return _campaigns;
        }
    }

    /// <summary>The selected row, from 0; -1 where there is no campaign.</summary>
    public int Row => Campaigns.Count == 0 ? -1 : _row;

    /// <summary>The selected campaign; null where there is none.</summary>
    public CampaignAttention? Selected => Row < 0 ? null : _campaigns[_row];

    /// <summary>Whether the selected campaign is the open one.</summary>
    public bool IsOpenSelected => Selected?.Overview.Campaign.Code == model.Standing.Campaign.Code;

    /// <summary>The checks of the open campaign's survivors; null before they were made.</summary>
    public SurvivorChecks? Checks { get; private set; }

    /// <summary>How far the checks are; null where none are being made.</summary>
    public WorkProgress? Checking => _checking is null ? null : _checking.Progress ?? new WorkProgress("checking", 0, 0, "survivors");

    /// <summary>Why the checks could not be made, in a sentence; null where they could.</summary>
    public string? Problem { get; private set; }

    /// <summary>Selects a campaign; beyond the ends the nearest.</summary>
    /// <param name="row">Row from 0.</param>
    public void Select(int row) => _row = Math.Clamp(row, 0, Math.Max(0, Campaigns.Count - 1));

    /// <summary>Opens the selected campaign where another one is open, and begins to make the checks of its survivors on another thread.</summary>
    public void Check()
    {
        if (_checking is null && Selected is { } selected)
        {
            if (!IsOpenSelected)
            {
                model.Open(selected.Overview.Campaign.Code);
                Refresh();
            }

            CampaignStanding standing = model.Standing;
            (Checks, Problem) = (null, null);
            _checking = new SideJob<SurvivorChecks>((progress, stop) => model.Source.Checks(standing, progress, stop));
        }
    }

    /// <summary>Asks the checks to stop.</summary>
    /// <returns>Whether any were being made.</returns>
    public bool StopChecking()
    {
        _checking?.Stop();
        return _checking is not null;
    }

    /// <summary>Takes what the other thread has done since.</summary>
    /// <returns>Whether it is still at work.</returns>
    public bool Follow()
    {
        if (_checking is { IsOver: true } over)
        {
            (Checks, Problem) = (over.Result, over.Fault?.Message);
            _checking = null;
            over.Dispose();
        }

        return _checking is not null;
    }

    /// <inheritdoc/>
    public void Dispose() => _checking?.Dispose();

    private static int RowOf(IReadOnlyList<CampaignAttention> campaigns, string code) => Math.Max(0, campaigns.ToList().FindIndex(c => c.Overview.Campaign.Code == code));

    private void Refresh()
    {
        if (_edition == model.Edition)
        {
            return;
        }

        string code = _edition < 0 || _row >= _campaigns.Count ? model.Standing.Campaign.Code : _campaigns[_row].Overview.Campaign.Code;
        _edition = model.Edition;
        IReadOnlyDictionary<string, WaitingData> waiting = model.Source.Waiting();
        _campaigns = [.. model.Source.Campaigns().Select(c => new CampaignAttention(c, waiting.GetValueOrDefault(c.Campaign.Code)))];
        _row = RowOf(_campaigns, code);

        // What was found, or is being looked for, belongs to the values as they were.
        _checking?.Dispose();
        (_checking, Checks, Problem) = (null, null, null);
    }
}
