using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Combination;

/// <summary>Simes' test: the smallest m p(k) / k, which is the smallest p-value adjusted by Benjamini and Hochberg's procedure.</summary>
public sealed class SimesCombination : CombinationTest
{
    /// <inheritdoc/>
    public override string Key => "simes";

    /// <inheritdoc/>
    public override string Name => "Simes";

    /// <inheritdoc/>
    public override string Assumes => "Independent or positively dependent experiments; exact for independent ones.";

    /// <inheritdoc/>
    public override string Source => "R. J. Simes (1986), Biometrika 73:751-754";

    /// <inheritdoc/>
    public override bool CountsUntested => true;

    /// <summary>The smallest adjusted p-value of a family.</summary>
    internal static PValue Smallest(Correction correction, RankedFamily family)
    {
        PValue smallest = PValue.One;
        foreach (PValue adjusted in correction.Adjust(family))
        {
            smallest = adjusted < smallest ? adjusted : smallest;
        }

        return smallest;
    }

    /// <inheritdoc/>
    protected override CombinationOutcome CombineUsed(ReadOnlySpan<PValue> p, int familySize, ReadOnlySpan<double> weights)
    {
        PValue smallest = Smallest(new BenjaminiHochberg(), RankedFamily.Of(p, familySize));
        return CombinationOutcome.Of(smallest.IsBelowDoubleRange ? double.NaN : smallest.Value, smallest);
    }
}
