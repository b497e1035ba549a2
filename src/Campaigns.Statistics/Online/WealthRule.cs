using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Online;

/// <summary>An initial wealth that is spread from the first experiment on, and what every rejection earns, spread from the moment at which it is known.</summary>
/// <remarks>
/// The level is W0 gamma(1 + U) + (alpha - W0) gamma(1 + U - U1) + alpha sum over j &gt;= 2 of gamma(1 + U - Uj), times a factor, at most a cap: U counts the started experiments that use up a position,
/// Uj those among the ones that had started when the j-th rejection became known. Where none gives its position back, 1 + U - Uj is t - tau(j).
/// Work for each experiment: one product for each rejection so far; giving a position back costs one step for each rejection that became known after the experiment had started.
/// </remarks>
internal sealed class WealthRule : LevelRule
{
    /// <summary>Weights are summed plainly in runs of this length, the runs in 32 digits: an error of at most 1.5e-14 for any number of rejections.</summary>
    private const int Run = 128;

    private readonly SpendingTable _table;
    private readonly SpentPositions _spent;
    private readonly DoubleDouble _level;
    private readonly DoubleDouble _initial;
    private readonly DoubleDouble _factor;
    private readonly double _cap;
    private readonly List<int> _known = [];
    private int[] _spentBefore = [];

    /// <param name="table">The shape.</param>
    /// <param name="settings">Level and initial wealth.</param>
    /// <param name="factor">The share of the wealth that may be spent: 1, 1 - lambda or tau - lambda.</param>
    /// <param name="cap">No level lies above it.</param>
    /// <param name="spent">Which experiments use up a position.</param>
    public WealthRule(SpendingTable table, OnlineSettings settings, DoubleDouble factor, double cap, SpentPositions spent)
    {
        _table = table;
        _spent = spent;
        _level = DoubleDouble.From(settings.Level.Value);
        _initial = DoubleDouble.From(settings.InitialWealth!.Value);
        _factor = factor;
        _cap = cap;
    }

    public override double Next(int position)
    {
        int next = _spent.Count + 1;
        DoubleDouble weighted = _initial * _table.Weight(next);
        if (_known.Count > 0)
        {
            weighted += (_level - _initial) * _table.Weight(next - _spentBefore[0]);
            weighted += _level * WeightsOfLaterRejections(next);
        }

        return Math.Min(_cap, _table.Level(_factor * weighted));
    }

    public override void Started(int position, double level) => _spent.Started();

    public override void Finished(int position, PValue p, bool rejected, int started)
    {
        if (_spent.GivesBack(p))
        {
            for (int j = _known.Count - 1; j >= 0 && _known[j] >= position; j--)
            {
                _spentBefore[j]--;
            }
        }

        if (rejected)
        {
            if (_spentBefore.Length == _known.Count)
            {
                Array.Resize(ref _spentBefore, Math.Max(16, 2 * _known.Count));
            }

            _spentBefore[_known.Count] = _spent.Count;
            _known.Add(started);
        }
    }

    private DoubleDouble WeightsOfLaterRejections(int next)
    {
        ReadOnlySpan<double> weights = _table.Upto(next);
        DoubleDouble sum = default;
        for (int from = 1; from < _known.Count; from += Run)
        {
            double run = 0;
            foreach (int before in _spentBefore.AsSpan(from, Math.Min(Run, _known.Count - from)))
            {
                run += weights[next - before - 1];
            }

            sum += DoubleDouble.From(run);
        }

        return sum;
    }
}
