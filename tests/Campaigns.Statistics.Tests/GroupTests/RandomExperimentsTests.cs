using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>200 seeded experiments against exact rational arithmetic (experiments_exact.csv, made with Python's fractions and mpmath).</summary>
public sealed class RandomExperimentsTests(ITestOutputHelper output)
{
    /// <summary>Half a unit in the last place of ours, as much again of the 17 printed digits.</summary>
    private const double RoundedOnce = 2.3e-16;

    [Fact]
    public void Read_as_doubles_they_give_the_exact_statistics_rounded_once()
    {
        double worstP = 0;
        foreach ((ReferenceRow truth, Tested tested) in Results(TypedSample.OfDoubles, _ => true))
        {
            string name = truth.Text("experiment");
            VariationTable table = tested.Variation!;
            Assert.Equal(truth.Integer("k"), tested.GroupCount);
            Assert.Equal(truth.Integer("n_total"), tested.ObservationCount);
            foreach ((string column, double computed) in new[]
            {
                ("f", tested.Statistic), ("ss_between", table.Between.SumOfSquares), ("ss_within", table.Within.SumOfSquares),
                ("ss_total", table.Total.SumOfSquares), ("ms_between", table.Between.MeanSquare), ("ms_within", table.Within.MeanSquare),
                ("eta2", table.EtaSquared), ("omega2", table.OmegaSquared),
            })
            {
                Relative.AssertNear(truth.Number(column), computed, RoundedOnce, $"{name} {column}");
            }

            Relative.AssertNear(truth.Number("log_p"), tested.P.Log, 1e-12, $"{name} log p");
            double error = Relative.Error(tested.P.Value, truth.Number("p"));
            worstP = truth.Number("p") > 1e-300 ? Math.Max(worstP, error) : worstP;
        }

        output.WriteLine(FormattableString.Invariant($"worst relative error of p: {worstP:E1}"));
        Assert.True(worstP < 1e-12);
    }

    [Fact]
    public void Read_as_the_decimals_typed_they_differ_from_that_by_the_rounding_of_the_values_alone()
    {
        // Values near zero, so that the half unit in the last place which reading as a double may add stays small beside their spread.
        ILookup<string, ReferenceRow> designs = ReferenceTable.Read("experiment/experiments_design.csv").Rows.ToLookup(r => r.Text("experiment"));
        int seen = 0;
        foreach ((ReferenceRow truth, Tested tested) in Results(TypedSample.OfText, name => designs[name].Single().Text("kind") is not ("offset" or "tiny")))
        {
            seen++;
            string name = truth.Text("experiment");
            Relative.AssertNear(truth.Number("f"), tested.Statistic, 1e-12, $"{name} F");
            Relative.AssertNear(truth.Number("ss_within"), tested.Variation!.Within.SumOfSquares, 1e-12, $"{name} SS within");
            Relative.AssertNear(truth.Number("ss_between"), tested.Variation!.Between.SumOfSquares, 1e-12, $"{name} SS between");
            Relative.AssertNear(truth.Number("log_p"), tested.P.Log, 1e-11, $"{name} log p");
        }

        Assert.Equal(160, seen);
    }

    private static IEnumerable<(ReferenceRow Truth, Tested Outcome)> Results(Func<IEnumerable<(string, string)>, TypedSample> read, Func<string, bool> wanted)
    {
        ILookup<string, (string, string)> data = ReferenceTable.Read("experiment/experiments_data.csv").Rows.ToLookup(r => r.Text("experiment"), r => (r.Text("group"), r.Text("value")));
        IReadOnlyList<ReferenceRow> truths = ReferenceTable.Read("experiment/experiments_exact.csv").Rows;
        Assert.Equal(200, truths.Count);
        foreach (ReferenceRow truth in truths.Where(t => wanted(t.Text("experiment"))))
        {
            yield return (truth, Assert.IsType<Tested>(read(data[truth.Text("experiment")]).Test(new FTest())));
        }
    }
}
