namespace Campaigns.Statistics.Numerics;

/// <summary>Elementary functions that keep their digits near zero, where the obvious form loses them.</summary>
/// <remarks>Source: W. Kahan's device of dividing out the rounding of 1 + x, as described in D. Goldberg (1991), ACM Computing Surveys 23:5-48, theorem 4.</remarks>
public static class Accurate
{
    /// <summary>ln(1 + x).</summary>
    /// <param name="x">At least -1.</param>
    /// <returns>Within a few units in the last place; negative infinity at -1, NaN below.</returns>
    public static double Log1p(double x)
    {
        double sum = 1 + x;
        return sum == 1 ? x : sum == 0 || double.IsInfinity(sum) ? Math.Log(sum) : Math.Log(sum) * x / (sum - 1);
    }

    /// <summary>e^x - 1.</summary>
    /// <param name="x">Any number.</param>
    /// <returns>Within a few units in the last place; -1 at negative infinity.</returns>
    public static double Expm1(double x)
    {
        double power = Math.Exp(x);
        double less = power - 1;
        return power == 1 ? x : less == -1 || double.IsInfinity(power) ? less : less * x / Math.Log(power);
    }
}
