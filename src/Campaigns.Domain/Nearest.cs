namespace Campaigns.Domain;

/// <summary>Finds the known word that a mistyped one was probably meant to be.</summary>
public static class Nearest
{
    private const int LongestCompared = 100;

    /// <summary>The candidate nearest to a word, or null when none is near enough to be worth naming.</summary>
    /// <param name="word">What was typed; case does not count.</param>
    /// <param name="candidates">The words that are known.</param>
    /// <returns>
    /// The candidate with the fewest changes, of several the first that has the same letters (they were swapped), else the first; null if that takes more than one change in three characters of the longer word
    /// (one change is always allowed from two characters on).
    /// </returns>
    /// <remarks>Changes: one character put in, taken out or replaced, or two neighbours swapped (Damerau 1964; each stretch changed once).</remarks>
    public static string? Of(string word, IEnumerable<string> candidates)
    {
        ArgumentNullException.ThrowIfNull(word);
        ArgumentNullException.ThrowIfNull(candidates);
        string typed = word.Trim().ToLowerInvariant();
        string? nearest = null;
        int fewest = int.MaxValue;
        bool isSwapped = false;
        if (typed.Length is 0 or > LongestCompared)
        {
            return null;
        }

        foreach (string candidate in candidates)
        {
            string known = candidate.ToLowerInvariant();
            int longer = Math.Max(known.Length, typed.Length);
            int allowed = longer < 2 ? 0 : Math.Max(1, longer / 3);
            if (Math.Abs(known.Length - typed.Length) > allowed)
            {
                continue;
            }

            int changes = Changes(typed, known);
            bool hasSameLetters = known.Length == typed.Length && known.Order().SequenceEqual(typed.Order());
            if (changes <= allowed && (changes < fewest || (changes == fewest && hasSameLetters && !isSwapped)))
            {
                (nearest, fewest, isSwapped) = (candidate, changes, hasSameLetters);
            }
        }

        return nearest;
    }

    private static int Changes(string a, string b)
    {
        int[,] cost = new int[a.Length + 1, b.Length + 1];
        for (int i = 0; i <= a.Length; i++)
        {
            for (int j = 0; j <= b.Length; j++)
            {
                if (i == 0 || j == 0)
                {
                    cost[i, j] = i + j;
                    continue;
                }

                int replaced = cost[i - 1, j - 1] + (a[i - 1] == b[j - 1] ? 0 : 1);
                cost[i, j] = Math.Min(replaced, Math.Min(cost[i - 1, j], cost[i, j - 1]) + 1);
                if (i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1])
                {
                    cost[i, j] = Math.Min(cost[i, j], cost[i - 2, j - 2] + 1);
                }
            }
        }

        return cost[a.Length, b.Length];
    }
}
