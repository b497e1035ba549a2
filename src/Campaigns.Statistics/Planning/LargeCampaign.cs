using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Planning.Laws;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Planning;

/// <summary>What becomes of the Benjamini-Hochberg procedure as a campaign grows without end, its share of real effects kept: one level for every test, and a least effect below which size does not help.</summary>
/// <remarks>
/// The level is the greatest t with t = q H(t), where H(t) = pi0 t + pi1 G(t): Genovese and Wasserman (2002), Journal of the Royal Statistical Society B 64:499-517. It stands for a finite campaign only where survivors are many: a lucky first one lowers the bar for the next, which the approximation leaves out.
/// G is concave, so a positive t exists if and only if the slope of G at 0 exceeds (1/q - pi0)/pi1; below that the share of real effects found goes to 0: Chi (2007), Annals of Statistics 35:1409-1431. The slope is that of the noncentral to the central F density far out: e^(-lambda/2) times the sum over j of ((d1 + d2)/2)_j/(d1/2)_j (lambda/2)^j/j!.
/// </remarks>
public static class LargeCampaign
{
    private const double GreatestLambda = 2e6;

    /// <summary>The level at which every test is in effect made.</summary>
    /// <param name="campaign">The campaign; its number of experiments is of no account but for a fixed number of real effects.</param>
    /// <param name="level">q.</param>
    /// <returns>In [0, 1); 0 where none is positive, or above 1e-300.</returns>
    public static double EffectiveLevel(CampaignDesign campaign, SignificanceLevel level)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        var curve = new TestCurve(campaign);
        double low = Math.Log(TestCurve.LeastLevel);
        double high = 0;
        if (!IsWithin(low))
        {
            return 0;
        }

        // Concave and 0 at 0: once below zero it stays there.
        while (high - low > 1e-15 * Math.Abs(low))
        {
            double middle = (low + high) / 2;
            if (middle == low || middle == high)
            {
                break;
            }

            (low, high) = IsWithin(middle) ? (middle, high) : (low, middle);
        }

        return Math.Exp(low);

        bool IsWithin(double log)
        {
            double t = Math.Exp(log);
            MixturePoint at = MixturePoint.Of(campaign, curve.At(t));
            return t <= level.Value * at.Below;
        }
    }

    /// <summary>The level at which a correction is Benjamini and Hochberg's procedure.</summary>
    /// <param name="correction">The correction.</param>
    /// <param name="campaign">The campaign.</param>
    /// <param name="level">The level of the correction.</param>
    /// <returns>q itself for that procedure, q/(1 + 1/2 + ... + 1/m) for Benjamini and Yekutieli's; null for every other.</returns>
    public static SignificanceLevel? LevelOf(Correction correction, CampaignDesign campaign, SignificanceLevel level)
    {
        ArgumentNullException.ThrowIfNull(correction);
        ArgumentNullException.ThrowIfNull(campaign);
        return correction is BenjaminiHochberg or BenjaminiYekutieli
            ? new SignificanceLevel(Math.Max(double.Epsilon, correction.BoundaryAt(campaign.Experiments, campaign.Experiments, level.Value)!.Value))
            : null;
    }

    /// <summary>Expected true and false survivors at the effective level.</summary>
    /// <param name="campaign">The campaign.</param>
    /// <param name="level">q.</param>
    public static (double TrueSurvivors, double FalseSurvivors) Approximate(CampaignDesign campaign, SignificanceLevel level)
    {
        double t = EffectiveLevel(campaign, level);
        if (t == 0)
        {
            return (0, 0);
        }

        MixturePoint at = MixturePoint.Of(campaign, new TestCurve(campaign).At(t));
        return (campaign.Experiments * at.TrueBelow, campaign.Experiments * at.FalseBelow);
    }

    /// <summary>The slope at 0 of power over level: how many times likelier than a false alarm a real effect is found at the strictest levels.</summary>
    /// <param name="experiment">Groups and observations.</param>
    /// <param name="noncentrality">Lambda, at least 0.</param>
    /// <returns>At least 1; positive infinity beyond the range of doubles, and for lambda above 2e6.</returns>
    public static double SlopeAtZero(OneWayDesign experiment, double noncentrality)
    {
        ArgumentNullException.ThrowIfNull(experiment);
        if (noncentrality > GreatestLambda)
        {
            return double.PositiveInfinity;
        }

        double half = noncentrality / 2;
        double a = (experiment.BetweenDegreesOfFreedom + experiment.WithinDegreesOfFreedom) / 2;
        double b = experiment.BetweenDegreesOfFreedom / 2;
        const double Scale = 1e200;
        (double term, double sum, double log) = (1, 1, -half);
        for (double j = 0; term > sum * 1e-18 || half * (a + j) > (b + j) * (j + 1); j++)
        {
            term *= half / (j + 1) * ((a + j) / (b + j));
            sum += term;
            if (sum > Scale)
            {
                (term, sum, log) = (term / Scale, sum / Scale, log + Math.Log(Scale));
            }
        }

        return Math.Exp(log + Math.Log(sum));
    }

    /// <summary>The slope that must be exceeded for size to help: (1/q - pi0)/pi1.</summary>
    /// <param name="campaign">The campaign.</param>
    /// <param name="level">q.</param>
    /// <returns>Above 1; positive infinity where no effect is real.</returns>
    public static double CriticalSlope(CampaignDesign campaign, SignificanceLevel level)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        return ((1 / level.Value) - campaign.ShareNull) / campaign.ShareReal;
    }

    /// <summary>Whether a larger campaign of the same kind finds a share of its real effects that does not vanish.</summary>
    /// <param name="campaign">The campaign.</param>
    /// <param name="level">q.</param>
    public static bool SizeHelps(CampaignDesign campaign, SignificanceLevel level)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        return SlopeAtZero(campaign.Experiment, campaign.Noncentrality) > CriticalSlope(campaign, level);
    }
}
