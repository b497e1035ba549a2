namespace Campaigns.App.Tests.Commands;

/// <summary>Layouts at the edge have one defined outcome under every test, and no output of theirs is dishonest.</summary>
public sealed class EdgeCaseTests : IDisposable
{
    private const string Well = "tested";
    private const string None = "zero-within-variance";
    private const string Constant = "constant-response";

    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    // In the order f, welch, brown-forsythe, kruskal-wallis, permutation, block-f; by the definitions of the tests.
    [Theory]
    [InlineData("ordinary", Well, Well, Well, Well, Well, Well)]
    [InlineData("one observation in a group", Well, "group-of-one", "group-of-one", Well, Well, Well)]
    [InlineData("zero variance in one group", Well, "constant-group", Well, Well, Well, Well)]
    [InlineData("zero variance in all groups", None, None, None, Well, Well, None)]
    [InlineData("all values equal", Constant, Constant, Constant, Constant, Constant, Constant)]
    [InlineData("one value in every group", "no-replication", "no-replication", "no-replication", "no-replication", "no-replication", "no-replication")]
    [InlineData("two groups", Well, Well, Well, Well, Well, Well)]
    [InlineData("two groups of two and one", Well, "group-of-one", "group-of-one", Well, Well, "no-replication")]
    [InlineData("one group", "too-few-groups", "too-few-groups", "too-few-groups", "too-few-groups", "too-few-groups", "too-few-groups")]
    [InlineData("sixty groups", Well, Well, Well, Well, Well, Well)]
    [InlineData("offset of 1e12", Well, Well, Well, Well, Well, Well)]
    [InlineData("values at 1e-300", Well, Well, Well, Well, Well, Well)]
    [InlineData("values at 1e300", Well, Well, Well, Well, Well, Well)]
    [InlineData("ties everywhere", Well, Well, Well, Well, Well, Well)]
    [InlineData("groups far apart", Well, Well, Well, Well, Well, None)]
    [InlineData("one block without a group", Well, Well, Well, Well, Well, Well)]
    [InlineData("blocks not recorded", Well, Well, Well, Well, Well, "block-not-recorded")]
    [InlineData("one block not recorded", Well, Well, Well, Well, Well, "block-not-recorded")]
    [InlineData("disconnected blocks", Well, Well, Well, Well, Well, "blocks-disconnected")]
    [InlineData("a specimen in two blocks", Well, Well, Well, Well, Well, "specimen-in-several-blocks")]
    [InlineData("several readings of a specimen", Well, Well, Well, Well, Well, Well)]
    [InlineData("100,000 observations in a group", Well, Well, Well, Well, Well, Well)]
    public void A_layout_at_the_edge_has_its_outcome_under_every_test(string layout, params string[] statuses)
    {
        string[] experiments = Layout.Of(layout).Run(_place);
        CsvText results = _place.Run("results", "C", "--format", "csv").Well().Csv;
        foreach (string experiment in experiments)
        {
            Assert.Equal((experiment, statuses[Array.IndexOf(Layout.Tests, experiment.Split(' ')[0])]), (experiment, results.Value(experiment, "status")));
            bool isTested = results.Value(experiment, "status") == Well;
            foreach (string column in (string[])["p", "adjusted_p", "survives", "ln_p"])
            {
                Assert.Equal((experiment, column, isTested), (experiment, column, results.Value(experiment, column).Length > 0));
            }
        }

        HonestOutput.Of(_place, "C", experiments);
        AssertComparisons(results);
    }

    private void AssertComparisons(CsvText results)
    {
        CsvText comparisons = _place.Run("comparisons", "C", "--format", "csv").Well().Csv;
        string[] names = ["experiment", "p", "adjusted_p", "survives", "lower", "difference", "upper", "note"];
        int[] at = [.. names.Select(n => Array.IndexOf(comparisons.Columns, n))];
        foreach (string[] row in comparisons.Rows)
        {
            (string experiment, string p, string adjusted, string survives, string lower, string difference, string upper, string note) =
                (row[at[0]], row[at[1]], row[at[2]], row[at[3]], row[at[4]], row[at[5]], row[at[6]], row[at[7]]);
            Assert.Equal(Well, results.Value(experiment, "status"));
            Assert.Equal(p.Length > 0, survives.Length > 0);
            Assert.Equal(survives != "true", note.Length > 0);
            if (results.Value(experiment, "survives") != "true")
            {
                Assert.NotEqual("true", survives);
                Assert.Equal("", adjusted);
            }

            if (lower.Length > 0 && upper.Length > 0)
            {
                Assert.InRange(CsvText.Number(difference), CsvText.Number(lower), CsvText.Number(upper));
            }
        }
    }

    [Fact]
    public void Effect_sizes_of_results_are_those_of_the_experiment_in_full_even_where_eta_squared_rounds_to_one()
    {
        Layout.Of("groups far apart").Run(_place);
        CsvText results = _place.Run("results", "C", "--format", "csv").Well().Csv;

        // By hand: sums of squares 60 x 0.25 x 2 = 30 and 120 x 1e-14, so Cohen's f is the root of 2.5e13.
        foreach (string experiment in (string[])["f tukey-kramer", "permutation games-howell"])
        {
            Assert.Equal(5e6, CsvText.Number(results.Value(experiment, "cohen_f")), 1e-15 * 5e6);
        }

        Assert.Contains("Cohen's f,5000000", EffectsOf("f tukey-kramer"), StringComparison.Ordinal);
    }

    [Fact]
    public void A_statistic_beyond_the_range_of_doubles_is_left_out_and_p_stays()
    {
        Layout.Of("zero variance in all groups").Run(_place);
        CsvText results = _place.Run("results", "C", "--format", "csv").Well().Csv;
        Assert.Equal("", results.Value("permutation games-howell", "statistic"));

        // 18!/(6!)^3 = 17,153,136 arrangements are more than are looked at one by one; a draw hits one of the 6 as extreme with probability 3.5e-7.
        Assert.Equal(1e-5, CsvText.Number(results.Value("permutation games-howell", "p")), 1e-12);
        Assert.Equal("99999", results.Value("permutation games-howell", "arrangements"));
    }

    private string EffectsOf(string experiment)
    {
        using var json = System.Text.Json.JsonDocument.Parse(_place.Run("show", "C", experiment, "--format", "json").Well().Out);
        return string.Join('\n', json.RootElement.GetProperty("effects").EnumerateArray().Select(e => $"{e.GetProperty("effect").GetString()},{e.GetProperty("value").GetRawText()}"));
    }
}
