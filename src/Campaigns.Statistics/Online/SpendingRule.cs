using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Online;

/// <summary>An amount spread over positions that are used up one after another, whatever was rejected: amount times gamma(k), k one more than the positions used up.</summary>
/// <remarks>Constant work for each experiment.</remarks>
internal sealed class SpendingRule(SpendingTable table, DoubleDouble amount, SpentPositions spent) : LevelRule
{
    public override double Next(int position) => table.Level(amount * table.Weight(spent.Count + 1));

    public override void Started(int position, double level) => spent.Started();

    public override void Finished(int position, PValue p, bool rejected, int started) => spent.GivesBack(p);
}
