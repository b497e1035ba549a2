namespace Campaigns.Statistics.Planning.Laws;

/// <summary>The law of a step-up procedure whose levels depend on rank alone, where the number of real effects is fixed.</summary>
/// <remarks>The walk of <see cref="StepUpOfShare"/> with two counts, of p-values without and with an effect, that are thinned each with its own ratio: t_(j-1)/t_j and G(t_(j-1))/G(t_j). This walk was derived here; exact laws by other sums: Roquain and Villers (2011), Annals of Statistics 39:584-612. Time m times the product of the two spreads.</remarks>
internal static class StepUpOfNumber
{
    public static CampaignExpectation Expect(CampaignDesign campaign, LevelLadder ladder, CancellationToken stop)
    {
        int m = campaign.Experiments;
        int real = campaign.Real.Number!.Value;
        var tally = new SurvivorTally();
        TestPoint at = ladder.At(m);
        var below = new TwoCounts(m - real, (at.Level, 1 - at.Level), real, (at.Found, at.Missed), ladder.Negligible);
        for (int j = m; ; j--)
        {
            stop.ThrowIfCancellationRequested();
            below.Take(j, (falseOnes, trueOnes, mass) => tally.Add(mass, trueOnes, falseOnes));
            if (j == 1 || below.IsOver)
            {
                return tally.Of(campaign);
            }

            TestPoint next = ladder.At(j - 1);
            below.Thin(Math.Max(0, at.Level - next.Level) / at.Level, Math.Max(0, at.Found - next.Found) / at.Found);
            at = next;
        }
    }
}
