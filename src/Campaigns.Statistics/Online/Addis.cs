using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Online;

/// <summary>ADDIS: SAFFRON that also uses up no share for experiments whose p-value is above tau, the discarded ones.</summary>
/// <remarks>alpha(t) = min(lambda, (tau - lambda) (W0 g(S - C0) + (alpha - W0) g(S - k(1) - C1) + alpha sum over j &gt;= 2 of g(S - k(j) - Cj))) with g counted from 0, S the experiments with p &lt;= tau, k(j) those among them up to the j-th rejection.</remarks>
public sealed class Addis : OnlineProcedure
{
    /// <inheritdoc/>
    public override string Key => "addis";

    /// <inheritdoc/>
    public override string Name => "ADDIS";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.FalseDiscovery;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.IndependentConservative;

    /// <inheritdoc/>
    public override string Guarantee => "The expected share of false survivors among all survivors is at most the level if the p-values of experiments without an effect are independent of each other and of all others, and uniformly conservative (exactly uniform ones are). It holds at every number of experiments fixed in advance, not where one stops because of the results.";

    /// <inheritdoc/>
    public override string Source => "J. Tian and A. Ramdas (2019), Advances in Neural Information Processing Systems 32:9388-9396";

    /// <inheritdoc/>
    public override string DefaultShape => "p1.6";

    /// <inheritdoc/>
    public override bool TakesWealth => true;

    /// <inheritdoc/>
    public override double? DefaultLambda => 0.25;

    /// <inheritdoc/>
    public override double? DefaultTau => 0.5;

    private protected override LevelRule Rule(OnlineSettings settings, SpendingTable table)
    {
        (double lambda, double tau) = (settings.Lambda!.Value, settings.Tau!.Value);
        return new WealthRule(table, settings, DoubleDouble.From(tau) - DoubleDouble.From(lambda), lambda, new SpentPositions(lambda, tau));
    }
}
