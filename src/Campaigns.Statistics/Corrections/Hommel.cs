using System.Buffers;

namespace Campaigns.Statistics.Corrections;

/// <summary>Hommel's correction: closed testing with Simes' test of every intersection; never weaker than Hochberg's.</summary>
/// <remarks>
/// The adjusted p-value of p is the smallest max(a(h + 1), h p) over h = 0..m, where a(s) is the Simes p-value of the s largest p-values and a(m + 1) = 0.
/// The first term falls in h and the second rises, so as p grows the crossing moves down: one walk for all. Products and quotients are rounded once; since rounding keeps
/// order, the least of rounded candidates is the rounded least. Time m log m, checked against closed testing over all intersections.
/// </remarks>
public sealed class Hommel : Correction
{
    /// <inheritdoc/>
    public override string Key => "hommel";

    /// <inheritdoc/>
    public override string Name => "Hommel";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.Familywise;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.Simes;

    /// <inheritdoc/>
    public override string Guarantee => "The probability of at least one false survivor is at most the level if Simes' inequality holds for the true nulls, as it does for independent experiments.";

    /// <inheritdoc/>
    public override string Source => "G. Hommel (1988), Biometrika 75:383-386";

    /// <inheritdoc/>
    public override bool IsSimpleSelection => false;

    /// <inheritdoc/>
    protected override void AdjustSorted(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted) => Fill(sorted, familySize, adjusted);

    /// <summary>The adjusted p-values of ascending p-values.</summary>
    internal static void Fill(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted)
    {
        int untested = familySize - sorted.Length;
        double[] simes = ArrayPool<double>.Shared.Rent(sorted.Length);
        TailSimes.Fill(sorted, familySize, simes.AsSpan(0, sorted.Length));

        // Tail number i leaves out the i smallest p-values: a(h) is tail m - h. Without any tested p-value it is 1, so no h below the untested ones improves on 1.
        int h = familySize;
        for (int k = 0; k < sorted.Length; k++)
        {
            double p = sorted[k];
            while (h > untested && (h - 1) * p >= simes[familySize - h])
            {
                h--;
            }

            double before = h > untested ? simes[familySize - h] : 1;
            adjusted[k] = Math.Min(h * p, before);
        }

        ArrayPool<double>.Shared.Return(simes);
    }
}
