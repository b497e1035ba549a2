namespace Campaigns.Statistics.Planning.Laws;

/// <summary>Adds up what a law says of survivors, outcome by outcome; every term is positive.</summary>
internal sealed class SurvivorTally
{
    private double _true;
    private double _false;
    private double _anyTrue;
    private double _anyFalse;
    private double _falseShare;

    /// <summary>Adds an outcome with a known number of survivors of each kind.</summary>
    public void Add(double probability, int trueOnes, int falseOnes)
    {
        if (trueOnes + falseOnes > 0)
        {
            Add(trueOnes + falseOnes, probability * trueOnes, probability * falseOnes, trueOnes > 0 ? probability : 0, falseOnes > 0 ? probability : 0);
        }
    }

    /// <summary>Adds all outcomes with a number of survivors.</summary>
    /// <param name="survivors">Their number, at least 1.</param>
    /// <param name="trueOnes">True ones, times the probability.</param>
    /// <param name="falseOnes">False ones, times the probability.</param>
    /// <param name="anyTrue">Probability of that number and at least one true.</param>
    /// <param name="anyFalse">Probability of that number and at least one false.</param>
    public void Add(int survivors, double trueOnes, double falseOnes, double anyTrue, double anyFalse)
    {
        _true += trueOnes;
        _false += falseOnes;
        _anyTrue += anyTrue;
        _anyFalse += anyFalse;
        _falseShare += falseOnes / survivors;
    }

    /// <summary>The sums; rounding errors do not carry a probability above 1.</summary>
    public CampaignExpectation Of(CampaignDesign campaign) => Expectation(campaign, _true, _false, _anyTrue, _anyFalse, _falseShare);

    /// <summary>An expectation from its parts.</summary>
    public static CampaignExpectation Expectation(CampaignDesign campaign, double trueOnes, double falseOnes, double anyTrue, double anyFalse, double falseShare) => new(
        Math.Min(trueOnes, campaign.Experiments),
        Math.Min(falseOnes, campaign.Experiments),
        campaign.ExpectedReal > 0 ? Math.Min(1, trueOnes / campaign.ExpectedReal) : null,
        Math.Min(1, anyTrue),
        Math.Min(1, anyFalse),
        Math.Min(1, falseShare));
}
