using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Online;

/// <summary>Alpha-spending, the online form of Bonferroni's correction: every experiment gets its share of the level, whatever the others show.</summary>
/// <remarks>alpha(t) = alpha gamma(t).</remarks>
public sealed class AlphaSpending : OnlineProcedure
{
    /// <inheritdoc/>
    public override string Key => "alpha-spending";

    /// <inheritdoc/>
    public override string Name => "Alpha-spending";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.Familywise;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.Any;

    /// <inheritdoc/>
    public override string Guarantee => "The probability of at least one false survivor, and even their expected number, is at most the level, whatever the dependence between experiments.";

    /// <inheritdoc/>
    public override string Source => "J. Tian and A. Ramdas (2021), Statistical Methods in Medical Research 30:976-993";

    /// <inheritdoc/>
    public override string DefaultShape => "jm";

    private protected override LevelRule Rule(OnlineSettings settings, SpendingTable table) =>
        new SpendingRule(table, DoubleDouble.From(settings.Level.Value), new SpentPositions(-1, 1));
}
