namespace Campaigns.Statistics.Permutation;

/// <summary>The group sizes of an experiment as far as permutations are concerned: which arrangements of its values there are.</summary>
/// <remarks>
/// Sizes stand in ascending order, so that the largest group, whose sum follows from the total, comes last; which group is which does not matter to F.
/// Two designs are equal where their sizes are. Instances can be shared between threads.
/// </remarks>
public sealed class PermutationDesign : IEquatable<PermutationDesign>
{
    /// <summary>Up to this many arrangements, those that only exchange groups of equal size counted once, all are looked at instead of drawn: a few milliseconds of work.</summary>
    public const long MostEnumerated = 1_000_000;

    private readonly int[] _sizes;
    private readonly Lazy<SubsetDraws> _subsets;

    private PermutationDesign(int[] sizes)
    {
        _sizes = sizes;
        Count = sizes.Sum();
        Arrangements = CountArrangements(sizes);
        _subsets = new(() => new SubsetDraws(this));
    }

    /// <summary>Values per group, ascending; at least two groups, each with at least one value.</summary>
    public ReadOnlySpan<int> Sizes => _sizes;

    /// <summary>Values in all groups, N.</summary>
    public int Count { get; }

    /// <summary>N!/(n_1! n_2! ...), the ways to give N values to the groups; null above 2^63 - 1.</summary>
    public long? Arrangements { get; }

    /// <summary>Arrangements that differ by more than an exchange of whole groups of equal size, which changes no F; null where <see cref="Arrangements"/> is.</summary>
    public long? DistinctArrangements => Arrangements / Exchanges();

    /// <summary>Whether all arrangements are looked at, instead of a random sample of them.</summary>
    public bool IsEnumerated => DistinctArrangements <= MostEnumerated;

    /// <summary>Ways to draw the design's groups as sets of bits; only for at most 64 values.</summary>
    internal SubsetDraws Subsets => _subsets.Value;

    /// <summary>The design with given group sizes.</summary>
    /// <param name="sizes">In any order; groups without a value (0) are left out.</param>
    /// <exception cref="ArgumentException">Fewer than two groups with a value, or a negative size.</exception>
    public static PermutationDesign Of(IEnumerable<int> sizes)
    {
        int[] filled = [.. sizes.Where(n => n != 0).Order()];
        return filled.Length >= 2 && filled[0] > 0
            ? new(filled)
            : throw new ArgumentException("A design has at least two groups with at least one value each.", nameof(sizes));
    }

    /// <summary>The smallest p-value that a permutation test of this design can give.</summary>
    /// <param name="draws">Random arrangements that would be drawn, at least 1.</param>
    /// <returns>One over <see cref="DistinctArrangements"/> where all are looked at, else 1/(draws + 1).</returns>
    /// <exception cref="ArgumentOutOfRangeException">Fewer than one draw.</exception>
    public double SmallestP(int draws)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(draws, 1);
        return IsEnumerated ? 1.0 / DistinctArrangements!.Value : 1.0 / (draws + 1.0);
    }

    /// <inheritdoc/>
    public bool Equals(PermutationDesign? other) => other is not null && _sizes.AsSpan().SequenceEqual(other._sizes);

    /// <inheritdoc/>
    public override bool Equals(object? obj) => Equals(obj as PermutationDesign);

    /// <inheritdoc/>
    public override int GetHashCode()
    {
        var hash = default(HashCode);
        Array.ForEach(_sizes, hash.Add);
        return hash.ToHashCode();
    }

    /// <summary>Ways to exchange groups of equal size. It divides the number of arrangements, so it fits where that does.</summary>
    private long Exchanges()
    {
        long ways = 1;
        int run = 1;
        for (int i = 1; i < _sizes.Length && Arrangements is not null; i++)
        {
            run = _sizes[i] == _sizes[i - 1] ? run + 1 : 1;
            ways *= run;
        }

        return ways;
    }

    private static long? CountArrangements(int[] sizes)
    {
        UInt128 ways = 1;
        long placed = 0;
        foreach (int size in sizes)
        {
            // times (placed + 1)(placed + 2).../(1 2 ...): a binomial coefficient, whole after every factor, and never smaller than before.
            UInt128 before = ways;
            UInt128 chosen = 1;
            for (int i = 1; i <= size && placed > 0; i++)
            {
                chosen = chosen * (UInt128)(placed + i) / (UInt128)i;
                if (chosen > long.MaxValue || before * chosen > long.MaxValue)
                {
                    return null;
                }
            }

            ways = before * chosen;
            placed += size;
        }

        return (long)ways;
    }
}
