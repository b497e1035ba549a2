using System.Globalization;
using Campaigns.Statistics.Permutation;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.Permutation;

public sealed class RandomNumbersTests
{
    [Fact]
    public void Outputs_are_those_of_the_same_generator_in_NumPy()
    {
        Assert.All(ReferenceTable.Read("experiment/random_sfc64.csv").Rows, row =>
        {
            var random = new RandomNumbers(Whole(row, "seed"), Whole(row, "stream"));
            for (int i = row.Integer("skipped"); i > 0; i--)
            {
                random.Next();
            }

            Assert.Equal(Whole(row, "output"), random.Next());
        });
    }

    [Fact]
    public void Bounded_numbers_are_uniform()
    {
        // Pearson's statistic has mean b - 1 and variance 2(b - 1): within five standard deviations.
        foreach (uint bound in new uint[] { 2, 3, 7, 24, 1000 })
        {
            const int Draws = 200_000;
            var random = new RandomNumbers(42, bound);
            var counts = new int[bound];
            for (int i = 0; i < Draws; i++)
            {
                counts[random.Below(bound)]++;
            }

            double expected = Draws / (double)bound;
            double statistic = counts.Sum(c => (c - expected) * (c - expected) / expected);
            Assert.InRange(statistic, bound - 1 - (5 * Math.Sqrt(2.0 * (bound - 1))), bound - 1 + (5 * Math.Sqrt(2.0 * (bound - 1))));
        }
    }

    [Fact]
    public void The_largest_bounds_are_shared_out_evenly_too()
    {
        // With bound 3 * 2^30 a product without rejection would give a quarter of the numbers twice as often: those divisible by 3 would be 1/2 of all.
        const uint Bound = 3u << 30;
        const int Draws = 200_000;
        var random = new RandomNumbers(7, 0);
        int multiples = 0;
        for (int i = 0; i < Draws; i++)
        {
            uint drawn = random.Below(Bound);
            Assert.True(drawn < Bound);
            multiples += drawn % 3 == 0 ? 1 : 0;
        }

        Assert.InRange(multiples / (double)Draws, (1 / 3.0) - 0.005, (1 / 3.0) + 0.005);
        Assert.Equal(0u, random.Below(1));
    }

    [Fact]
    public void Neighbouring_streams_and_seeds_share_no_pattern()
    {
        // Half of the 64 bits of the first output differ on average: 32 with standard deviation 4, so a mean over 1,000 pairs within 0.6.
        Assert.InRange(MeanDistance(i => new RandomNumbers(1, i)), 31.4, 32.6);
        Assert.InRange(MeanDistance(i => new RandomNumbers(i, 1)), 31.4, 32.6);
    }

    private static double MeanDistance(Func<ulong, RandomNumbers> start) => Enumerable.Range(0, 1000).Average(i =>
    {
        RandomNumbers one = start((ulong)i);
        RandomNumbers other = start((ulong)i + 1);
        return (double)ulong.PopCount(one.Next() ^ other.Next());
    });

    private static ulong Whole(ReferenceRow row, string column) => ulong.Parse(row.Text(column), CultureInfo.InvariantCulture);
}
