using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Selection;

namespace Campaigns.Statistics.Replication;

/// <summary>The p-value of the hypothesis that fewer than u of n studies of one question have an effect: small where at least u of them have.</summary>
/// <remarks>
/// The u - 1 smallest p-values are set aside, as they may belong to true effects; the k = n - u + 1 others are combined as if none of them had an effect. That is the largest combined p-value of any k of the studies, so that it is valid whichever of them have effects.
/// With p(1) at most p(2), ...: Bonferroni k p(u); Simes min over i of (k/i) p(u - 1 + i); Fisher the upper tail at -2 (ln p(u) + ... + ln p(n)) of the chi-squared law with 2 k degrees of freedom.
/// For u = n all three are the largest p-value: "every study has an effect" is shown as well as the least convincing study shows it.
/// Source: Y. Benjamini and R. Heller (2008), Biometrics 64:1215-1222. Studies that were chosen for following up by the results of the first: M. Bogomolov and R. Heller (2013), Journal of the American Statistical Association 108:1480-1492.
/// </remarks>
public static class PartialConjunction
{
    /// <summary>The p-value of "at least u of these studies have an effect", against "fewer have".</summary>
    /// <param name="p">A p-value a study, in any order; at least one.</param>
    /// <param name="atLeast">u, from 1 (any study at all) to the number of studies (every one).</param>
    /// <param name="form">How those that are kept are combined.</param>
    /// <returns>In (0, 1]; 0 only where all p-values that are kept are 0, or for Fisher's form one of them. O(n log n).</returns>
    /// <exception cref="ArgumentException">There is no study.</exception>
    /// <exception cref="ArgumentOutOfRangeException">u is not one of these numbers, or the form is none.</exception>
    public static PValue Of(ReadOnlySpan<PValue> p, int atLeast, PartialConjunctionForm form)
    {
        if (p.IsEmpty)
        {
            throw new ArgumentException("There is no study to combine.", nameof(p));
        }

        ArgumentOutOfRangeException.ThrowIfLessThan(atLeast, 1);
        ArgumentOutOfRangeException.ThrowIfGreaterThan(atLeast, p.Length);
        PValue[] sorted = p.ToArray();
        Array.Sort(sorted);
        ReadOnlySpan<PValue> kept = sorted.AsSpan(atLeast - 1);
        return kept.Length == 1 ? kept[0] : form switch
        {
            PartialConjunctionForm.Bonferroni => Share(kept, 1),
            PartialConjunctionForm.Simes => Simes(kept),
            PartialConjunctionForm.Fisher => Fisher(kept),
            _ => throw new ArgumentOutOfRangeException(nameof(form), form, "This is no form of a partial conjunction."),
        };
    }

    /// <summary>min(1, p(i) k/i), rounded once.</summary>
    private static PValue Share(ReadOnlySpan<PValue> kept, int i) => SelectedFamilies.FalseDiscovery(kept[i - 1], kept.Length, i);

    private static PValue Simes(ReadOnlySpan<PValue> kept)
    {
        PValue least = PValue.One;
        for (int i = 1; i <= kept.Length; i++)
        {
            PValue share = Share(kept, i);
            least = share < least ? share : least;
        }

        return least;
    }

    private static PValue Fisher(ReadOnlySpan<PValue> kept)
    {
        double sum = 0;
        foreach (PValue p in kept)
        {
            sum -= p.Log;
        }

        return ChiSquared.UpperTailPValue(2 * sum, 2 * kept.Length);
    }
}
