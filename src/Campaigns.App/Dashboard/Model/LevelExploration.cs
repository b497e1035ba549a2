using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Dashboard.Model;

/// <summary>What the sealed correction would make of a campaign at another level: to look at, never stored.</summary>
public sealed class LevelExploration
{
    private LevelExploration(CampaignStanding standing, FamilyMembers members, SignificanceLevel level)
    {
        Level = level;
        CampaignVerdict verdict = FamilyVerdict.Judge(PlanScenarios.At(standing.Campaign, level), members);
        Families = verdict.Families;
        int next = 0;
        for (int position = 0; position < standing.Experiments.Count; position++)
        {
            ExperimentResult e = standing.Experiments[position];
            if (e.P is null)
            {
                continue;
            }

            bool wouldSurvive = verdict.Survives[next++];
            SurvivorCount += wouldSurvive ? 1 : 0;
            if (wouldSurvive != (e.Survives == true))
            {
                (wouldSurvive ? Gained : Lost).Add(position);
            }
        }
    }

    /// <summary>The level looked at.</summary>
    public SignificanceLevel Level { get; }

    /// <summary>The families as they would be, their shares of the level kept.</summary>
    public IReadOnlyList<FamilyStanding> Families { get; }

    /// <summary>Experiments of the campaign that would survive.</summary>
    public int SurvivorCount { get; }

    /// <summary>Positions of experiments that would survive and do not.</summary>
    public HashSet<int> Gained { get; } = [];

    /// <summary>Positions of survivors that would not survive.</summary>
    public HashSet<int> Lost { get; } = [];

    /// <summary>Looks at a campaign at a level; O(m log m).</summary>
    /// <param name="standing">The campaign as it stands, judged by a batch correction.</param>
    /// <param name="members">Its hypotheses.</param>
    /// <param name="level">The level.</param>
    public static LevelExploration Of(CampaignStanding standing, FamilyMembers members, SignificanceLevel level)
    {
        ArgumentNullException.ThrowIfNull(standing);
        ArgumentNullException.ThrowIfNull(members);
        return new LevelExploration(standing, members, level);
    }
}
