namespace Campaigns.Catalog.Loading;

/// <summary>Reads typed whole numbers.</summary>
internal static class IntegerText
{
    private const int MostDigits = 18;

    /// <summary>Reads an optional sign and one to eighteen digits, with nothing else.</summary>
    public static bool TryParse(ReadOnlySpan<byte> text, out long value)
    {
        value = 0;
        bool isNegative = text.StartsWith("-"u8);
        if (isNegative || text.StartsWith("+"u8))
        {
            text = text[1..];
        }

        foreach (byte b in text)
        {
            uint digit = (uint)(b - '0');
            if (digit > 9 || text.Length > MostDigits)
            {
                value = 0;
                return false;
            }

            value = (value * 10) + digit;
        }

        value = isNegative ? -value : value;
        return text.Length > 0;
    }
}
