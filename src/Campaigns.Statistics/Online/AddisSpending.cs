using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Online;

/// <summary>ADDIS-spending: alpha-spending that uses up no share for experiments whose p-value is at most lambda or above tau.</summary>
/// <remarks>alpha(t) = alpha (tau - lambda) gamma(k), k one more than the earlier experiments that run or have lambda &lt; p &lt;= tau.</remarks>
public sealed class AddisSpending : OnlineProcedure
{
    /// <inheritdoc/>
    public override string Key => "addis-spending";

    /// <inheritdoc/>
    public override string Name => "ADDIS-spending";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.Familywise;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.IndependentConservative;

    /// <inheritdoc/>
    public override string Guarantee => "The probability of at least one false survivor is at most the level if the p-values of experiments without an effect are independent of each other and of all others, and uniformly conservative (exactly uniform ones are).";

    /// <inheritdoc/>
    public override string Source => "J. Tian and A. Ramdas (2021), Statistical Methods in Medical Research 30:976-993";

    /// <inheritdoc/>
    public override string DefaultShape => "p1.6";

    /// <inheritdoc/>
    public override double? DefaultLambda => 0.25;

    /// <inheritdoc/>
    public override double? DefaultTau => 0.5;

    /// <inheritdoc/>
    public override bool LambdaMayBeZero => true;

    private protected override LevelRule Rule(OnlineSettings settings, SpendingTable table)
    {
        (double lambda, double tau) = (settings.Lambda!.Value, settings.Tau!.Value);
        DoubleDouble amount = DoubleDouble.From(settings.Level.Value) * (DoubleDouble.From(tau) - DoubleDouble.From(lambda));
        return new SpendingRule(table, amount, new SpentPositions(lambda, tau));
    }
}
