namespace Campaigns.Statistics.Planning;

/// <summary>How many experiments of a campaign have a real effect, as a planner assumes it.</summary>
/// <remarks>Two models. A share: every experiment has one with the same probability, independently of the others, so that their number itself is a matter of chance. A number: exactly so many have one, and which is not known.</remarks>
public sealed record RealEffects
{
    private RealEffects(double? share, int? number)
    {
        Share = share;
        Number = number;
    }

    /// <summary>The probability with which an experiment has a real effect, in [0, 1]; null where their number is fixed.</summary>
    public double? Share { get; }

    /// <summary>The fixed number of real effects, at least 0; null where only a share is assumed.</summary>
    public int? Number { get; }

    /// <summary>Every experiment has a real effect with the same probability.</summary>
    /// <param name="share">In [0, 1].</param>
    /// <exception cref="ArgumentOutOfRangeException">Outside [0, 1], or NaN.</exception>
    public static RealEffects OfShare(double share) =>
        share is >= 0 and <= 1
            ? new(share, null)
            : throw new ArgumentOutOfRangeException(nameof(share), share, "A share of real effects lies in [0, 1].");

    /// <summary>Exactly so many experiments have a real effect.</summary>
    /// <param name="number">At least 0.</param>
    /// <exception cref="ArgumentOutOfRangeException">Negative.</exception>
    public static RealEffects OfNumber(int number)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(number);
        return new(null, number);
    }
}
