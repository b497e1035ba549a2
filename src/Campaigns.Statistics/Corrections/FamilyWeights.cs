using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Corrections;

/// <summary>Weights of a family's hypotheses in the order of ranks, on a scale of their own.</summary>
/// <remarks>The scale is a power of two that brings the largest weight, or the sum of the untested ones, into [1, 2), so that nothing leaves the range of doubles; a weight below 10^-30 of it is taken for 0.</remarks>
internal sealed class FamilyWeights
{
    private const double Least = 1e-30;

    private readonly double[] _byRank;

    private FamilyWeights(double[] byRank, double rest)
    {
        _byRank = byRank;
        Rest = rest;

        // Summed from the last rank on, as a procedure does that goes down the ranks: at the first rank both sums are the same bits.
        DoubleDouble total = DoubleDouble.From(rest);
        for (int rank = byRank.Length - 1; rank >= 0; rank--)
        {
            total += DoubleDouble.From(byRank[rank]);
        }

        Total = total;
    }

    /// <summary>The untested hypotheses' weights together.</summary>
    public double Rest { get; }

    /// <summary>All weights together.</summary>
    public DoubleDouble Total { get; }

    /// <summary>The weight of a rank, counted from 0: 0, or from 10^-30 to 2.</summary>
    public double AtRank(int rank) => _byRank[rank];

    /// <summary>Weights in the order of some ranks.</summary>
    /// <param name="scaled">Weights as <see cref="Scaled"/> gives them.</param>
    /// <param name="rest">The untested hypotheses' weights together, on the same scale.</param>
    /// <param name="order">For each rank the position of its weight.</param>
    public static FamilyWeights InOrder(ReadOnlySpan<double> scaled, double rest, ReadOnlySpan<int> order)
    {
        double[] byRank = new double[order.Length];
        for (int rank = 0; rank < byRank.Length; rank++)
        {
            byRank[rank] = scaled[order[rank]];
        }

        return new FamilyWeights(byRank, rest);
    }

    /// <summary>Checks weights and brings them to scale.</summary>
    /// <param name="weights">One for each p-value at hand.</param>
    /// <param name="rest">The untested hypotheses' weights together.</param>
    /// <param name="count">P-values at hand.</param>
    /// <param name="familySize">Hypotheses in the family.</param>
    /// <exception cref="ArgumentException">Not one weight a p-value; a weight that is negative, infinite or NaN; all 0; a rest where nothing is untested.</exception>
    public static (double[] Each, double OfRest) Scaled(ReadOnlySpan<double> weights, double rest, int count, int familySize)
    {
        if (weights.Length != count)
        {
            throw new ArgumentException(FormattableString.Invariant($"{weights.Length} weights were given for {count} p-values: each needs one."), nameof(weights));
        }

        double largest = Check(rest, "The weight of the untested hypotheses together");
        for (int i = 0; i < count; i++)
        {
            largest = Math.Max(largest, Check(weights[i], FormattableString.Invariant($"Weight number {i + 1}")));
        }

        if (largest == 0 && familySize > 0)
        {
            throw new ArgumentException("All weights of the family are 0: at least one must be positive.", nameof(weights));
        }

        if (rest > 0 && familySize == count)
        {
            throw new ArgumentException(FormattableString.Invariant($"A weight of {rest:R} was given for untested hypotheses, but all {count} of the family have a p-value."), nameof(rest));
        }

        int power = largest > 0 ? Math.ILogB(largest) : 0;
        double[] scaled = new double[count];
        for (int i = 0; i < count; i++)
        {
            double weight = Math.ScaleB(weights[i], -power);
            scaled[i] = weight < Least ? 0 : weight;
        }

        return (scaled, Math.ScaleB(rest, -power));
    }

    private static double Check(double weight, string which) =>
        double.IsFinite(weight) && weight >= 0
            ? weight
            : throw new ArgumentException(FormattableString.Invariant($"{which} is {weight:R}: a weight is a number from 0 up."));
}
