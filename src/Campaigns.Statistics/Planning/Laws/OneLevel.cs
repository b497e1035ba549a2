namespace Campaigns.Statistics.Planning.Laws;

/// <summary>The law of a procedure that compares every p-value with the same level: counts are binomial.</summary>
internal static class OneLevel
{
    public static CampaignExpectation Expect(CampaignDesign campaign, LevelLadder ladder) =>
        campaign.Real.Number is { } real ? OfNumber(campaign, ladder, real) : OfShare(campaign, ladder.Mixture(1));

    private static CampaignExpectation OfShare(CampaignDesign campaign, MixturePoint at)
    {
        int m = campaign.Experiments;
        double any = MixturePoint.AtLeastOne(at.Below, at.Above, m);
        return SurvivorTally.Expectation(
            campaign,
            m * at.TrueBelow,
            m * at.FalseBelow,
            MixturePoint.AtLeastOne(at.TrueBelow, 1 - at.TrueBelow, m),
            MixturePoint.AtLeastOne(at.FalseBelow, 1 - at.FalseBelow, m),
            at.FalseBelow / at.Below * any);
    }

    private static CampaignExpectation OfNumber(CampaignDesign campaign, LevelLadder ladder, int real)
    {
        TestPoint at = ladder.At(1);
        int none = campaign.Experiments - real;
        double[] falseOnes = new double[none + 1];
        double[] trueOnes = new double[real + 1];
        (int lowFalse, int highFalse) = BinomialMasses.Fill(none, at.Level, 1 - at.Level, ladder.Negligible, falseOnes);
        (int lowTrue, int highTrue) = BinomialMasses.Fill(real, at.Found, at.Missed, ladder.Negligible, trueOnes);
        double share = 0;
        for (int f = Math.Max(1, lowFalse); f <= highFalse; f++)
        {
            double mean = 0;
            for (int t = lowTrue; t <= highTrue; t++)
            {
                mean += trueOnes[t] * f / (f + t);
            }

            share += falseOnes[f] * mean;
        }

        return SurvivorTally.Expectation(
            campaign,
            real * at.Found,
            none * at.Level,
            MixturePoint.AtLeastOne(at.Found, at.Missed, real),
            MixturePoint.AtLeastOne(at.Level, 1 - at.Level, none),
            share);
    }
}
