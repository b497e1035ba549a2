using System.Text;

namespace Campaigns.App.Dashboard.Model;

/// <summary>Orders names as people count: runs of digits by their number, so that E2 comes before E10; everything else by code unit.</summary>
public static class CodeOrder
{
    private const int LongestNumber = 40;

    /// <summary>A text whose ordinal order is that order: before every number its count of digits is put, leading zeros left out.</summary>
    /// <param name="name">Any text.</param>
    /// <returns>The same for names that differ in leading zeros alone. Numbers of more than 40 digits are compared as text.</returns>
    public static string KeyOf(string name)
    {
        if (!name.AsSpan().ContainsAnyInRange('0', '9'))
        {
            return name;
        }

        StringBuilder key = new(name.Length + 4);
        for (int at = 0; at < name.Length;)
        {
            if (!char.IsAsciiDigit(name[at]))
            {
                key.Append(name[at++]);
                continue;
            }

            int end = at;
            while (end < name.Length && char.IsAsciiDigit(name[end]))
            {
                end++;
            }

            ReadOnlySpan<char> digits = name.AsSpan(at, end - at).TrimStart('0');
            key.Append((char)('0' + Math.Min(digits.Length, LongestNumber))).Append(digits);
            at = end;
        }

        return key.ToString();
    }
}
