using System.Numerics;

namespace Campaigns.Catalog.Loading;

/// <summary>Reads one typed number exactly, and refuses whatever could silently become another one.</summary>
/// <remarks>
/// A number is: an optional sign (+, - or U+2212), digits with at most one decimal mark among or beside them, and an optional exponent (e or E,
/// an optional sign, digits). ASCII blanks around it are ignored. Nothing else is guessed: see <see cref="NumberReading"/>.
/// </remarks>
public static class DecimalText
{
    /// <summary>The most significant digits that a number may have; leading zeros do not count.</summary>
    public const int MostDigits = 400;

    /// <summary>The smallest decimal exponent of the leading digit: 1e-307 still has all digits of a double.</summary>
    internal const int SmallestExponent = -307;

    private const int NarrowDigits = 18;
    private const long NarrowUnit = 1_000_000_000_000_000_000;
    private const int LargestTypedExponent = 9_999_999;

    /// <summary>Reads one measurement.</summary>
    /// <param name="text">UTF-8, of any length.</param>
    /// <param name="mark">The decimal mark of the file.</param>
    /// <param name="value">The number, where the answer is <see cref="NumberReading.Number"/>.</param>
    /// <returns>Number, missing, or the reason of the refusal; never an exception.</returns>
    public static NumberReading Parse(ReadOnlySpan<byte> text, DecimalMark mark, out ParsedDecimal value)
    {
        text = AsciiText.Trim(text);
        if (TryParseShort(text, MarkByte(mark), out value))
        {
            return NumberReading.Number;
        }

        NumberReading reading = Scan(text, mark, out value);
        return reading == NumberReading.Number ? Bounded(ref value) : reading;
    }

    /// <summary>Whether a text stands for a value that is not there: empty or blank, NA or n/a in any case.</summary>
    /// <param name="text">UTF-8.</param>
    public static bool IsMissing(ReadOnlySpan<byte> text)
    {
        text = AsciiText.Trim(text);
        return text.Length switch
        {
            0 => true,
            2 => (text[0] | 0x20) == 'n' && (text[1] | 0x20) == 'a',
            3 => (text[0] | 0x20) == 'n' && text[1] == '/' && (text[2] | 0x20) == 'a',
            _ => false,
        };
    }

    /// <summary>Reads a number of any magnitude: the decimals may be far outside the range of doubles.</summary>
    internal static NumberReading Scan(ReadOnlySpan<byte> text, DecimalMark mark, out ParsedDecimal value)
    {
        value = default;
        int at = SignLength(text, out bool isNegative);
        Span<byte> digits = stackalloc byte[MostDigits];
        int count = 0;
        int decimals = 0;
        bool anyDigit = false;
        bool afterMark = false;
        bool tooMany = false;
        byte markByte = MarkByte(mark);
        for (; at < text.Length; at++)
        {
            uint digit = (uint)(text[at] - '0');
            if (digit <= 9)
            {
                anyDigit = true;
                decimals += afterMark ? 1 : 0;
                if (count == MostDigits)
                {
                    tooMany = true;
                }
                else if (digit != 0 || count > 0)
                {
                    digits[count++] = (byte)digit;
                }
            }
            else if (text[at] == markByte && !afterMark)
            {
                afterMark = true;
            }
            else
            {
                break;
            }
        }

        if (!anyDigit || !TryReadExponent(text[at..], out int exponent))
        {
            return IsMissing(text) ? NumberReading.Missing : NumberRefusal.Classify(text, mark);
        }

        if (tooMany)
        {
            return NumberReading.TooManyDigits;
        }

        value = Assemble(digits[..count], isNegative, decimals - exponent);
        return NumberReading.Number;
    }

    private static bool TryParseShort(ReadOnlySpan<byte> text, byte mark, out ParsedDecimal value)
    {
        value = default;
        if (text.Length is 0 or > NarrowDigits)
        {
            return false;
        }

        int at = text[0] is (byte)'-' or (byte)'+' ? 1 : 0;
        int first = at;
        int markAt = -1;
        long mantissa = 0;
        for (; at < text.Length; at++)
        {
            uint digit = (uint)(text[at] - '0');
            if (digit <= 9)
            {
                mantissa = (mantissa * 10) + digit;
            }
            else if (text[at] == mark && markAt < 0)
            {
                markAt = at;
            }
            else
            {
                return false;
            }
        }

        if (text.Length - first - (markAt < 0 ? 0 : 1) == 0)
        {
            return false;
        }

        value = new ParsedDecimal(text[0] == '-' ? -mantissa : mantissa, markAt < 0 ? 0 : text.Length - markAt - 1);
        return true;
    }

    private static int SignLength(ReadOnlySpan<byte> text, out bool isNegative)
    {
        isNegative = text.StartsWith("-"u8) || text.StartsWith("\u2212"u8);
        return text.StartsWith("-"u8) || text.StartsWith("+"u8) ? 1 : isNegative ? 3 : 0;
    }

    private static bool TryReadExponent(ReadOnlySpan<byte> text, out int exponent)
    {
        exponent = 0;
        if (text.IsEmpty)
        {
            return true;
        }

        if ((text[0] | 0x20) != 'e')
        {
            return false;
        }

        text = text[1..];
        text = text[SignLength(text, out bool isNegative)..];
        foreach (byte b in text)
        {
            if (b is < (byte)'0' or > (byte)'9')
            {
                return false;
            }

            exponent = Math.Min((exponent * 10) + (b - '0'), LargestTypedExponent);
        }

        exponent = isNegative ? -exponent : exponent;
        return text.Length > 0;
    }

    private static ParsedDecimal Assemble(ReadOnlySpan<byte> digits, bool isNegative, int decimals)
    {
        if (digits.IsEmpty)
        {
            // A zero keeps its decimals as typed, but not so many that scaling by them could overflow.
            return new ParsedDecimal(0, Math.Clamp(decimals, 0, MostDigits));
        }

        BigInteger wide = BigInteger.Zero;
        long part = 0;
        long unit = 1;
        foreach (byte digit in digits)
        {
            part = (part * 10) + digit;
            unit *= 10;
            if (unit == NarrowUnit && digits.Length > NarrowDigits)
            {
                wide = (wide * unit) + part;
                part = 0;
                unit = 1;
            }
        }

        if (digits.Length <= NarrowDigits)
        {
            return new ParsedDecimal(isNegative ? -part : part, decimals);
        }

        wide = (wide * unit) + part;
        return new ParsedDecimal(isNegative ? -wide : wide, decimals);
    }

    private static NumberReading Bounded(ref ParsedDecimal value)
    {
        if (!value.IsWide && value.Mantissa == 0)
        {
            return NumberReading.Number;
        }

        long leading = LeadingExponent(value);
        NumberReading reading =
            leading < SmallestExponent ? NumberReading.TooSmall
            : leading > 308 || (leading == 308 && !double.IsFinite(value.ToDouble())) ? NumberReading.TooLarge
            : NumberReading.Number;
        if (reading != NumberReading.Number)
        {
            value = default;
        }

        return reading;
    }

    private static long LeadingExponent(ParsedDecimal value)
    {
        int digits = 0;
        if (value.IsWide)
        {
            digits = BigInteger.Abs(value.WideMantissa).ToString(System.Globalization.CultureInfo.InvariantCulture).Length;
        }
        else
        {
            for (long rest = Math.Abs(value.Mantissa); rest > 0; rest /= 10)
            {
                digits++;
            }
        }

        return digits - 1L - value.Decimals;
    }

    private static byte MarkByte(DecimalMark mark) => mark == DecimalMark.Comma ? (byte)',' : (byte)'.';
}
