namespace Campaigns.Statistics.Probability;

/// <summary>The level at which an error rate is held: alpha for the familywise error rate, q for the false discovery rate; in (0, 1).</summary>
/// <remarks><c>default</c> was never given a value and throws when read.</remarks>
public readonly record struct SignificanceLevel
{
    private readonly double _value;

    /// <summary>Makes a level.</summary>
    /// <param name="value">In the open interval (0, 1).</param>
    /// <exception cref="ArgumentOutOfRangeException">Outside (0, 1), or NaN.</exception>
    public SignificanceLevel(double value)
    {
        if (!(value > 0 && value < 1))
        {
            throw new ArgumentOutOfRangeException(nameof(value), value, "A level lies between 0 and 1, both excluded.");
        }

        _value = value;
    }

    /// <summary>The level as a number in (0, 1).</summary>
    /// <exception cref="InvalidOperationException">The level was never given.</exception>
    public double Value => _value > 0 ? _value : throw new InvalidOperationException("This level was never given.");

    /// <summary>The one rejection rule of the whole program: a hypothesis is rejected if and only if its adjusted p-value is at most the level.</summary>
    /// <param name="adjusted">The adjusted p-value that the family's correction gave.</param>
    public bool Rejects(PValue adjusted) => adjusted.Value <= Value;

    /// <summary>The level in invariant round-trip form.</summary>
    public override string ToString() => FormattableString.Invariant($"{_value:R}");
}
