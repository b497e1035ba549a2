using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Online;

/// <summary>LORD++: an initial wealth is spread over the experiments, and every rejection earns wealth that is spread over those after it.</summary>
/// <remarks>alpha(t) = W0 gamma(t) + (alpha - W0) gamma(t - tau(1)) + alpha sum over j &gt;= 2 of gamma(t - tau(j)), tau(j) the time at which the j-th rejection became known. Where many became known at once this could exceed 1; it then is the largest double below 1, so that p = 1 never survives.</remarks>
public sealed class Lord : OnlineProcedure
{
    /// <inheritdoc/>
    public override string Key => "lord";

    /// <inheritdoc/>
    public override string Name => "LORD++";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.FalseDiscovery;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.Independent;

    /// <inheritdoc/>
    public override string Guarantee => "The expected share of false survivors among all survivors is at most the level if the p-values of experiments without an effect are independent of each other and of all others. It holds at every number of experiments fixed in advance, not where one stops because of the results. Where each of them is only valid given the decisions before it, the expected number of false survivors is at most the level times the expected number of survivors.";

    /// <inheritdoc/>
    public override string Source => "A. Ramdas, F. Yang, M. J. Wainwright and M. I. Jordan (2017), Advances in Neural Information Processing Systems 30; experiments that overlap: T. Zrnic, A. Ramdas and M. I. Jordan (2021), Journal of Machine Learning Research 22(33):1-39";

    /// <inheritdoc/>
    public override string DefaultShape => "jm";

    /// <inheritdoc/>
    public override bool TakesWealth => true;

    private protected override LevelRule Rule(OnlineSettings settings, SpendingTable table) =>
        new WealthRule(table, settings, DoubleDouble.From(1.0), Math.BitDecrement(1), new SpentPositions(-1, 1));
}
