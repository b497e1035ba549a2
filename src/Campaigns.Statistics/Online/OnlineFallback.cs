using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Online;

/// <summary>Online fallback: alpha-spending in which an experiment that is rejected leaves its level to the next one.</summary>
/// <remarks>alpha(t) = alpha gamma(t), plus alpha(t - 1) if experiment t - 1 is known to be rejected when t starts.</remarks>
public sealed class OnlineFallback : OnlineProcedure
{
    /// <inheritdoc/>
    public override string Key => "online-fallback";

    /// <inheritdoc/>
    public override string Name => "Online fallback";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.Familywise;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.Any;

    /// <inheritdoc/>
    public override string Guarantee => "The probability of at least one false survivor is at most the level, whatever the dependence between experiments.";

    /// <inheritdoc/>
    public override string Source => "J. Tian and A. Ramdas (2021), Statistical Methods in Medical Research 30:976-993";

    /// <inheritdoc/>
    public override string DefaultShape => "jm";

    private protected override LevelRule Rule(OnlineSettings settings, SpendingTable table) =>
        new FallbackRule(table, DoubleDouble.From(settings.Level.Value));

    private sealed class FallbackRule(SpendingTable table, DoubleDouble level) : LevelRule
    {
        private double _last;
        private double _left;

        public override double Next(int position) => table.Level(level * table.Weight(position)) + _left;

        public override void Started(int position, double level) => (_last, _left) = (level, 0);

        public override void Finished(int position, PValue p, bool rejected, int started)
        {
            if (rejected && position == started)
            {
                _left = _last;
            }
        }
    }
}
