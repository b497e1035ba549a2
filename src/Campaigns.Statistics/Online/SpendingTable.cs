using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Online;

/// <summary>A shape over a horizon, as a stream uses it: weights looked up, and amounts divided by their sum with one rounding.</summary>
internal sealed class SpendingTable
{
    private readonly SpendingShape _shape;
    private readonly int _horizon;
    private readonly DoubleDouble _total;
    private double[] _weights = [];

    public SpendingTable(SpendingShape shape, int? horizon)
    {
        _shape = shape;
        _horizon = horizon ?? int.MaxValue;
        _total = shape.Total(horizon);
    }

    /// <summary>The weight of a position; 0 after the horizon.</summary>
    public DoubleDouble Weight(int position) => DoubleDouble.From(Upto(position)[position - 1]);

    /// <summary>The weights of at least the positions up to one, at index position - 1; 0 after the horizon.</summary>
    public ReadOnlySpan<double> Upto(int position)
    {
        if (_weights.Length < position)
        {
            int known = _weights.Length;
            Array.Resize(ref _weights, Math.Max(position, (int)Math.Min(2L * known, int.MaxValue / 2)));
            for (int j = known + 1; j <= Math.Min(_weights.Length, _horizon); j++)
            {
                _weights[j - 1] = _shape.Weight(j);
            }
        }

        return _weights;
    }

    /// <summary>A sum of levels times weights, divided by the sum of all weights; rounded to a double here and nowhere before.</summary>
    public double Level(DoubleDouble weighted) => (weighted / _total).High;
}
