using Campaigns.Catalog;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Planning;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>Laws and drawn campaigns, with their progress.</summary>
internal sealed class SizeCampaignWork(SizeCampaign campaign, Action<WorkProgress> report, CancellationToken stop)
{
    private readonly Lock _telling = new();

    /// <summary>What corrections bring, each by its exact law where there is one; the others judge the same drawn campaigns.</summary>
    public IReadOnlyList<CampaignExpectation> Expect(CampaignDesign planned, IReadOnlyList<ErrorProcedure> corrections, SignificanceLevel level)
    {
        ErrorProcedure[] drawn = [.. corrections.Where(c => !CampaignPower.IsExact(planned, c))];
        var simulated = new Queue<CampaignExpectation>(drawn.Length == 0 ? [] : Drawn(planned, drawn, level));
        return [.. corrections.Select(c => CampaignPower.IsExact(planned, c) ? CampaignPower.Exact(planned, (Correction)c, level, stop) : simulated.Dequeue())];
    }

    private IReadOnlyList<CampaignExpectation> Drawn(CampaignDesign planned, ErrorProcedure[] corrections, SignificanceLevel level)
    {
        int done = 0;
        string what = $"drawing campaigns for {string.Join(", ", corrections.Select(c => c.Key))}";
        return CampaignSimulation.Expect(planned, [.. corrections.Select(c => CampaignSimulation.Decision(c, level))], new CampaignDraws((ulong)campaign.Seed, campaign.Draws)
        {
            Stop = stop,
            Drawn = () =>
            {
                lock (_telling)
                {
                    report(new WorkProgress(what, ++done, campaign.Draws, "campaigns"));
                }
            },
        });
    }
}
