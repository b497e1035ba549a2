using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Dashboard.Model;

/// <summary>The p-values of a campaign from the smallest to the largest, beside the boundary of its correction.</summary>
public sealed class Ranking
{
    private readonly CampaignStanding _standing;
    private readonly Correction? _correction;
    private readonly int[] _order;
    private readonly int[] _rankOf;
    private readonly Dictionary<int, double?> _boundaries = [];

    /// <summary>Ranks the tested experiments of a campaign; equal p-values stay in the plan's order.</summary>
    /// <param name="standing">The campaign as it stands.</param>
    /// <param name="correction">Its correction; null where the program does not know it.</param>
    public Ranking(CampaignStanding standing, ErrorProcedure? correction)
    {
        _standing = standing;

        // Ranks run over all experiments, while each family has a boundary of its own; an online procedure has none.
        _correction = standing.Families.Count > 1 ? null : correction as Correction;
        Count = standing.TestedCount;
        _order = ExperimentOrder.By(standing.Experiments, ExperimentColumn.Named("p"), isFalling: false)[..Count];
        _rankOf = new int[standing.Experiments.Count];
        for (int i = 0; i < Count; i++)
        {
            _rankOf[_order[i]] = i + 1;
            if (At(i + 1) is { Survives: true } survivor)
            {
                LargestSurvivor = survivor.P;
            }
        }

        FamilySize = Math.Max(standing.FamilySize, Count);
        SurvivorCount = standing.SurvivorCount;
        HasBoundary = FamilySize > 0 && BoundaryAt(1) is not null;
    }

    /// <summary>Experiments with a p-value.</summary>
    public int Count { get; }

    /// <summary>Hypotheses in the family; those beyond <see cref="Count"/> count as p = 1.</summary>
    public int FamilySize { get; }

    /// <summary>Whether there are several families, each with a boundary of its own.</summary>
    public bool HasFamilies => _standing.Families.Count > 1;

    /// <summary>Survivors.</summary>
    public int SurvivorCount { get; }

    /// <summary>Whether the correction has a boundary that depends on rank, family size and level alone.</summary>
    public bool HasBoundary { get; }

    /// <summary>Position in the campaign's list, from 0, of the experiment at a rank.</summary>
    /// <param name="rank">1 to <see cref="Count"/>.</param>
    public int PositionAt(int rank) => _order[rank - 1];

    /// <summary>The experiment at a rank.</summary>
    /// <param name="rank">1 to <see cref="Count"/>.</param>
    public ExperimentResult At(int rank) => _standing.Experiments[_order[rank - 1]];

    /// <summary>The rank of an experiment; 0 where it has no p-value.</summary>
    /// <param name="position">Its position in the campaign's list, from 0.</param>
    public int RankOf(int position) => position >= 0 && position < _rankOf.Length ? _rankOf[position] : 0;

    /// <summary>Decimal logarithm of the p-value at a rank, at most 0; negative infinity where 0 itself was given.</summary>
    /// <param name="rank">1 to <see cref="Count"/>.</param>
    public double Log10At(int rank) => At(rank).P!.Value.Log / Math.Log(10);

    /// <summary>The largest p-value that survives; null without a survivor.</summary>
    public PValue? LargestSurvivor { get; }

    /// <summary>The boundary at a rank; null where there is none.</summary>
    /// <param name="rank">1 to <see cref="FamilySize"/>.</param>
    /// <remarks>Kept, since some corrections take time in proportion to the family.</remarks>
    public double? BoundaryAt(int rank)
    {
        if (!_boundaries.TryGetValue(rank, out double? boundary))
        {
            boundary = _correction?.BoundaryAt(rank, FamilySize, _standing.Campaign.Level.Value);
            _boundaries.Add(rank, boundary);
        }

        return boundary;
    }
}
