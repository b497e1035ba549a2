using System.Buffers;
using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Corrections;

/// <summary>The two-stage procedure of Benjamini, Krieger and Yekutieli for the false discovery rate, which first estimates how many nulls are true.</summary>
/// <remarks>
/// At level q, with q' = q/(1 + q): Benjamini and Hochberg's procedure at q' rejects r. For r = 0 nothing is rejected, for r = m everything; else the same procedure runs at q' m/(m - r).
/// Rejections only grow with q, so the adjusted p-value is the least q that rejects. With b(r) the adjusted p-value of Benjamini and Hochberg at rank r, rank i is rejected if
/// b(r) and b(i) (m - r)/m are at most q' for some r. The first term rises with r and the second falls, and the crossing moves up with i: one walk for all. Each b is a quotient of a p-value
/// and whole numbers, compared by exact products and put into q'/(1 - q') with 32 digits, rounded once. Linear time after ranking.
/// </remarks>
public sealed class TwoStageBenjaminiHochberg : Correction
{
    /// <inheritdoc/>
    public override string Key => "bky";

    /// <inheritdoc/>
    public override string Name => "Benjamini-Krieger-Yekutieli, two stages";

    /// <inheritdoc/>
    public override ErrorRate Controls => ErrorRate.FalseDiscovery;

    /// <inheritdoc/>
    public override Dependence ValidUnder => Dependence.Independent;

    /// <inheritdoc/>
    public override string Guarantee =>
        "The expected share of false survivors among all survivors is at most the level if the experiments are independent; where most nulls look false, an experiment with p above the level can survive.";

    /// <inheritdoc/>
    public override string Source => "Y. Benjamini, A. M. Krieger and D. Yekutieli (2006), Biometrika 93:491-507, definition 6";

    /// <inheritdoc/>
    public override bool MayGoBelowP => true;

    /// <inheritdoc/>
    public override bool IsSimpleSelection => false;

    /// <inheritdoc/>
    protected override void AdjustSorted(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted)
    {
        Quotient[] stepUp = ArrayPool<Quotient>.Shared.Rent(sorted.Length);
        FillStepUp(sorted, familySize, stepUp);
        int tested = sorted.Length;
        int r = 1;
        double highest = 0;
        for (int i = 0; i < tested; i++)
        {
            Quotient own = stepUp[i];
            while (r <= tested && stepUp[r - 1].IsLess(own.With(familySize - r)))
            {
                r++;
            }

            // Ranks past the tested ones have b = 1.
            Quotient least = r <= tested ? stepUp[r - 1] : Quotient.One(familySize);
            if (r > 1 && own.With(familySize - r + 1) is { } before && before.IsLess(least))
            {
                least = before;
            }

            highest = Math.Max(highest, least.Odds());
            adjusted[i] = highest;
        }

        ArrayPool<Quotient>.Shared.Return(stepUp);
    }

    /// <summary>The adjusted p-values of Benjamini and Hochberg, each as the quotient m p(j) / j that is least among j from its own rank up.</summary>
    private static void FillStepUp(ReadOnlySpan<double> sorted, int familySize, Span<Quotient> stepUp)
    {
        Quotient least = Quotient.One(familySize);
        for (int k = sorted.Length - 1; k >= 0; k--)
        {
            var own = new Quotient(sorted[k], familySize, k + 1);
            least = least.IsLess(own) ? least : own;
            stepUp[k] = least;
        }
    }

    /// <summary>p times a whole number over a whole number.</summary>
    private readonly record struct Quotient(double P, int Times, int Over)
    {
        public static Quotient One(int familySize) => new(1, familySize, familySize);

        public Quotient With(int times) => this with { Times = times };

        /// <summary>Exact while products of two whole numbers stay below 2^53, as they do for families of up to 94 million.</summary>
        public bool IsLess(Quotient other) => ExactProducts.IsLess(P, (double)Times * other.Over, other.P, (double)other.Times * Over);

        /// <summary>x / (1 - x) for this quotient x, at most 1.</summary>
        public double Odds()
        {
            DoubleDouble product = DoubleDouble.From(P) * DoubleDouble.From((double)Times);
            DoubleDouble rest = DoubleDouble.From((double)Over) - product;
            return product.High >= rest.High ? 1 : ExactProducts.Quotient(P, Times, 0, rest.High, rest.Low);
        }
    }
}
