using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.ClosedTesting;

/// <summary>Closed testing of a family with Simes' tests: for every set of its hypotheses at once, how many of them at least are false nulls (real effects), with confidence 1 - level.</summary>
/// <remarks>
/// With probability at least 1 - level the bounds of all sets hold together, so a set may be chosen after looking at everything. Bounds of confidence, no estimates: a bound of 0 does
/// not say that the set holds no effect. They hold where Simes' inequality holds for the true nulls (independence, positive regression dependence), or, with the level divided by
/// 1 + 1/2 + ... + 1/m, under any dependence. Comparisons are of exact products. Levels below 10^-290 are not meant.
/// Sources: J. J. Goeman and A. Solari (2011), Statistical Science 26:584-597; J. J. Goeman, R. J. Meijer, T. J. P. Krebs and A. Solari (2019), Biometrika 106:841-856;
/// any dependence: G. Hommel (1983), Biometrical Journal 25:423-430.
/// </remarks>
public sealed class SimesClosedTesting
{
    private readonly RankedFamily _family;
    private readonly SimesBoundary _boundary;
    private readonly double[] _given;

    private SimesClosedTesting(RankedFamily family, SignificanceLevel level, bool anyDependence)
    {
        (_family, Level, AnyDependence) = (family, level, anyDependence);
        _boundary = new SimesBoundary(level.Value, family.FamilySize, anyDependence);
        _given = new double[family.Count];
        for (int rank = 0; rank < _given.Length; rank++)
        {
            _given[family.Order[rank]] = family.Sorted[rank];
        }

        LargestUnrejected = FindLargestUnrejected();
    }

    /// <summary>The level; the bounds have the confidence 1 - level.</summary>
    public SignificanceLevel Level { get; }

    /// <summary>Whether the bounds hold under any dependence, at the price of the level divided by 1 + 1/2 + ... + 1/m.</summary>
    public bool AnyDependence { get; }

    /// <summary>Hypotheses in the family, tested or not.</summary>
    public int FamilySize => _family.FamilySize;

    /// <summary>Size of the largest set that closed testing does not reject: the upper bound of the true nulls in the whole family; from 0 to the size of the family.</summary>
    public int LargestUnrejected { get; }

    /// <summary>Carries out the closed testing of a family, once for all sets.</summary>
    /// <param name="family">The p-values with the size of the family; planned but untested hypotheses count as p = 1.</param>
    /// <param name="level">The level; confidence is 1 - level.</param>
    /// <param name="anyDependence">Whether the bounds are to hold under any dependence.</param>
    /// <returns>The bounds of all sets. Time m log m, memory of a double for each p-value.</returns>
    public static SimesClosedTesting Of(RankedFamily family, SignificanceLevel level, bool anyDependence = false)
    {
        ArgumentNullException.ThrowIfNull(family);
        return new SimesClosedTesting(family, level, anyDependence);
    }

    /// <summary>The least number of false nulls in a set, with confidence 1 - level, simultaneously for all sets.</summary>
    /// <param name="members">Distinct members: the position at which a p-value was given, counted from 0; positions from there to the size of the family are untested hypotheses. Any order.</param>
    /// <returns>From 0 to the size of the set; the rest is the most that may be true nulls. Time and memory in proportion to the set, once its members are told apart.</returns>
    /// <exception cref="ArgumentException">A member is not of the family, or stands twice.</exception>
    /// <remarks>The largest of 1 - u + (number of members with h p at most u level) over u from 1 to the size of the set, with h = <see cref="LargestUnrejected"/>.</remarks>
    public int RealAtLeast(ReadOnlySpan<int> members)
    {
        CheckMembers(members);
        int[] counts = new int[members.Length + 2];
        foreach (int member in members)
        {
            counts[LeastRank(member < _given.Length ? _given[member] : 1, members.Length)]++;
        }

        int best = 0;
        int reached = 0;
        for (int u = 1; u <= members.Length; u++)
        {
            reached += counts[u];
            best = Math.Max(best, 1 - u + reached);
        }

        return best;
    }

    /// <summary>The most true nulls that a set may hold, with confidence 1 - level: its size less <see cref="RealAtLeast"/>.</summary>
    /// <inheritdoc cref="RealAtLeast"/>
    public int FalseAtMost(ReadOnlySpan<int> members) => members.Length - RealAtLeast(members);

    /// <summary>The bounds of the sets of the k smallest p-values, for all k.</summary>
    /// <returns>At k, from 0 to the number of p-values given, the least number of false nulls among the k smallest. Never falls, and rises by at most 1 from each k to the next. Time in proportion to the p-values.</returns>
    public int[] Curve()
    {
        int[] curve = new int[_family.Count + 1];
        for (int k = 1; k < curve.Length; k++)
        {
            curve[k] = Math.Max(curve[k - 1], k + 1 - LeastRank(_family.Sorted[k - 1], k + 1));
        }

        return curve;
    }

    /// <summary>The least rank u from 1 to a largest one with h p at most u level; one more than the largest where none is.</summary>
    private int LeastRank(double p, int largest)
    {
        // The quotient is only a first guess: comparing the products decides.
        double guess = Math.Ceiling(LargestUnrejected * p / _boundary.RoundedLevel);
        int u = (int)Math.Clamp(guess, 1, largest + 1.0);
        while (u > 1 && _boundary.Reaches(p, LargestUnrejected, u - 1))
        {
            u--;
        }

        while (u <= largest && !_boundary.Reaches(p, LargestUnrejected, u))
        {
            u++;
        }

        return u;
    }

    /// <summary>If the i largest p-values are not rejected by Simes' test, neither are the i - 1 largest: so halving finds the largest such i.</summary>
    private int FindLargestUnrejected()
    {
        int low = FamilySize - _family.Count;
        int high = FamilySize;
        while (low < high)
        {
            int middle = low + ((high - low + 1) >> 1);
            if (IsRejected(middle))
            {
                high = middle - 1;
            }
            else
            {
                low = middle;
            }
        }

        return low;
    }

    /// <summary>Whether Simes' test rejects the set of the largest p-values; untested members alone, with p = 1, never bring that about.</summary>
    private bool IsRejected(int size)
    {
        int first = FamilySize - size;
        ReadOnlySpan<double> sorted = _family.Sorted;
        for (int k = first; k < sorted.Length; k++)
        {
            if (_boundary.Reaches(sorted[k], size, k - first + 1))
            {
                return true;
            }
        }

        return false;
    }

    private void CheckMembers(ReadOnlySpan<int> members)
    {
        var seen = new HashSet<int>(members.Length);
        foreach (int member in members)
        {
            if (member < 0 || member >= FamilySize)
            {
                throw new ArgumentException(FormattableString.Invariant($"Member {member} is not one of the {FamilySize} hypotheses of the family."), nameof(members));
            }

            if (!seen.Add(member))
            {
                throw new ArgumentException(FormattableString.Invariant($"Member {member} stands twice in the set."), nameof(members));
            }
        }
    }
}
