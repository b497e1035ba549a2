using System.Numerics;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.GroupTests;

public sealed class EdgeCasesTests
{
    [Fact]
    public void Every_edge_case_gets_its_status_and_its_numbers()
    {
        ILookup<string, (string, string)> data = ReferenceTable.Read("experiment/edge_cases_data.csv").Rows.ToLookup(r => r.Text("experiment"), r => (r.Text("group"), r.Text("value")));
        int seen = 0;
        foreach (ReferenceRow expected in ReferenceTable.Read("experiment/edge_cases_expected.csv").Rows.Where(r => r.Text("status") != "rejected-non-finite"))
        {
            seen++;
            string name = expected.Text("experiment");
            TestOutcome outcome = TypedSample.OfText(data[name]).Test(new FTest());
            Assert.Equal(expected.Integer("k_used"), outcome.GroupCount);
            Assert.Equal(expected.Integer("n_total"), outcome.ObservationCount);
            Assert.Equal(expected.Text("status"), Status(outcome));
            if (outcome is Tested tested)
            {
                AssertNumbers(expected, tested, name);
            }
        }

        Assert.Equal(18, seen);
    }

    [Fact]
    public void Empty_groups_are_left_out_and_not_counted()
    {
        // The same values with and without two groups that hold nothing.
        long[] values = [1, 2, 3, 2, 4, 6];
        TestOutcome with = new FTest().Test(new GroupedSample(values, 0, [1, 1, 1, 3, 3, 3], 5));
        TestOutcome without = new FTest().Test(new GroupedSample(values, 0, [0, 0, 0, 1, 1, 1], 2));
        Assert.Equal(without, with);
    }

    [Fact]
    public void The_earlier_reason_wins_where_several_hold()
    {
        Assert.Equal(NotTestableReason.TooFewGroups, Reason([5, 5, 5], [0, 0, 0], 2));
        Assert.Equal(NotTestableReason.TooFewGroups, Reason([5], [0], 2));
        Assert.Equal(NotTestableReason.NoReplication, Reason([5, 5], [0, 1], 2));
        Assert.Equal(NotTestableReason.ConstantResponse, Reason([5, 5, 5], [0, 1, 1], 2));
        Assert.Equal(NotTestableReason.ZeroWithinVariation, Reason([5, 6, 6], [0, 1, 1], 2));
    }

    [Fact]
    public void Equal_means_give_F_0_and_p_1()
    {
        Tested tested = Assert.IsType<Tested>(new FTest().Test(new GroupedSample([1L, 3, 2, 2, 0, 4], 3, [0, 0, 1, 1, 2, 2], 3)));
        Assert.Equal(0, tested.Statistic);
        Assert.Equal(1, tested.P.Value);
        Assert.Equal(0, tested.P.Log);
        Assert.Equal(0, tested.Variation!.EtaSquared);
    }

    [Fact]
    public void Sums_of_squares_beyond_the_doubles_leave_F_and_p_right()
    {
        long[] values = [1, 2, 3, 4, 5, 6];
        ushort[] groups = [0, 0, 0, 1, 1, 1];
        Tested plain = Assert.IsType<Tested>(new FTest().Test(new GroupedSample(values, 0, groups, 2)));
        foreach (int decimals in new[] { -300, 300, -2000, 2000 })
        {
            Tested far = Assert.IsType<Tested>(new FTest().Test(new GroupedSample(values, decimals, groups, 2)));
            Assert.Equal(plain.Statistic, far.Statistic);
            Assert.Equal(plain.P, far.P);
            Assert.Equal(plain.Variation!.EtaSquared, far.Variation!.EtaSquared);
            Assert.Equal(plain.Variation!.OmegaSquared, far.Variation!.OmegaSquared);
            Assert.Equal(decimals < 0 ? double.PositiveInfinity : 0, far.Variation!.Within.SumOfSquares);
        }
    }

    [Fact]
    public void An_F_beyond_the_doubles_is_given_as_the_largest_with_the_logarithm_of_its_own_p()
    {
        // Groups {0, 1} and {10^200, 10^200 + 1}: F = 2 * 10^400 exactly, and P(F > f) with (1, 2) degrees of freedom is 1 - sqrt(f/(f + 2)), about 1/f.
        BigInteger far = BigInteger.Pow(10, 200);
        TypedSample sample = new([0, 1, far, far + 1], 0, [0, 0, 1, 1], 2);
        Tested tested = Assert.IsType<Tested>(sample.Test(new FTest()));
        Assert.Equal(double.MaxValue, tested.Statistic);
        Relative.AssertNear(-Math.Log(2) - (400 * Math.Log(10)), tested.P.Log, 1e-14, "log p");
        Assert.True(tested.P.IsBelowDoubleRange);
    }

    [Fact]
    public void The_widest_64_bit_values_do_not_overflow()
    {
        // Differences of 2^64 - 1: sums of squares need 130 bits. SSB and SSW are equal by symmetry of the design {min, max} against {max, max}.
        TypedSample sample = new([long.MinValue, long.MaxValue, long.MaxValue, long.MaxValue], 0, [0, 0, 1, 1], 2);
        Tested narrow = Assert.IsType<Tested>(sample.Test(new FTest()));
        Assert.Equal(sample.TestAsWide(new FTest()), narrow);
        Assert.Equal(1, narrow.Statistic);
    }

    [Fact]
    public void A_value_of_an_unknown_group_is_refused()
    {
        Assert.Throws<ArgumentException>(() => new FTest().Test(new GroupedSample([1L, 2], 0, [0, 2], 2)));
        Assert.Throws<ArgumentException>(() => new FTest().Test(new GroupedSample([new BigInteger(1), new BigInteger(2)], 0, [0, 2], 2)));
    }

    private static NotTestableReason Reason(long[] values, ushort[] groups, int groupCount) =>
        Assert.IsType<NotTestable>(new FTest().Test(new GroupedSample(values, 0, groups, groupCount))).Reason;

    private static string Status(TestOutcome outcome) => outcome switch
    {
        Tested => "ok",
        NotTestable { Reason: NotTestableReason.TooFewGroups } => "too-few-groups",
        NotTestable { Reason: NotTestableReason.NoReplication } => "no-replication",
        NotTestable { Reason: NotTestableReason.ConstantResponse } => "constant-response",
        NotTestable { Reason: NotTestableReason.ZeroWithinVariation } => "zero-within-variance",
        _ => throw new InvalidOperationException("An outcome of a new kind needs its line here."),
    };

    private static void AssertNumbers(ReferenceRow expected, Tested tested, string name)
    {
        Assert.Equal(expected.Integer("df_between"), tested.Df1);
        Assert.Equal(expected.Integer("df_within"), tested.Df2);
        Relative.AssertNear(expected.Number("f_from_decimal_text"), tested.Statistic, 2.3e-16, $"{name} F");

        // The reference p belongs to F of the values read as doubles: comparable where that F is the typed one's.
        if (Relative.Error(expected.Number("f"), tested.Statistic) < 1e-15)
        {
            Relative.AssertNear(expected.Number("p"), tested.P.Value, 1e-14, $"{name} p");
            Relative.AssertNear(expected.Number("ss_between"), tested.Variation!.Between.SumOfSquares, 1e-15, $"{name} SS between");
            Relative.AssertNear(expected.Number("ss_within"), tested.Variation!.Within.SumOfSquares, 1e-15, $"{name} SS within");
        }
    }
}
