using Campaigns.Domain;
using Campaigns.Statistics.Online;

namespace Campaigns.App.Dashboard.Model;

/// <summary>What only the page of the risk shows: the risk test by test, the standing decisions of an online campaign, and the test pointed at.</summary>
/// <param name="model">The dashboard.</param>
/// <remarks>Everything is read after a load when it is first asked for, the risk when it is begun; the test pointed at is the selected experiment's.</remarks>
public sealed class RiskModel(DashboardModel model)
{
    private int _edition = -1;
    private Reckoning<IReadOnlyList<RiskPoint>>? _points;
    private int[]? _testOf;
    private int[]? _placeOf;
    private IReadOnlyList<ExperimentResult>? _decisions;
    private Reckoning<CampaignRisk>? _risk;

    /// <summary>The campaign as it stands.</summary>
    public CampaignStanding Standing => model.Standing;

    /// <summary>The experiments that are marked, and their bound.</summary>
    public Marks Marks => model.Marks;

    /// <summary>Whether experiments are decided as they arrive.</summary>
    public bool IsOnline => model.Correction is OnlineProcedure;

    /// <summary>Whether the reckoning was begun for the campaign as it was last loaded.</summary>
    public bool IsBegun
    {
        get
        {
            Follow();
            return _points is not null;
        }
    }

    /// <summary>Whether the campaign is so large that a page should be shown before the reckoning is begun: reading the order of testing takes a moment.</summary>
    public bool IsLarge => Standing.Experiments.Count > Reckoning.FewExperiments;

    /// <summary>Whether everything is reckoned.</summary>
    public bool IsDone => IsBegun && _points!.IsDone && Risk?.IsDone != false;

    /// <summary>The risk test by test, in the order of testing; null before it is reckoned.</summary>
    public IReadOnlyList<RiskPoint>? Points => IsBegun ? _points!.Result : null;

    /// <summary>The test of the selected experiment, from 1 in the order of testing; 0 where it has none.</summary>
    public int Test
    {
        get
        {
            if (Points is not { } points)
            {
                return 0;
            }

            if (_testOf is null)
            {
                _testOf = new int[Standing.Experiments.Count];
                foreach (RiskPoint point in points)
                {
                    _testOf[point.Experiment.Position - 1] = point.Tests;
                }
            }

            return model.SelectedPosition is >= 0 and var position ? _testOf[position] : 0;
        }
    }

    /// <summary>The experiments that were given a level, stream by stream in the order of starting; empty for a batch correction.</summary>
    public IReadOnlyList<ExperimentResult> Decisions
    {
        get
        {
            Follow();
            return _decisions ??= [.. Standing.Experiments.Where(e => e.Entry is not null).OrderBy(e => e.Entry!.Stream).ThenBy(e => e.Entry!.Position)];
        }
    }

    /// <summary>Place of the selected experiment among the decisions, from 0; -1 where it was given no level.</summary>
    public int Decision
    {
        get
        {
            Follow();
            if (_placeOf is null)
            {
                _placeOf = new int[Standing.Experiments.Count];
                for (int place = 0; place < Decisions.Count; place++)
                {
                    _placeOf[Decisions[place].Position - 1] = place + 1;
                }
            }

            return model.SelectedPosition is >= 0 and var position ? _placeOf[position] - 1 : -1;
        }
    }

    /// <summary>The risk as <c>risk</c> gives it; null where the program does not know the campaign's correction.</summary>
    public Reckoning<CampaignRisk>? Risk
    {
        get
        {
            Follow();
            CampaignStanding standing = Standing;
            return KnownCorrections.Are(standing.Campaign) ? _risk ??= new(() => CampaignRisk.Of(standing), standing.Experiments.Count) : null;
        }
    }

    /// <summary>Reads the order of testing and begins to reckon.</summary>
    public void Begin()
    {
        Follow();
        _points ??= new(model.Source.ReadRiskCurve(Standing), Standing.Experiments.Count);
    }

    /// <summary>Selects the experiment of another test, not beyond the first and the last.</summary>
    /// <param name="tests">On, or back where negative.</param>
    public void Walk(int tests) => GoTo(Test + tests);

    /// <summary>Selects the experiment of a test; beyond the ends the nearest.</summary>
    /// <param name="test">From 1 in the order of testing.</param>
    public void GoTo(int test)
    {
        if (Points is { Count: > 0 } points)
        {
            model.SelectPosition(points[Math.Clamp(test, 1, points.Count) - 1].Experiment.Position - 1);
        }
    }

    /// <summary>Selects the experiment of a decision; beyond the ends the nearest.</summary>
    /// <param name="place">From 0 in the order of the stream.</param>
    public void GoToDecision(int place)
    {
        if (Decisions.Count > 0)
        {
            model.SelectPosition(Decisions[Math.Clamp(place, 0, Decisions.Count - 1)].Position - 1);
        }
    }

    private void Follow()
    {
        if (_edition != model.Edition)
        {
            (_edition, _points, _testOf, _placeOf, _decisions, _risk) = (model.Edition, null, null, null, null, null);
        }
    }
}
