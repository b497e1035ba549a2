using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.CampaignPermutation;

/// <summary>Westfall and Young's step-down adjustment by permutation, over all responses of a campaign at once.</summary>
/// <remarks>
/// Responses of one set of specimens are permuted together; sets are permuted independently of each other. In the order of the evidence, the adjusted p-value of a response is the share of arrangements in which the most extreme of it and all later ones is at least as extreme, and never less than that of the one before: by the largest share of variation (maxT), or by the smallest p-value (minP), the p-value of a share being how often the same response reaches it among all arrangements.
/// Where every set's arrangements can all be looked at, the observed one among them, shares of arrangements are exact, and 1 less the product of their complements joins the sets. Otherwise B random arrangements are drawn, every set its own in each draw, and the observed one is counted among them: (c + 1)/(B + 1).
/// Ties count as at least as extreme, and are found without rounding (<see cref="ExactResponse"/>).
/// Holds the familywise error rate in the strong sense where the groups are exchangeable if the hypothesis holds, whatever other hypotheses do (subset pivotality), and specimens of different sets were assigned independently.
/// Hypotheses that are not permuted (<see cref="PermutationRun.Others"/>) are granted the share p each: by Boole's inequality the rate is held over the whole family whatever their dependence, and what minP rejects while they wait, it still rejects when they have come.
/// Works column by column, as many at a time as fit into 130 MB, plus some columns to work with: up to about 0.4 GB for the largest number of draws.
/// Cost of 10,000 draws of 200 responses on 24 specimens, one core: about 0.05 s for maxT, 0.3 s for minP, which sorts every column.
/// Sources: P. H. Westfall and S. S. Young, Resampling-Based Multiple Testing, 1993; Y. Ge, S. Dudoit and T. P. Speed, Test 12 (2003) 1-77; B. Phipson and G. K. Smyth, Statistical Applications in Genetics and Molecular Biology 9(1), 2010. For independent sets: P. H. Westfall and R. D. Wolfinger, The American Statistician 51 (1997) 3-8.
/// </remarks>
public static class StepDownPermutation
{
    /// <summary>Adjusts by the largest share of variation; for responses whose degrees of freedom are the same, so that shares mean the same in all of them.</summary>
    /// <param name="sets">At least one, each with at least one response.</param>
    /// <param name="run">Draws, threads, the rest of the family.</param>
    /// <returns>For each response, set by set in the order in which they were added.</returns>
    /// <exception cref="ArgumentException">No set, a set without responses, or more draws than <see cref="PermutationRun.MostDraws"/>.</exception>
    /// <exception cref="OperationCanceledException">Stopped.</exception>
    public static StepDownResult[] MaxT(IReadOnlyList<SpecimenSet> sets, PermutationRun run) => new StepDown(Worlds(sets, run), [], run, byP: false).Adjust();

    /// <summary>Adjusts by the smallest p-value: for responses of any degrees of freedom.</summary>
    /// <inheritdoc cref="MaxT" path="/param|/returns|/exception"/>
    public static StepDownResult[] MinP(IReadOnlyList<SpecimenSet> sets, PermutationRun run) => new StepDown(Worlds(sets, run), [], run, byP: true).Adjust();

    /// <summary>Adjusts by the smallest p-value without a random draw, for experiments of which many are small: p-values that an experiment cannot reach cost nothing.</summary>
    /// <param name="sets">Sets whose arrangements can all be looked at.</param>
    /// <param name="given">P-values of other experiments, in groups that may depend on each other; each is taken for uniform, which is never too small. Different groups, and sets, are independent.</param>
    /// <param name="run">Threads and the rest of the family; nothing is drawn.</param>
    /// <returns>For each response, set by set, then for each given p-value, group by group.</returns>
    /// <remarks>With one response in each set and one p-value in each group this is the discrete step-down procedure of Westfall and Wolfinger, never larger than Holm's with Sidak's inequality; with several p-values in a group, Bonferroni's inequality inside it.</remarks>
    /// <exception cref="ArgumentException">A set has too many arrangements or no response, or there is nothing to adjust.</exception>
    /// <exception cref="OperationCanceledException">Stopped.</exception>
    public static StepDownResult[] ExactMinP(IReadOnlyList<SpecimenSet> sets, IReadOnlyList<IReadOnlyList<PValue>> given, PermutationRun run)
    {
        ArgumentNullException.ThrowIfNull(sets);
        ArgumentNullException.ThrowIfNull(given);
        if (sets.Any(set => !set.IsEnumerable))
        {
            throw new ArgumentException("A set with too many arrangements to look at all of them has no exact law.", nameof(sets));
        }

        return new StepDown(sets.Count == 0 ? [] : Worlds(sets, run), given, run, byP: true).Adjust();
    }

    private static List<(ArrangementColumns Columns, IReadOnlyList<SpecimenSet> Sets)> Worlds(IReadOnlyList<SpecimenSet> sets, PermutationRun run)
    {
        ArgumentNullException.ThrowIfNull(sets);
        if (sets.Count == 0 || sets.Any(set => set.ResponseCount == 0))
        {
            throw new ArgumentException("There is nothing to permute without sets, or in a set without responses.", nameof(sets));
        }

        if (sets.All(set => set.IsEnumerable))
        {
            return [.. sets.Select(set => (ArrangementColumns.AllOf(set), (IReadOnlyList<SpecimenSet>)[set]))];
        }

        if (run.Draws.Count is < 1 or > PermutationRun.MostDraws)
        {
            throw new ArgumentException(FormattableString.Invariant($"From 1 to {PermutationRun.MostDraws} arrangements can be drawn, not {run.Draws.Count}."), nameof(run));
        }

        return [(ArrangementColumns.Drawn(sets, run.Draws), sets)];
    }
}
