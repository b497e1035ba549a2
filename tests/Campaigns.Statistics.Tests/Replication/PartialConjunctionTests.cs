using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Replication;

namespace Campaigns.Statistics.Tests.Replication;

public sealed class PartialConjunctionTests
{
    private static readonly PartialConjunctionForm[] Forms = [PartialConjunctionForm.Bonferroni, PartialConjunctionForm.Simes, PartialConjunctionForm.Fisher];

    // By hand. Fisher's of two: q - q ln q with q the product; of three with q = 0.01 x 0.04 x 0.2 = 8e-5: q (1 + x + x^2/2), x = -ln q = 9.433484.
    [Theory]
    [InlineData(1, PartialConjunctionForm.Bonferroni, 0.03)]
    [InlineData(1, PartialConjunctionForm.Simes, 0.03)]
    [InlineData(1, PartialConjunctionForm.Fisher, 0.004394303470)]
    [InlineData(2, PartialConjunctionForm.Bonferroni, 0.08)]
    [InlineData(2, PartialConjunctionForm.Simes, 0.08)]
    [InlineData(2, PartialConjunctionForm.Fisher, 0.046626509896)]
    [InlineData(3, PartialConjunctionForm.Bonferroni, 0.2)]
    [InlineData(3, PartialConjunctionForm.Simes, 0.2)]
    [InlineData(3, PartialConjunctionForm.Fisher, 0.2)]
    public void Three_studies_by_hand(int atLeast, PartialConjunctionForm form, double expected) =>
        Assert.Equal(expected, Of([0.2, 0.01, 0.04], atLeast, form), 1e-9);

    // Simes takes the second of two where both are alike: min(2 x 0.03, 0.04) = 0.04.
    [Fact]
    public void Simes_looks_at_all_that_are_kept() => Assert.Equal(0.04, Of([0.001, 0.03, 0.04], 2, PartialConjunctionForm.Simes), 1e-15);

    // The definition (Benjamini and Heller 2008): the largest global p-value of any n - u + 1 of the studies, each combined by its own text-book formula.
    [Fact]
    public void It_is_the_largest_global_p_value_of_any_so_many_studies()
    {
        var random = new Random(8);
        for (int trial = 0; trial < 300; trial++)
        {
            int n = random.Next(1, 7);
            double[] p = [.. Enumerable.Range(0, n).Select(_ => Math.Pow(random.NextDouble(), random.Next(1, 6)))];
            for (int u = 1; u <= n; u++)
            {
                double[][] subsets = [.. Enumerable.Range(1, (1 << n) - 1).Select(mask => p.Where((_, i) => (mask >> i & 1) == 1).ToArray()).Where(s => s.Length == n - u + 1)];
                Assert.Equal(subsets.Max(s => Math.Min(1, s.Length * s.Min())), Of(p, u, PartialConjunctionForm.Bonferroni), 1e-14);
                Assert.Equal(subsets.Max(s => Math.Min(1, s.Order().Select((x, i) => s.Length * x / (i + 1)).Min())), Of(p, u, PartialConjunctionForm.Simes), 1e-14);
                Assert.Equal(subsets.Max(Fisher), Of(p, u, PartialConjunctionForm.Fisher), 1e-12);
            }
        }
    }

    // Under "fewer than u have an effect", whichever they are, it is small at most as often as it says; the hardest case, u - 1 overwhelming effects, is uniform for Simes and Fisher.
    [Theory]
    [InlineData(2, 2)]
    [InlineData(3, 2)]
    [InlineData(3, 3)]
    [InlineData(4, 2)]
    [InlineData(5, 3)]
    public void It_is_uniform_or_larger_under_every_null_configuration(int n, int u)
    {
        const int Runs = 4_000;
        var random = new Random(100 + (10 * n) + u);
        for (int effects = 0; effects < u; effects++)
        {
            foreach (double power in (double[])[1, 8, 1e6])
            {
                int[] small = new int[Forms.Length];
                for (int run = 0; run < Runs; run++)
                {
                    double[] p = [.. Enumerable.Range(0, n).Select(i => Math.Max(double.Epsilon, Math.Pow(random.NextDouble(), i < effects ? power : 1)))];
                    for (int f = 0; f < Forms.Length; f++)
                    {
                        small[f] += Of(p, u, Forms[f]) <= 0.1 ? 1 : 0;
                    }
                }

                double allowed = 4 * Math.Sqrt(0.1 * 0.9 / Runs);
                Assert.All(small, count => Assert.True(count / (double)Runs <= 0.1 + allowed));
                if (effects == u - 1 && power == 1e6)
                {
                    Assert.All(small.Skip(1), count => Assert.Equal(0.1, count / (double)Runs, allowed));
                }
            }
        }
    }

    [Fact]
    public void Of_all_studies_every_form_is_the_largest_p_to_the_bit()
    {
        foreach (PartialConjunctionForm form in Forms)
        {
            Assert.Equal(PValue.FromValue(0.013), PartialConjunction.Of([PValue.FromValue(1e-300), PValue.FromValue(0.013), PValue.FromValue(0.01)], 3, form));
            Assert.Equal(PValue.FromValue(0.4), PartialConjunction.Of([PValue.FromValue(0.4)], 1, form));
        }
    }

    [Fact]
    public void Tails_below_the_range_of_doubles_keep_their_logarithms()
    {
        PValue[] p = [PValue.FromLog(-5000), PValue.FromLog(-2000), PValue.FromLog(-1000)];
        Assert.Equal(-1000, PartialConjunction.Of(p, 3, PartialConjunctionForm.Bonferroni).Log, 1e-9);
        Assert.Equal(-2000 + Math.Log(2), PartialConjunction.Of(p, 2, PartialConjunctionForm.Bonferroni).Log, 1e-9);
        Assert.Equal(-2000 + Math.Log(2), PartialConjunction.Of(p, 2, PartialConjunctionForm.Simes).Log, 1e-9);

        // q (1 - ln q) with ln q = -3000.
        Assert.Equal(-3000 + Math.Log(3001), PartialConjunction.Of(p, 2, PartialConjunctionForm.Fisher).Log, 1e-9);
        Assert.True(PartialConjunction.Of(p, 2, PartialConjunctionForm.Fisher).IsBelowDoubleRange);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(3)]
    public void A_number_of_studies_that_cannot_be_is_refused(int atLeast) =>
        Assert.Throws<ArgumentOutOfRangeException>(() => Of([0.1, 0.2], atLeast, PartialConjunctionForm.Simes));

    [Fact]
    public void Nothing_to_combine_is_refused() => Assert.Throws<ArgumentException>(() => Of([], 1, PartialConjunctionForm.Simes));

    private static double Of(double[] p, int atLeast, PartialConjunctionForm form) => PartialConjunction.Of([.. p.Select(PValue.FromValue)], atLeast, form).Value;

    private static double Fisher(double[] p)
    {
        double x = -p.Sum(Math.Log);
        double term = 1;
        double sum = 0;
        for (int k = 0; k < p.Length; k++)
        {
            sum += term;
            term *= x / (k + 1);
        }

        return Math.Exp(-x) * sum;
    }
}
