namespace Campaigns.Statistics.Planning.Laws;

/// <summary>The law of a step-down procedure whose levels depend on rank alone, where the number of real effects is fixed.</summary>
/// <remarks>The walk of <see cref="StepDownOfShare"/> with two counts, of p-values without and with an effect that lie above the level reached, each thinned with its own ratio. This walk was derived here; exact laws by other sums: Roquain and Villers (2011), Annals of Statistics 39:584-612. Time: ranks up to the last survivor times the product of the two spreads.</remarks>
internal static class StepDownOfNumber
{
    public static CampaignExpectation Expect(CampaignDesign campaign, LevelLadder ladder, CancellationToken stop)
    {
        int m = campaign.Experiments;
        int real = campaign.Real.Number!.Value;
        int none = m - real;
        var tally = new SurvivorTally();
        TestPoint at = ladder.At(1);
        var above = new TwoCounts(none, (1 - at.Level, at.Level), real, (at.Missed, at.Found), ladder.Negligible);
        for (int rank = 1; ; rank++)
        {
            stop.ThrowIfCancellationRequested();
            above.Take(m - rank + 1, Add);
            if (rank == m || above.IsOver)
            {
                // Whatever is left has passed every rank: nothing lies above.
                above.Take(0, Add);
                return tally.Of(campaign);
            }

            TestPoint next = ladder.At(rank + 1);
            above.Thin(Share(next.Level - at.Level, 1 - at.Level), Share(next.Found - at.Found, at.Missed));
            at = next;
        }

        void Add(int nullsAbove, int realAbove, double mass) => tally.Add(mass, real - realAbove, none - nullsAbove);
    }

    private static double Share(double part, double whole) => part <= 0 ? 0 : Math.Min(1, part / whole);
}
