namespace Campaigns.Statistics.Distributions;

/// <summary>Solves for the noncentrality at which a tail of the noncentral F law at f has a given probability.</summary>
/// <remarks>
/// Newton's method on the logarithm of the tail in s, the square root of lambda, in which that logarithm is nearly a parabola; a bracket is kept, and halved or doubled where a step leaves it.
/// d ln tail/d lambda is half of <see cref="MixtureTail.Steepness"/>: it comes with the tail and costs nothing.
/// </remarks>
internal static class NoncentralityRoot
{
    /// <summary>From here on lambda is proportional to f: the noncentral chi-square law has become a point.</summary>
    private const double Far = 1e60;
    private const int MostSteps = 400;

    /// <summary>The lambda.</summary>
    /// <param name="f">Finite.</param>
    /// <param name="df1">Positive and finite.</param>
    /// <param name="df2">Positive and finite.</param>
    /// <param name="logTarget">The logarithm of the wanted probability; negative.</param>
    /// <param name="isUpper">Which tail has it.</param>
    /// <returns>0 where no lambda is needed; at most the largest double.</returns>
    public static double Of(double f, double df1, double df2, double logTarget, bool isUpper)
    {
        if (!double.IsFinite(f))
        {
            throw new ArgumentOutOfRangeException(nameof(f), f, "The value of F must be finite.");
        }

        FDistribution central = FDistribution.For(df1, df2);
        double known = isUpper ? central.LogUpperTail(f) : central.LogLowerTail(f);
        if (isUpper ? known >= logTarget : known <= logTarget)
        {
            return 0;
        }

        return f <= Far
            ? Search(f, df1, df2, logTarget, isUpper)
            : Math.Min(double.MaxValue, Search(Far, df1, df2, logTarget, isUpper) * (f / Far));
    }

    private static double Search(double f, double df1, double df2, double logTarget, bool isUpper)
    {
        double below = 0;
        double above = double.PositiveInfinity;
        double s = Math.Sqrt(1 + (df1 * f));
        for (int step = 0; step < MostSteps; step++)
        {
            MixtureTail tail = new PoissonMixture(df1, df2, s * s).Tail(f, isUpper);
            double excess = tail.Log - logTarget;
            if (excess == 0)
            {
                return s * s;
            }

            if (excess > 0 == isUpper)
            {
                above = s;
            }
            else
            {
                below = s;
            }

            double slope = isUpper ? tail.Steepness * s : -tail.Steepness * s;
            double next = s - (excess / slope);
            bool isInside = next > below && next < Math.Min(above, 8 * s);
            if (!isInside)
            {
                next = double.IsPositiveInfinity(above) ? 2 * s : below + ((above - below) / 2);
            }

            // Newton's step squares the error, so what is left after one this short is below the rounding of the tail.
            if ((isInside && Math.Abs(next - s) <= 1e-9 * s) || next == below || next == above)
            {
                return next * next;
            }

            s = next;
        }

        throw new ArithmeticException(FormattableString.Invariant($"The noncentrality of F with ({df1:R}, {df2:R}) degrees of freedom did not converge at f = {f:R}, ln p = {logTarget:R}."));
    }
}
