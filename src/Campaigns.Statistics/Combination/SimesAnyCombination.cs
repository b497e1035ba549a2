using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Combination;

/// <summary>Simes' test for any dependence: the smallest m p(k) / k times 1 + 1/2 + ... + 1/m, which is the smallest p-value adjusted by Benjamini and Yekutieli's procedure.</summary>
public sealed class SimesAnyCombination : CombinationTest
{
    /// <inheritdoc/>
    public override string Key => "simes-any";

    /// <inheritdoc/>
    public override string Name => "Simes for any dependence";

    /// <inheritdoc/>
    public override string Assumes => "Nothing of the dependence between experiments.";

    /// <inheritdoc/>
    public override string Source => "G. Hommel (1983), Biometrical Journal 25:423-430; R. J. Simes (1986), Biometrika 73:751-754";

    /// <inheritdoc/>
    public override bool CountsUntested => true;

    /// <inheritdoc/>
    protected override CombinationOutcome CombineUsed(ReadOnlySpan<PValue> p, int familySize, ReadOnlySpan<double> weights)
    {
        var family = RankedFamily.Of(p, familySize);
        PValue simes = SimesCombination.Smallest(new BenjaminiHochberg(), family);
        return CombinationOutcome.Of(simes.IsBelowDoubleRange ? double.NaN : simes.Value, SimesCombination.Smallest(new BenjaminiYekutieli(), family));
    }
}
