using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Tests.Corrections;

public sealed class FarTailTests
{
    public static TheoryData<string> Keys => [.. CorrectionRegistry.All.Select(c => c.Key)];

    [Fact]
    public void Bonferroni_Holm_Benjamini_Hochberg_and_Hommel_agree_with_logarithms_worked_by_hand()
    {
        // Natural logarithms; 7 hypotheses were planned, 4 p-values are at hand.
        double[] raw = [-1000000, -999999.9, -2000, -0.1];
        double Ln(double x) => Math.Log(x);

        Close("bonferroni", raw, 7, [-1000000 + Ln(7), -999999.9 + Ln(7), -2000 + Ln(7), 0]);
        Close("holm", raw, 7, [-1000000 + Ln(7), -1000000 + Ln(7), -2000 + Ln(5), 0]);
        Close("hochberg", raw, 7, [-999999.9 + Ln(6), -999999.9 + Ln(6), -2000 + Ln(5), 0]);
        Close("bh", raw, 7, [-999999.9 + Ln(3.5), -999999.9 + Ln(3.5), -2000 + Ln(7 / 3.0), 0]);
        Close("by", raw, 7, [-999999.9 + Ln(3.5 * 363 / 140), -999999.9 + Ln(3.5 * 363 / 140), -2000 + Ln(7 / 3.0 * 363 / 140), 0]);

        // All seven: the best Simes term is 7 p(2) / 2. Intersections with one of the two least hold six or fewer others; with the lesser, 6 p(1); with the other, 6 p(2), the worst for it.
        Close("hommel", raw, 7, [-1000000 + Ln(6), -999999.9 + Ln(6), -2000 + Ln(5), 0]);
    }

    [Fact]
    public void Adaptive_and_any_dependence_corrections_agree_with_logarithms_worked_by_hand()
    {
        // As above. Sum 1 + 1/2 + ... + 1/7 = 363/140.
        double[] raw = [-1000000, -999999.9, -2000, -0.1];
        double Ln(double x) => Math.Log(x);
        double harmonic = Ln(363 / 140.0);
        Close("hommel-any", raw, 7, [-1000000 + Ln(6) + harmonic, -999999.9 + Ln(6) + harmonic, -2000 + Ln(5) + harmonic, 0]);

        // W = 4: exp(-0.1) and three untested; 2 (W + 1) = 10 true nulls.
        Close("storey", raw, 7, [-999999.9 + Ln(5), -999999.9 + Ln(5), -2000 + Ln(10 / 3.0), 0]);

        // b(1) = b(2) = 3.5 p(2): the first stage begins there. b(3) = 7/3 p(3) needs 5/7 of itself once the first stage has rejected two.
        // b(4) = 1, since three untested stand behind it; 4/7 of it once three are rejected, and q = (4/7)/(3/7) is above 1.
        Close("bky", raw, 7, [-999999.9 + Ln(3.5), -999999.9 + Ln(3.5), -2000 + Ln(5 / 3.0), 0]);

        // All tested, the last one small: it survives at a level below its p.
        Close("bky", [-3000, -2000, -1000], 3, [-3000 + Ln(3), -2000 + Ln(1), -1000 + Ln(1.0 / 3)]);
        Close("storey", [-3000, -2000, -1000], 3, [-3000 + Ln(2), -2000 + Ln(1), -1000 + Ln(2.0 / 3)]);
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void Far_down_a_shift_of_all_logarithms_shifts_the_adjusted_ones(string key)
    {
        var random = new Random(20260404);
        for (int trial = 0; trial < 200; trial++)
        {
            int count = random.Next(1, 30);
            int size = count + random.Next(0, 50);
            double[] logs = [.. Enumerable.Range(0, count).Select(_ => Math.Round(-150 - (random.NextDouble() * 20), random.Next(0, 12)))];
            double shift = random.Next(600, 1000000);
            PValue[] near = Adjust(key, [.. logs.Select(PValue.FromLog)], size);
            PValue[] far = Adjust(key, [.. logs.Select(l => PValue.FromLog(l - shift))], size);
            Assert.All(near.Zip(far), pair => Assert.Equal(pair.First.Log - shift, pair.Second.Log, 1e-9));
        }
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void Logarithms_spread_over_many_windows_stay_monotone_above_the_raw_ones_and_in_place(string key)
    {
        var random = new Random(20260405);
        double[] logs = [.. Enumerable.Range(0, 200).Select(_ => -Math.Pow(10, 6 * random.NextDouble()))];
        PValue[] adjusted = Adjust(key, [.. logs.Select(PValue.FromLog)], 100000);
        (double Raw, PValue Adjusted)[] pairs = [.. logs.Zip(adjusted).OrderBy(pair => pair.First)];
        double below = CorrectionRegistry.Find(key)!.MayGoBelowP ? Math.Log(200) : 0;
        Assert.All(pairs, pair => Assert.InRange(pair.Adjusted.Log, pair.Raw - below - 1e-12 - (1e-15 * Math.Abs(pair.Raw)), Math.Min(0, pair.Raw + Math.Log(100000 * 13.0))));
        Assert.All(pairs.Zip(pairs.Skip(1)), two => Assert.True(two.First.Adjusted <= two.Second.Adjusted));
    }

    [Fact]
    public void A_sum_that_climbs_back_into_the_range_of_doubles_has_its_value()
    {
        // exp(-746) is no double; a million times it is one.
        PValue adjusted = Adjust("bonferroni", [PValue.FromLog(-746)], 1000000)[0];
        Assert.Equal(-746 + Math.Log(1e6), adjusted.Log, 1e-12);
        Assert.Equal(Math.Exp(-746 + Math.Log(1e6)), adjusted.Value);
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void Only_a_p_value_given_as_zero_stays_zero(string key)
    {
        PValue[] adjusted = Adjust(key, [PValue.FromValue(0), PValue.FromLog(-5000), PValue.FromValue(0.3)], 10);
        Assert.Equal(double.NegativeInfinity, adjusted[0].Log);
        Assert.True(adjusted[1].IsBelowDoubleRange);
        Assert.InRange(adjusted[1].Log, -5000, -5000 + Math.Log(10 * 2.93));
    }

    private static PValue[] Adjust(string key, PValue[] p, int size) => CorrectionRegistry.Find(key)!.Adjust(RankedFamily.Of(p, size));

    private static void Close(string key, double[] logs, int size, double[] expected)
    {
        PValue[] adjusted = Adjust(key, [.. logs.Select(PValue.FromLog)], size);
        Assert.All(expected.Zip(adjusted), pair => Assert.Equal(pair.First, pair.Second.Log, 1e-9));
    }
}
