using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.Corrections;

public sealed class WeightedOracleTests
{
    private const int Seed = 20260502;
    private const int Vectors = 2000;

    public static TheoryData<string, string> Twins => new()
    {
        { "weighted-bonferroni", "bonferroni" },
        { "weighted-holm", "holm" },
        { "weighted-bh", "bh" },
    };

    [Theory]
    [InlineData("weighted-bonferroni")]
    [InlineData("weighted-holm")]
    [InlineData("weighted-bh")]
    public void Adjusted_p_values_are_those_of_the_exact_table(string key)
    {
        foreach (IGrouping<string, ReferenceRow> set in ReferenceTable.Read("campaign/adjust_weighted.csv").Rows.GroupBy(r => r.Text("set")))
        {
            double[] p = [.. set.Select(r => r.Number("p"))];
            double[] weights = [.. set.Select(r => r.Number("weight"))];
            double[] expected = [.. set.Select(r => r.Number(key.Replace('-', '_')))];
            Assert.Equal(expected, Adjust(key, p, weights), (a, b) => Math.Abs(a - b) <= 1e-14 * b);
        }
    }

    [Fact]
    public void Weighted_Holm_is_closed_testing_with_weighted_Bonferroni()
    {
        var random = new Random(Seed);
        for (int trial = 0; trial < Vectors; trial++)
        {
            (double[] p, int[] weights, int rest) = Draw(random, 7);

            // The untested rest, p = 1, is one more hypothesis here: it can only add its weight.
            int[] all = rest > 0 ? [.. weights, rest] : weights;
            var worst = new Rational[p.Length];
            Array.Fill(worst, Rational.Of(0));
            for (int set = 1; set < 1 << all.Length; set++)
            {
                int[] members = [.. Enumerable.Range(0, all.Length).Where(i => (set >> i & 1) != 0)];
                int sum = members.Sum(i => all[i]);
                Rational local = members.Where(i => i < p.Length && weights[i] > 0).Select(i => sum * Rational.Of(p[i]) / weights[i]).Append(Rational.One).Aggregate(Rational.Min);
                foreach (int i in members.Where(i => i < p.Length))
                {
                    worst[i] = Rational.Max(worst[i], local);
                }
            }

            Assert.Equal(worst.Select(w => w.Round()), Adjust("weighted-holm", p, weights, rest));
        }
    }

    [Fact]
    public void Weighted_Bonferroni_shares_the_level_out_by_weight()
    {
        var random = new Random(Seed + 1);
        for (int trial = 0; trial < Vectors; trial++)
        {
            (double[] p, int[] weights, int rest) = Draw(random, 30);
            int sum = weights.Sum() + rest;
            IEnumerable<double> expected = p.Zip(weights, (x, w) => w == 0 ? 1 : Rational.Min(Rational.One, sum * Rational.Of(x) / w).Round());
            Assert.Equal(expected, Adjust("weighted-bonferroni", p, weights, rest));
        }
    }

    [Fact]
    public void Weighted_Benjamini_Hochberg_rejects_k_where_k_of_them_pass_at_k_times_their_share()
    {
        var random = new Random(Seed + 2);
        for (int trial = 0; trial < Vectors; trial++)
        {
            (double[] p, int[] weights, int rest) = Draw(random, 14);
            int sum = weights.Sum() + rest;
            double[] adjusted = Adjust("weighted-bh", p, weights, rest);
            double[] levels = [0.01, 0.05, 0.3, .. adjusted.Distinct().SelectMany(a => new[] { Math.BitDecrement(a), Math.BitIncrement(a) })];
            foreach (double level in levels.Where(l => l is > 0 and < 1))
            {
                // Genovese, Roeder and Wasserman (2006): the largest k with k of the p/w at most k q / m, weights of mean 1.
                bool Passes(int i, int k) => weights[i] > 0 && (sum * Rational.Of(p[i])).CompareTo(k * weights[i] * Rational.Of(level)) <= 0;
                int k = p.Length;
                while (k > 0 && Enumerable.Range(0, p.Length).Count(i => Passes(i, k)) < k)
                {
                    k--;
                }

                for (int i = 0; i < p.Length; i++)
                {
                    if (adjusted[i] != level)
                    {
                        Assert.True((k > 0 && Passes(i, k)) == adjusted[i] <= level, $"trial {trial}, p = {p[i]:R}, weight {weights[i]} of {sum}, adjusted {adjusted[i]:R}, level {level:R}");
                    }
                }
            }
        }
    }

    [Theory]
    [MemberData(nameof(Twins))]
    public void Without_weights_or_with_equal_ones_it_is_the_unweighted_correction_to_the_bit(string key, string unweighted)
    {
        var random = new Random(Seed + 3);
        for (int trial = 0; trial < Vectors; trial++)
        {
            double[] values = Families.Draw(random, random.Next(0, 20));
            int untested = random.Next(3);
            PValue[] p = [.. values.Select((x, i) => random.Next(6) == 0 ? PValue.FromLog(-700 - (100 * random.NextDouble())) : PValue.FromValue(x))];
            var family = RankedFamily.Of(p, p.Length + untested);
            PValue[] expected = CorrectionRegistry.Find(unweighted)!.Adjust(family);
            Correction weighted = CorrectionRegistry.Find(key)!;
            Assert.Equal(expected, weighted.Adjust(family));

            double weight = new[] { 1, 0.37, 12e200, 3e-250 }[random.Next(4)];
            var equal = RankedFamily.Of(p, p.Length + untested, [.. p.Select(_ => weight)], untested * weight);
            Assert.Equal(expected, CorrectionRegistry.Find(unweighted)!.Adjust(equal));
            PValue[] adjusted = weighted.Adjust(equal);
            Assert.All(expected.Zip(adjusted), pair => Assert.Equal(pair.First.Log, pair.Second.Log, 1e-12));
            if (weight == 1)
            {
                Assert.Equal(expected.Where(e => e.Value > 1e-280).Select(e => e.Value), adjusted.Where(e => e.Value > 1e-280).Select(e => e.Value));
            }
        }
    }

    [Theory]
    [InlineData("weighted-bonferroni")]
    [InlineData("weighted-holm")]
    [InlineData("weighted-bh")]
    public void A_hypothesis_of_weight_zero_is_never_rejected(string key)
    {
        PValue[] p = [PValue.FromValue(0), PValue.FromValue(0.01), PValue.FromLog(-5000), PValue.FromValue(0)];
        PValue[] adjusted = CorrectionRegistry.Find(key)!.Adjust(RankedFamily.Of(p, 4, [0, 1, 0, 3], 0));
        Assert.Equal([PValue.One, PValue.One], [adjusted[0], adjusted[2]]);
        Assert.Equal(double.NegativeInfinity, adjusted[3].Log);
        Assert.InRange(adjusted[1].Value, 0.01, 0.04);
    }

    [Fact]
    public void Far_tails_agree_with_logarithms_worked_by_hand()
    {
        // Weights 4, 1, 1, 2 of mean 2: p/w ascends in the order 2, 1, 4, 3. Holm's 7/4 of the first is below 8 of the second, which comes before it.
        PValue[] p = [PValue.FromLog(-9000), PValue.FromLog(-9001.5), PValue.FromLog(-2000), PValue.FromLog(-2001)];
        double Ln(double x) => Math.Log(x);
        void Close(string key, double[] expected) =>
            Assert.All(expected.Zip(CorrectionRegistry.Find(key)!.Adjust(RankedFamily.Of(p, 4, [4, 1, 1, 2], 0))), pair => Assert.Equal(pair.First, pair.Second.Log, 1e-9));

        Close("weighted-bonferroni", [-9000 + Ln(2), -9001.5 + Ln(8), -2000 + Ln(8), -2001 + Ln(4)]);
        Close("weighted-holm", [-9001.5 + Ln(8), -9001.5 + Ln(8), -2000, -2001 + Ln(3 / 2.0)]);
        Close("weighted-bh", [-9000 + Ln(1), -9000 + Ln(1), -2000 + Ln(2), -2001 + Ln(4 / 3.0)]);
    }

    [Fact]
    public void A_small_weight_brings_what_no_double_holds_back_into_their_range()
    {
        // exp(-760) / 10^-25 is a double again; the two weigh 1 together, but for 10^-25.
        PValue adjusted = CorrectionRegistry.Find("weighted-bonferroni")!.Adjust(RankedFamily.Of([PValue.FromLog(-760), PValue.FromValue(0.5)], 2, [1e-25, 1], 0))[0];
        Assert.Equal(-760 + (25 * Math.Log(10)), adjusted.Log, 1e-10);
        Assert.Equal(Math.Exp(-760 + (25 * Math.Log(10))), adjusted.Value, 1e-310);
        PValue further = CorrectionRegistry.Find("weighted-bonferroni")!.Adjust(RankedFamily.Of([PValue.FromLog(-690), PValue.FromValue(0.5)], 2, [1e-25, 1], 0))[0];
        Assert.Equal(-690 + (25 * Math.Log(10)), further.Log, 1e-10);
    }

    [Fact]
    public void Smaller_p_values_of_the_same_weight_never_get_larger_adjusted_ones_and_the_input_order_does_not_matter()
    {
        var random = new Random(Seed + 4);
        for (int trial = 0; trial < Vectors; trial++)
        {
            (double[] p, int[] weights, int rest) = Draw(random, 40);
            int[] places = [.. Enumerable.Range(0, p.Length)];
            random.Shuffle(places);
            foreach (string key in (string[])["weighted-bonferroni", "weighted-holm", "weighted-bh"])
            {
                double[] adjusted = Adjust(key, p, weights, rest);
                Assert.Equal(places.Select(i => adjusted[i]), Adjust(key, [.. places.Select(i => p[i])], [.. places.Select(i => weights[i])], rest));
                foreach (IGrouping<int, int> alike in Enumerable.Range(0, p.Length).GroupBy(i => weights[i]))
                {
                    int[] ascending = [.. alike.OrderBy(i => p[i])];
                    Assert.All(ascending.Zip(ascending.Skip(1)), two => Assert.True(adjusted[two.First] <= adjusted[two.Second] && (p[two.First] < p[two.Second] || adjusted[two.First] == adjusted[two.Second])));
                }

                Assert.All(Enumerable.Range(0, p.Length), i => Assert.True(adjusted[i] > 0 || p[i] == 0));
            }
        }
    }

    [Fact]
    public void Weights_that_are_none_are_refused_in_a_clear_sentence()
    {
        static string Fault(double[] weights, double rest, int familySize = 3) =>
            Assert.Throws<ArgumentException>(() => RankedFamily.Of([PValue.FromValue(0.1), PValue.FromValue(0.2)], familySize, weights, rest)).Message;

        Assert.Contains("Weight number 2 is -1: a weight is a number from 0 up.", Fault([1, -1], 1), StringComparison.Ordinal);
        Assert.Contains("Weight number 1 is NaN", Fault([double.NaN, 1], 1), StringComparison.Ordinal);
        Assert.Contains("Weight number 1 is Infinity", Fault([double.PositiveInfinity, 1], 1), StringComparison.Ordinal);
        Assert.Contains("untested hypotheses together is -2", Fault([1, 1], -2), StringComparison.Ordinal);
        Assert.Contains("All weights of the family are 0", Fault([0, 0], 0), StringComparison.Ordinal);
        Assert.Contains("1 weights were given for 2 p-values", Fault([1], 0), StringComparison.Ordinal);
        Assert.Contains("all 2 of the family have a p-value", Fault([1, 1], 1, 2), StringComparison.Ordinal);
    }

    [Fact]
    public void All_weight_on_the_untested_leaves_nothing_to_reject()
    {
        var family = RankedFamily.Of([PValue.FromValue(0), PValue.FromValue(0.2)], 3, [0, 0], 5);
        Assert.True(family.HasWeights);
        Assert.All(CorrectionRegistry.All.Where(c => c.NeedsWeights), c => Assert.Equal([PValue.One, PValue.One], c.Adjust(family)));
        Assert.Empty(CorrectionRegistry.Find("weighted-holm")!.Adjust(RankedFamily.Of([], 0, [], 0)));
    }

    private static (double[] P, int[] Weights, int OfRest) Draw(Random random, int most)
    {
        double[] p = Families.Draw(random, random.Next(1, most + 1));
        int[] weights = [.. p.Select(_ => random.Next(4) == 0 ? random.Next(20) : random.Next(1, 4))];
        weights[random.Next(weights.Length)] = 2;
        return (p, weights, random.Next(3) == 0 ? random.Next(1, 10) : 0);
    }

    private static double[] Adjust(string key, double[] p, int[] weights, int rest) => Adjust(key, p, [.. weights.Select(w => (double)w)], rest);

    private static double[] Adjust(string key, double[] p, double[] weights, double rest = 0)
    {
        double[] adjusted = new double[p.Length];
        var family = RankedFamily.Of([.. p.Select(PValue.FromValue)], p.Length + (rest > 0 ? 1 : 0), weights, rest);
        CorrectionRegistry.Find(key)!.Adjust(family, adjusted);
        return adjusted;
    }
}
