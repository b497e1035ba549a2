using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>What a programme risks by testing many true null hypotheses, each at one level: how likely a false positive is, and how many to expect.</summary>
/// <remarks>
/// All figures take every one of the hypotheses as true ("if nothing is real"): with some effects real, they are upper bounds. They hold for tests whose p-values are uniform under the null.
/// Source: the binomial law, and Boole's and Bonferroni's inequalities, e.g. W. Feller (1968), An Introduction to Probability Theory and Its Applications, volume 1, chapters IV and VI.
/// </remarks>
public static class FamilyRisk
{
    /// <summary>The probability of at least one false positive among independent tests: 1 - (1 - level)^tests.</summary>
    /// <param name="tests">How many true nulls are tested; 0 or more.</param>
    /// <param name="level">The level of each test.</param>
    /// <returns>In [0, 1]; 0 for no tests. Within 10^-14, relative, also where it is tiny.</returns>
    /// <exception cref="ArgumentOutOfRangeException">A negative number of tests.</exception>
    public static double AtLeastOneIfIndependent(int tests, SignificanceLevel level)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(tests);
        double risk = -Accurate.Expm1(tests * Accurate.Log1p(-level.Value));

        // Independence obeys the bounds of any dependence; so does its rounding.
        return Math.Clamp(risk, AtLeastOneLowerBound(tests, level), AtLeastOneUpperBound(tests, level));
    }

    /// <summary>The least that the probability of at least one false positive can be under any dependence: the level, reached when all tests are copies of one.</summary>
    /// <param name="tests">How many true nulls are tested; 0 or more.</param>
    /// <param name="level">The level of each test.</param>
    /// <returns>The level, or 0 for no tests.</returns>
    /// <exception cref="ArgumentOutOfRangeException">A negative number of tests.</exception>
    public static double AtLeastOneLowerBound(int tests, SignificanceLevel level)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(tests);
        return tests == 0 ? 0 : level.Value;
    }

    /// <summary>The most that the probability of at least one false positive can be, whatever the dependence: the smaller of 1 and tests times level.</summary>
    /// <param name="tests">How many true nulls are tested; 0 or more.</param>
    /// <param name="level">The level of each test.</param>
    /// <returns>In [0, 1].</returns>
    /// <exception cref="ArgumentOutOfRangeException">A negative number of tests.</exception>
    public static double AtLeastOneUpperBound(int tests, SignificanceLevel level) => Math.Min(1, ExpectedFalsePositives(tests, level));

    /// <summary>The expected number of false positives, tests times level, whatever the dependence.</summary>
    /// <param name="tests">How many true nulls are tested; 0 or more.</param>
    /// <param name="level">The level of each test.</param>
    /// <returns>From 0 to the number of tests.</returns>
    /// <exception cref="ArgumentOutOfRangeException">A negative number of tests.</exception>
    public static double ExpectedFalsePositives(int tests, SignificanceLevel level)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(tests);
        return tests * level.Value;
    }

    /// <summary>The standard deviation of the number of false positives among independent tests: the root of tests level (1 - level).</summary>
    /// <param name="tests">How many true nulls are tested; 0 or more.</param>
    /// <param name="level">The level of each test.</param>
    /// <returns>0 or more, in false positives.</returns>
    /// <exception cref="ArgumentOutOfRangeException">A negative number of tests.</exception>
    public static double StandardDeviationIfIndependent(int tests, SignificanceLevel level) =>
        Math.Sqrt(ExpectedFalsePositives(tests, level) * (1 - level.Value));

    /// <summary>The probability of at least so many false positives among independent tests: the upper tail of the binomial law.</summary>
    /// <param name="count">How many false positives at least; 0 or less is certain.</param>
    /// <param name="tests">How many true nulls are tested; 0 or more.</param>
    /// <param name="level">The level of each test.</param>
    /// <returns>In [0, 1]; 0 above the number of tests. Within 10^-12, relative.</returns>
    /// <exception cref="ArgumentOutOfRangeException">A negative number of tests.</exception>
    /// <remarks>
    /// The terms on the side of the tail that is the smaller are added up from the one nearest to the middle, whose value comes without cancellation from its deviance.
    /// </remarks>
    public static double AtLeastIfIndependent(int count, int tests, SignificanceLevel level)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(tests);
        if (count <= 1 || count > tests)
        {
            return count <= 0 ? 1 : count > tests ? 0 : AtLeastOneIfIndependent(tests, level);
        }

        double odds = level.Value / (1 - level.Value);
        double sum = 0;
        if (count > tests * level.Value)
        {
            double term = BinomialTerm.Of(count, tests, level.Value);
            for (int k = count; term > sum * 1e-18; k++)
            {
                sum += term;
                term *= (tests - k) / (k + 1.0) * odds;
            }

            return Math.Min(1, sum);
        }

        double below = BinomialTerm.Of(count - 1, tests, level.Value);
        for (int k = count - 1; below > sum * 1e-18; k--)
        {
            sum += below;
            below *= k / (tests - k + 1.0) / odds;
        }

        return Math.Max(0, 1 - sum);
    }
}
