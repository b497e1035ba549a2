using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>Published worked examples of the one-way layout.</summary>
public sealed class WorkedExamplesTests
{
    private static readonly Lazy<ILookup<string, (string Group, string Value)>> Data = new(() =>
        ReferenceTable.Read("experiment/worked_examples_data.csv").Rows.ToLookup(r => r.Text("experiment"), r => (r.Text("group"), r.Text("value"))));

    /// <remarks>
    /// NIST743: NIST/SEMATECH e-Handbook of Statistical Methods, section 7.4.3: F = 9.59 (page prc424; its p-value from memory).
    /// The sets of R with the F and p that R's own help and outputs give (from memory): PlantGrowth, InsectSprays, chickwts, warpbreaks, morley, iris (Fisher 1936).
    /// gear: NIST data GEAR.DAT, handbook 1.3.5.10 (from memory). bulbs: Colorado School of Mines, course page on the analysis of variance: F = 18/4.
    /// threeTreatments: an encyclopaedia's example of the one-way analysis: F = 9.3, p = 0.0024.
    /// </remarks>
    [Theory]
    [InlineData("NIST743", 9.59, 0.005, 0.00325, 0.000005)]
    [InlineData("PlantGrowth", 4.846, 0.0005, 0.01591, 0.000005)]
    [InlineData("InsectSprays", 34.70, 0.005, 0.0, 2e-16)]
    [InlineData("chickwts", 15.36, 0.005, 5.936e-10, 5e-14)]
    [InlineData("warpbreaksTension", 7.206, 0.0005, 0.001753, 5e-7)]
    [InlineData("irisSepalLength", 119.3, 0.05, 0.0, 2e-16)]
    [InlineData("morley", 4.288, 0.0005, 0.00311, 0.000005)]
    [InlineData("gear", 2.2969, 0.00005, null, null)]
    [InlineData("bulbs", 4.5, 1e-15, null, null)]
    [InlineData("threeTreatments", 9.3, 0.05, 0.0024, 0.00005)]
    public void The_published_figures_come_out(string name, double f, double fRounding, double? p, double? pRounding)
    {
        Tested tested = Test(name);
        Assert.Equal(f, tested.Statistic, fRounding);
        if (p is double published)
        {
            Assert.Equal(published, tested.P.Value, pRounding!.Value);
        }
    }

    [Fact]
    public void The_table_of_the_NIST_handbook_example_comes_out()
    {
        // Section 7.4.3.4: sums of squares 27.897 and 17.452, mean squares 13.949 and 1.454.
        VariationTable table = Test("NIST743").Variation!;
        Assert.Equal(27.897, table.Between.SumOfSquares, 0.0005);
        Assert.Equal(17.452, table.Within.SumOfSquares, 0.0005);
        Assert.Equal(45.349, table.Total.SumOfSquares, 0.0005);
        Assert.Equal(13.949, table.Between.MeanSquare, 0.0005);
        Assert.Equal(1.454, table.Within.MeanSquare, 0.0005);
        Assert.Equal((2, 12, 14), (table.Between.DegreesOfFreedom, table.Within.DegreesOfFreedom, table.Total.DegreesOfFreedom));
    }

    [Fact]
    public void All_of_them_agree_with_exact_rational_arithmetic()
    {
        IReadOnlyList<ReferenceRow> truths = ReferenceTable.Read("experiment/worked_examples_exact.csv").Rows;
        Assert.Equal(15, truths.Count);
        foreach (ReferenceRow truth in truths)
        {
            string name = truth.Text("experiment");
            Tested tested = Test(name);

            // The reference read the values as doubles; offsets up to a thousand times the spread cost it three digits.
            Relative.AssertNear(truth.Number("f"), tested.Statistic, 1e-12, $"{name} F");
            Relative.AssertNear(truth.Number("ss_between"), tested.Variation!.Between.SumOfSquares, 1e-12, $"{name} SS between");
            Relative.AssertNear(truth.Number("ss_within"), tested.Variation!.Within.SumOfSquares, 1e-12, $"{name} SS within");
            Relative.AssertNear(truth.Number("omega2"), tested.Variation!.OmegaSquared, 1e-12, $"{name} omega squared");
            Relative.AssertNear(truth.Number("p"), tested.P.Value, 1e-11, $"{name} p");
            Relative.AssertNear(truth.Number("log_p"), tested.P.Log, 1e-12, $"{name} log p");
        }
    }

    private static Tested Test(string name) => Assert.IsType<Tested>(TypedSample.OfText(Data.Value[name]).Test(new FTest()));
}
