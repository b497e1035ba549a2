using System.Text.Json;

namespace Campaigns.App.Tests.Commands;

public sealed class SizeCampaignTests : IDisposable
{
    private static readonly string[] Hundred = ["--campaign", "100", "--share-real", "0.3", "--groups", "4", "--effect", "0.4"];

    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    private CsvText Csv(params string[] arguments) => _place.Run(["size", .. arguments, "--format", "csv"]).Well().Csv;

    private string Text(params string[] arguments) => _place.Run(["size", .. arguments]).Well().Out.ReplaceLineEndings(" ");

    [Fact]
    public void The_columns_are_frozen() =>
        Assert.Equal(
            [
                "correction", "method", "experiments", "share_real", "real", "real_model", "groups", "replicates", "observations", "campaign_observations", "level", "effect", "noncentrality", "largest_difference", "wanted",
                "survivors", "survivors_se", "true_survivors", "true_survivors_se", "false_survivors", "false_survivors_se", "share_found", "share_found_se", "any_true", "any_true_se", "any_false", "any_false_se",
                "false_share", "false_share_se", "large_campaign_true", "large_campaign_shortfall", "draws", "seed",
            ],
            Csv([.. Hundred, "--replicates", "10", "--correction", "bh"]).Columns);

    /// <remarks>planning.csv: SciPy's laws in ten digits.</remarks>
    [Fact]
    public void The_reference_is_met()
    {
        CsvText csv = Csv([.. Hundred, "--replicates", "10", "--correction", "bonferroni,bh"]);
        Assert.Equal(["bonferroni", "bh"], csv.Column("correction"));
        Assert.Equal(["exact", "exact"], csv.Column("method"));
        Assert.Equal(1.501606606, csv.Numbers("true_survivors")[0], 1e-8);
        Assert.Equal(3.773441255, csv.Numbers("true_survivors")[1], 1e-8);
        Assert.Equal(0.1946169539, csv.Numbers("false_survivors")[1], 1e-9);
        Assert.Equal(0.035, csv.Numbers("false_share")[1], 1e-12);
        Assert.Equal(3.773441255 / 30, csv.Numbers("share_found")[1], 1e-9);
        Assert.Equal("", csv.Column("large_campaign_true")[0]);
        Assert.Equal(2.768760657, CsvText.Number(csv.Column("large_campaign_true")[1]), 1e-7);
        Assert.Equal(3.773441255 - 2.768760657, CsvText.Number(csv.Column("large_campaign_shortfall")[1]), 1e-7);
        Assert.Equal(["", ""], csv.Column("true_survivors_se"));
        Assert.Equal(["", ""], csv.Column("seed"));
        Assert.Equal(["4000", "4000"], csv.Column("campaign_observations"));
    }

    [Fact]
    public void Every_correction_has_a_row_and_those_without_a_law_are_drawn_with_their_errors()
    {
        string[] typed = ["--campaign", "30", "--real", "9", "--groups", "3", "--effect", "0.8", "--replicates", "5", "--draws", "400", "--seed", "7"];
        CsvText csv = Csv(typed);
        Assert.Equal(Statistics.Corrections.CorrectionRegistry.FromPAlone.Select(c => c.Key), csv.Column("correction"));
        Assert.Equal("exact", csv.Column("method")[Row("holm")]);
        int hommel = Row("hommel");
        Assert.Equal("simulated", csv.Column("method")[hommel]);
        Assert.Equal("400", csv.Column("draws")[hommel]);
        Assert.Equal("7", csv.Column("seed")[hommel]);
        double error = CsvText.Number(csv.Column("true_survivors_se")[hommel]);
        Assert.InRange(error, 0.01, 0.3);
        Assert.InRange(csv.Numbers("true_survivors")[hommel], csv.Numbers("true_survivors")[Row("hochberg")] - (4 * error), csv.Numbers("true_survivors")[Row("bh")] + (4 * error));
        Assert.Equal(csv.Rows[hommel], Csv(typed).Rows[hommel]);
        Assert.NotEqual(csv.Rows[hommel], Csv([.. typed[..^1], "8"]).Rows[hommel]);
        Assert.Contains("Simulated: hommel", Text(typed), StringComparison.Ordinal);

        int Row(string key) => Array.IndexOf([.. csv.Column("correction")], key);
    }

    [Fact]
    public void Replicates_are_the_least_that_find_the_wanted_share()
    {
        CsvText csv = Csv([.. Hundred, "--wanted", "0.5,0.8", "--correction", "holm,bh"]);
        Assert.Equal(["0.5", "0.5", "0.8", "0.8"], csv.Column("wanted"));
        for (int row = 0; row < 4; row++)
        {
            double wanted = csv.Numbers("wanted")[row];
            int n = (int)csv.Numbers("replicates")[row];
            string key = csv.Column("correction")[row];
            Assert.InRange(csv.Numbers("share_found")[row], wanted, 1);
            Assert.InRange(Csv([.. Hundred, "--correction", key, "--replicates", $"{n - 1}"]).Numbers("share_found")[0], 0, wanted);
            Assert.Equal(csv.Column("share_found")[row], Csv([.. Hundred, "--correction", key, "--replicates", $"{n}"]).Column("share_found")[0]);
        }

        CsvText drawn = Csv("--campaign", "20", "--real", "5", "--groups", "3", "--effect", "0.8", "--wanted", "0.7", "--correction", "hommel", "--draws", "300");
        Assert.InRange(drawn.Numbers("share_found")[0], 0.7, 1);
    }

    [Fact]
    public void A_campaign_of_one_is_one_experiment()
    {
        string power = Csv("--groups", "4", "--difference", "1.5", "--sd", "1.1", "--replicates", "7").Column("power")[0];
        CsvText csv = Csv("--campaign", "1", "--real", "1", "--groups", "4", "--difference", "1.5", "--sd", "1.1", "--replicates", "7", "--correction", "none,bonferroni,holm,hochberg,bh,by");
        Assert.All(csv.Numbers("share_found"), p => Assert.Equal(double.Parse(power, System.Globalization.CultureInfo.InvariantCulture), p, 1e-14));
        Assert.Equal(Csv("--groups", "4", "--effect", "0.4", "--power", "0.9").Column("replicates"), Csv("--campaign", "1", "--real", "1", "--groups", "4", "--effect", "0.4", "--wanted", "0.9", "--correction", "bh").Column("replicates"));
    }

    [Fact]
    public void Every_combination_has_a_row()
    {
        CsvText csv = Csv("--campaign", "12", "--share-real", "0.2,0.5", "--groups", "3", "--difference", "1,2", "--sd", "1,1.5", "--replicates", "4,8", "--level", "0.05,0.1", "--correction", "holm,bh");
        Assert.Equal(64, csv.Rows.Count);
        Assert.Equal(64, csv.Rows.Select(r => string.Join(',', r)).Distinct(StringComparer.Ordinal).Count());
        CsvText unequal = Csv("--campaign", "12", "--share-real", "0.2", "--sizes", "4,6,8", "--effect", "0.5", "--correction", "bh");
        Assert.Equal([""], unequal.Column("replicates"));
        Assert.Equal(["216"], unequal.Column("campaign_observations"));
    }

    [Fact]
    public void People_read_plain_sentences()
    {
        string text = Text([.. Hundred, "--replicates", "10", "--correction", "bh"]);
        Assert.Contains("100 experiments, each with a real effect with probability 0.3, so 30 of them on average of f = 0.4.", text, StringComparison.Ordinal);
        Assert.Contains("of 30 real effects about 3.77 would be found (12.6 %); about 3.97 survivors are expected, 0.195 of them false.", text, StringComparison.Ordinal);
        Assert.Contains("that approximation has 2.77 true survivors instead of 3.77", text, StringComparison.Ordinal);
        Assert.Contains("Assumed: every real effect", text, StringComparison.Ordinal);
        Assert.Contains("Choose the correction now and seal it", text, StringComparison.Ordinal);
        Assert.DoesNotContain("Simulated", text, StringComparison.Ordinal);
        Assert.False(File.Exists(_place.Catalog));

        // 30 of 100 real, f = 0.4, 3 groups of 5: a slope of 26.18 against 64.33 needed (planning.csv).
        string weak = Text("--campaign", "100", "--share-real", "0.3", "--groups", "3", "--effect", "0.4", "--replicates", "5", "--correction", "bh");
        Assert.Contains("with 5 replicates a larger campaign does not help under bh", weak, StringComparison.Ordinal);
        // With 6 replicates the slope is 70.3 (mpmath).
        Assert.Contains("at most 26.2 times as likely to pass a strict level as a false one, and more than 64.3 times would be needed. From 6 replicates on size helps.", weak, StringComparison.Ordinal);
        string sure = Text("--campaign", "100", "--real", "30", "--groups", "3", "--effect", "9", "--replicates", "5", "--correction", "bh,hommel", "--draws", "200");
        Assert.DoesNotContain(" 1.0000", sure, StringComparison.Ordinal);
        Assert.Contains(">0.9999", sure, StringComparison.Ordinal);
        Assert.Contains(">0.9850", sure, StringComparison.Ordinal);
        Assert.Contains("there is no real effect to find", Text("--campaign", "9", "--real", "0", "--groups", "3", "--effect", "0.5", "--replicates", "5", "--correction", "bh"), StringComparison.Ordinal);
        Assert.Contains("--campaign N plans the whole campaign", Text("--groups", "3", "--effect", "0.4", "--tests", "50"), StringComparison.Ordinal);
    }

    [Fact]
    public void Json_and_csv_say_the_same()
    {
        string[] arguments = ["size", .. Hundred, "--replicates", "6", "--correction", "bh,hommel", "--draws", "150"];
        CsvText csv = _place.Run([.. arguments, "--format", "csv"]).Well().Csv;
        using var json = JsonDocument.Parse(_place.Run([.. arguments, "--format", "json"]).Well().Out);
        Assert.Equal(2, csv.Rows.Count);
        foreach ((JsonElement row, string[] fields) in json.RootElement.EnumerateArray().Zip(csv.Rows))
        {
            Assert.Equal(csv.Columns, row.EnumerateObject().Select(p => p.Name));
            Assert.Equal(fields, row.EnumerateObject().Select(p => p.Value.ValueKind == JsonValueKind.Null ? "" : p.Value.ValueKind == JsonValueKind.String ? p.Value.GetString()! : p.Value.GetRawText()));
        }
    }

    [Fact]
    public void It_stops_when_asked_to()
    {
        using var stop = new CancellationTokenSource();
        stop.Cancel();
        using var stopped = new Workplace { Cancel = stop.Token };
        stopped.Run(["size", .. Hundred, "--replicates", "6", "--correction", "hommel"]).Refused(130, "Stopped");
        stopped.Run(["size", .. Hundred, "--replicates", "6", "--correction", "bh"]).Refused(130, "Stopped");
    }

    [Theory]
    [InlineData("--share-real describes a whole campaign", "--groups", "3", "--effect", "0.4", "--share-real", "0.3")]
    [InlineData("--seed describes a whole campaign", "--groups", "3", "--effect", "0.4", "--seed", "3")]
    [InlineData("is to be given once", "--campaign", "9", "--groups", "3", "--effect", "0.4", "--replicates", "5")]
    [InlineData("is to be given once", "--campaign", "9", "--real", "3", "--share-real", "0.3", "--groups", "3", "--effect", "0.4", "--replicates", "5")]
    [InlineData("--real 10 is more than the 9", "--campaign", "9", "--real", "3,10", "--groups", "3", "--effect", "0.4", "--replicates", "5")]
    [InlineData("A campaign is planned for an effect", "--campaign", "9", "--real", "3", "--groups", "3", "--replicates", "5")]
    [InlineData("A campaign is planned for an effect", "--campaign", "9", "--real", "3", "--groups", "3")]
    [InlineData("Give either the replicates", "--campaign", "9", "--real", "3", "--groups", "3", "--effect", "0.4")]
    [InlineData("Give either the replicates", "--campaign", "9", "--real", "3", "--groups", "3", "--effect", "0.4", "--replicates", "5", "--wanted", "0.8")]
    [InlineData("--power and --tests are for one experiment", "--campaign", "9", "--real", "3", "--groups", "3", "--effect", "0.4", "--power", "0.8")]
    [InlineData("--power and --tests are for one experiment", "--campaign", "9", "--real", "3", "--groups", "3", "--effect", "0.4", "--replicates", "5", "--tests", "9")]
    [InlineData("--real 0 leaves no real effect", "--campaign", "9", "--real", "0", "--groups", "3", "--effect", "0.4", "--wanted", "0.8")]
    [InlineData("did you mean 'holm'", "--campaign", "9", "--real", "3", "--groups", "3", "--effect", "0.4", "--replicates", "5", "--correction", "hollm")]
    [InlineData("--share-real takes numbers between 0 and 1", "--campaign", "9", "--share-real", "30", "--groups", "3", "--effect", "0.4", "--replicates", "5")]
    [InlineData("--campaign takes a whole number from 1", "--campaign", "0", "--real", "3", "--groups", "3", "--effect", "0.4", "--replicates", "5")]
    [InlineData("--campaign takes a whole number from 1 to 1000000", "--campaign", "2000000", "--real", "3", "--groups", "3", "--effect", "0.4", "--replicates", "5")]
    [InlineData("--draws takes a whole number from 100", "--campaign", "9", "--real", "3", "--groups", "3", "--effect", "0.4", "--replicates", "5", "--draws", "5")]
    [InlineData("The effect is too small", "--campaign", "9", "--real", "3", "--groups", "3", "--effect", "0.00001", "--wanted", "0.8", "--correction", "bh")]
    public void Options_that_contradict_or_mean_nothing_are_refused(string sentence, params string[] arguments) =>
        _place.Run(["size", .. arguments]).Refused(2, sentence);
}
