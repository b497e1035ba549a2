using Campaigns.Statistics.Corrections;

namespace Campaigns.Statistics.Online;

/// <summary>LOND with levels divided by 1 + 1/2 + ... + 1/t, which holds under any dependence.</summary>
/// <remarks>alpha(t) = alpha gamma(t) (D + 1) / H(t), D the rejections known at the start.</remarks>
public sealed class LondAny : OnlineProcedure
{
    /// <inheritdoc/>
    public override string Key => "lond-any";

    /// <inheritdoc/>
    public override string Name => "LOND for any dependence";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.FalseDiscovery;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.Any;

    /// <inheritdoc/>
    public override string Guarantee => "The expected share of false survivors among all survivors is at most the level, whatever the dependence between experiments. It holds at every number of experiments fixed in advance, not where one stops because of the results.";

    /// <inheritdoc/>
    public override string Source => "A. Javanmard and A. Montanari (2015), arXiv 1502.06197; any dependence: Y. Benjamini and D. Yekutieli (2001), Annals of Statistics 29:1165-1188";

    /// <inheritdoc/>
    public override string DefaultShape => "jm";

    private protected override LevelRule Rule(OnlineSettings settings, SpendingTable table) =>
        new LondRule(table, settings.Level.Value, true);
}
