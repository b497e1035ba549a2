using Campaigns.Statistics.Distributions;

namespace Campaigns.Statistics.Planning.Laws;

/// <summary>How often the test of one experiment rejects at a level: the curve of power over level of the F test.</summary>
internal sealed class TestCurve
{
    /// <summary>Levels of single tests below this one count as it.</summary>
    public const double LeastLevel = 1e-300;

    private readonly FDistribution _central;
    private readonly NoncentralF _law;

    /// <summary>The curve of a campaign's experiments with a real effect.</summary>
    public TestCurve(CampaignDesign campaign)
    {
        _law = new NoncentralF(campaign.Experiment.BetweenDegreesOfFreedom, campaign.Experiment.WithinDegreesOfFreedom, campaign.Noncentrality);
        _central = _law.Central;
    }

    /// <summary>The curve at a level.</summary>
    /// <param name="level">In [0, 1].</param>
    public TestPoint At(double level)
    {
        level = Math.Clamp(level, LeastLevel, 1);
        double critical = _central.UpperQuantile(level);

        // The test is unbiased; where its critical value lies beyond the range of doubles the level is the better bound.
        double found = Math.Max(level, _law.UpperTail(critical));
        return found < 0.5 ? new(level, found, 1 - found) : new(level, found, Math.Min(1 - level, _law.LowerTail(critical)));
    }
}

/// <summary>One point of the curve: a test at a level, and how often it finds or misses the real effect.</summary>
internal readonly record struct TestPoint(double Level, double Found, double Missed);
