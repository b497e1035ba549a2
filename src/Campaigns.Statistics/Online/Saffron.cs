using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Online;

/// <summary>SAFFRON: LORD++ that uses up no share for experiments whose p-value is at most lambda, the candidates.</summary>
/// <remarks>alpha(t) = min(lambda, (1 - lambda) (W0 gamma(t - C0) + (alpha - W0) gamma(t - tau(1) - C1) + alpha sum over j &gt;= 2 of gamma(t - tau(j) - Cj))), Cj the candidates after tau(j).</remarks>
public sealed class Saffron : OnlineProcedure
{
    /// <inheritdoc/>
    public override string Key => "saffron";

    /// <inheritdoc/>
    public override string Name => "SAFFRON";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.FalseDiscovery;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.Independent;

    /// <inheritdoc/>
    public override string Guarantee => "The expected share of false survivors among all survivors is at most the level if the p-values of experiments without an effect are independent of each other and of all others. It holds at every number of experiments fixed in advance, not where one stops because of the results. Where each of them is only valid given the decisions before it, the expected number of false survivors is at most the level times the expected number of survivors.";

    /// <inheritdoc/>
    public override string Source => "A. Ramdas, T. Zrnic, M. J. Wainwright and M. I. Jordan (2018), Proceedings of Machine Learning Research 80:4286-4294; experiments that overlap: T. Zrnic, A. Ramdas and M. I. Jordan (2021), Journal of Machine Learning Research 22(33):1-39";

    /// <inheritdoc/>
    public override string DefaultShape => "p1.6";

    /// <inheritdoc/>
    public override bool TakesWealth => true;

    /// <inheritdoc/>
    public override double? DefaultLambda => 0.5;

    private protected override LevelRule Rule(OnlineSettings settings, SpendingTable table)
    {
        double lambda = settings.Lambda!.Value;
        return new WealthRule(table, settings, DoubleDouble.From(1.0) - DoubleDouble.From(lambda), lambda, new SpentPositions(lambda, 1));
    }
}
