using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.FollowUps;

/// <summary>All pairs by Student's t with a common standard deviation, the p-values adjusted by Holm's step-down correction.</summary>
/// <remarks>The statistic is t. Holm's procedure has no simultaneous intervals of its own; the intervals are Bonferroni's, at 1 - alpha/M for M pairs, which hold together but may include zero where Holm's p-value is at most alpha.</remarks>
public sealed class HolmPairs : FollowUp
{
    private static readonly Holm Correction = new();

    /// <inheritdoc/>
    public override string Key => "holm-pairs";

    /// <inheritdoc/>
    public override string Name => "Holm, all pairs";

    /// <inheritdoc/>
    public override string Holds => "All pairs: the probability of calling any equal pair different is at most the level. The intervals are Bonferroni's, which hold together but are a little wider than the p-values are strict, so that one may include zero although its pair is called different.";

    /// <inheritdoc/>
    public override string Assumes => "Independent observations; in every group a normal law with the same variance.";

    /// <inheritdoc/>
    public override string Source => "S. Holm (1979), Scandinavian Journal of Statistics 6:65-70.";

    /// <inheritdoc/>
    public override IReadOnlyList<GroupComparison> Compare(GroupEstimates estimates, int? control, double confidence)
    {
        double risk = Pairing.Risk(confidence);
        (int A, int B)[] pairs = [.. Pairing.AllPairs(estimates)];
        if (pairs.Length == 0)
        {
            return [];
        }

        double df = estimates.DegreesOfFreedom;
        double half = StudentT.TwoSidedQuantile(risk / pairs.Length, df);
        GroupComparison[] raw = [.. pairs.Select(pair => Pairing.Pooled(estimates, pair.A, pair.B, t => t, t => PValue.FromLog(StudentT.LogTwoSidedTail(t, df)), half))];

        // A pair that cannot be compared still counts among the M.
        PValue[] adjusted = Correction.Adjust(RankedFamily.Of([.. raw.Where(c => c.P is not null).Select(c => c.P!.Value)], pairs.Length));
        int next = 0;
        return [.. raw.Select(c => c.P is null ? c : c with { P = adjusted[next++] })];
    }
}
