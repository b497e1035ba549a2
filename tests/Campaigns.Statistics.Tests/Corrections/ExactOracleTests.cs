namespace Campaigns.Statistics.Tests.Corrections;

/// <summary>Brute force in exact fractions: closed testing over every intersection, and stepwise rules tried at every level that could matter.</summary>
public sealed class ExactOracleTests
{
    private const int Seed = 20260401;

    public static TheoryData<int, int> SmallFamilies
    {
        get
        {
            var data = new TheoryData<int, int>();
            for (int count = 1; count <= 8; count++)
            {
                data.Add(count, 0);
                data.Add(count, 2);
            }

            data.Add(10, 0);
            return data;
        }
    }

    [Theory]
    [MemberData(nameof(SmallFamilies))]
    public void Holm_is_closed_testing_with_Bonferroni(int count, int untested) =>
        CheckClosed("holm", count, untested, static sorted => Rational.Min(Rational.One, sorted.Length * sorted[0]));

    [Theory]
    [MemberData(nameof(SmallFamilies))]
    public void Hommel_is_closed_testing_with_Simes(int count, int untested) =>
        CheckClosed("hommel", count, untested, static sorted =>
        {
            Rational least = Rational.One;
            for (int j = 0; j < sorted.Length; j++)
            {
                least = Rational.Min(least, sorted.Length * sorted[j] / (j + 1));
            }

            return least;
        });

    [Theory]
    [MemberData(nameof(SmallFamilies))]
    public void Hommel_for_any_dependence_is_closed_testing_with_Simes_times_the_harmonic_sum(int count, int untested) =>
        CheckClosed(
            "hommel-any",
            count,
            untested,
            sorted =>
            {
                Rational harmonic = Enumerable.Range(1, count + untested).Select(k => Rational.One / k).Aggregate((a, b) => a + b);
                return Rational.Min(Rational.One, sorted.Select((p, j) => harmonic * (sorted.Length * p) / (j + 1)).Aggregate(Rational.Min));
            },
            1);

    [Theory]
    [MemberData(nameof(SmallFamilies))]
    public void Hochberg_rejects_up_to_the_largest_rank_that_passes(int count, int untested) =>
        CheckStepUp("hochberg", count, untested, static (p, m, rank) => (m - rank + 1) * p);

    [Theory]
    [MemberData(nameof(SmallFamilies))]
    public void Benjamini_Hochberg_rejects_up_to_the_largest_rank_that_passes(int count, int untested) =>
        CheckStepUp("bh", count, untested, static (p, m, rank) => m * p / rank);

    [Theory]
    [MemberData(nameof(SmallFamilies))]
    [InlineData(20, 0)]
    [InlineData(20, 15)]
    [InlineData(20, 16)]
    [InlineData(20, 17)]
    [InlineData(20, 40)]
    [InlineData(20, 300)]
    public void Benjamini_Yekutieli_rejects_up_to_the_largest_rank_that_passes(int count, int untested)
    {
        Rational harmonic = Enumerable.Range(1, count + untested).Select(k => Rational.One / k).Aggregate((a, b) => a + b);
        CheckStepUp("by", count, untested, (p, m, rank) => m * (harmonic * p) / rank);
    }

    [Fact]
    public void Sidak_is_the_exact_power_rounded_once()
    {
        var random = new Random(Seed);
        for (int trial = 0; trial < 20000; trial++)
        {
            int m = random.Next(1, 40);
            double p = Math.Pow(10, -random.Next(0, 60) * random.NextDouble());
            double expected = Rational.Of(p).Complement().Power(m).Complement().Round();
            Assert.Equal(expected, Families.Adjust("sidak", [p], m)[0]);
            Assert.Equal(expected, Families.Adjust("holm-sidak", [p], m)[0]);
        }
    }

    private static void CheckClosed(string key, int count, int untested, Func<Rational[], Rational> local, long units = 0)
    {
        int m = count + untested;
        foreach (double[] p in Cases(count, m))
        {
            Rational[] all = [.. p.Concat(Enumerable.Repeat(1.0, untested)).Select(Rational.Of)];
            int[] ascending = [.. Enumerable.Range(0, m).OrderBy(i => i < count ? p[i] : 1)];
            var worst = new Rational[m];
            Array.Fill(worst, Rational.Of(0));
            for (int set = 1; set < 1 << m; set++)
            {
                int[] members = [.. ascending.Where(i => (set >> i & 1) != 0)];
                Rational value = local([.. members.Select(i => all[i])]);
                foreach (int i in members)
                {
                    worst[i] = Rational.Max(worst[i], value);
                }
            }

            Assert.Equal(worst.Take(count).Select(w => w.Round()), Families.Adjust(key, p, m), (a, b) => Families.UlpsApart(a, b) <= units);
        }
    }

    /// <summary>Adjusted p-value: the least level at which the rule rejects. Only levels at which some rank begins to pass need be tried, and 1.</summary>
    private static void CheckStepUp(string key, int count, int untested, Func<Rational, int, int, Rational> passesAt)
    {
        int m = count + untested;
        foreach (double[] p in Cases(count, m))
        {
            double[] sorted = [.. p];
            Array.Sort(sorted);
            Rational[] begins = [.. sorted.Select((x, k) => passesAt(Rational.Of(x), m, k + 1))];
            Rational[] levels = [.. begins.Append(Rational.One).Where(l => l.CompareTo(Rational.One) <= 0)];
            Array.Sort(levels);
            double[] expected = [.. p.Select(x => levels.First(level => level.CompareTo(Rational.One) == 0 || x <= Reach(sorted, begins, level)).Round())];
            Assert.Equal(expected, Families.Adjust(key, p, m));
        }
    }

    private static double Reach(double[] sorted, Rational[] begins, Rational level)
    {
        int largest = Array.FindLastIndex(begins, b => b.CompareTo(level) <= 0);
        return largest < 0 ? -1 : sorted[largest];
    }

    private static IEnumerable<double[]> Cases(int count, int m)
    {
        var random = new Random(Seed + count + (100 * m));
        double[] edges = [0, 0.05, 0.05 / m, 1, 0.025, 5e-324, 1e-310];
        int trials = m >= 9 ? 6 : 40;
        for (int trial = 0; trial < trials; trial++)
        {
            yield return Families.Draw(random, count);
            yield return [.. Enumerable.Range(0, count).Select(_ => edges[random.Next(edges.Length)])];
        }

        yield return [.. Enumerable.Repeat(0.05, count)];
    }
}
