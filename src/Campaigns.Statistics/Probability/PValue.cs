namespace Campaigns.Statistics.Probability;

/// <summary>A probability in [0, 1] that a test reports, kept beside its natural logarithm so that tails below the smallest double stay ranked and printable.</summary>
/// <remarks>
/// Order and equality are those of the logarithm: two p-values that both underflow to zero as doubles still differ.
/// <c>default(PValue)</c> was never given a value and throws when read: an unfilled slot must not look like p = 0, the most significant value there is.
/// </remarks>
public readonly struct PValue : IEquatable<PValue>, IComparable<PValue>
{
    private readonly double _value;

    // NaN where the logarithm is that of the value and is computed when it is asked for.
    private readonly double _log;

    private PValue(double value, double log)
    {
        _value = value;
        _log = log;
    }

    /// <summary>No p-value is 0 with the logarithm 0, so that pair marks one that was never given.</summary>
    private bool IsGiven => _value != 0 || _log != 0;

    /// <summary>p = 1: what a planned but untested hypothesis counts as.</summary>
    public static PValue One { get; } = new(1, 0);

    /// <summary>The p-value as a double in [0, 1]; 0 only where it lies below the smallest double (or was given as 0).</summary>
    /// <exception cref="InvalidOperationException">The value was never given.</exception>
    public double Value => IsGiven ? _value : throw NeverGiven();

    /// <summary>The natural logarithm of the p-value, at most 0; negative infinity only where 0 itself was given.</summary>
    /// <exception cref="InvalidOperationException">The value was never given.</exception>
    public double Log => !IsGiven ? throw NeverGiven() : double.IsNaN(_log) ? Math.Log(_value) : _log;

    /// <summary>Whether the logarithm was given, and is not just that of the value.</summary>
    internal bool HasOwnLog => !double.IsNaN(_log);

    /// <summary>Whether the p-value is positive but below the smallest positive double, so that only its logarithm tells it.</summary>
    public bool IsBelowDoubleRange => Value == 0 && double.IsFinite(_log);

    /// <summary>Makes a p-value from a double.</summary>
    /// <param name="value">In [0, 1].</param>
    /// <exception cref="ArgumentOutOfRangeException">NaN, negative or above 1.</exception>
    public static PValue FromValue(double value)
    {
        if (!(value >= 0 && value <= 1))
        {
            throw new ArgumentOutOfRangeException(nameof(value), value, "A p-value lies in [0, 1].");
        }

        return new PValue(value, double.NaN);
    }

    /// <summary>Makes a p-value from its double and its natural logarithm, where both were computed, each to its own accuracy.</summary>
    /// <param name="value">In [0, 1].</param>
    /// <param name="log">At most 0; the logarithm of <paramref name="value"/>, or of a number too small to be a double.</param>
    /// <exception cref="ArgumentOutOfRangeException">Either is outside its range.</exception>
    public static PValue FromValueAndLog(double value, double log)
    {
        if (!(value >= 0 && value <= 1))
        {
            throw new ArgumentOutOfRangeException(nameof(value), value, "A p-value lies in [0, 1].");
        }

        if (!(log <= 0))
        {
            throw new ArgumentOutOfRangeException(nameof(log), log, "The logarithm of a p-value is at most 0.");
        }

        return new PValue(value, value == 0 && log == 0 ? throw new ArgumentException("The logarithm of 0 is not 0.", nameof(log)) : log);
    }

    /// <summary>Makes a p-value from its natural logarithm.</summary>
    /// <param name="log">At most 0; negative infinity gives p = 0.</param>
    /// <exception cref="ArgumentOutOfRangeException">NaN or positive.</exception>
    public static PValue FromLog(double log) => FromValueAndLog(log <= 0 ? Math.Exp(log) : double.NaN, log);

    /// <inheritdoc/>
    public int CompareTo(PValue other) => Log.CompareTo(other.Log);

    /// <inheritdoc/>
    public bool Equals(PValue other) => IsGiven == other.IsGiven && (!IsGiven || (_value.Equals(other._value) && Log.Equals(other.Log)));

    /// <inheritdoc/>
    public override bool Equals(object? obj) => obj is PValue other && Equals(other);

    /// <inheritdoc/>
    public override int GetHashCode() => _value.GetHashCode();

    /// <summary>The value in invariant round-trip form, or as "exp(ln p)" below the range of doubles.</summary>
    public override string ToString() =>
        !IsGiven ? "(no p-value)"
        : IsBelowDoubleRange ? FormattableString.Invariant($"exp({_log:R})")
        : FormattableString.Invariant($"{_value:R}");

    /// <summary>Whether both are the same p-value.</summary>
    public static bool operator ==(PValue left, PValue right) => left.Equals(right);

    /// <summary>Whether they differ.</summary>
    public static bool operator !=(PValue left, PValue right) => !left.Equals(right);

    /// <summary>Whether the first is the smaller p-value.</summary>
    public static bool operator <(PValue left, PValue right) => left.CompareTo(right) < 0;

    /// <summary>Whether the first is the larger p-value.</summary>
    public static bool operator >(PValue left, PValue right) => left.CompareTo(right) > 0;

    /// <summary>Whether the first is at most the second.</summary>
    public static bool operator <=(PValue left, PValue right) => left.CompareTo(right) <= 0;

    /// <summary>Whether the first is at least the second.</summary>
    public static bool operator >=(PValue left, PValue right) => left.CompareTo(right) >= 0;

    private static InvalidOperationException NeverGiven() => new("This p-value was never given.");
}
