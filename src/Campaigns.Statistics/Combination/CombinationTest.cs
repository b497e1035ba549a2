using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Combination;

/// <summary>A test of the global null, that every hypothesis of a family is true, from the p-values of the family: one sealed class in one file, and one line in <see cref="CombinationRegistry"/>.</summary>
/// <remarks>A small p-value says that something in the family is real, and nothing of any single hypothesis.</remarks>
public abstract class CombinationTest
{
    /// <summary>The short, frozen, lower-case word by which commands and files name the test.</summary>
    public abstract string Key { get; }

    /// <summary>The test's published name.</summary>
    public abstract string Name { get; }

    /// <summary>What must hold for its p-value to be one, in one sentence for people.</summary>
    public abstract string Assumes { get; }

    /// <summary>Where it was published.</summary>
    public abstract string Source { get; }

    /// <summary>Whether hypotheses without a p-value count, as p = 1; else the test takes those that have one.</summary>
    public abstract bool CountsUntested { get; }

    /// <summary>Whether the test takes weights.</summary>
    public virtual bool TakesWeights => false;

    /// <summary>Tests the global null.</summary>
    /// <param name="p">The p-values at hand, in any order.</param>
    /// <param name="familySize">Hypotheses in the family, tested or not; at least the number of p-values.</param>
    /// <param name="weights">One weight for each p-value, fixed before the data, at least 0 and finite; empty for equal weights. A test without weights takes none.</param>
    /// <returns>Statistic and p-value, or the reason why there are none. A single p-value gives itself where the family has one hypothesis.</returns>
    /// <exception cref="ArgumentException">The family is smaller than the p-values are many; weights that do not fit.</exception>
    public CombinationOutcome Combine(ReadOnlySpan<PValue> p, int familySize, ReadOnlySpan<double> weights = default)
    {
        if (familySize < p.Length)
        {
            throw new ArgumentException(FormattableString.Invariant($"A family of {familySize} cannot hold {p.Length} p-values."), nameof(familySize));
        }

        if (weights.Length > 0 && (!TakesWeights || weights.Length != p.Length))
        {
            throw new ArgumentException(TakesWeights ? "There is one weight for each p-value." : $"{Name} takes no weights.", nameof(weights));
        }

        foreach (double weight in weights)
        {
            if (!(weight >= 0 && double.IsFinite(weight)))
            {
                throw new ArgumentException(FormattableString.Invariant($"A weight is a number from 0 up, not {weight:R}."), nameof(weights));
            }
        }

        (PValue[] used, double[] shares) = Weighted(p, weights);
        return used.Length > 0 ? CombineUsed(used, familySize, shares)
            : CombinationOutcome.Undefined(p.Length > 0 ? "every weight is 0" : "no experiment has a p-value yet");
    }

    /// <summary>The test itself, on at least one p-value.</summary>
    /// <param name="p">The p-values with a weight above 0.</param>
    /// <param name="familySize">Hypotheses in the family.</param>
    /// <param name="weights">Their weights, the largest 1.</param>
    protected abstract CombinationOutcome CombineUsed(ReadOnlySpan<PValue> p, int familySize, ReadOnlySpan<double> weights);

    /// <summary>What carries weight. Weights over their largest stay in range, also when they are squared and added.</summary>
    private static (PValue[] P, double[] Weights) Weighted(ReadOnlySpan<PValue> p, ReadOnlySpan<double> weights)
    {
        if (weights.Length == 0)
        {
            double[] equal = new double[p.Length];
            Array.Fill(equal, 1);
            return (p.ToArray(), equal);
        }

        double largest = 0;
        foreach (double weight in weights)
        {
            largest = Math.Max(largest, weight);
        }

        var used = new List<PValue>();
        var shares = new List<double>();
        for (int i = 0; i < p.Length; i++)
        {
            if (weights[i] > 0)
            {
                used.Add(p[i]);
                shares.Add(weights[i] / largest);
            }
        }

        return ([.. used], [.. shares]);
    }
}
