namespace Campaigns.App.Dashboard.Model;

/// <summary>Orders names as people count: runs of digits by their number, so that E2 comes before E10; everything else by code unit.</summary>
public sealed class CodeOrder : IComparer<string>
{
    /// <summary>The order.</summary>
    public static CodeOrder Instance { get; } = new();

    /// <inheritdoc/>
    public int Compare(string? x, string? y)
    {
        ReadOnlySpan<char> a = x, b = y;

        // What both begin with needs no look, except the digits of a number that may go on.
        int same = a.CommonPrefixLength(b);
        while (same > 0 && char.IsAsciiDigit(a[same - 1]))
        {
            same--;
        }

        int i = same, j = same;
        while (i < a.Length && j < b.Length)
        {
            if (!char.IsAsciiDigit(a[i]) || !char.IsAsciiDigit(b[j]))
            {
                if (a[i] != b[j])
                {
                    return a[i].CompareTo(b[j]);
                }

                i++;
                j++;
                continue;
            }

            ReadOnlySpan<char> left = DigitsAt(a, i), right = DigitsAt(b, j);
            int sign = CompareDigits(left, right);
            if (sign != 0)
            {
                return sign;
            }

            i += left.Length;
            j += right.Length;
        }

        int rest = (a.Length - i).CompareTo(b.Length - j);
        return rest != 0 ? rest : a.SequenceCompareTo(b);
    }

    private static ReadOnlySpan<char> DigitsAt(ReadOnlySpan<char> text, int at)
    {
        int end = at;
        while (end < text.Length && char.IsAsciiDigit(text[end]))
        {
            end++;
        }

        return text[at..end];
    }

    private static int CompareDigits(ReadOnlySpan<char> left, ReadOnlySpan<char> right)
    {
        left = left.TrimStart('0');
        right = right.TrimStart('0');
        return left.Length != right.Length ? left.Length.CompareTo(right.Length) : left.SequenceCompareTo(right);
    }
}
