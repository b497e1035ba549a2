using System.Numerics;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>Welch's, Brown-Forsythe's and Kruskal-Wallis's tests at the edge of what can be tested.</summary>
public sealed class OtherTestsEdgeCasesTests
{
    private static readonly GroupTest Welch = new WelchTest();
    private static readonly GroupTest Star = new BrownForsytheTest();
    private static readonly GroupTest Ranks = new KruskalWallisTest();

    [Fact]
    public void Every_edge_case_of_the_F_test_gets_its_status_from_the_others_too()
    {
        ILookup<string, (string, string)> data = ReferenceTable.Read("experiment/edge_cases_data.csv").Rows.ToLookup(r => r.Text("experiment"), r => (r.Text("group"), r.Text("value")));
        int seen = 0;
        foreach (ReferenceRow expected in ReferenceTable.Read("experiment/edge_cases_expected.csv").Rows.Where(r => r.Text("status") != "rejected-non-finite"))
        {
            seen++;
            string name = expected.Text("experiment");
            TypedSample sample = TypedSample.OfText(data[name]);
            NotTestableReason? common = Reason(expected.Text("status"));
            AssertStatus(sample.Test(Welch), expected, name switch { "single_value_group" => NotTestableReason.GroupOfOne, "one_group_constant" or "equal_means" => NotTestableReason.ConstantGroup, _ => common });
            AssertStatus(sample.Test(Star), expected, name == "single_value_group" ? NotTestableReason.GroupOfOne : common);
            AssertStatus(sample.Test(Ranks), expected, common == NotTestableReason.ZeroWithinVariation ? null : common);

            // All the layouts here that F* can test have groups of equal size, where it is F.
            if (sample.Test(Star) is Tested star)
            {
                Relative.AssertNear(expected.Number("f_from_decimal_text"), star.Statistic, 2.3e-16, name);
            }
        }

        Assert.Equal(18, seen);
    }

    [Fact]
    public void The_earlier_reason_wins_where_several_hold()
    {
        (NotTestableReason? Welch, NotTestableReason? Star, NotTestableReason? Ranks) Reasons(long[] values, ushort[] groups)
        {
            NotTestableReason? Of(GroupTest test) => (test.Test(new GroupedSample(values, 0, groups, 3)) as NotTestable)?.Reason;
            return (Of(Welch), Of(Star), Of(Ranks));
        }

        void AssertAll(NotTestableReason reason, long[] values, ushort[] groups) =>
            Assert.Equal((reason, reason, reason), Reasons(values, groups));

        AssertAll(NotTestableReason.TooFewGroups, [], []);
        AssertAll(NotTestableReason.TooFewGroups, [5, 6, 7], [1, 1, 1]);
        AssertAll(NotTestableReason.NoReplication, [5, 5, 5], [0, 1, 2]);
        AssertAll(NotTestableReason.NoReplication, [5, 6, 7], [0, 1, 2]);
        AssertAll(NotTestableReason.ConstantResponse, [5, 5, 5], [0, 1, 1]);
        Assert.Equal((NotTestableReason.GroupOfOne, NotTestableReason.GroupOfOne, null), Reasons([5, 6, 6], [0, 1, 1]));
        Assert.Equal((NotTestableReason.GroupOfOne, NotTestableReason.GroupOfOne, null), Reasons([5, 6, 7], [0, 1, 1]));
        Assert.Equal((NotTestableReason.ZeroWithinVariation, NotTestableReason.ZeroWithinVariation, null), Reasons([5, 5, 6, 6], [0, 0, 1, 1]));
        Assert.Equal((NotTestableReason.ConstantGroup, null, null), Reasons([5, 5, 6, 7], [0, 0, 2, 2]));
    }

    [Fact]
    public void Ranks_compare_groups_that_are_constant_inside_and_have_no_table_of_variation()
    {
        // Ranks 1 2 3 4 as midranks 1.5 1.5 3.5 3.5: rank sums 3 and 7, sum of R^2/n = 29, H before ties 12/20 * 29 - 15 = 2.4, ties 1 - 12/60 = 0.8, H = 3 (by hand).
        Tested tested = Assert.IsType<Tested>(Ranks.Test(new GroupedSample([5L, 5, 6, 6], 0, [0, 0, 1, 1], 2)));
        Assert.Equal(3, tested.Statistic);
        Assert.Null(tested.Variation);

        // P(chi-squared with 1 degree of freedom > 3) = 0.0833 in any table (from memory).
        Assert.Equal(0.0833, tested.P.Value, 0.00005);
    }

    [Fact]
    public void Equal_means_and_equal_mean_ranks_give_0_and_p_1()
    {
        long[] values = [1, 3, 0, 4, -2, 6];
        ushort[] groups = [0, 0, 1, 1, 2, 2];
        Assert.All([Welch, Star, Ranks], test =>
        {
            Tested tested = Assert.IsType<Tested>(test.Test(new GroupedSample(values, 0, groups, 3)));
            Assert.Equal((0.0, 1.0, 0.0), (tested.Statistic, tested.P.Value, tested.P.Log));
        });
    }

    [Fact]
    public void Empty_groups_are_left_out_and_not_counted()
    {
        long[] values = [1, 2, 3, 2, 4, 9];
        Assert.All([Welch, Star, Ranks], test => Assert.Equal(
            test.Test(new GroupedSample(values, 0, [0, 0, 0, 1, 1, 1], 2)),
            test.Test(new GroupedSample(values, 0, [1, 1, 1, 3, 3, 3], 5))));
    }

    [Fact]
    public void A_statistic_beyond_the_doubles_is_given_as_the_largest_with_the_logarithm_of_its_own_p()
    {
        // Groups {0, 1} and {10^200, 10^200 + 1}: t^2 = 2 * 10^400 exactly, and P(F > f) with (1, 2) degrees of freedom is 1 - sqrt(f/(f + 2)), about 1/f.
        BigInteger far = BigInteger.Pow(10, 200);
        TypedSample sample = new([0, 1, far, far + 1], 0, [0, 0, 1, 1], 2);
        foreach (GroupTest test in new[] { Welch, Star })
        {
            Tested tested = Assert.IsType<Tested>(sample.Test(test));
            Assert.Equal((double.MaxValue, 2.0), (tested.Statistic, tested.Df2!.Value));
            Relative.AssertNear(-Math.Log(2) - (400 * Math.Log(10)), tested.P.Log, 1e-14, test.Key + " ln p");
            Assert.True(tested.P.IsBelowDoubleRange);
        }
    }

    [Fact]
    public void Spreads_two_thousand_powers_of_ten_apart_give_finite_numbers()
    {
        // The wide group alone matters: 1 and 2 degrees of freedom become those of its own variance, n - 1 = 2; t^2 = 2^2 * 3/1 for {1, 2, 3} against a mean of 0.
        BigInteger unit = BigInteger.Pow(10, 2000);
        TypedSample sample = new([-1, 0, 1, unit, 2 * unit, 3 * unit], 1000, [0, 0, 0, 1, 1, 1], 2);
        Tested welch = Assert.IsType<Tested>(sample.Test(Welch));
        Assert.Equal((12.0, 2.0), (welch.Statistic, welch.Df2));
        Tested star = Assert.IsType<Tested>(sample.Test(Star));
        Assert.Equal((12.0, 1.0, 2.0), (star.Statistic, star.Df1, star.Df2));
        Assert.Equal(welch.P, star.P);
    }

    [Fact]
    public void A_hundred_thousand_values_in_a_group_meet_the_closed_forms()
    {
        // 0 and 1 in turn: n/s^2 = 4 (n - 1); {10, 11, 12}: 3. Welch's t^2 = 10.5^2/(1/(4 (n - 1)) + 1/3).
        const int N = 100_000;
        long[] values = [.. Enumerable.Range(0, N).Select(i => i % 2L), 10, 11, 12];
        ushort[] groups = [.. Enumerable.Repeat((ushort)0, N), 1, 1, 1];
        double v = 1 / (4.0 * (N - 1));
        double squaredT = 10.5 * 10.5 / (v + (1 / 3.0));
        double df = Math.Pow(v + (1 / 3.0), 2) / ((v * v / (N - 1)) + (1 / 18.0));
        foreach (GroupTest test in new[] { Welch, Star })
        {
            Tested tested = Assert.IsType<Tested>(test.Test(new GroupedSample(values, 0, groups, 2)));
            Relative.AssertNear(squaredT, tested.Statistic, 1e-15, test.Key);
            Relative.AssertNear(df, tested.Df2!.Value, 1e-15, test.Key + " df2");
        }

        // 1, 2, ..., n - 1 against n alone: rank sums n (n - 1)/2 and n, hence H = 3 (n - 1)/(n + 1) by the formula of Kruskal and Wallis; n is N + 1.
        Tested ranked = Assert.IsType<Tested>(Ranks.Test(new GroupedSample([.. Enumerable.Range(0, N + 1).Select(i => (long)i)], 0, [.. Enumerable.Repeat((ushort)0, N), 1], 2)));
        Relative.AssertNear(3.0 * N / (N + 2), ranked.Statistic, 2.3e-16, "H");
    }

    [Fact]
    public void Sixty_groups_meet_the_closed_forms()
    {
        // Group g holds m - 1, m, m + 1 with m = 10 g: variances 1, weights 3, sum of squared means 100 (60^3 - 60)/12.
        const int K = 60;
        long[] values = [.. Enumerable.Range(0, K * 3).Select(i => (10L * (i / 3)) + (i % 3) - 1)];
        ushort[] groups = [.. Enumerable.Range(0, K * 3).Select(i => (ushort)(i / 3))];
        double f = 3 * 100 * (((double)K * K * K) - K) / 12 / (K - 1);
        double t = K * Math.Pow(1 - (1.0 / K), 2) / 2;
        Tested welch = Assert.IsType<Tested>(Welch.Test(new GroupedSample(values, 0, groups, K)));
        Relative.AssertNear(f / (1 + (2 * (K - 2) * t / ((K * K) - 1))), welch.Statistic, 1e-15, "Welch F");
        Relative.AssertNear(((K * K) - 1) / (3 * t), welch.Df2!.Value, 1e-15, "Welch df2");
        Tested star = Assert.IsType<Tested>(Star.Test(new GroupedSample(values, 0, groups, K)));
        Assert.Equal((f, K - 1.0, 2.0 * K), (star.Statistic, star.Df1, star.Df2));

        // No two groups overlap: the between sum of squares of the ranks is the greatest there is, 9 * 3 (K^3 - K)/12, over that of all ranks, (N^3 - N)/12, times N - 1.
        double n = 3 * K;
        Tested ranked = Assert.IsType<Tested>(Ranks.Test(new GroupedSample(values, 0, groups, K)));
        Relative.AssertNear((n - 1) * 27 * (((double)K * K * K) - K) / ((n * n * n) - n), ranked.Statistic, 1e-15, "H");
    }

    [Fact]
    public void Ties_everywhere_meet_the_chi_squared_of_the_two_by_k_table()
    {
        // Two values only: the corrected H is (N - 1)/N times Pearson's chi-squared of the 2 by k table of counts (identity by algebra). Counts of ones 5, 1, 3 of 8: expected 3 each, 40 of N = 24 by hand: sum of (o - e)^2/e over both rows.
        long[] values = [.. Ones(5), .. Ones(1), .. Ones(3)];
        ushort[] groups = [.. Enumerable.Range(0, 24).Select(i => (ushort)(i / 8))];
        const double Pearson = (4 + 4 + 0) / 3.0 + ((4 + 4 + 0) / 5.0);
        Tested tested = Assert.IsType<Tested>(Ranks.Test(new GroupedSample(values, 0, groups, 3)));
        Relative.AssertNear(Pearson * 23 / 24, tested.Statistic, 4e-16, "H");

        static IEnumerable<long> Ones(int count) => Enumerable.Range(0, 8).Select(i => i < count ? 1L : 0L);
    }

    [Fact]
    public void Thirds_are_tested_as_what_they_are()
    {
        // Means of three readings: integers over a common divisor.
        long[] values = [1, 2, 4, 3, 5, 10];
        ushort[] groups = [0, 0, 0, 1, 1, 1];
        Assert.All([Welch, Star, Ranks], test =>
        {
            Tested whole = Assert.IsType<Tested>(test.Test(new GroupedSample(values, 0, groups, 2)));
            Tested thirds = Assert.IsType<Tested>(test.Test(new GroupedSample(values, 0, groups, 2) { Divisor = 3 }));
            Assert.Equal(whole with { Variation = null }, thirds with { Variation = null });
            Relative.AssertNear(whole.Variation!.Within.SumOfSquares / 9, thirds.Variation!.Within.SumOfSquares, 2.3e-16, test.Key);
        });
    }

    [Fact]
    public void A_value_of_an_unknown_group_is_refused() =>
        Assert.All([Welch, Star, Ranks], test => Assert.Throws<ArgumentException>(() => test.Test(new GroupedSample([1L, 2], 0, [0, 2], 2))));

    private static NotTestableReason? Reason(string status) => status switch
    {
        "ok" => null,
        "too-few-groups" => NotTestableReason.TooFewGroups,
        "no-replication" => NotTestableReason.NoReplication,
        "constant-response" => NotTestableReason.ConstantResponse,
        "zero-within-variance" => NotTestableReason.ZeroWithinVariation,
        _ => throw new InvalidOperationException("A status of a new kind needs its line here."),
    };

    private static void AssertStatus(TestOutcome outcome, ReferenceRow expected, NotTestableReason? reason)
    {
        Assert.Equal(reason, (outcome as NotTestable)?.Reason);
        Assert.Equal(expected.Integer("k_used"), outcome.GroupCount);
        Assert.Equal(expected.Integer("n_total"), outcome.ObservationCount);
        if (outcome is Tested tested)
        {
            Assert.True(double.IsFinite(tested.Statistic) && tested.Statistic >= 0);
            Assert.InRange(tested.P.Value, double.Epsilon, 1);
            Assert.Equal(expected.Text("status") == "ok", tested.Variation is not null);
        }
    }
}
