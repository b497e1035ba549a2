using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Tests.GroupTests;
using FsCheck.Xunit;

namespace Campaigns.Statistics.Tests.Distributions;

[Properties(Replay = "(20261207,104729)", MaxTest = 500)]
public sealed class NoncentralFPropertiesTests
{
    [Property]
    public void Both_tails_add_to_one_and_move_with_f_and_with_lambda(int seed)
    {
        (double df1, double df2, double lambda, double f) = Draw(seed);
        var law = new NoncentralF(df1, df2, lambda);
        var further = new NoncentralF(df1, df2, lambda * 1.01);
        Assert.Equal(1, law.UpperTail(f) + law.LowerTail(f), 1e-12);
        Assert.True(law.LogUpperTail(f * 1.01) <= law.LogUpperTail(f));
        Assert.True(law.LogLowerTail(f * 1.01) >= law.LogLowerTail(f));
        Assert.True(further.LogUpperTail(f) >= law.LogUpperTail(f));
        Assert.True(further.LogLowerTail(f) <= law.LogLowerTail(f));
    }

    [Property]
    public void The_noncentrality_of_a_tail_is_the_one_of_the_law_it_was_taken_from(int seed)
    {
        (double df1, double df2, double lambda, double f) = Draw(seed);
        var law = new NoncentralF(df1, df2, lambda);
        double upper = law.UpperTail(f);
        double lower = law.LowerTail(f);

        // A tail that is rounded, or that hardly depends on lambda, tells lambda no better than its own rounding.
        double slope = (new NoncentralF(df1, df2, lambda * 1.001).LogUpperTail(f) - law.LogUpperTail(f)) / 0.001;
        double tolerance = 1e-12 + (1e-12 * Math.Max(1, -Math.Log(Math.Min(upper, lower))) / Math.Max(1e-300, Math.Abs(slope) * upper / Math.Min(upper, lower)));
        if (Math.Min(upper, lower) > 1e-300 && tolerance < 1e-6)
        {
            double found = upper <= lower ? NoncentralF.NoncentralityOfUpperTail(f, df1, df2, upper) : NoncentralF.NoncentralityOfLowerTail(f, df1, df2, lower);
            Relative.AssertNear(lambda, found, tolerance, FormattableString.Invariant($"({df1:R}, {df2:R}, {lambda:R}) at {f:R}"));
        }
    }

    /// <summary>Degrees of freedom 0.5 to 1000, lambda 1e-3 to 3000, f within a factor of 30 of the law's middle.</summary>
    private static (double Df1, double Df2, double Lambda, double F) Draw(int seed)
    {
        var random = new Random(seed);
        double df1 = 0.5 * Math.Pow(200, random.NextDouble());
        double df2 = 0.5 * Math.Pow(2000, random.NextDouble());
        double lambda = Math.Pow(10, -3 + (6.5 * random.NextDouble()));
        return (df1, df2, lambda, (df1 + lambda) / df1 * Math.Pow(30, (2 * random.NextDouble()) - 1));
    }
}
