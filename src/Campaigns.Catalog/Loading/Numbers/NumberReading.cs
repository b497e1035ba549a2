namespace Campaigns.Catalog.Loading;

/// <summary>What a typed text turned out to be where a number is expected; everything after <see cref="Missing"/> is a refusal.</summary>
public enum NumberReading
{
    /// <summary>One number, read exactly.</summary>
    Number,

    /// <summary>A mark for a value that is not there: an empty text, NA or n/a.</summary>
    Missing,

    /// <summary>No number, and no nearer reason.</summary>
    NotANumber,

    /// <summary>A comma where the decimal mark is a point, as in 1,5.</summary>
    DecimalComma,

    /// <summary>A point where the decimal mark is a comma, as in 1.5.</summary>
    DecimalPoint,

    /// <summary>A thousands separator, as in 1,234.5 or 1 234.5 or 1'234.</summary>
    ThousandsSeparator,

    /// <summary>NaN or an infinity.</summary>
    NotFinite,

    /// <summary>A hexadecimal number, as in 0x10.</summary>
    Hexadecimal,

    /// <summary>A truth value, as in TRUE.</summary>
    TruthValue,

    /// <summary>A date, a time or a fraction, as in 2024-05-31 or 1/2.</summary>
    DateLike,

    /// <summary>Digits of another script, full-width ones among them.</summary>
    ForeignDigits,

    /// <summary>A number and its unit, as in 5 mPa.</summary>
    Unit,

    /// <summary>A limit instead of a measurement, as in &lt;0.05.</summary>
    Limit,

    /// <summary>More significant digits than are kept.</summary>
    TooManyDigits,

    /// <summary>A magnitude above the largest double.</summary>
    TooLarge,

    /// <summary>A magnitude below the smallest that keeps all digits of a double.</summary>
    TooSmall,
}
