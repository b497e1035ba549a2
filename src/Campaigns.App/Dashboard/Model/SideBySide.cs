using Campaigns.Domain;
using Campaigns.Statistics.Corrections;

namespace Campaigns.App.Dashboard.Model;

/// <summary>A campaign under every correction, counted.</summary>
/// <param name="Outcomes">Key, procedure, whether it is the sealed one, and survivors; the sealed one first.</param>
/// <param name="Hanging">Experiments that survive under some corrections of the campaign's kind and not under others.</param>
public sealed record SideBySide(IReadOnlyList<(string Key, ErrorProcedure Procedure, bool IsSealed, int Survivors)> Outcomes, int Hanging)
{
    /// <summary>Counts what <c>corrections</c> shows; O(m log m) for each correction.</summary>
    /// <param name="standing">The campaign, its procedures known to this program.</param>
    public static SideBySide Of(CampaignStanding standing)
    {
        ArgumentNullException.ThrowIfNull(standing);
        IReadOnlyList<CorrectionOutcome> outcomes = CorrectionsBeside.Of(standing);
        return new SideBySide(
            [.. outcomes.Select(o => (o.Key, o.Procedure, o.IsSealed, o.IsSealed ? standing.SurvivorCount : o.SurvivorCount))],
            Enumerable.Range(0, standing.TestedCount).Count(i => CorrectionsBeside.Hangs(outcomes, standing.Campaign.ErrorRate, i)));
    }
}
