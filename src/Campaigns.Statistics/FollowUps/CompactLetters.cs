using System.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.FollowUps;

/// <summary>Letters for the groups of an experiment, such that two groups share one if and only if they are not called different.</summary>
/// <remarks>
/// Insert and absorb, then sweep. Source: H.-P. Piepho (2004), Journal of Computational and Graphical Statistics 13:456-466.
/// A letter is a set of groups. At first one holds all; a pair that is called different splits every letter that holds both into one without the first and one without the second, and a letter inside another is absorbed. A group is swept out of a letter where it shares another letter with each of the rest.
/// Letters go from a on by the largest mean they hold. After 52 come a2, b2, ...
/// The number of letters before sweeping may grow exponentially for patterns that no set of means with a common standard error gives; beyond 1024 the letters are made one by one instead, each as large as it can be, until all pairs are covered.
/// </remarks>
public static class CompactLetters
{
    private const int MostLetters = 1024;
    private const string Alphabet = "abcdefghijklmnopqrstuvwxyzABCDEFGHIJKLMNOPQRSTUVWXYZ";

    /// <summary>The letters of each group.</summary>
    /// <param name="estimates">What is known of the groups; groups are taken by descending mean, those with the same mean by number.</param>
    /// <param name="comparisons">Every pair of groups with values, in any order. A pair without a p-value counts as not called different.</param>
    /// <param name="level">The level at which a pair is called different.</param>
    /// <returns>For each group number its letters in alphabetical order, empty for a group without a value. Null where a pair is missing, as after comparisons with a control alone.</returns>
    public static IReadOnlyList<string>? Of(GroupEstimates estimates, IReadOnlyList<GroupComparison> comparisons, SignificanceLevel level)
    {
        int[] groups = [.. Enumerable.Range(0, estimates.GroupCount).Where(g => estimates.CountOf(g) > 0)];
        if (groups.Length == 0 || comparisons.Count != groups.Length * (groups.Length - 1) / 2)
        {
            return null;
        }

        int[] ranked = [.. groups.OrderByDescending(g => estimates.Difference(groups[0], g)).ThenBy(g => g)];
        var rank = new int[estimates.GroupCount];
        for (int i = 0; i < ranked.Length; i++)
        {
            rank[ranked[i]] = i;
        }

        var different = new BigInteger[ranked.Length];
        foreach (GroupComparison pair in comparisons.Where(c => c.P is PValue p && level.Rejects(p)))
        {
            different[rank[pair.GroupA]] |= BigInteger.One << rank[pair.GroupB];
            different[rank[pair.GroupB]] |= BigInteger.One << rank[pair.GroupA];
        }

        List<BigInteger> letters = Sweep(InsertAndAbsorb(different) ?? Cover(different), ranked.Length);
        letters.Sort((x, y) => CompareSets(x, y, ranked.Length));
        var marks = new string[estimates.GroupCount];
        Array.Fill(marks, "");
        for (int i = 0; i < ranked.Length; i++)
        {
            marks[ranked[i]] = string.Concat(Enumerable.Range(0, letters.Count).Where(l => Holds(letters[l], i)).Select(Mark));
        }

        return marks;
    }

    /// <returns>Null where the letters become too many.</returns>
    private static List<BigInteger>? InsertAndAbsorb(BigInteger[] different)
    {
        List<BigInteger> letters = [(BigInteger.One << different.Length) - 1];
        for (int i = 0; i < different.Length; i++)
        {
            for (int j = i + 1; j < different.Length; j++)
            {
                if (Holds(different[i], j))
                {
                    letters = Split(letters, BigInteger.One << i, BigInteger.One << j);
                }

                if (letters.Count > MostLetters)
                {
                    return null;
                }
            }
        }

        return letters;
    }

    /// <summary>Letters that hold both groups are replaced by the two halves that lie inside no other letter; no other letter can lie inside a half.</summary>
    private static List<BigInteger> Split(List<BigInteger> letters, BigInteger first, BigInteger second)
    {
        BigInteger both = first | second;
        List<BigInteger> kept = [.. letters.Where(l => (l & both) != both)];
        List<BigInteger> halves = [.. letters.Where(l => (l & both) == both).SelectMany(l => new[] { l ^ first, l ^ second })];
        kept.AddRange(halves.Where(h => !kept.Exists(l => (h & l) == h)).ToList());
        return kept;
    }

    /// <summary>For every pair not yet covered a letter that takes in, from the largest mean on, each group that none of its groups differs from.</summary>
    private static List<BigInteger> Cover(BigInteger[] different)
    {
        List<BigInteger> letters = [];
        for (int i = 0; i < different.Length; i++)
        {
            for (int j = i; j < different.Length; j++)
            {
                BigInteger pair = (BigInteger.One << i) | (BigInteger.One << j);
                if (!Holds(different[i], j) && !letters.Exists(l => (l & pair) == pair))
                {
                    BigInteger letter = pair;
                    for (int g = 0; g < different.Length; g++)
                    {
                        letter |= (different[g] & letter).IsZero ? BigInteger.One << g : BigInteger.Zero;
                    }

                    letters.Add(letter);
                }
            }
        }

        return letters;
    }

    /// <summary>Takes out of each letter, the last groups first, whoever shares another letter with every other group of it; a letter whose groups all go is dropped.</summary>
    private static List<BigInteger> Sweep(List<BigInteger> letters, int count)
    {
        for (int l = letters.Count - 1; l >= 0; l--)
        {
            for (int i = count - 1; i >= 0; i--)
            {
                if (Holds(letters[l], i) && (SharedElsewhere(letters, l, i) & letters[l]) == letters[l])
                {
                    letters[l] ^= BigInteger.One << i;
                }
            }
        }

        letters.RemoveAll(l => l.IsZero);
        return letters;
    }

    /// <summary>The groups with which group i shares a letter other than l.</summary>
    private static BigInteger SharedElsewhere(List<BigInteger> letters, int l, int i)
    {
        BigInteger shared = BigInteger.Zero;
        for (int other = 0; other < letters.Count; other++)
        {
            if (other != l && Holds(letters[other], i))
            {
                shared |= letters[other];
            }
        }

        return shared;
    }

    /// <summary>The letter whose first group that the other lacks comes earlier goes first.</summary>
    private static int CompareSets(BigInteger x, BigInteger y, int count)
    {
        for (int i = 0; i < count; i++)
        {
            if (Holds(x, i) != Holds(y, i))
            {
                return Holds(x, i) ? -1 : 1;
            }
        }

        return 0;
    }

    private static bool Holds(BigInteger set, int i) => !((set >> i) & BigInteger.One).IsZero;

    private static string Mark(int letter) =>
        letter < Alphabet.Length
            ? Alphabet[letter].ToString()
            : FormattableString.Invariant($"{Alphabet[letter % Alphabet.Length]}{(letter / Alphabet.Length) + 1}");
}
