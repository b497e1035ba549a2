using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Planning;

/// <summary>Power of the F test of a one-way experiment, and what it takes to reach a wanted one.</summary>
/// <remarks>
/// Everything refers to the F test: independent, normally distributed values with the same standard deviation sigma in every group. Power is P(F > critical value) under the noncentral F law with lambda = sum of n_i (mu_i - mu)^2/sigma^2, mu the mean weighted with the n_i.
/// Cohen's f is sqrt(lambda/N); in a balanced design it is the standard deviation of the group means (divisor k) over sigma. Source: Cohen (1988), Statistical Power Analysis for the Behavioral Sciences, chapter 8.
/// The level is the one at which the single test is made: under Bonferroni's correction over m tests the campaign's level over m.
/// </remarks>
public static class OneWayPower
{
    /// <summary>Replicates are not searched for beyond this number.</summary>
    public const int MostReplicates = 10_000_000;

    /// <summary>The probability that the F test rejects.</summary>
    /// <param name="design">Groups and their sizes.</param>
    /// <param name="level">The level of the test.</param>
    /// <param name="noncentrality">Lambda, at least 0 and finite; <see cref="Noncentrality"/> makes it from Cohen's f, <see cref="NoncentralityOfDifference"/> from a difference.</param>
    /// <returns>In [0, 1]; the level itself where lambda is 0.</returns>
    /// <exception cref="ArgumentOutOfRangeException">Lambda is outside its range.</exception>
    /// <remarks>Cost: one quantile of F and one noncentral tail, about 5 us.</remarks>
    public static double Power(OneWayDesign design, SignificanceLevel level, double noncentrality) =>
        Law(design, noncentrality).UpperTail(CriticalValue(design, level));

    /// <summary>The F that the test must exceed to reject.</summary>
    /// <param name="design">Groups and their sizes.</param>
    /// <param name="level">The level of the test.</param>
    public static double CriticalValue(OneWayDesign design, SignificanceLevel level)
    {
        ArgumentNullException.ThrowIfNull(design);
        return FDistribution.For(design.BetweenDegreesOfFreedom, design.WithinDegreesOfFreedom).UpperQuantile(level.Value);
    }

    /// <summary>Lambda of an effect: N f^2.</summary>
    /// <param name="design">Groups and their sizes.</param>
    /// <param name="cohenF">Cohen's f, at least 0.</param>
    public static double Noncentrality(OneWayDesign design, double cohenF)
    {
        ArgumentNullException.ThrowIfNull(design);
        return design.Observations * cohenF * cohenF;
    }

    /// <summary>The least lambda that two means a difference apart can have: the two smallest groups have them, and all others lie at their weighted mean.</summary>
    /// <param name="design">Groups and their sizes.</param>
    /// <param name="difference">In units of the response, finite.</param>
    /// <param name="standardDeviation">Within groups, in the same units, positive and finite.</param>
    public static double NoncentralityOfDifference(OneWayDesign design, double difference, double standardDeviation)
    {
        ArgumentNullException.ThrowIfNull(design);
        double standardised = difference / Deviation(standardDeviation);
        return standardised * standardised * design.LeastPairWeight;
    }

    /// <summary>Cohen's f of given group means.</summary>
    /// <param name="means">In units of the response, finite; differences from one of them serve as well, and keep more digits where the means are large.</param>
    /// <param name="groupSizes">Observations in every group, or any numbers in proportion to them; equal ones for a balanced design.</param>
    /// <param name="standardDeviation">Within groups, in the same units, positive and finite.</param>
    /// <returns>sqrt(sum of n_i (mu_i - mu)^2/N)/sigma; positive infinity where it lies beyond the range of doubles.</returns>
    /// <exception cref="ArgumentException">The lists are empty or differ in length.</exception>
    public static double CohenFOfMeans(ReadOnlySpan<double> means, ReadOnlySpan<int> groupSizes, double standardDeviation)
    {
        if (means.Length == 0 || means.Length != groupSizes.Length)
        {
            throw new ArgumentException("Every group has one mean and one size.", nameof(means));
        }

        // Scaled by the widest gap, squares neither underflow nor overflow.
        double origin = means[0];
        double widest = 0;
        foreach (double mean in means)
        {
            widest = Math.Max(widest, Math.Abs(mean - origin));
        }

        if (widest == 0)
        {
            return 0;
        }

        double observations = 0;
        double sum = 0;
        for (int i = 0; i < means.Length; i++)
        {
            observations += groupSizes[i];
            sum += groupSizes[i] * ((means[i] - origin) / widest);
        }

        double centre = sum / observations;
        double squares = 0;
        for (int i = 0; i < means.Length; i++)
        {
            double deviation = ((means[i] - origin) / widest) - centre;
            squares += groupSizes[i] * deviation * deviation;
        }

        return Math.Sqrt(squares / observations) * (widest / Deviation(standardDeviation));
    }

    /// <summary>Cohen's f of a lambda: sqrt(lambda/N).</summary>
    /// <param name="design">Groups and their sizes.</param>
    /// <param name="noncentrality">Lambda, at least 0.</param>
    public static double CohenF(OneWayDesign design, double noncentrality)
    {
        ArgumentNullException.ThrowIfNull(design);
        return Math.Sqrt(noncentrality / design.Observations);
    }

    /// <summary>The largest difference of two means that a lambda leaves possible: the two smallest groups have them, and all others lie at their weighted mean.</summary>
    /// <param name="design">Groups and their sizes.</param>
    /// <param name="noncentrality">Lambda, at least 0.</param>
    /// <param name="standardDeviation">Within groups, in units of the response, positive and finite.</param>
    /// <returns>In units of the response; the inverse of <see cref="NoncentralityOfDifference"/>.</returns>
    public static double LargestDifference(OneWayDesign design, double noncentrality, double standardDeviation)
    {
        ArgumentNullException.ThrowIfNull(design);
        return Deviation(standardDeviation) * Math.Sqrt(noncentrality / design.LeastPairWeight);
    }

    /// <summary>The least lambda that is found with a wanted power.</summary>
    /// <param name="design">Groups and their sizes.</param>
    /// <param name="level">The level of the test.</param>
    /// <param name="power">The wanted power; above the level and below 1.</param>
    /// <exception cref="ArgumentOutOfRangeException">The power is not above the level and below 1.</exception>
    /// <remarks>Cost: one quantile of F and one noncentral tail inverted, about 20 us.</remarks>
    public static double SmallestNoncentrality(OneWayDesign design, SignificanceLevel level, double power)
    {
        double critical = CriticalValue(design, level);
        return NoncentralF.NoncentralityOfUpperTail(critical, design.BetweenDegreesOfFreedom, design.WithinDegreesOfFreedom, Wanted(power, level));
    }

    /// <summary>The least number of replicates, at least 2, of a balanced design that finds an effect with a wanted power.</summary>
    /// <param name="groups">Groups, at least 2.</param>
    /// <param name="cohenF">Cohen's f, positive.</param>
    /// <param name="level">The level of the test.</param>
    /// <param name="power">The wanted power; above the level and below 1.</param>
    /// <returns>Replicates in each group; null where <see cref="MostReplicates"/> are not enough.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument is outside its range.</exception>
    /// <remarks>Power rises with replicates, so the number is doubled until it suffices and the gap then halved. Cost: up to 48 evaluations of power.</remarks>
    public static int? SmallestReplicates(int groups, double cohenF, SignificanceLevel level, double power)
    {
        Wanted(power, level);
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(cohenF);
        int tooFew = 1;
        int enough = 2;
        while (!Suffices(enough))
        {
            if (enough == MostReplicates)
            {
                return null;
            }

            tooFew = enough;
            enough = Math.Min(MostReplicates, enough * 2);
        }

        while (enough - tooFew > 1)
        {
            int middle = tooFew + ((enough - tooFew) / 2);
            (tooFew, enough) = Suffices(middle) ? (tooFew, middle) : (middle, enough);
        }

        return enough;

        bool Suffices(int replicates)
        {
            var design = OneWayDesign.Balanced(groups, replicates);
            double lambda = Math.Min(double.MaxValue, Noncentrality(design, cohenF));

            // Near one the risk of missing the effect has the digits, not the power.
            return power > 0.5
                ? Law(design, lambda).LowerTail(CriticalValue(design, level)) <= 1 - power
                : Power(design, level, lambda) >= power;
        }
    }

    private static NoncentralF Law(OneWayDesign design, double noncentrality)
    {
        ArgumentNullException.ThrowIfNull(design);
        return new NoncentralF(design.BetweenDegreesOfFreedom, design.WithinDegreesOfFreedom, noncentrality);
    }

    private static double Wanted(double power, SignificanceLevel level) =>
        power > level.Value && power < 1
            ? power
            : throw new ArgumentOutOfRangeException(nameof(power), power, "A wanted power lies above the level, which a test without any effect reaches, and below 1.");

    private static double Deviation(double standardDeviation) =>
        standardDeviation > 0 && double.IsFinite(standardDeviation)
            ? standardDeviation
            : throw new ArgumentOutOfRangeException(nameof(standardDeviation), standardDeviation, "A standard deviation is positive and finite.");
}
