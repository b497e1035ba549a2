using System.Numerics;
using Campaigns.Statistics.GroupTests;
using FsCheck.Xunit;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>Identities of Welch's, Brown-Forsythe's and Kruskal-Wallis's tests on random layouts; the seeds are fixed, a failure prints the layout's own seed.</summary>
[Properties(Replay = "(20261202,7919)", MaxTest = 200)]
public sealed class OtherTestsPropertiesTests
{
    private static readonly GroupTest[] Tests = [new WelchTest(), new BrownForsytheTest(), new KruskalWallisTest()];

    [Property]
    public void Neither_row_order_nor_group_labels_nor_shift_nor_scale_change_a_bit(int seed, long constant, byte power)
    {
        TypedSample sample = Layout(seed, wide: seed % 3 == 0);
        foreach (GroupTest test in Tests)
        {
            Core expected = Core.Of(sample.Test(test));
            Assert.Equal(expected, Core.Of(sample.Shuffled(seed).Test(test)));
            Assert.Equal(expected, Core.Of(sample.Relabelled(seed).Test(test)));
            Assert.Equal(expected, Core.Of(sample.TestAsWide(test)));
            Assert.Equal(expected, Core.Of(sample.Plus(constant).Test(test)));
            Assert.Equal(expected, Core.Of(sample.Plus(BigInteger.Pow(10, 40) + constant).Test(test)));
            Assert.Equal(expected, Core.Of(sample.WithDecimals(power * 3).Test(test)));
            Assert.Equal(expected, Core.Of(sample.WithDecimals(-power * 3).Test(test)));
            Assert.Equal(expected, Core.Of(sample.Times(BigInteger.Pow(10, power % 60)).Test(test)));
            Assert.Equal(expected, Core.Of(sample.Times(-1).Test(test)));
        }
    }

    [Property]
    public void Any_increasing_function_of_the_values_leaves_the_rank_test_to_the_bit(int seed)
    {
        TypedSample sample = Layout(seed, wide: false);
        Core expected = Core.Of(sample.Test(new KruskalWallisTest()));
        Assert.Equal(expected, Core.Of(sample.Mapped(x => x * x * x).Test(new KruskalWallisTest())));
        Assert.Equal(expected, Core.Of(sample.Mapped(x => x > 0 ? x * 1000 : x).Test(new KruskalWallisTest())));
    }

    [Property]
    public void With_equal_group_sizes_F_star_is_F_to_the_bit(int seed)
    {
        TypedSample sample = Layout(seed, wide: seed % 2 == 0, equalSizes: true);
        Tested f = Assert.IsType<Tested>(sample.Test(new FTest()));
        Tested star = Assert.IsType<Tested>(sample.Test(new BrownForsytheTest()));
        Assert.Equal(f.Statistic, star.Statistic);
        Assert.Equal(f.Variation, star.Variation);
        Assert.True(star.Df1 <= f.Df1 && star.Df2 <= f.Df2);
    }

    /// <remarks>Welch's t test of two groups: t^2 = (difference of means)^2/(v + w), v = s^2/n and w = s^2/n of the other, with (v + w)^2/(v^2/(n - 1) + w^2/(m - 1)) degrees of freedom; here in exact fractions from the deviations themselves.</remarks>
    [Property]
    public void With_two_groups_both_statistics_are_the_squared_t_of_Welch(int seed)
    {
        var random = new Random(seed);
        BigInteger[] first = Values(random, random.Next(2, 20), random.Next(1, 18));
        BigInteger[] second = Values(random, random.Next(2, 20), random.Next(1, 18));
        TypedSample sample = new([.. first, .. second], 3, [.. first.Select(_ => (ushort)0), .. second.Select(_ => (ushort)1)], 2);
        ExactFraction v = Variance(first) / first.Length;
        ExactFraction w = Variance(second) / second.Length;
        ExactFraction difference = Mean(first) - Mean(second);
        double squaredT = (difference * difference / (v + w)).ToDouble();
        double df = ((v + w) * (v + w) / ((v * v / (first.Length - 1)) + (w * w / (second.Length - 1)))).ToDouble();
        foreach (GroupTest test in new GroupTest[] { new WelchTest(), new BrownForsytheTest() })
        {
            Tested tested = Assert.IsType<Tested>(sample.Test(test));
            Relative.AssertNear(squaredT, tested.Statistic, 2.3e-16, test.Key + " statistic");
            Assert.Equal(1, tested.Df1);
            Relative.AssertNear(df, tested.Df2!.Value, 2.3e-16, test.Key + " df2");
        }
    }

    /// <remarks>
    /// Standard deviations and distances of means that span up to 40 powers of ten. The sum of weighted squares about the weighted mean in another form, sum over pairs of w_i w_j (mean_i - mean_j)^2/W, in exact fractions;
    /// the first degrees of freedom of F* in the form that Mehrotra printed, whose terms may be negative.
    /// </remarks>
    [Property(MaxTest = 60)]
    public void Spreads_and_distances_of_any_size_leave_every_digit(int seed)
    {
        var random = new Random(seed);
        BigInteger[][] groups = [.. Enumerable.Range(0, random.Next(2, 7)).Select(_ => Values(random, random.Next(2, 9), random.Next(1, 18), BigInteger.Pow(10, random.Next(0, 20)), BigInteger.Pow(10, random.Next(0, 40))))];
        if (seed % 2 == 0)
        {
            // One wide group far away, the others narrow and close to each other.
            groups[0] = Values(random, 3, 17, BigInteger.Pow(10, 19), BigInteger.Pow(10, 39));
            groups = [groups[0], .. groups.Skip(1).Select(g => Values(random, g.Length, 2)), Values(random, 4, 2)];
        }

        TypedSample sample = new([.. groups.SelectMany(g => g)], 3, [.. groups.SelectMany((g, i) => g.Select(_ => (ushort)i))], groups.Length);
        int k = groups.Length;
        int n = sample.Count;
        ExactFraction[] means = [.. groups.Select(Mean)];
        ExactFraction[] variances = [.. groups.Select(Variance)];
        ExactFraction[] weights = [.. groups.Select((g, i) => ExactFraction.Of(g.Length) / variances[i])];
        ExactFraction total = Sum(weights);
        ExactFraction pairs = Sum(from i in Enumerable.Range(0, k) from j in Enumerable.Range(0, i) select weights[i] * weights[j] * (means[i] - means[j]) * (means[i] - means[j]));
        ExactFraction t = Sum(Enumerable.Range(0, k).Select(i => (total - weights[i]) * (total - weights[i]) / (groups[i].Length - 1))) / (total * total);
        ExactFraction f = pairs / total / (k - 1) / (ExactFraction.Of(1) + (ExactFraction.Of(2 * (k - 2)) * t / ((k * k) - 1)));
        Tested welch = Assert.IsType<Tested>(sample.Test(new WelchTest()));
        Relative.AssertNear(f.ToDouble(), welch.Statistic, 2.3e-16, "Welch F");
        Relative.AssertNear((ExactFraction.Of((k * k) - 1) / (t * ExactFraction.Of(3))).ToDouble(), welch.Df2!.Value, 2.3e-16, "Welch df2");

        ExactFraction[] shares = [.. groups.Select(g => ExactFraction.Of(g.Length) / n)];
        ExactFraction grand = Sum(groups.Select((_, i) => shares[i] * means[i]));
        ExactFraction between = Sum(groups.Select((g, i) => ExactFraction.Of(g.Length) * (means[i] - grand) * (means[i] - grand)));
        ExactFraction d = Sum(groups.Select((_, i) => (ExactFraction.Of(1) - shares[i]) * variances[i]));
        ExactFraction weighted = Sum(groups.Select((_, i) => shares[i] * variances[i]));
        ExactFraction below = (weighted * weighted) + Sum(groups.Select((_, i) => variances[i] * variances[i] * (ExactFraction.Of(1) - (ExactFraction.Of(2) * shares[i]))));
        Tested star = Assert.IsType<Tested>(sample.Test(new BrownForsytheTest()));
        Relative.AssertNear((between / d).ToDouble(), star.Statistic, 2.3e-16, "F*");
        Relative.AssertNear((d * d / below).ToDouble(), star.Df1!.Value, 2.3e-16, "F* df1");
    }

    private static ExactFraction Sum(IEnumerable<ExactFraction> terms) => terms.Aggregate((a, b) => a + b);

    private static ExactFraction Mean(BigInteger[] values) => ExactFraction.Of(values.Aggregate(BigInteger.Add)) / values.Length;

    private static ExactFraction Variance(BigInteger[] values)
    {
        ExactFraction mean = Mean(values);
        return Sum(values.Select(x => (ExactFraction.Of(x) - mean) * (ExactFraction.Of(x) - mean))) / (values.Length - 1);
    }

    /// <summary>At least two of them differ.</summary>
    private static BigInteger[] Values(Random random, int count, int digits, BigInteger? scale = null, BigInteger? offset = null)
    {
        long width = (long)Math.Pow(10, digits);
        BigInteger[] values = [0, width, .. Enumerable.Range(2, count - 2).Select(_ => (BigInteger)random.NextInt64(-width, width))];
        return [.. values.Select(v => (v * (scale ?? 1)) + (offset ?? 0))];
    }

    /// <summary>2 to 6 groups of 2 to 12 values, none constant, ties likely where digits are few.</summary>
    private static TypedSample Layout(int seed, bool wide, bool equalSizes = false)
    {
        var random = new Random(seed);
        int size = equalSizes ? random.Next(2, 13) : 0;
        int digits = random.Next(1, 18);
        BigInteger[][] groups = [.. Enumerable.Range(0, random.Next(2, 7)).Select(_ => Values(random, equalSizes ? size : random.Next(2, 13), digits, wide ? BigInteger.Pow(10, 25) + 7 : BigInteger.One))];
        return new([.. groups.SelectMany(g => g)], random.Next(-5, 12), [.. groups.SelectMany((g, i) => g.Select(_ => (ushort)i))], groups.Length);
    }

    /// <summary>What does not depend on the unit of the response.</summary>
    private sealed record Core(double Statistic, double? Df1, double? Df2, double P, double LogP)
    {
        public static Core Of(TestOutcome outcome)
        {
            Tested tested = Assert.IsType<Tested>(outcome);
            return new(tested.Statistic, tested.Df1, tested.Df2, tested.P.Value, tested.P.Log);
        }
    }
}
