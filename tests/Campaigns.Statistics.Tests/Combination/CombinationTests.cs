using Campaigns.Statistics.Combination;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.Combination;

public sealed class CombinationTests
{
    private static readonly Dictionary<string, double[]> Vectors =
        ReferenceTable.Read("campaign/pvectors.csv").Rows.GroupBy(r => r.Text("set")).ToDictionary(g => g.Key, g => g.Select(r => r.Number("p")).ToArray());

    public static TheoryData<string> Keys => [.. CombinationRegistry.All.Select(t => t.Key)];

    [Theory]
    [InlineData("simes", "simes", "simes", false)]
    [InlineData("simes-any", "simes", "simes_times_Hm", false)]
    [InlineData("fisher", "fisher_chi2", "fisher_p", false)]
    [InlineData("stouffer", "stouffer_z", "stouffer_p", false)]
    [InlineData("stouffer", "stouffer_z_w123", "stouffer_p_w123", true)]
    [InlineData("cauchy", "cauchy_T", "cauchy_p", false)]
    [InlineData("cauchy", null, "cauchy_p_w123", true)]
    public void Statistic_and_p_value_are_those_of_80_digits(string key, string? statistic, string column, bool weighted)
    {
        foreach (ReferenceRow row in ReferenceTable.Read("campaign/global_combination.csv").Rows)
        {
            double[] values = Vectors[row.Text("set")];
            double[] weights = weighted ? [.. values.Select((_, i) => 1.0 + (i % 3))] : [];
            CombinationOutcome outcome = CombinationRegistry.Find(key)!.Combine(values.Select(PValue.FromValue).ToArray(), values.Length, weights);
            double expected = row.Number(column);
            if (double.IsNaN(expected))
            {
                Assert.Null(outcome.P);
                Assert.NotEmpty(outcome.Reason!);
                continue;
            }

            // Rounding ln p in the last place is an error of |ln p| such places in p.
            double tolerance = expected > 0 ? 3e-15 * (1 + Math.Abs(Math.Log(expected))) : 0;
            Assert.True(Math.Abs(outcome.P!.Value.Value - expected) <= (tolerance * expected) + double.Epsilon, $"{row.Text("set")}: {outcome.P} instead of {expected:R}");
            if (statistic is not null && double.IsFinite(row.Number(statistic)))
            {
                Assert.Equal(row.Number(statistic), outcome.Statistic!.Value, 1e-14 * Math.Max(1, Math.Abs(row.Number(statistic))));
            }
            else if (statistic is not null && key != "cauchy")
            {
                Assert.Null(outcome.Statistic);
            }
        }
    }

    [Fact]
    public void Below_the_range_of_doubles_the_logarithm_carries_the_p_value()
    {
        // The table has the statistic, and 0 for the p-value: with 2 m degrees of freedom the tail is e^-x (1 + x + ... + x^(m-1)/(m-1)!), x half the statistic (Abramowitz and Stegun 1964, 26.4.21).
        PValue p = CombinationRegistry.Find("fisher")!.Combine(Vectors["m5_denorm"].Select(PValue.FromValue).ToArray(), 5).P!.Value;
        Assert.True(p.IsBelowDoubleRange);
        double x = 3057.6435970448979 / 2;
        double series = 1 + x + (x * x / 2) + (x * x * x / 6) + (x * x * x * x / 24);
        Assert.Equal(Math.Log(series) - x, p.Log, 1e-11);
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void Two_p_values_far_below_the_range_of_doubles_combine_to_one_that_is_still_ranked(string key)
    {
        CombinationOutcome outcome = CombinationRegistry.Find(key)!.Combine([PValue.FromLog(-4000), PValue.FromLog(-3999)], 2);
        Assert.True(outcome.P!.Value.IsBelowDoubleRange);
        double log = key switch
        {
            // 2 p for the smaller, p for the larger one; times 3/2; half the mean of the reciprocals; the others by their own laws.
            "simes" => -4000 + Math.Log(2),
            "simes-any" => -4000 + Math.Log(3),
            "cauchy" => -4000 + Math.Log(2 / (1 + Math.Exp(-1))),
            "fisher" => -7999 + Math.Log(8000),
            _ => outcome.P.Value.Log,
        };
        Assert.Equal(log, outcome.P.Value.Log, 1e-9);
    }

    [Fact]
    public void Stouffers_deviates_far_out_are_those_of_the_normal_tail()
    {
        // The table of the normal tail, 60 digits: two equal deviates z combine to z sqrt 2.
        ReferenceRow row = ReferenceTable.Read("experiment/normal_tail.csv").Rows.First(r => r.Number("z") is > 50 and < 200);
        var p = PValue.FromLog(row.Number("log_upper"));
        CombinationOutcome outcome = CombinationRegistry.Find("stouffer")!.Combine([p, p], 2);
        Assert.Equal(row.Number("z") * Math.Sqrt(2), outcome.Statistic!.Value, 1e-10);
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void One_p_value_alone_is_its_own_combination(string key)
    {
        foreach (double p in new[] { 0, 1e-300, 0.03, 0.5, 0.9, 1 })
        {
            Assert.Equal(p, CombinationRegistry.Find(key)!.Combine([PValue.FromValue(p)], 1).P!.Value.Value);
        }
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void Nothing_to_combine_gives_a_reason(string key) => Assert.Contains("no experiment", CombinationRegistry.Find(key)!.Combine([], 3).Reason!, StringComparison.Ordinal);

    [Theory]
    [MemberData(nameof(Keys))]
    public void The_order_of_the_p_values_is_irrelevant(string key)
    {
        double[] p = Vectors["m5_hommel"];
        PValue forward = CombinationRegistry.Find(key)!.Combine(p.Select(PValue.FromValue).ToArray(), 5).P!.Value;
        PValue backward = CombinationRegistry.Find(key)!.Combine(p.Reverse().Select(PValue.FromValue).ToArray(), 5).P!.Value;
        Assert.Equal(forward.Value, backward.Value, 1e-15);
    }

    [Fact]
    public void Simes_counts_the_untested_and_the_others_do_not()
    {
        PValue[] p = [PValue.FromValue(0.01), PValue.FromValue(0.4)];
        foreach (CombinationTest test in CombinationRegistry.All)
        {
            double own = test.Combine(p, 2).P!.Value.Value;
            double planned = test.Combine(p, 10).P!.Value.Value;
            Assert.Equal(test.CountsUntested, planned > own);
        }
    }

    [Fact]
    public void Weights_of_zero_take_p_values_out_and_none_left_gives_a_reason()
    {
        PValue[] p = [PValue.FromValue(0.01), PValue.FromValue(1), PValue.FromValue(0.2)];
        foreach (CombinationTest test in CombinationRegistry.All.Where(t => t.TakesWeights))
        {
            Assert.Equal(test.Combine([p[0], p[2]], 2, [1, 3]), test.Combine(p, 3, [1e200, 0, 3e200]));
            Assert.Contains("weight", test.Combine(p, 3, [0, 0, 0]).Reason!, StringComparison.Ordinal);
            Assert.Throws<ArgumentException>(() => test.Combine(p, 3, [1, 1]));
            Assert.Throws<ArgumentException>(() => test.Combine(p, 3, [1, -1, 1]));
        }

        Assert.Throws<ArgumentException>(() => CombinationRegistry.Find("fisher")!.Combine(p, 3, [1, 1, 1]));
        Assert.Throws<ArgumentException>(() => CombinationRegistry.Find("fisher")!.Combine(p, 2));
    }

    [Fact]
    public void Every_test_is_registered_with_a_frozen_key()
    {
        IEnumerable<Type> written = typeof(CombinationTest).Assembly.GetTypes().Where(t => t.IsSubclassOf(typeof(CombinationTest)));
        Assert.Equal(written.OrderBy(t => t.Name, StringComparer.Ordinal), CombinationRegistry.All.Select(t => t.GetType()).OrderBy(t => t.Name, StringComparer.Ordinal));
        IEnumerable<string> frozen = File.ReadLines(Path.Combine(ReferenceTable.Folder(), "frozen-keys.txt"))
            .Where(l => l.StartsWith("overall ", StringComparison.Ordinal))
            .Select(l => l["overall ".Length..].Trim());
        Assert.Equal(frozen, CombinationRegistry.All.Select(t => t.Key));
        Assert.All(CombinationRegistry.All, t => Assert.Matches(@"\((19|20)\d\d\), ", t.Source));
        Assert.All(CombinationRegistry.All, t => Assert.EndsWith(".", t.Assumes, StringComparison.Ordinal));
        Assert.Null(CombinationRegistry.Find("Fisher"));
    }
}
