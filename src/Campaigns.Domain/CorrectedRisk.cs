using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>What a campaign still risks with its correction, if nothing is real and the tests are independent, after so many tests of its family.</summary>
/// <param name="AtLeastOne">The probability of at least one false survivor, or an upper bound of it.</param>
/// <param name="IsExact">Whether it is the probability itself, not a bound.</param>
/// <param name="ExpectedFalse">The expected number of false survivors; null where no published law gives it.</param>
/// <remarks>
/// Single-step procedures: the binomial law at their common boundary. Step-down ones reject anything exactly when their first step does. Benjamini and Hochberg's, and Benjamini and
/// Yekutieli's: <see cref="StepUpNull"/>. Hochberg's and Hommel's reject nothing unless Simes' test rejects the whole family, whose law is that of Benjamini and Hochberg's procedure.
/// Any other procedure that holds an error rate over its family holds the familywise one if nothing is real, because then every survivor is false.
/// Sources: those of the procedures; for step-up ones H. Finner and M. Roters (2002), Annals of Statistics 30:220-238.
/// </remarks>
public readonly record struct CorrectedRisk(double AtLeastOne, bool IsExact, double? ExpectedFalse)
{
    /// <summary>The risk after some tests.</summary>
    /// <param name="procedure">The correction, or an online procedure.</param>
    /// <param name="level">Its level.</param>
    /// <param name="familySize">Hypotheses that it counts, at least 1 where there are tests.</param>
    /// <param name="tests">Those tested so far; the others count as p = 1.</param>
    /// <exception cref="ArgumentOutOfRangeException">More tests than the family has hypotheses, or fewer than none.</exception>
    public static CorrectedRisk Of(ErrorProcedure procedure, SignificanceLevel level, int familySize, int tests)
    {
        ArgumentNullException.ThrowIfNull(procedure);
        ArgumentOutOfRangeException.ThrowIfNegative(tests);
        ArgumentOutOfRangeException.ThrowIfGreaterThan(tests, familySize);
        if (tests == 0)
        {
            return new CorrectedRisk(0, true, 0);
        }

        return procedure.Key switch
        {
            "none" or "bonferroni" or "sidak" => SingleStep(First(), FamilyRisk.ExpectedFalsePositives(tests, First())),
            "holm" or "holm-sidak" => SingleStep(First(), null),
            "bh" or "by" => new CorrectedRisk(StepUpNull.AtLeastOne(tests, First().Value), true, StepUpNull.Expected(tests, First().Value)),
            "hochberg" or "hommel" => new CorrectedRisk(level.Value * tests / familySize, false, null),
            _ => new CorrectedRisk(level.Value, false, null),
        };

        SignificanceLevel First() => new(((Correction)procedure).BoundaryAt(1, familySize, level.Value)!.Value);

        CorrectedRisk SingleStep(SignificanceLevel each, double? expected) => new(FamilyRisk.AtLeastOneIfIndependent(tests, each), true, expected);
    }
}
