using Campaigns.Statistics.Checks;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.Checks;

/// <summary>What the checks of spread and balance say, on samples whose figures can be had by hand.</summary>
public sealed class SpreadAndBalanceTests
{
    [Fact]
    public void Spreads_that_differ_are_told_with_both_groups_and_the_p()
    {
        CheckFinding finding = CheckedExperiment.Of("10 20 30 40 50 60 70", "1 2 3 4 5 6 7", "2 3 5 6 8 9 11").Look(new EqualSpread());
        Assert.Equal(CheckVerdict.Warns, finding.Verdict);
        Assert.Matches(@"^Spreads differ: standard deviation 21\.6 in A against 2\.16 in B \(p = 0\.000\d{3}\)\.$", finding.Saw);
    }

    [Fact]
    public void Spreads_that_are_alike_are_no_proof_but_no_sign()
    {
        CheckFinding finding = CheckedExperiment.Of("1 2 3 4", "11 12 13 14").Look(new EqualSpread());
        Assert.Equal(new CheckFinding(CheckVerdict.Quiet, "No sign of different spreads: all standard deviations are 1.29 (p = 1).", 0, finding.P), finding);
        Assert.Equal(1, finding.P!.Value.Value);
    }

    [Fact]
    public void Levene_and_Bartlett_tell_and_never_warn()
    {
        CheckedExperiment experiment = CheckedExperiment.Of("100 200 300 400 500 600 700 900", "1 2 3 4 5 6 7 9", "2 3 5 6 8 9 11 13");
        Assert.All([new Levene(), (ExperimentCheck)new Bartlett()], check =>
        {
            CheckFinding finding = experiment.Look(check);
            Assert.Equal(CheckVerdict.Quiet, finding.Verdict);
            Assert.StartsWith("By this test alone, spreads differ: ", finding.Saw, StringComparison.Ordinal);
        });
    }

    [Fact]
    public void Pairs_alone_give_no_test_on_deviations()
    {
        const string Reason = "No group holds more than two values, and the two of a pair always lie equally far from their middle.";
        CheckedExperiment pairs = CheckedExperiment.Of("1 2", "3 9", "4 5");
        Assert.Equal(new CheckFinding(CheckVerdict.NotPossible, Reason), pairs.Look(new EqualSpread()));
        Assert.Equal(new CheckFinding(CheckVerdict.NotPossible, Reason), pairs.Look(new Levene()));
        Assert.Equal(CheckVerdict.Quiet, pairs.Look(new Bartlett()).Verdict);
    }

    [Fact]
    public void Values_equally_far_from_their_centre_give_no_test_on_deviations() =>
        Assert.Equal(
            "Inside every group all values lie equally far from its centre, so that nothing tells how much these distances vary by chance.",
            CheckedExperiment.Of("1 1 3 3", "0 0 10 10").Look(new EqualSpread()).Saw);

    [Fact]
    public void Groups_of_one_are_left_out_of_the_tests_on_deviations_and_named()
    {
        CheckFinding with = CheckedExperiment.Of("1 2 4 8", "5 6 6 9", "100").Look(new EqualSpread());
        CheckFinding without = CheckedExperiment.Of("1 2 4 8", "5 6 6 9").Look(new EqualSpread());
        Assert.Equal((without.Statistic, without.P), (with.Statistic, with.P));
        Assert.EndsWith(", groups of one value left out.", with.Saw, StringComparison.Ordinal);
        Assert.Equal("A group holds a single value, which has no variance.", CheckedExperiment.Of("1 2 4 8", "5 6 6 9", "100").Look(new Bartlett()).Saw);
    }

    /// <summary>Two groups: the statistic is one ratio of variances, 10^600 to one, and chi-squared grows as its logarithm: K = (2 df ln((1 + r)/2) - df ln r)/C with ln r = 600 ln 10, df = 3, C = 1 + (2/3 - 1/6)/3.</summary>
    [Fact]
    public void Bartletts_statistic_keeps_its_digits_where_variances_leave_the_doubles()
    {
        CheckFinding finding = CheckedExperiment.Of("1e300 2e300 3e300 4e300", "1 2 3 4").Look(new Bartlett());
        double logRatio = 600 * Math.Log(10);
        Relative.AssertNear(((6 * (logRatio - Math.Log(2))) - (3 * logRatio)) / (1 + ((2.0 / 3) - (1.0 / 6)) / 3), finding.Statistic!.Value, 1e-14, "K squared");
    }

    [Fact]
    public void Bartletts_statistic_keeps_its_digits_where_variances_are_nearly_equal()
    {
        // u = +-d with d = 1e-8 about: the sum is 3 d^2 (each group 3 (d^2/2)), far below the rounding of the logarithms.
        CheckFinding finding = CheckedExperiment.Of("0 1 2 3", "0 1 2 3.00000001").Look(new Bartlett());
        double a = 5.0 / 3;

        // The second variance is a + 1e-8 (2 * 1.5)/3 + 1e-16/4, exactly.
        double step = 1e-8 + (1e-16 / 4);
        double d = step / 2 / (a + (step / 2));
        Relative.AssertNear(3 * d * d / (1 + (((2.0 / 3) - (1.0 / 6)) / 3)), finding.Statistic!.Value, 1e-12, "K squared");
    }

    [Theory]
    [InlineData("0 3.1 6.2 9.3 12.4 15.5 18.6 21.7 24.8 27.9", "0 1 2 3 4 5 6 7 8 9", CheckVerdict.Warns)] // 3.1, of one size
    [InlineData("0 2.9 5.8 8.7 11.6 14.5 17.4 20.3 23.2 26.1", "0 1 2 3 4 5 6 7 8 9", CheckVerdict.Quiet)] // 2.9
    [InlineData("0 31 62", "0 10 20", CheckVerdict.Quiet)] // 3.1, but three values each: F = 9.6 on (2, 2), P = 1/10.6 for one of two ratios
    [InlineData("0 100 200", "0 10 20", CheckVerdict.Warns)] // 10: 2/101
    public void The_ratio_warns_where_it_is_large_and_chance_does_not_explain_it(string a, string b, CheckVerdict verdict) =>
        Assert.Equal(verdict, CheckedExperiment.Of(a, b).Look(new SpreadRatio()).Verdict);

    [Fact]
    public void The_limit_is_lower_where_sizes_differ()
    {
        string few = string.Join(' ', Enumerable.Range(0, 20));
        string many = string.Join(' ', Enumerable.Range(0, 60).Select(i => i % 20));
        Assert.Equal(CheckVerdict.Quiet, CheckedExperiment.Of(few, Times(few, 2.5)).Look(new SpreadRatio()).Verdict);
        Assert.Equal(CheckVerdict.Warns, CheckedExperiment.Of(many, Times(few, 2.5)).Look(new SpreadRatio()).Verdict);

        static string Times(string values, double factor) => string.Join(' ', values.Split(' ').Select(v => (double.Parse(v, System.Globalization.CultureInfo.InvariantCulture) * factor).ToString("R", System.Globalization.CultureInfo.InvariantCulture)));
    }

    /// <summary>The p-value is k (k - 1) times that of F(2, 2) above r^2, which is 1/(1 + r^2).</summary>
    [Fact]
    public void Chance_is_bounded_over_all_pairs_of_groups()
    {
        CheckFinding finding = CheckedExperiment.Of("0 20 40", "0 1 2", "0 3 6").Look(new SpreadRatio());
        Relative.AssertNear(20, finding.Statistic!.Value, 1e-15, "ratio");
        Relative.AssertNear(6 / 401.0, finding.P!.Value.Value, 1e-14, "p");
        Assert.Equal("The largest standard deviation, 20.0 in A, is 20.0 times the smallest, 1.00 in B (p = 0.0150).", finding.Saw);
    }

    [Fact]
    public void A_constant_group_beside_others_warns_and_a_constant_pair_does_not()
    {
        Assert.Equal(new CheckFinding(CheckVerdict.Warns, "All 3 values of A are the same, beside a standard deviation of 1.00 in B."), CheckedExperiment.Of("5 5 5", "1 2 3").Look(new SpreadRatio()));
        Assert.Equal(CheckVerdict.Quiet, CheckedExperiment.Of("5 5", "1 2 3").Look(new SpreadRatio()).Verdict);
        Assert.Equal("All 3 values of C are the same, beside a standard deviation of 1.00 in B.", CheckedExperiment.Of("5 5", "1 2 3", "6 6 6").Look(new SpreadRatio()).Saw);
        Assert.Equal("All values of A are the same, and the test needs the logarithm of every variance.", CheckedExperiment.Of("5 5 5", "1 2 3").Look(new Bartlett()).Saw);
    }

    [Theory]
    [InlineData("1 2 3", "4 5 6", CheckVerdict.Quiet, "All groups have 3 values.")]
    [InlineData("1 2 3", "4 5 6 7 8", CheckVerdict.Quiet, "Group sizes run from 3 values in A to 5 in B.")]
    [InlineData("1 2 3", "4 5 6 7 8 9", CheckVerdict.Warns, "Group sizes run from 3 values in A to 6 in B.")]
    [InlineData("1", "4", CheckVerdict.Warns, "All groups have 1 value.")]
    [InlineData("1 5 5", "4", CheckVerdict.Warns, "Group sizes run from 1 value in B to 3 in A.")]
    public void Balance_tells_the_sizes(string a, string b, CheckVerdict verdict, string saw)
    {
        CheckFinding finding = CheckedExperiment.Of(a, b).Look(new Balance());
        Assert.Equal((verdict, saw), (finding.Verdict, finding.Saw));
    }

    [Fact]
    public void A_planned_group_without_a_value_is_told() =>
        Assert.Equal(new CheckFinding(CheckVerdict.Warns, "There is no value in B, against 4 in C."), CheckedExperiment.Of("1 2 3", "", "1 2 3 4").Look(new Balance()));
}
