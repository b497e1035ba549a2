namespace Campaigns.Statistics.Corrections;

/// <summary>The two ways in which a stepwise procedure makes its adjusted p-values monotone; capping at 1 is left to <see cref="Correction"/>.</summary>
internal static class Steps
{
    /// <summary>Step-down: starting from the smallest p-value, no adjusted p-value lies below an earlier one.</summary>
    /// <param name="adjusted">One value for each p-value, in ascending order of the p-values, or their logarithms; replaced.</param>
    public static void Down(Span<double> adjusted)
    {
        double highest = double.NegativeInfinity;
        foreach (ref double value in adjusted)
        {
            highest = Math.Max(highest, value);
            value = highest;
        }
    }

    /// <summary>Step-up: starting from the largest p-value, no adjusted p-value lies above a later one. The untested rest of the family gives 1.</summary>
    /// <param name="adjusted">One value for each p-value, in ascending order of the p-values, or their logarithms; replaced.</param>
    /// <param name="next">What the rank after the last one has.</param>
    public static void Up(Span<double> adjusted, double next = 1)
    {
        double lowest = next;
        for (int k = adjusted.Length - 1; k >= 0; k--)
        {
            lowest = Math.Min(lowest, adjusted[k]);
            adjusted[k] = lowest;
        }
    }
}
