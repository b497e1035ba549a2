using System.Text;

namespace Campaigns.Catalog.Loading;

/// <summary>Unicode normal form C for the letters that <see cref="CompositionTable"/> knows, so that one name has one spelling in bytes.</summary>
/// <remarks>
/// Written out because the runtime leaves text as it is when it runs without cultural data, as this program does.
/// Decompose, order the marks by class, compose (Unicode Standard Annex 15). Other scripts are left as they are.
/// </remarks>
internal static class Composition
{
    // Dialytika and tonos in one: the only mark of the range whose normal form is two characters.
    private const char TwoMarks = '\u0344';

    private static readonly Dictionary<(char Letter, char Mark), char> Composites = CompositionTable.Composites
        .SelectMany(row => row.LettersAndComposites.Chunk(2).Select(pair => (Key: (pair[0], row.Mark), Composite: pair[1])))
        .ToDictionary(entry => entry.Key, entry => entry.Composite);

    private static readonly Dictionary<char, (char Letter, char Mark)> Parts = Composites.ToDictionary(entry => entry.Value, entry => entry.Key);

    private static readonly Dictionary<char, char> Singles = CompositionTable.Singles.Chunk(2).ToDictionary(pair => pair[0], pair => pair[1]);

    /// <summary>The composed form.</summary>
    public static string Compose(string text)
    {
        List<char> chars = new(text.Length + 8);
        foreach (char c in text)
        {
            Decompose(c, chars);
        }

        OrderMarks(chars);
        return Join(chars);
    }

    private static void Decompose(char c, List<char> into)
    {
        if (c == TwoMarks)
        {
            into.AddRange("\u0308\u0301");
        }
        else if (Singles.TryGetValue(c, out char single))
        {
            Decompose(single, into);
        }
        else if (Parts.TryGetValue(c, out (char Letter, char Mark) parts))
        {
            Decompose(parts.Letter, into);
            into.Add(parts.Mark);
        }
        else
        {
            into.Add(c);
        }
    }

    private static void OrderMarks(List<char> chars)
    {
        for (int i = 1; i < chars.Count; i++)
        {
            for (int j = i; j > 0 && ClassOf(chars[j]) > 0 && ClassOf(chars[j - 1]) > ClassOf(chars[j]); j--)
            {
                (chars[j], chars[j - 1]) = (chars[j - 1], chars[j]);
            }
        }
    }

    private static string Join(List<char> chars)
    {
        StringBuilder composed = new(chars.Count);
        int starter = -1;
        int lastClass = -1;
        foreach (char c in chars)
        {
            int ownClass = ClassOf(c);
            bool isBlocked = lastClass >= ownClass && lastClass != -1;
            if (starter >= 0 && !isBlocked && Composites.TryGetValue((composed[starter], c), out char composite))
            {
                composed[starter] = composite;
                continue;
            }

            if (ownClass == 0)
            {
                starter = composed.Length;
                lastClass = -1;
            }
            else
            {
                lastClass = ownClass;
            }

            composed.Append(c);
        }

        return composed.ToString();
    }

    private static int ClassOf(char c) =>
        c is >= '\u0300' and <= '\u036F' ? CompositionTable.Classes[c - '\u0300'] : c is '\u3099' or '\u309A' ? 8 : 0;
}
