using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Corrections;

/// <summary>Holm's step-down correction with weights, never weaker than Bonferroni's with the same weights.</summary>
/// <remarks>With ranks by p/w, the adjusted p-value of rank k is the largest p(j)/w(j) times the sum of the weights from rank j on, over j &lt;= k. It is closed testing with weighted Bonferroni tests.</remarks>
public sealed class WeightedHolm : WeightedCorrection
{
    /// <inheritdoc/>
    public override string Key => "weighted-holm";

    /// <inheritdoc/>
    public override string Name => "Weighted Holm";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.Familywise;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.Any;

    /// <inheritdoc/>
    public override string Guarantee =>
        "The probability of at least one false survivor is at most the level, whatever the dependence between experiments, if the weights were fixed before the data.";

    /// <inheritdoc/>
    public override string Source => "S. Holm (1979), Scandinavian Journal of Statistics 6:65-70; Y. Benjamini and Y. Hochberg (1997), Scandinavian Journal of Statistics 24:407-418";

    private protected override bool IsStepUp => false;

    private protected override (DoubleDouble Weights, int Divisor) FactorAt(int rank, DoubleDouble total, DoubleDouble from) => (from, 1);
}
