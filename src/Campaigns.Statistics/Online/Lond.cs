using Campaigns.Statistics.Corrections;

namespace Campaigns.Statistics.Online;

/// <summary>LOND: every experiment gets its share of the level times one more than the rejections so far.</summary>
/// <remarks>alpha(t) = alpha gamma(t) (D + 1), D the rejections known at the start.</remarks>
public sealed class Lond : OnlineProcedure
{
    /// <inheritdoc/>
    public override string Key => "lond";

    /// <inheritdoc/>
    public override string Name => "LOND";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.FalseDiscovery;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.PositiveRegression;

    /// <inheritdoc/>
    public override string Guarantee => "The expected share of false survivors among all survivors is at most the level if the experiments are independent or positively dependent. It holds at every number of experiments fixed in advance, not where one stops because of the results.";

    /// <inheritdoc/>
    public override string Source => "A. Javanmard and A. Montanari (2015), arXiv 1502.06197; experiments that overlap: T. Zrnic, A. Ramdas and M. I. Jordan (2021), Journal of Machine Learning Research 22(33):1-39";

    /// <inheritdoc/>
    public override string DefaultShape => "jm";

    private protected override LevelRule Rule(OnlineSettings settings, SpendingTable table) =>
        new LondRule(table, settings.Level.Value, false);
}
