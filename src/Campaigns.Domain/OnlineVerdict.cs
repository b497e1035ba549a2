using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>What standing decisions make of a campaign that is judged as its experiments arrive, and beside it the batch view, which may change with every experiment.</summary>
public static class OnlineVerdict
{
    /// <summary>The online procedure that a campaign was sealed with; null where it has a batch correction.</summary>
    public static OnlineProcedure? ProcedureOf(Campaign campaign)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        return OnlineRegistry.Find(campaign.Correction);
    }

    /// <summary>Settings for a stream of a campaign.</summary>
    /// <param name="procedure">The procedure.</param>
    /// <param name="level">The campaign's level.</param>
    /// <param name="options">What was said; null leaves the defaults.</param>
    /// <param name="planned">The horizon where none is named: the number of experiments.</param>
    /// <exception cref="RefusedException">The options do not fit the procedure.</exception>
    public static OnlineSettings Settings(OnlineProcedure procedure, SignificanceLevel level, OnlineOptions? options, int planned)
    {
        ArgumentNullException.ThrowIfNull(procedure);
        try
        {
            int? horizon = options?.Horizon switch { null => Math.Max(1, planned), 0 => null, var given => given };
            return OnlineSettings.For(procedure, level, horizon, options?.Shape, options?.InitialWealth, options?.Lambda, options?.Tau);
        }
        catch (OnlineSettingsException error)
        {
            throw new RefusedException($"The settings do not fit '{procedure.Key}'. {error.Message}");
        }
    }

    /// <summary>Refuses families in a campaign that takes its experiments as one stream.</summary>
    /// <exception cref="RefusedException">The campaign is judged by an online procedure and an experiment names a family.</exception>
    public static void RefuseFamilies(Campaign campaign, IEnumerable<PlannedExperiment> experiments)
    {
        ArgumentNullException.ThrowIfNull(experiments);
        if (ProcedureOf(campaign) is not { } procedure)
        {
            return;
        }

        PlannedExperiment? named = experiments.FirstOrDefault(e => e.Family is not null);
        if (named is not null || campaign.Families.Count > 0)
        {
            string where = named is null ? "its families" : $"the family '{named.Family}' of experiment '{named.Code}'";
            throw new RefusedException($"The campaign '{campaign.Code}' is judged by {procedure.Name}, which takes all experiments as one stream, so {where} would count for nothing: leave families out, or open a campaign with a batch correction.");
        }
    }

    /// <summary>The batch correction beside which the decisions are shown: Holm's or Benjamini and Hochberg's, by the error rate.</summary>
    public static Campaign BatchView(Campaign campaign)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        return campaign with { Correction = campaign.ErrorRate == ErrorRate.Familywise ? "holm" : "bh", Families = [] };
    }

    /// <summary>The verdict of the standing decisions.</summary>
    internal static CampaignVerdict Judge(Campaign campaign, FamilyMembers members)
    {
        CampaignVerdict batch = FamilyVerdict.Judge(BatchView(campaign), members);
        int count = members.P.Length;
        var adjusted = new PValue[count];
        var survives = new bool[count];
        for (int i = 0; i < count; i++)
        {
            StreamEntry? entry = i < members.Entries.Count ? members.Entries[i] : null;
            adjusted[i] = entry?.AdjustedP(campaign.Level) ?? PValue.One;
            survives[i] = entry?.Survives == true;
        }

        return new CampaignVerdict(adjusted, survives, [batch.Families[0] with { Correction = campaign.Correction, Survivors = members.StandingSurvivors }]) { Batch = batch };
    }

    /// <summary>The experiments with their decisions; one whose values changed afterwards keeps its decision, and says so.</summary>
    internal static IReadOnlyList<ExperimentResult> Apply(IReadOnlyList<ExperimentResult> experiments, CampaignVerdict verdict, CampaignVerdict batch)
    {
        FamilyStanding family = verdict.Families[0];
        var judged = new ExperimentResult[experiments.Count];
        int next = 0;
        for (int i = 0; i < judged.Length; i++)
        {
            ExperimentResult experiment = experiments[i];
            int at = experiment.P is null ? -1 : next++;
            judged[i] = Apply(experiment, family) with
            {
                BatchAdjustedP = at < 0 ? null : batch.Adjusted[at],
                BatchSurvives = at < 0 ? null : batch.Survives[at],
            };
        }

        return judged;
    }

    /// <summary>One experiment with its decision.</summary>
    /// <param name="experiment">The experiment with its place in a stream.</param>
    /// <param name="family">The campaign's one family.</param>
    public static ExperimentResult Apply(ExperimentResult experiment, FamilyStanding family)
    {
        ArgumentNullException.ThrowIfNull(experiment);
        ArgumentNullException.ThrowIfNull(family);
        StreamEntry? entry = experiment.Entry;
        if (experiment.Status == ExperimentStatus.Withdrawn)
        {
            return Withdrawn(experiment, entry, family);
        }

        bool neverGaveP = entry?.P is null && experiment.P is null;
        return experiment with
        {
            Family = family,
            GivenLevel = entry?.Level,
            AdjustedP = neverGaveP ? null : entry?.AdjustedP(family.Level),
            Survives = neverGaveP ? null : entry?.Survives,
            Amendments = entry?.DecidedAt is not null && entry.P != experiment.P
                ? [.. experiment.Amendments, $"its decision was made on {(entry.P is { } p ? $"p = {p}" : "data that gave no p-value")} and stands, whatever a later test says"]
                : experiment.Amendments,
        };
    }
    /// <summary>A decision is never revoked, but an experiment that was withdrawn is no survivor.</summary>
    private static ExperimentResult Withdrawn(ExperimentResult experiment, StreamEntry? entry, FamilyStanding family) => experiment with
    {
        Family = family,
        GivenLevel = entry?.Level,
        AdjustedP = null,
        Survives = null,
        Amendments = entry?.Survives is { } survives
            ? [.. experiment.Amendments, $"its decision ({(survives ? "survives" : "does not survive")}) stays in the stream, but it does not count while it is withdrawn"]
            : experiment.Amendments,
    };
}
