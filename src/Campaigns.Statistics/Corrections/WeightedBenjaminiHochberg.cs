using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Corrections;

/// <summary>The Benjamini-Hochberg step-up correction with weights.</summary>
/// <remarks>With ranks by p/w, the adjusted p-value of rank k is the smallest p(j)/w(j) times the sum of all weights over j, for j &gt;= k, at most 1. The untested rest takes the last ranks whatever it weighs: what was not tested is not rejected.</remarks>
public sealed class WeightedBenjaminiHochberg : WeightedCorrection
{
    /// <inheritdoc/>
    public override string Key => "weighted-bh";

    /// <inheritdoc/>
    public override string Name => "Weighted Benjamini-Hochberg";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.FalseDiscovery;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.PositiveRegression;

    /// <inheritdoc/>
    public override string Guarantee =>
        "The expected share of false survivors among all survivors is at most the level if the experiments are independent or positively dependent and the weights were fixed before the data; an experiment of great weight with p above the level can survive.";

    /// <inheritdoc/>
    public override string Source => "C. R. Genovese, K. Roeder and L. Wasserman (2006), Biometrika 93:509-524; positive dependence: G. Blanchard and E. Roquain (2008), Electronic Journal of Statistics 2:963-992";

    /// <inheritdoc/>
    public override bool MayGoBelowP => true;

    private protected override bool IsStepUp => true;

    private protected override (DoubleDouble Weights, int Divisor) FactorAt(int rank, DoubleDouble total, DoubleDouble from) => (total, rank + 1);
}
