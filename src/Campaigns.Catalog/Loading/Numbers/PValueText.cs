using System.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Loading;

/// <summary>Reads one typed p-value, with its logarithm, however small it is.</summary>
public static class PValueText
{
    private const double SmallestNormal = 2.2250738585072014e-308;

    /// <summary>Reads a p-value in [0, 1].</summary>
    /// <param name="text">UTF-8; the same forms of numbers as <see cref="DecimalText"/> takes, without a lower limit of magnitude.</param>
    /// <param name="mark">The decimal mark of the file.</param>
    /// <param name="value">The p-value: below the smallest double only its logarithm tells it.</param>
    /// <param name="reason">One sentence, where the answer is false.</param>
    /// <returns>Whether the text is a p-value; a missing one (see <see cref="DecimalText.IsMissing"/>) is not.</returns>
    public static bool TryParse(ReadOnlySpan<byte> text, DecimalMark mark, out PValue value, out string reason)
    {
        value = default;
        reason = "";
        text = AsciiText.Trim(text);
        NumberReading reading = DecimalText.Scan(text, mark, out ParsedDecimal number);
        if (reading != NumberReading.Number)
        {
            reason = NumberRefusal.Explain(reading, text);
            return false;
        }

        if (number.WideMantissa.Sign < 0 || ExceedsOne(number))
        {
            reason = $"{ShownText.Quote(text)} is no p-value: it must lie between 0 and 1.";
            return false;
        }

        // Subnormal doubles have lost digits, so their logarithm is taken from the decimal.
        double nearest = number.ToDouble();
        value = nearest >= SmallestNormal || number.WideMantissa.IsZero
            ? PValue.FromValue(nearest)
            : PValue.FromValueAndLog(nearest, BigInteger.Log(number.WideMantissa) - (number.Decimals * Math.Log(10)));
        return true;
    }

    private static bool ExceedsOne(ParsedDecimal number) =>
        number.Decimals <= 0
            ? number.WideMantissa > (number.Decimals == 0 ? BigInteger.One : BigInteger.Zero)
            : number.Decimals <= DecimalText.MostDigits && number.WideMantissa > BigInteger.Pow(10, number.Decimals);
}
