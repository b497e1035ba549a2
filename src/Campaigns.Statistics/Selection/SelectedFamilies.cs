using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Selection;

/// <summary>P-values of comparisons inside experiments that were selected out of many, adjusted for that selection.</summary>
/// <remarks>
/// False discovery rate: inside the R experiments selected out of m, comparisons are claimed at level q R/m, so their p-values, already adjusted inside the experiment, are multiplied by m/R
/// (Y. Benjamini and M. Bogomolov 2014, Journal of the Royal Statistical Society B 76:297-318). What is held is the expected average, over the selected experiments, of the error inside each,
/// at most q, where the experiments are independent of each other and the selection is simple (Bonferroni, step-up and step-down procedures are).
/// Familywise: every experiment's comparisons get the share level/m, or of their weight, so their p-values are multiplied by m, or by the sum of the weights over their own; by the union bound the probability of any false comparison in the campaign is at most the level,
/// whatever the dependence and whatever the selection.
/// </remarks>
public static class SelectedFamilies
{
    /// <summary>Below this p-value its logarithm carries the result.</summary>
    private const double LogBelow = 1e-290;

    /// <summary>min(1, p m/R).</summary>
    /// <param name="p">Adjusted inside its experiment.</param>
    /// <param name="experiments">Experiments in the family, m; at least <paramref name="selected"/>.</param>
    /// <param name="selected">Experiments selected, R; at least 1.</param>
    /// <exception cref="ArgumentOutOfRangeException">A count is out of range.</exception>
    public static PValue FalseDiscovery(PValue p, int experiments, int selected)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(selected, 1);
        ArgumentOutOfRangeException.ThrowIfLessThan(experiments, selected);
        return p.Value < LogBelow
            ? PValue.FromLog(Math.Min(0, p.Log + Math.Log((double)experiments / selected)))
            : PValue.FromValue(Math.Min(1, ExactProducts.Quotient(p.Value, experiments, 0, selected)));
    }

    /// <summary>min(1, p W/w): the share w/W of the level in the place of 1/m.</summary>
    /// <param name="p">Adjusted inside its experiment.</param>
    /// <param name="total">Weights of the family together, W; above 0.</param>
    /// <param name="weight">Weight of the experiment, w; 0 or more. At 0 the result is 1.</param>
    /// <exception cref="ArgumentOutOfRangeException">A weight is out of range.</exception>
    public static PValue Weighted(PValue p, double total, double weight)
    {
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(total);
        ArgumentOutOfRangeException.ThrowIfNegative(weight);
        return weight == 0 ? PValue.FromValue(1)
            : p.Value < LogBelow ? PValue.FromLog(Math.Min(0, p.Log + Math.Log(total) - Math.Log(weight)))
            : PValue.FromValue(Math.Min(1, ExactProducts.Quotient(p.Value, total, 0, weight)));
    }

    /// <summary>min(1, p m).</summary>
    /// <param name="p">Adjusted inside its experiment.</param>
    /// <param name="experiments">Experiments in the family, m; at least 1.</param>
    /// <exception cref="ArgumentOutOfRangeException">The count is out of range.</exception>
    public static PValue Familywise(PValue p, int experiments) => FalseDiscovery(p, experiments, 1);
}
