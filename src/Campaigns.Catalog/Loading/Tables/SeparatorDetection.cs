using System.Text;

namespace Campaigns.Catalog.Loading;

/// <summary>Finds the separator of a file from its header line.</summary>
internal static class SeparatorDetection
{
    private static readonly char[] Candidates = [',', ';', '\t'];

    /// <summary>A first line such as <c>sep=;</c>, which some spreadsheets write to name the separator.</summary>
    /// <param name="head">The start of the text.</param>
    /// <param name="length">Bytes of the line, its break included.</param>
    /// <returns>The separator, or null where there is no such line.</returns>
    public static char? Hint(ReadOnlySpan<byte> head, out int length)
    {
        length = 0;
        if (head.Length < 6 || !Ascii.EqualsIgnoreCase(head[..4], "sep="u8) || !Candidates.Contains((char)head[4]) || head[5] is not ((byte)'\r' or (byte)'\n'))
        {
            return null;
        }

        length = head[5] == '\r' && head.Length > 6 && head[6] == '\n' ? 7 : 6;
        return (char)head[4];
    }

    /// <summary>The separator under which the header line has the most of the wanted names, and among those the one that it has most often.</summary>
    /// <param name="head">The start of the text.</param>
    /// <param name="wanted">Names of columns that the file may have, in any case.</param>
    public static char Detect(ReadOnlySpan<byte> head, IReadOnlyCollection<string> wanted)
    {
        string line = HeaderLine(head);
        char best = Candidates[0];
        (int Names, int Fields) bestCount = (-1, 0);
        foreach (char candidate in Candidates)
        {
            List<string> fields = Split(line, candidate);
            (int Names, int Fields) count = (fields.Count(f => wanted.Contains(f, StringComparer.OrdinalIgnoreCase)), fields.Count);
            if (count.CompareTo(bestCount) > 0)
            {
                (best, bestCount) = (candidate, count);
            }
        }

        return best;
    }

    private static string HeaderLine(ReadOnlySpan<byte> head)
    {
        int start = 0;
        while (start < head.Length && head[start] is (byte)'\r' or (byte)'\n')
        {
            start++;
        }

        bool isQuoted = false;
        int end = start;
        for (; end < head.Length && (isQuoted || head[end] is not ((byte)'\r' or (byte)'\n')); end++)
        {
            isQuoted ^= head[end] == '"';
        }

        return Encoding.UTF8.GetString(head[start..end]);
    }

    private static List<string> Split(string line, char separator)
    {
        List<string> fields = [];
        bool isQuoted = false;
        int start = 0;
        for (int i = 0; i <= line.Length; i++)
        {
            if (i == line.Length || (line[i] == separator && !isQuoted))
            {
                fields.Add(line[start..i].Trim(' ', '\t', '"'));
                start = i + 1;
            }
            else
            {
                isQuoted ^= line[i] == '"';
            }
        }

        return fields;
    }
}
