using System.Text.Json;

namespace Campaigns.App.Tests.Commands;

public sealed class SizeVerbTests : IDisposable
{
    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    private CsvText Csv(params string[] arguments) => _place.Run(["size", .. arguments, "--format", "csv"]).Well().Csv;

    [Fact]
    public void The_columns_are_frozen() =>
        Assert.Equal(["groups", "replicates", "observations", "level", "effect", "noncentrality", "power", "largest_difference"], Csv("--groups", "3", "--effect", "0.25").Columns);

    /// <remarks>Least replicates per group for power 0.8 and 0.9 at level 0.05, f = 0.25 and 0.4: 40-digit arithmetic; also Cohen (1988), tables 8.4 (from memory).</remarks>
    [Theory]
    [InlineData(3, "53", "69", "22", "28")]
    [InlineData(4, "45", "58", "19", "24")]
    [InlineData(6, "36", "45", "15", "19")]
    public void Replicates_for_a_wanted_power(int groups, params string[] replicates)
    {
        CsvText csv = Csv("--groups", $"{groups}", "--effect", "0.25,0.4", "--power", "0.8,0.9");
        Assert.Equal(replicates, csv.Column("replicates"));
        Assert.Equal(["", "", "", ""], csv.Column("largest_difference"));
        Assert.All(csv.Numbers("observations").Zip(csv.Numbers("replicates")), p => Assert.Equal(groups * p.Second, p.First));
        Assert.True(csv.Numbers("power")[0] >= 0.8);
    }

    /// <remarks>The example of R's power.anova.test: means with variance 1 (divisor k - 1), variance within 3, so f = 0.5; its n = 11.92613 for power 0.8.</remarks>
    [Fact]
    public void The_example_of_R_is_met()
    {
        Assert.Equal(0.35355942372299339, Csv("--groups", "4", "--effect", "0.5", "--replicates", "5").Numbers("power")[0], 1e-14);
        Assert.Equal(["12"], Csv("--groups", "4", "--effect", "0.5").Column("replicates"));

        // Means -1, -1, 1, 1 have variance 4/3 with divisor 3; against a variance of 4 within, f is 0.5 again.
        Assert.Equal(0.35355942372299339, Csv("--means", "-1,-1,1,1", "--sd", "2", "--replicates", "5").Numbers("power")[0], 1e-14);
    }

    /// <remarks>4 groups of 8, level 0.05: 40-digit arithmetic. Two of four means D apart, the others midway: f = D/(sd sqrt(8)).</remarks>
    [Fact]
    public void Smallest_effects_and_their_differences()
    {
        CsvText csv = Csv("--groups", "4", "--replicates", "8", "--power", "0.8,0.95", "--sd", "2");
        Assert.Equal(0.62613396374374014, csv.Numbers("effect")[0], 1e-13);
        Assert.Equal(0.7864853513946482, csv.Numbers("effect")[1], 1e-13);
        Assert.Equal(0.62613396374374014 * 2 * Math.Sqrt(8), csv.Numbers("largest_difference")[0], 1e-12);
        Assert.Equal([0.8, 0.95], csv.Numbers("power").Select(p => Math.Round(p, 12)));

        // What was found as a difference is found again as an effect.
        string difference = csv.Column("largest_difference")[0];
        Assert.Equal(0.8, Csv("--groups", "4", "--difference", difference, "--sd", "2", "--replicates", "8").Numbers("power")[0], 1e-12);
    }

    [Fact]
    public void Unequal_sizes_have_no_replicates_and_the_order_of_the_means_counts()
    {
        CsvText csv = Csv("--means", "10,10,13", "--sizes", "5,5,10", "--sd", "2");
        Assert.Equal([""], csv.Column("replicates"));
        Assert.Equal(["20"], csv.Column("observations"));
        Assert.Equal(["3"], csv.Column("largest_difference"));

        // lambda = (10 * 1.5^2 + 10 * 1.5^2)/4.
        Assert.Equal(11.25, csv.Numbers("noncentrality")[0], 1e-13);
        Assert.Equal(((15 * 0.75 * 0.75) + (5 * 2.25 * 2.25)) / 4, Csv("--means", "13,10,10", "--sizes", "5,5,10", "--sd", "2").Numbers("noncentrality")[0], 1e-13);

        // Two groups of 5 that lie 3 apart: 9 * 2.5/4.
        Assert.Equal(5.625, Csv("--difference", "3", "--sizes", "5,5,10", "--sd", "2").Numbers("noncentrality")[0], 1e-13);
        Assert.Equal(["5"], Csv("--sizes", "5,5,5").Column("replicates"));
    }

    [Fact]
    public void Means_are_the_decimals_that_were_typed() =>
        Assert.Equal(Csv("--means", "0.1,0.2,0.4", "--sd", "0.1").Rows[0], Csv("--means", "1000000000000.1,1000000000000.2,1000000000000.4", "--sd", "0.1").Rows[0]);

    [Fact]
    public void Tests_share_the_level()
    {
        CsvText shared = Csv("--groups", "3", "--effect", "0.4", "--replicates", "20", "--level", "0.05,0.1", "--tests", "50");
        Assert.Equal([0.001, 0.002], shared.Numbers("level"));
        Assert.Equal(Csv("--groups", "3", "--effect", "0.4", "--replicates", "20", "--level", "0.001").Column("power")[0], shared.Column("power")[0]);
        string text = _place.Run("size", "--groups", "3", "--effect", "0.4", "--tests", "50").Well().Out;
        Assert.Contains("may be milder", text.ReplaceLineEndings(" "), StringComparison.Ordinal);
    }

    [Fact]
    public void Every_combination_has_a_row()
    {
        CsvText csv = Csv("--groups", "3", "--difference", "1,2", "--sd", "1,1.5,2", "--replicates", "4,8", "--level", "0.05,0.01");
        Assert.Equal(24, csv.Rows.Count);
        Assert.Equal(24, csv.Rows.Select(r => string.Join(',', r)).Distinct(StringComparer.Ordinal).Count());
    }

    [Fact]
    public void People_read_the_answer_its_assumptions_and_that_it_is_no_guarantee()
    {
        string text = _place.Run("size", "--groups", "3", "--effect", "0.25").Well().Out.ReplaceLineEndings(" ");
        Assert.StartsWith("53 replicates in each of 3 groups, 159 observations in all, find an effect of f = 0.2500 by the F test at level 0.05", text, StringComparison.Ordinal);
        Assert.Contains("0.8 was wanted, and one replicate less in each group does not reach it.", text, StringComparison.Ordinal);
        Assert.Contains("Assumed: the F test", text, StringComparison.Ordinal);
        Assert.Contains("same standard deviation in every group", text, StringComparison.Ordinal);
        Assert.Contains("No guarantee for the effect you guessed", text, StringComparison.Ordinal);
        Assert.Contains("--tests N", text, StringComparison.Ordinal);
        string power = _place.Run("size", "--difference", "30", "--sd", "1", "--groups", "3", "--replicates", "9").Well().Out.ReplaceLineEndings(" ");
        Assert.Contains("with power above 0.9999.", power, StringComparison.Ordinal);
        Assert.Contains("finds hardest", power, StringComparison.Ordinal);
        Assert.Contains("or more", _place.Run("size", "--sizes", "4,5,6").Well().Out, StringComparison.Ordinal);
        Assert.Contains("fewer than two replicates", _place.Run("size", "--groups", "3", "--effect", "9").Well().Out.ReplaceLineEndings(" "), StringComparison.Ordinal);
        Assert.False(File.Exists(_place.Catalog));
    }

    [Fact]
    public void Json_and_csv_say_the_same()
    {
        string[] arguments = ["size", "--sizes", "5,6,9", "--power", "0.7,0.9"];
        CsvText csv = _place.Run([.. arguments, "--format", "csv"]).Well().Csv;
        using var json = JsonDocument.Parse(_place.Run([.. arguments, "--format", "json"]).Well().Out);
        Assert.Equal(2, csv.Rows.Count);
        foreach ((JsonElement row, string[] fields) in json.RootElement.EnumerateArray().Zip(csv.Rows))
        {
            Assert.Equal(csv.Columns, row.EnumerateObject().Select(p => p.Name));
            Assert.Equal(fields, row.EnumerateObject().Select(p => p.Value.ValueKind == JsonValueKind.Null ? "" : p.Value.GetRawText()));
        }
    }

    [Theory]
    [InlineData("Two of effect, replicates and power are needed", "--groups", "3")]
    [InlineData("Two of effect, replicates and power are needed", "--groups", "3", "--power", "0.9")]
    [InlineData("nothing is left to compute", "--groups", "3", "--effect", "0.3", "--replicates", "5", "--power", "0.8")]
    [InlineData("The number of groups is missing", "--effect", "0.3")]
    [InlineData("give one of them", "--groups", "3", "--effect", "0.3", "--difference", "1", "--sd", "1")]
    [InlineData("give one of them", "--groups", "3", "--replicates", "5", "--sizes", "5,5,5")]
    [InlineData("--means is in the unit of the response", "--means", "1,2")]
    [InlineData("--difference is in the unit of the response", "--groups", "3", "--difference", "1")]
    [InlineData("--groups is 3, but --means has 2", "--groups", "3", "--means", "1,2", "--sd", "1")]
    [InlineData("--means has 2 groups and --sizes has 3", "--means", "1,2", "--sizes", "3,4,5", "--sd", "1")]
    [InlineData("--sizes takes at least two groups", "--sizes", "5")]
    [InlineData("one observation in every group", "--sizes", "1,1,1")]
    [InlineData("The --means are all equal", "--means", "2,2.0", "--sd", "1")]
    [InlineData("--power 0.05 is not above the level 0.05", "--groups", "3", "--effect", "0.3", "--power", "0.05")]
    [InlineData("is too small: even 10000000 replicates", "--groups", "3", "--effect", "0.00001")]
    [InlineData("beyond all measure", "--groups", "3", "--difference", "1e300", "--sd", "1e-300")]
    [InlineData("--effect takes numbers above 0", "--groups", "3", "--effect", "0")]
    [InlineData("--effect takes numbers above 0", "--groups", "3", "--effect", "-0.3")]
    [InlineData("--effect takes numbers above 0", "--groups", "3", "--effect", "0,25")]
    [InlineData("--effect takes numbers above 0", "--groups", "3", "--effect", "0.3,,0.4")]
    [InlineData("--effect takes numbers above 0", "--groups", "3", "--effect", "NaN")]
    [InlineData("--sd takes numbers above 0", "--groups", "3", "--difference", "1", "--sd", "0")]
    [InlineData("--power takes numbers between 0 and 1", "--groups", "3", "--effect", "0.3", "--power", "80")]
    [InlineData("--level takes numbers between 0 and 1", "--groups", "3", "--effect", "0.3", "--level", "1")]
    [InlineData("--replicates takes whole numbers from 2 to 10000000", "--groups", "3", "--replicates", "1")]
    [InlineData("--replicates takes whole numbers from 2 to 10000000", "--groups", "3", "--replicates", "5.5")]
    [InlineData("--sizes takes whole numbers from 1", "--sizes", "5,0")]
    [InlineData("--groups takes a whole number from 2", "--groups", "1", "--effect", "0.3")]
    [InlineData("--groups takes a whole number from 2", "--groups", "20000", "--effect", "0.3")]
    [InlineData("--tests takes a whole number from 1", "--groups", "3", "--effect", "0.3", "--tests", "0")]
    [InlineData("--effect", "--groups", "3", "--effect", "0.3", "--effect", "0.4")]
    public void Options_that_contradict_or_mean_nothing_are_refused(string sentence, params string[] arguments) =>
        _place.Run(["size", .. arguments]).Refused(2, sentence);
}
