namespace Campaigns.App.Tests.Commands;

/// <summary>What stands beside Storey's correction in a campaign: a warning where experiments are few, q-values and the estimated share of true nulls.</summary>
public sealed class StoreyCampaignTests : IDisposable
{
    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Theory]
    [InlineData(19, true)]
    [InlineData(20, false)]
    public void Fewer_than_twenty_experiments_are_warned_of_at_the_seal_in_the_review_and_below_the_results(int experiments, bool warned)
    {
        OnlineCampaign.Open(_place, experiments, "--correction", "storey");
        _place.Run("load", "C", _place.Write("m.csv", OnlineCampaign.Measurements(Enumerable.Range(1, experiments)))).Well();
        _place.Run("test", "C").Well();
        Ran review = _place.Run("review", "C").Well();
        Assert.Equal(warned, review.Error.Replace('\n', ' ').Contains("19 experiments are few for Storey", StringComparison.Ordinal));
        foreach (string command in (string[])["results", "survivors"])
        {
            string text = _place.Run(command, "C").Well().Out.Replace('\n', ' ');
            Assert.Equal(warned, text.Contains("19 experiments are few for Storey", StringComparison.Ordinal));
        }
    }

    /// <summary>adjust's own q-values are held against exact fractions (storey_q.csv); here they come by way of a campaign.</summary>
    [Fact]
    public void The_corrections_of_a_campaign_stand_beside_the_q_values_of_its_p_values_and_their_share_of_true_nulls()
    {
        OnlineCampaign.Open(_place, 24, "--correction", "storey");
        _place.Run("load", "C", _place.Write("m.csv", OnlineCampaign.Measurements(Enumerable.Range(1, 24)))).Well();
        _place.Run("test", "C").Well();
        CsvText beside = _place.Run("corrections", "C", "--by-experiment", "--format", "csv").Well().Csv;
        string file = _place.Write("p.csv", "p\n" + string.Join('\n', beside.Column("p")) + "\n");
        CsvText adjusted = _place.Run("adjust", file, "--correction", "storey", "--q-values", "--format", "csv").Well().Csv;
        Assert.Equal(adjusted.Column("q_value"), beside.Column("q_value"));
        Assert.Equal(adjusted.Column("storey"), beside.Column("storey"));
        Assert.Contains("share of true nulls", _place.Run("corrections", "C", "--by-experiment").Well().Out.Replace('\n', ' '), StringComparison.Ordinal);
    }
}
