using System.Globalization;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>The one-way sets of NIST's Statistical Reference Datasets with their certified values.</summary>
public sealed class NistReferenceDatasetsTests(ITestOutputHelper output)
{
    private static readonly Lazy<ILookup<string, (string Group, string Value)>> Data = new(() =>
        ReferenceTable.Read("experiment/nist_anova_data.csv").Rows.ToLookup(r => r.Text("experiment"), r => (r.Text("group"), r.Text("value"))));

    [Fact]
    public void Every_certified_number_is_met_to_14_digits_or_more()
    {
        output.WriteLine("digits     F  SS between  SS within  R squared  residual sd");
        double least = 15;
        IReadOnlyList<ReferenceRow> certified = ReferenceTable.Read("experiment/nist_anova_certified.csv").Rows;
        Assert.Equal(11, certified.Count);
        foreach (ReferenceRow row in certified)
        {
            string name = row.Text("experiment");
            Tested tested = Assert.IsType<Tested>(TypedSample.OfText(Data.Value[name]).Test(new FTest()));
            VariationTable table = tested.Variation!;
            double[] digits =
            [
                Relative.Digits(tested.Statistic, row.Number("f")),
                Relative.Digits(table.Between.SumOfSquares, row.Number("ss_between")),
                Relative.Digits(table.Within.SumOfSquares, row.Number("ss_within")),
                Relative.Digits(table.EtaSquared, row.Number("r_squared")),
                Relative.Digits(table.ResidualStandardDeviation, row.Number("residual_sd")),
                Relative.Digits(table.Between.MeanSquare, row.Number("ms_between")),
                Relative.Digits(table.Within.MeanSquare, row.Number("ms_within")),
            ];
            output.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{name,-8} {digits[0],4:F1}  {digits[1],10:F1}  {digits[2],9:F1}  {digits[3],9:F1}  {digits[4],11:F1}"));
            least = Math.Min(least, digits.Min());
            Assert.Equal(row.Integer("df_between"), table.Between.DegreesOfFreedom);
            Assert.Equal(row.Integer("df_within"), table.Within.DegreesOfFreedom);
        }

        Assert.True(least >= 14, $"Least number of digits: {least}.");
    }

    [Theory]
    [InlineData("SiRstv")]
    [InlineData("AtmWtAg")]
    [InlineData("SmLs03")]
    [InlineData("SmLs09")]
    public void Rows_in_any_order_give_the_same_bits(string name)
    {
        TypedSample sample = TypedSample.OfText(Data.Value[name]);
        TestOutcome straight = sample.Test(new FTest());
        for (int seed = 1; seed <= 20; seed++)
        {
            Assert.Equal(straight, sample.Shuffled(seed).Test(new FTest()));
        }
    }
}
