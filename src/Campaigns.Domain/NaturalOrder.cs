namespace Campaigns.Domain;

/// <summary>The order in which people list names: runs of digits by their value (F2 before F10), everything else by its characters; names that differ only in leading zeros keep a fixed order too.</summary>
public sealed class NaturalOrder : IComparer<string>
{
    private NaturalOrder()
    {
    }

    /// <summary>The one instance.</summary>
    public static NaturalOrder Instance { get; } = new();

    /// <inheritdoc/>
    public int Compare(string? x, string? y)
    {
        ReadOnlySpan<char> a = x;
        ReadOnlySpan<char> b = y;
        while (!a.IsEmpty && !b.IsEmpty)
        {
            int order = char.IsAsciiDigit(a[0]) && char.IsAsciiDigit(b[0])
                ? CompareNumbers(TakeDigits(ref a), TakeDigits(ref b))
                : Take(ref a).CompareTo(Take(ref b));
            if (order != 0)
            {
                return order;
            }
        }

        int rest = a.Length.CompareTo(b.Length);
        return rest != 0 ? rest : string.CompareOrdinal(x, y);
    }

    private static int CompareNumbers(ReadOnlySpan<char> a, ReadOnlySpan<char> b)
    {
        a = a.TrimStart('0');
        b = b.TrimStart('0');
        return a.Length != b.Length ? a.Length.CompareTo(b.Length) : a.SequenceCompareTo(b);
    }

    private static ReadOnlySpan<char> TakeDigits(ref ReadOnlySpan<char> text)
    {
        int end = text.IndexOfAnyExceptInRange('0', '9');
        ReadOnlySpan<char> digits = end < 0 ? text : text[..end];
        text = text[digits.Length..];
        return digits;
    }

    private static char Take(ref ReadOnlySpan<char> text)
    {
        char first = text[0];
        text = text[1..];
        return first;
    }
}
