namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>Distances between a computed and a true number.</summary>
internal static class Relative
{
    public static double Error(double computed, double truth) =>
        computed == truth ? 0 : truth == 0 ? Math.Abs(computed) : Math.Abs((computed - truth) / truth);

    /// <summary>Log relative error: the number of right digits, at most 15, as NIST asks programs to report it.</summary>
    public static double Digits(double computed, double certified)
    {
        double error = Error(computed, certified);
        return error < 1e-15 ? 15 : -Math.Log10(error);
    }

    public static void AssertNear(double truth, double computed, double tolerance, string what) =>
        Assert.True(Error(computed, truth) <= tolerance, FormattableString.Invariant($"{what}: {computed:R} instead of {truth:R}, relative error {Error(computed, truth):E1} above {tolerance:E1}."));
}
