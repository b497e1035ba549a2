using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Dashboard.Model;

/// <summary>The p-values of a campaign, or of one of its families, from the smallest to the largest, beside the boundary of the correction.</summary>
public sealed class Ranking
{
    private static readonly double Ln10 = Math.Log(10);
    private readonly CampaignStanding _standing;
    private readonly BoundaryLine? _line;
    private readonly int[] _order;
    private readonly int[] _rankOf;
    private readonly double[] _logs;

    /// <summary>Ranks the tested experiments of a campaign; equal p-values stay in the plan's order.</summary>
    /// <param name="standing">The campaign as it stands.</param>
    /// <param name="correction">Its correction; null where the program does not know it.</param>
    /// <param name="family">The family that is ranked, with its size and level; null for the whole campaign, which has no boundary of its own where it has several families.</param>
    public Ranking(CampaignStanding standing, ErrorProcedure? correction, FamilyStanding? family = null)
    {
        ArgumentNullException.ThrowIfNull(standing);
        _standing = standing;
        Family = family;
        bool isPart = family is not null && standing.Families.Count > 1;
        int[] all = ExperimentOrder.By(standing.Experiments, ExperimentColumn.Named("p"), isFalling: false)[..standing.TestedCount];
        _order = isPart ? Array.FindAll(all, position => standing.FamilyOf(standing.Experiments[position]).Name == family!.Name) : all;
        _rankOf = new int[standing.Experiments.Count];
        _logs = new double[_order.Length];
        for (int i = 0; i < _order.Length; i++)
        {
            _rankOf[_order[i]] = i + 1;
            ExperimentResult e = standing.Experiments[_order[i]];
            _logs[i] = e.P!.Value.Log / Ln10;
            if (e.Survives == true)
            {
                LargestSurvivor = e.P;
            }
        }

        FamilySize = Math.Max(isPart ? family!.Size : standing.FamilySize, Count);
        SurvivorCount = isPart ? family!.Survivors : standing.SurvivorCount;
        IsOnline = correction is OnlineProcedure;
        _line = correction is Correction batch && FamilySize > 0 && (isPart || standing.Families.Count <= 1)
            ? new BoundaryLine(batch, FamilySize, isPart ? family!.Level : standing.Campaign.Level)
            : null;
        HasBoundary = _line?.At(1) is not null;
    }

    /// <summary>The family that is ranked; null for the whole campaign.</summary>
    public FamilyStanding? Family { get; }

    /// <summary>Experiments with a p-value.</summary>
    public int Count => _order.Length;

    /// <summary>Hypotheses in the family; those beyond <see cref="Count"/> count as p = 1.</summary>
    public int FamilySize { get; }

    /// <summary>Whether several families are ranked together, each with a boundary of its own.</summary>
    public bool HasFamilies => Family is null && _standing.Families.Count > 1;

    /// <summary>Whether each experiment is held against the level that it was given when it started.</summary>
    public bool IsOnline { get; }

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

    /// <summary>An experiment of the campaign.</summary>
    /// <param name="position">Its position in the campaign's list, from 0.</param>
    public ExperimentResult Experiment(int position) => _standing.Experiments[position];

    /// <summary>The rank of an experiment; 0 where it has no p-value here.</summary>
    /// <param name="position">Its position in the campaign's list, from 0.</param>
    public int RankOf(int position) => position >= 0 && position < _rankOf.Length ? _rankOf[position] : 0;

    /// <summary>Decimal logarithm of the p-value at a rank, at most 0; negative infinity where 0 itself was given.</summary>
    /// <param name="rank">1 to <see cref="Count"/>.</param>
    public double Log10At(int rank) => _logs[rank - 1];

    /// <summary>The largest p-value that survives; null without a survivor.</summary>
    public PValue? LargestSurvivor { get; }

    /// <summary>The boundary at a rank; null where there is none.</summary>
    /// <param name="rank">1 to <see cref="FamilySize"/>.</param>
    public double? BoundaryAt(int rank) => _line?.At(rank);
}
