using System.Globalization;
using System.Numerics;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Units;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>Experiments in blocks against exact fractions: least squares on the full design matrix (blocks.py), the typed decimals as they stand.</summary>
public sealed class BlockFTestTests
{
    private const double Ulp = 2.3e-16;

    private static readonly Dictionary<string, DesignedSample> Data = DesignedSample.Read("experiment/blocks_data.csv", blocks: true);

    public static TheoryData<string> Experiments => [.. Data.Keys];

    [Theory]
    [MemberData(nameof(Experiments))]
    public void Table_and_p_are_those_of_exact_fractions(string name)
    {
        ReferenceRow expected = Row(name);
        TestOutcome outcome = new BlockFTest().Test(Data[name].Sample);
        Assert.Equal(expected.Integer("k"), outcome.GroupCount);
        Assert.Equal(expected.Integer("n"), outcome.ObservationCount);
        Assert.Equal(expected.Text("status"), Status(outcome));
        if (outcome is not Tested tested)
        {
            return;
        }

        VariationTable table = tested.Variation!;
        Assert.Equal(expected.Integer("df1"), tested.Df1);
        Assert.Equal(expected.Integer("df2"), tested.Df2);
        Assert.Equal(expected.Integer("b") - 1, table.Blocks!.Value.DegreesOfFreedom);
        Near("f", tested.Statistic, Ulp);
        Near("ss_blocks", table.Blocks.Value.SumOfSquares, Ulp);
        Near("ss_groups", table.Between.SumOfSquares, Ulp);
        Near("ss_residual", table.Within.SumOfSquares, Ulp);
        Near("ss_total", table.Total.SumOfSquares, Ulp);
        Near("partial_eta2", table.EtaSquared, Ulp);
        Near("partial_omega2", table.OmegaSquared, Ulp);
        Near("residual_sd", table.ResidualStandardDeviation, Ulp);
        Near("log_p", tested.P.Log, 1e-13);
        Near("p", tested.P.Value, 1e-13);

        void Near(string column, double computed, double tolerance) => Relative.AssertNear(expected.Number(column), computed, tolerance, $"{name} {column}");
    }

    [Theory]
    [MemberData(nameof(Experiments))]
    public void Row_order_width_of_the_integers_and_a_constant_do_not_change_a_bit(string name)
    {
        TestOutcome plain = new BlockFTest().Test(Data[name].Sample);
        Assert.Equal(plain, new BlockFTest().Test(Data[name].Wide));
        Assert.Equal(plain, new BlockFTest().Test(Data[name].Shuffled(7).Sample));
        BigInteger far = BigInteger.Pow(10, 60) + 1;
        Assert.Equal(Shares(new BlockFTest().Test(Data[name].Shifted(1, 0).Sample)), Shares(new BlockFTest().Test(Data[name].Shifted(far, -far * far).Sample)));
    }

    [Theory]
    [MemberData(nameof(Experiments))]
    public void Residuals_and_leverages_are_those_of_exact_fractions(string name)
    {
        FittedLayout? fit = FittedLayout.InBlocks(Data[name].Sample);
        Assert.Equal(Row(name).Text("status") is "ok" or "constant-response" or "zero-residual", fit is not null);
        if (fit is null)
        {
            return;
        }

        ReferenceRow[] rows = [.. ReferenceTable.Read("experiment/blocks_fit_exact.csv").Rows.Where(r => r.Text("experiment") == name)];
        Assert.Equal(rows.Length, fit.Residuals.Count);
        Assert.True(fit.WithinBlocks);
        double scale = fit.Scale.ToDouble();
        double largest = rows.Max(r => Math.Abs(r.Number("residual")));
        for (int i = 0; i < rows.Length; i++)
        {
            Assert.InRange(Math.Abs((fit.Residuals[i] * scale) - rows[i].Number("residual")), 0, 4e-16 * largest);
            Relative.AssertNear(rows[i].Number("leverage"), fit.Leverages[i], 2e-15, $"{name} leverage {i}");
        }
    }

    [Theory]
    [MemberData(nameof(Experiments))]
    public void Adjusted_differences_and_their_errors_are_those_of_exact_fractions(string name)
    {
        GroupEstimates? estimates = GroupEstimates.InBlocks(Data[name].Sample);
        Assert.Equal(Row(name).Text("status") is "ok" or "constant-response" or "zero-residual", estimates is not null);
        if (estimates is null)
        {
            return;
        }

        double residual = Row(name).Has("residual_sd") ? Row(name).Number("residual_sd") : 0;
        Relative.AssertNear(residual, estimates.ResidualStandardDeviation, Ulp, $"{name} residual sd");
        Assert.True(estimates.WithinBlocks);
        Assert.All(Enumerable.Range(0, estimates.GroupCount), g => Assert.True(double.IsNaN(estimates.OwnStandardError(g))));
        foreach (ReferenceRow row in ReferenceTable.Read("experiment/blocks_differences_exact.csv").Rows.Where(r => r.Text("experiment") == name))
        {
            int group = Array.IndexOf(Data[name].GroupNames, row.Text("group"));

            // A group estimated alike may differ in its 25th digit: an exact zero is compared by the residual spread.
            Assert.InRange(Math.Abs(estimates.Difference(0, group) - row.Number("difference_to_first")), 0, (Ulp * Math.Abs(row.Number("difference_to_first"))) + (1e-20 * residual));
            Relative.AssertNear(residual * Math.Sqrt(row.Number("variance_factor")), estimates.StandardErrorOfDifference(0, group), 1e-15, $"{name} error of group {group}");
            Assert.Equal(1, estimates.CorrelationOfDifferences(group, group, 0), 1e-14);
        }
    }

    /// <summary>D. C. Montgomery, Design and Analysis of Experiments: vascular grafts in complete blocks, catalysts in balanced incomplete blocks; data and figures [from memory], the printed figures rounded as in the book.</summary>
    [Theory]
    [InlineData("montgomery-grafts", 192.25, 178.17, 109.89, 8.11, 0.0019)]
    [InlineData("montgomery-catalysts", 55.00, 22.75, 3.25, 11.67, 0.0107)]
    public void Worked_examples_of_a_textbook_come_out_as_printed(string name, double blocks, double groups, double residual, double f, double p)
    {
        Tested tested = Assert.IsType<Tested>(new BlockFTest().Test(Data[name].Sample));
        VariationTable table = tested.Variation!;
        Assert.Equal([blocks, groups, residual, f], [.. new[] { table.Blocks!.Value.SumOfSquares, table.Between.SumOfSquares, table.Within.SumOfSquares, tested.Statistic }.Select(v => Math.Round(v, 2))]);
        Assert.Equal(p, Math.Round(tested.P.Value, 4));
    }

    [Fact]
    public void A_table_of_residuals_so_small_that_squares_vanish_still_gives_estimates()
    {
        GroupEstimates estimates = GroupEstimates.InBlocks(Data["at-1e-300"].Sample)!;
        Assert.Equal(0, Assert.IsType<Tested>(new BlockFTest().Test(Data["at-1e-300"].Sample)).Variation!.Within.SumOfSquares);
        Assert.InRange(estimates.ResidualStandardDeviation, 1e-301, 1e-299);
        Assert.InRange(estimates.StandardErrorOfDifference(0, 1), 1e-301, 1e-299);
    }

    private static ReferenceRow Row(string name) => ReferenceTable.Read("experiment/blocks_exact.csv").Rows.Single(r => r.Text("experiment") == name);

    private static string Shares(TestOutcome outcome) => outcome is Tested t
        ? string.Create(CultureInfo.InvariantCulture, $"{t.Statistic:R} {t.P.Log:R} {t.Variation!.EtaSquared:R} {t.Variation.OmegaSquared:R}")
        : Status(outcome);

    private static string Status(TestOutcome outcome) => outcome switch
    {
        Tested => "ok",
        NotTestable { Reason: NotTestableReason.TooFewGroups } => "too-few-groups",
        NotTestable { Reason: NotTestableReason.NoReplication } => "no-replication",
        NotTestable { Reason: NotTestableReason.ConstantResponse } => "constant-response",
        NotTestable { Reason: NotTestableReason.ZeroWithinVariation } => "zero-residual",
        NotTestable { Reason: NotTestableReason.DisconnectedBlocks } => "disconnected",
        _ => throw new InvalidOperationException("An outcome of a new kind needs its line here."),
    };
}
