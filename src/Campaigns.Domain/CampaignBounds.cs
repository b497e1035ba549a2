using Campaigns.Statistics.ClosedTesting;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>How many of any set of a campaign's experiments may be false, for all sets at once: closed testing over every planned experiment, whatever families the correction divides them into.</summary>
/// <remarks>Bounds of confidence for sets that may be chosen after looking at everything; see <see cref="SimesClosedTesting"/>.</remarks>
public sealed class CampaignBounds
{
    /// <summary>The place of an experiment that was withdrawn before any data.</summary>
    private const int LeftFamily = -1;

    private readonly IReadOnlyList<ExperimentResult> _experiments;
    private readonly int[] _members;
    private readonly RankedFamily _family;

    private CampaignBounds(IReadOnlyList<ExperimentResult> experiments, SignificanceLevel level, bool anyDependence)
    {
        _experiments = experiments;
        _members = new int[experiments.Count];
        PValue[] p = [.. experiments.Where(e => e.P is not null).Select(e => e.P!.Value)];
        int tested = 0;
        int untested = p.Length;
        for (int i = 0; i < _members.Length; i++)
        {
            _members[i] = experiments[i].LeftFamily ? LeftFamily : experiments[i].P is null ? untested++ : tested++;
        }

        _family = RankedFamily.Of(p, untested);
        Testing = SimesClosedTesting.Of(_family, level, anyDependence);
    }

    /// <summary>The closed testing behind the bounds.</summary>
    public SimesClosedTesting Testing { get; }

    /// <summary>1 - level, as it is written: the confidence that all bounds hold together.</summary>
    public double Confidence => ConfidenceOf(Testing.Level);

    /// <summary>Prepares the bounds of all sets; O(m log m).</summary>
    /// <param name="experiments">Every planned experiment of the campaign; those without a result count as p = 1, those that left the family do not count.</param>
    /// <param name="level">One less the confidence.</param>
    /// <param name="anyDependence">Whether the bounds are to hold under any dependence instead of where Simes' inequality holds.</param>
    public static CampaignBounds Of(IReadOnlyList<ExperimentResult> experiments, SignificanceLevel level, bool anyDependence = false)
    {
        ArgumentNullException.ThrowIfNull(experiments);
        return new CampaignBounds(experiments, level, anyDependence);
    }

    /// <summary>1 less a level, without the rounding of binary fractions: 0.93 for 0.07.</summary>
    /// <param name="level">The level.</param>
    public static double ConfidenceOf(SignificanceLevel level) =>
        level.Value < 1e-12 ? 1 - level.Value : (double)(1m - (decimal)level.Value);

    /// <summary>The bound of a set of experiments; those that left the family are passed over.</summary>
    /// <param name="indices">Distinct places in the list of experiments, from 0, in any order.</param>
    /// <exception cref="ArgumentException">A place stands twice.</exception>
    public MarkedBound Mark(IReadOnlyCollection<int> indices)
    {
        ArgumentNullException.ThrowIfNull(indices);
        int[] members = [.. indices.Select(i => _members[i]).Where(m => m != LeftFamily)];
        return new MarkedBound(members.Length, Testing.RealAtLeast(members), members.Count(m => m >= _family.Count));
    }

    /// <summary>The tested experiments, the smallest p-value first, each with the bound of the set that ends with it.</summary>
    /// <returns>Equal p-values keep the order of the experiments.</returns>
    public IEnumerable<(ExperimentResult Experiment, MarkedBound Bound)> Curve()
    {
        ExperimentResult[] tested = [.. _experiments.Where(e => e.P is not null)];
        int[] realAtLeast = Testing.Curve();
        for (int k = 1; k <= tested.Length; k++)
        {
            yield return (tested[_family.Order[k - 1]], new MarkedBound(k, realAtLeast[k], 0));
        }
    }
}
