using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Model;

/// <summary>The experiments that the user marked, and at most how many of them may be false. The bound holds for all sets at once, so marking after looking is what it is for.</summary>
/// <remarks>Closed testing runs once, when the bound is first asked for after a load; marking costs time in proportion to what is marked.</remarks>
public sealed class Marks
{
    private readonly HashSet<int> _positions = [];
    private CampaignStanding _standing;
    private CampaignBounds? _bounds;
    private MarkedBound? _bound;
    private int[]? _realAtLeast;

    /// <summary>Nothing marked yet.</summary>
    /// <param name="standing">The campaign.</param>
    public Marks(CampaignStanding standing) => _standing = standing;

    /// <summary>Experiments marked.</summary>
    public int Count => _positions.Count;

    /// <summary>The confidence of the bound: 1 less the campaign's level.</summary>
    public double Confidence => CampaignBounds.ConfidenceOf(_standing.Campaign.Level);

    /// <summary>At most how many of the marked are false, by closed testing over all planned experiments of the campaign at its level.</summary>
    public MarkedBound Bound => _bound ??= Bounds.Mark(_positions);

    /// <summary>The bounds of all sets of the campaign's experiments.</summary>
    public CampaignBounds Bounds => _bounds ??= CampaignBounds.Of(_standing.Experiments, _standing.Campaign.Level);

    /// <summary>Positions of the marked experiments in the campaign's list, from 0, in any order.</summary>
    public IReadOnlyCollection<int> Positions => _positions;

    /// <summary>At most how many of the smallest p-values are false.</summary>
    /// <param name="count">How many of them, from 0 to the number of tested experiments.</param>
    public int FalseAtMostOfSmallest(int count) => count - (_realAtLeast ??= Bounds.Testing.Curve())[count];

    /// <summary>Whether an experiment is marked.</summary>
    /// <param name="position">Its position in the campaign's list, from 0.</param>
    public bool Has(int position) => _positions.Contains(position);

    /// <summary>Marks an experiment, or takes its mark off.</summary>
    /// <param name="position">Its position in the campaign's list, from 0.</param>
    public void Turn(int position)
    {
        if (!_positions.Remove(position))
        {
            _positions.Add(position);
        }

        _bound = null;
    }

    /// <summary>Marks all of some experiments, or, where all of them are marked, takes their marks off.</summary>
    /// <param name="positions">Their positions in the campaign's list, from 0.</param>
    public void TurnAll(IReadOnlyCollection<int> positions)
    {
        if (positions.All(_positions.Contains))
        {
            _positions.ExceptWith(positions);
        }
        else
        {
            _positions.UnionWith(positions);
        }

        _bound = null;
    }

    /// <summary>Goes over to the campaign as it stands now; marks stay with the codes of the experiments.</summary>
    /// <param name="standing">The campaign, loaded again.</param>
    public void Follow(CampaignStanding standing)
    {
        HashSet<string> codes = [.. _positions.Select(i => _standing.Experiments[i].Plan.Code)];
        (_standing, _bounds, _bound, _realAtLeast) = (standing, null, null, null);
        _positions.Clear();
        for (int i = 0; codes.Count > 0 && i < standing.Experiments.Count; i++)
        {
            if (codes.Contains(standing.Experiments[i].Plan.Code))
            {
                _positions.Add(i);
            }
        }
    }
}
