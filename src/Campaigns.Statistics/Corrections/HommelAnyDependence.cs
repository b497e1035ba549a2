using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Corrections;

/// <summary>Hommel's correction for any dependence: closed testing with Simes' test at a level that pays for the dependence.</summary>
/// <remarks>
/// Hommel (1983): for any joint law, Simes' p-value of n hypotheses times 1 + 1/2 + ... + 1/n is a valid p-value. The sum over the whole family, H, is at least that of any intersection, so
/// the adjusted p-value is Hommel's (1988) times H. Two roundings. Whether it or Holm's is smaller depends on the p-values.
/// </remarks>
public sealed class HommelAnyDependence : Correction
{
    /// <inheritdoc/>
    public override string Key => "hommel-any";

    /// <inheritdoc/>
    public override string Name => "Hommel for any dependence";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.Familywise;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.Any;

    /// <inheritdoc/>
    public override string Guarantee => "The probability of at least one false survivor is at most the level, whatever the dependence between experiments.";

    /// <inheritdoc/>
    public override string Source => "G. Hommel (1983), Biometrical Journal 25:423-430, with G. Hommel (1988), Biometrika 75:383-386";

    /// <inheritdoc/>
    public override bool IsSimpleSelection => false;

    /// <inheritdoc/>
    protected override void AdjustSorted(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted)
    {
        Hommel.Fill(sorted, familySize, adjusted);
        (DoubleDouble factor, double divisor) = HarmonicFactor.Of(familySize);
        foreach (ref double value in adjusted)
        {
            value = ExactProducts.Quotient(value, factor.High, factor.Low, divisor * familySize);
        }
    }
}
