using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>A campaign under every correction: to see how much hangs on the choice, never to choose by it.</summary>
public static class CorrectionsBeside
{
    /// <summary>The sealed procedure first, then every other batch correction in the order of the registry; those with weights where the plan gives some, and the campaign's own in all families where these have several.</summary>
    /// <param name="standing">The campaign as it stands. Procedures that decide as experiments arrive need the order of arrival and are shown only where one is sealed.</param>
    /// <remarks>O(m log m) for each correction.</remarks>
    public static IReadOnlyList<CorrectionOutcome> Of(CampaignStanding standing)
    {
        ArgumentNullException.ThrowIfNull(standing);
        ErrorProcedure chosen = FamilyVerdict.ProcedureOf(standing.Campaign);
        ExperimentResult[] tested = [.. standing.Experiments.Where(e => e.P is not null)];
        IReadOnlyList<Correction> others = standing.Experiments.Any(e => e.Plan.Weight is not null) ? CorrectionRegistry.All : CorrectionRegistry.FromPAlone;
        bool isMixed = standing.Families.Any(f => f.Correction != chosen.Key);
        return
        [
            new CorrectionOutcome(chosen, IsSealed: true, [.. tested.Select(e => e.AdjustedP)], [.. tested.Select(e => e.Survives == true)]) { IsMixed = isMixed },
            .. others.Where(c => isMixed || c.Key != chosen.Key).Select(c => Under(standing, c)),
        ];
    }

    /// <summary>Keys of the procedures of a kind under which an experiment survives.</summary>
    /// <param name="outcomes">The campaign under every procedure.</param>
    /// <param name="rate">The kind: the error rate that they hold, each under its own assumptions.</param>
    /// <param name="place">Place of the experiment among the tested ones, from 0.</param>
    public static IReadOnlyList<string> SurvivesUnder(IReadOnlyList<CorrectionOutcome> outcomes, ErrorRate rate, int place) =>
        [.. outcomes.Where(o => o.Procedure.Controls == rate && o.Survives[place]).Select(o => o.Key)];

    /// <summary>Whether it hangs on the choice: an experiment survives under some of the procedures that hold the same kind of error rate, and not under others.</summary>
    /// <inheritdoc cref="SurvivesUnder"/>
    public static bool Hangs(IReadOnlyList<CorrectionOutcome> outcomes, ErrorRate rate, int place)
    {
        ArgumentNullException.ThrowIfNull(outcomes);
        CorrectionOutcome[] alike = [.. outcomes.Where(o => o.Procedure.Controls == rate)];
        return alike.Any(o => o.Survives[place]) && !alike.All(o => o.Survives[place]);
    }

    private static CorrectionOutcome Under(CampaignStanding standing, Correction correction)
    {
        CampaignVerdict verdict = FamilyVerdict.JudgeBy(standing.Campaign, standing.Experiments, correction);
        return new CorrectionOutcome(correction, IsSealed: false, [.. verdict.Adjusted.Select(p => (PValue?)p)], verdict.Survives);
    }
}
