using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Corrections;

/// <summary>Bonferroni's correction with weights: the level is shared out in proportion to them.</summary>
/// <remarks>The adjusted p-value is p times the sum of all weights over its own.</remarks>
public sealed class WeightedBonferroni : WeightedCorrection
{
    /// <inheritdoc/>
    public override string Key => "weighted-bonferroni";

    /// <inheritdoc/>
    public override string Name => "Weighted Bonferroni";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.Familywise;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.Any;

    /// <inheritdoc/>
    public override string Guarantee =>
        "The probability of at least one false survivor is at most the level, whatever the dependence between experiments, if the weights were fixed before the data.";

    /// <inheritdoc/>
    public override string Source => "R. Rosenthal and D. B. Rubin (1983), Psychological Bulletin 94:540-541; inequality: O. J. Dunn (1961), Journal of the American Statistical Association 56:52-64";

    private protected override bool IsStepUp => true;

    private protected override (DoubleDouble Weights, int Divisor) FactorAt(int rank, DoubleDouble total, DoubleDouble from) => (total, 1);
}
