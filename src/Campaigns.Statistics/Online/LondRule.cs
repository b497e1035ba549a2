using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Online;

/// <summary>A share of the level times one more than the rejections known so far, for any dependence divided by 1 + 1/2 + ... + 1/t.</summary>
/// <remarks>Constant work for each experiment.</remarks>
internal sealed class LondRule(SpendingTable table, double level, bool anyDependence) : LevelRule
{
    private DoubleDouble _harmonic;
    private int _rejections;

    public override double Next(int position)
    {
        DoubleDouble weighted = DoubleDouble.From(level) * DoubleDouble.From(_rejections + 1.0) * table.Weight(position);
        return table.Level(anyDependence ? weighted / (_harmonic + Inverse(position)) : weighted);
    }

    public override void Started(int position, double level) => _harmonic += Inverse(position);

    public override void Finished(int position, PValue p, bool rejected, int started) => _rejections += rejected ? 1 : 0;

    private static DoubleDouble Inverse(int position) => DoubleDouble.From(1.0) / position;
}
