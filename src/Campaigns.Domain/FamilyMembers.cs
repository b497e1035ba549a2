using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>The hypotheses of a campaign as columns: the p-values at hand in the plan's order, and what is planned of each family.</summary>
public sealed record FamilyMembers
{
    /// <summary>P-values of the tested experiments, in the plan's order.</summary>
    public required ReadOnlyMemory<PValue> P { get; init; }

    /// <summary>What is counted of each family; one entry for a campaign of one family.</summary>
    public required IReadOnlyList<FamilyCount> Families { get; init; }

    /// <summary>For each p-value the place of its family in <see cref="Families"/>, from 0; empty where there is one family.</summary>
    public ReadOnlyMemory<int> FamilyOf { get; init; }

    /// <summary>For each p-value the planned weight of its experiment; empty where no correction asks for weights.</summary>
    public ReadOnlyMemory<double> Weights { get; init; }

    /// <summary>In a campaign judged as experiments arrive, for each p-value the experiment's place in its stream; else empty.</summary>
    public IReadOnlyList<StreamEntry?> Entries { get; init; } = [];

    /// <summary>Standing decisions that an experiment survives, those included whose values were changed afterwards, those not that were withdrawn.</summary>
    public int StandingSurvivors { get; init; }

    /// <summary>The members that experiments in memory make up, those without a p-value counted too.</summary>
    /// <param name="campaign">Its families.</param>
    /// <param name="experiments">Every experiment of the campaign; the p-values keep their order. Those that left their family are not counted.</param>
    public static FamilyMembers Of(Campaign campaign, IReadOnlyList<ExperimentResult> experiments)
    {
        ArgumentNullException.ThrowIfNull(campaign);
        ArgumentNullException.ThrowIfNull(experiments);
        FamilyMembers members = Counted(campaign, experiments);
        return OnlineVerdict.ProcedureOf(campaign) is null ? members : members with
        {
            Entries = [.. experiments.Where(e => e.P is not null).Select(e => e.Entry)],
            StandingSurvivors = experiments.Count(e => e.Entry?.Survives == true && e.Status != ExperimentStatus.Withdrawn),
        };
    }

    /// <summary>The members of a campaign of one family.</summary>
    /// <param name="p">P-values of the tested experiments.</param>
    /// <param name="size">Hypotheses counted, tested or not.</param>
    public static FamilyMembers OneFamily(ReadOnlyMemory<PValue> p, int size) => new() { P = p, Families = [new FamilyCount(new Family(""), size, size)] };

    private static FamilyMembers Counted(Campaign campaign, IReadOnlyList<ExperimentResult> experiments)
    {
        if (!FamilyTally.IsNeeded(campaign))
        {
            return OneFamily(experiments.Where(e => e.P is not null).Select(e => e.P!.Value).ToArray(), experiments.Count(e => !e.LeftFamily));
        }

        var tally = new FamilyTally(campaign);
        foreach (ExperimentResult experiment in experiments.Where(e => !e.LeftFamily))
        {
            tally.Add(experiment.Plan.Family, experiment.Plan.Weight, experiment.Plan.SharedControl, experiment.P);
        }

        return tally.Members(testedOnly: false);
    }
}
