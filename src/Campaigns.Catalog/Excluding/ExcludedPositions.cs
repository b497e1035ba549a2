using Campaigns.Catalog.Measurements;

namespace Campaigns.Catalog.Excluding;

/// <summary>Finds the excluded values of an experiment in its columns while its loads are read one after the other.</summary>
internal sealed class ExcludedPositions
{
    private readonly List<int> _positions = [];
    private IReadOnlySet<StandingExclusions.Place> _excluded = new HashSet<StandingExclusions.Place>();
    private int _from;

    /// <summary>Positions found, ascending.</summary>
    public IReadOnlyList<int> Positions => _positions;

    /// <summary>Begins an experiment whose columns are empty.</summary>
    public void Begin(IReadOnlySet<StandingExclusions.Place> excluded)
    {
        _excluded = excluded;
        _positions.Clear();
        _from = 0;
    }

    /// <summary>Looks at the values that a load has just added.</summary>
    public void Find(long loadId, ObservationColumns values)
    {
        for (int i = _from; i < values.Count && _excluded.Count > 0; i++)
        {
            if (_excluded.Contains(new StandingExclusions.Place(loadId, values.Lines[i])))
            {
                _positions.Add(i);
            }
        }

        _from = values.Count;
    }
}
