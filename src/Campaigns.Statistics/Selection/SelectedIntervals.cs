using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Effects;
using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Selection;

/// <summary>Confidence intervals of what was selected out of many: how often each may miss, so that selection does not make the shown ones miss more often than was promised.</summary>
/// <remarks>
/// False coverage: intervals of the R parameters selected out of m, each at confidence 1 - q R/m, miss an expected share of at most q of those shown (Y. Benjamini and D. Yekutieli 2005, Journal of the American Statistical Association 100:71-81).
/// That holds for independent estimates and a simple selection: one in which R does not change while the own estimate changes and stays selected, as in step-up and step-down procedures. Under any dependence the confidence is 1 - q R/(m (1 + 1/2 + ... + 1/m)).
/// Where a selected experiment shows several intervals that hold together at that confidence, the promise is about the share of experiments in which any of them misses.
/// Familywise: at confidence 1 - level/m nothing that is shown misses, with probability 1 - level, whatever the dependence and whatever the selection (union bound).
/// </remarks>
public static class SelectedIntervals
{
    /// <summary>q R/m: the probability with which the interval of each selected parameter may miss.</summary>
    /// <param name="level">q, the expected share of intervals that miss.</param>
    /// <param name="parameters">Parameters out of which was selected, m; at least <paramref name="selected"/>.</param>
    /// <param name="selected">Parameters selected, R; at least 1.</param>
    /// <exception cref="ArgumentOutOfRangeException">A count is out of range.</exception>
    public static double FalseCoverageRisk(SignificanceLevel level, int parameters, int selected)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(selected, 1);
        ArgumentOutOfRangeException.ThrowIfLessThan(parameters, selected);
        return level.Value * selected / parameters;
    }

    /// <summary>q R/(m (1 + 1/2 + ... + 1/m)): the same, whatever the dependence of the estimates.</summary>
    /// <inheritdoc cref="FalseCoverageRisk"/>
    /// <remarks>O(m) up to m = 65536, then O(1).</remarks>
    public static double FalseCoverageRiskUnderAnyDependence(SignificanceLevel level, int parameters, int selected)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(selected, 1);
        ArgumentOutOfRangeException.ThrowIfLessThan(parameters, selected);
        (DoubleDouble factor, double divisor) = HarmonicFactor.Of(parameters);
        return level.Value * selected / (factor / divisor).High;
    }

    /// <summary>level/m: the probability with which any interval of one of m experiments may miss.</summary>
    /// <param name="level">The probability that any interval of the campaign misses.</param>
    /// <param name="experiments">Experiments, m; at least 1.</param>
    /// <exception cref="ArgumentOutOfRangeException">The count is out of range.</exception>
    public static double FamilywiseRisk(SignificanceLevel level, int experiments) => FalseCoverageRisk(level, experiments, 1);

    /// <summary>The interval of one parameter by Student's t: estimate plus and minus the quantile times the standard error.</summary>
    /// <param name="estimate">The estimate, finite.</param>
    /// <param name="standardError">Its standard error, positive and finite.</param>
    /// <param name="degreesOfFreedom">Degrees of freedom of the standard error, positive and finite.</param>
    /// <param name="risk">The probability with which it may miss, in (0, 1).</param>
    /// <exception cref="ArgumentOutOfRangeException">An argument is outside its range.</exception>
    public static Interval Marginal(double estimate, double standardError, double degreesOfFreedom, double risk)
    {
        if (!double.IsFinite(estimate) || !(standardError > 0 && double.IsFinite(standardError)))
        {
            throw new ArgumentOutOfRangeException(nameof(standardError), standardError, "An estimate is finite, and its standard error positive and finite.");
        }

        if (!(risk > 0 && risk < 1))
        {
            throw new ArgumentOutOfRangeException(nameof(risk), risk, "The probability with which an interval may miss lies between 0 and 1, both excluded.");
        }

        double half = StudentT.TwoSidedQuantile(risk, degreesOfFreedom) * standardError;
        return new Interval(estimate - half, estimate + half);
    }
}
