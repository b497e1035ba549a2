using System.Globalization;
using System.Text;
using System.Text.RegularExpressions;

namespace Campaigns.Catalog.Loading;

/// <summary>Finds why a text is no number, and says what to do about it.</summary>
public static partial class NumberRefusal
{
    private const int LongestExamined = 100;

    /// <summary>The frozen code of a reading, such as <c>decimal-comma</c>.</summary>
    /// <param name="reading">Any reading.</param>
    public static string Code(NumberReading reading) => reading switch
    {
        NumberReading.Number => "number",
        NumberReading.Missing => "missing",
        NumberReading.DecimalComma => "decimal-comma",
        NumberReading.DecimalPoint => "decimal-point",
        NumberReading.ThousandsSeparator => "thousands-separator",
        NumberReading.NotFinite => "not-finite",
        NumberReading.Hexadecimal => "hexadecimal",
        NumberReading.TruthValue => "truth-value",
        NumberReading.DateLike => "date",
        NumberReading.ForeignDigits => "foreign-digits",
        NumberReading.Unit => "unit",
        NumberReading.Limit => "limit",
        NumberReading.TooManyDigits => "too-many-digits",
        NumberReading.TooLarge => "too-large",
        NumberReading.TooSmall => "too-small",
        _ => "not-a-number",
    };

    /// <summary>One sentence: what was typed, why it was refused, and what to do.</summary>
    /// <param name="reading">The reason.</param>
    /// <param name="text">What was typed, UTF-8.</param>
    public static string Explain(NumberReading reading, ReadOnlySpan<byte> text) => $"{ShownText.Quote(AsciiText.Trim(text))} {Advice(reading)}";

    /// <summary>The reason why a text that the scan did not accept is no number.</summary>
    internal static NumberReading Classify(ReadOnlySpan<byte> utf8, DecimalMark mark)
    {
        if (utf8.Length > LongestExamined)
        {
            return NumberReading.NotANumber;
        }

        string text = Encoding.UTF8.GetString(utf8);
        if (text.Any(c => c > '\x7F' && char.IsDigit(c)))
        {
            return NumberReading.ForeignDigits;
        }

        if (text.IndexOfAny(['<', '>', '~', '\u2264', '\u2265', '\u2248', '\u2272', '\u2273']) == 0)
        {
            return NumberReading.Limit;
        }

        text = text.Replace('\u2212', '-');
        return NotFinite().IsMatch(text) ? NumberReading.NotFinite
            : TruthValue().IsMatch(text) ? NumberReading.TruthValue
            : Hexadecimal().IsMatch(text) ? NumberReading.Hexadecimal
            : Thousands().IsMatch(text) ? NumberReading.ThousandsSeparator
            : DateLike().IsMatch(text) ? NumberReading.DateLike
            : mark == DecimalMark.Point && OneComma().IsMatch(text) ? NumberReading.DecimalComma
            : mark == DecimalMark.Comma && OnePoint().IsMatch(text) ? NumberReading.DecimalPoint
            : BrokenExponent().IsMatch(text) ? NumberReading.NotANumber
            : Unit().IsMatch(text) ? NumberReading.Unit
            : NumberReading.NotANumber;
    }

    private static string Advice(NumberReading reading) => reading switch
    {
        NumberReading.Missing => "is no value: write a number.",
        NumberReading.DecimalComma => "has a comma, but the decimal mark is the point: if the file has decimal commas say --decimal comma, if the comma separates thousands take it out.",
        NumberReading.DecimalPoint => "has a point, but the decimal mark is the comma: if the file has decimal points say --decimal point, if the point separates thousands take it out.",
        NumberReading.ThousandsSeparator => "has separators between thousands: write the number without them.",
        NumberReading.NotFinite => "is not a finite number: write the value, or leave the field empty if there is none.",
        NumberReading.Hexadecimal => "is a hexadecimal number: write it in decimal digits.",
        NumberReading.TruthValue => "is a truth value: write a number.",
        NumberReading.DateLike => "looks like a date, a time or a fraction: write the number (a spreadsheet may have changed it).",
        NumberReading.ForeignDigits => "has digits other than 0 to 9: write those.",
        NumberReading.Unit => "has a unit or other text after the number: write the number alone, and the unit in the plan.",
        NumberReading.Limit => "is a limit, not a measurement: decide before the data how values beyond a limit count, then write that number, or NA.",
        NumberReading.TooManyDigits => string.Create(CultureInfo.InvariantCulture, $"has more than {DecimalText.MostDigits} significant digits: write fewer."),
        NumberReading.TooLarge => "is larger than any number that can be computed with (about 1.8e308): use a larger unit.",
        NumberReading.TooSmall => "is smaller than can be computed with (1e-307): use a smaller unit.",
        _ => "is not a number: write a number, or leave the field empty if there is none.",
    };

    [GeneratedRegex(@"^[+-]?\s*(nan|1\.#\w+|inf|infinity|∞)$", RegexOptions.IgnoreCase | RegexOptions.CultureInvariant)]
    private static partial Regex NotFinite();

    [GeneratedRegex(@"^(true|false|yes|no)$", RegexOptions.IgnoreCase | RegexOptions.CultureInvariant)]
    private static partial Regex TruthValue();

    [GeneratedRegex(@"^[+-]?(0x|&h)[0-9a-f]+$", RegexOptions.IgnoreCase | RegexOptions.CultureInvariant)]
    private static partial Regex Hexadecimal();

    // Digits parted by blanks, apostrophes or underscores; or both marks; or one mark again and again, with groups of three.
    [GeneratedRegex(@"^[+-]?([0-9]+([\s'’_˙][0-9]+)+([.,][0-9]*)?|(?=.*,)(?=.*\.)[0-9.,]+|[0-9]{1,3}(,[0-9]{3}){2,}|[0-9]{1,3}(\.[0-9]{3}){2,})(e[+-]?[0-9]+)?$", RegexOptions.IgnoreCase | RegexOptions.CultureInvariant)]
    private static partial Regex Thousands();

    [GeneratedRegex(@"^([0-9]{1,4}\s*[-/.]\s*[0-9]{1,2}\s*[-/.]\s*[0-9]{1,4}([T\s].*)?|[0-9]{1,2}:[0-9]{2}(:[0-9]{2}([.,][0-9]*)?)?|[0-9]+\s*/\s*[0-9]+|[0-9]{1,4}-[0-9]{1,2}|[0-9]{1,2}[-. ]*[a-z]{3,9}[-. ]+[0-9]{2,4}|[0-9]{1,2}-[a-z]{3}|[a-z]{3}-[0-9]{2,4})$", RegexOptions.IgnoreCase | RegexOptions.CultureInvariant)]
    private static partial Regex DateLike();

    [GeneratedRegex(@"^[+-]?([0-9]+,[0-9]*|,[0-9]+)(e[+-]?[0-9]+)?$", RegexOptions.IgnoreCase | RegexOptions.CultureInvariant)]
    private static partial Regex OneComma();

    [GeneratedRegex(@"^[+-]?([0-9]+\.[0-9]*|\.[0-9]+)(e[+-]?[0-9]+)?$", RegexOptions.IgnoreCase | RegexOptions.CultureInvariant)]
    private static partial Regex OnePoint();

    [GeneratedRegex(@"^[+-]?[0-9.,]+e[+-]?$", RegexOptions.IgnoreCase | RegexOptions.CultureInvariant)]
    private static partial Regex BrokenExponent();

    [GeneratedRegex(@"^[+-]?([0-9]+([.,][0-9]*)?|[.,][0-9]+)(e[+-]?[0-9]+)?\s*[%‰°µ\p{L}$€£].*$", RegexOptions.IgnoreCase | RegexOptions.CultureInvariant)]
    private static partial Regex Unit();
}
