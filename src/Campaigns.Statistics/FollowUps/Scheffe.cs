using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.FollowUps;

/// <summary>All pairs by Scheffe's method, which covers every other contrast as well.</summary>
/// <remarks>The statistic is F = t^2/(k - 1), never negative, with k - 1 and the residual degrees of freedom; k counts the groups with values. Half widths are sqrt((k - 1) F_alpha) standard errors.</remarks>
public sealed class Scheffe : FollowUp
{
    /// <summary>Beyond it the square of t is near the end of doubles, and the tail a pure power of t.</summary>
    private const double Squarable = 1e140;

    /// <inheritdoc/>
    public override string Key => "scheffe";

    /// <inheritdoc/>
    public override string Name => "Scheffe";

    /// <inheritdoc/>
    public override string Holds => "All pairs, and all other contrasts of the means: the probability of calling any contrast different from zero that is zero is at most the level, and all intervals hold together. Wider than Tukey-Kramer's where pairs alone are of interest.";

    /// <inheritdoc/>
    public override string Assumes => "Independent observations; in every group a normal law with the same variance.";

    /// <inheritdoc/>
    public override string Source => "H. Scheffe (1953), Biometrika 40:87-104.";

    /// <inheritdoc/>
    public override IReadOnlyList<GroupComparison> Compare(GroupEstimates estimates, int? control, double confidence)
    {
        double risk = Pairing.Risk(confidence);
        if (estimates.ComparedCount < 2)
        {
            return [];
        }

        int df1 = estimates.ComparedCount - 1;
        FDistribution law = FDistribution.For(df1, estimates.DegreesOfFreedom);
        double half = Math.Sqrt(df1 * law.UpperQuantile(risk));
        return [.. Pairing.AllPairs(estimates).Select(pair => Pairing.Pooled(estimates, pair.A, pair.B, t => t / df1 * t, t => Tail(law, t), half))];
    }

    private static PValue Tail(FDistribution law, double t) =>
        t < Squarable
            ? law.UpperTailPValue(t * t / law.Df1)
            : PValue.FromLog(law.LogUpperTail(Squarable * Squarable / law.Df1) - (law.Df2 * (Math.Log(t) - Math.Log(Squarable))));
}
