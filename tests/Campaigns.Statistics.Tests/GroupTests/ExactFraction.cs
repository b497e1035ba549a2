using System.Numerics;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>A fraction of integers of any size, for oracles.</summary>
internal readonly struct ExactFraction
{
    private readonly BigInteger _above;
    private readonly BigInteger _below;

    private ExactFraction(BigInteger above, BigInteger below)
    {
        var common = BigInteger.GreatestCommonDivisor(above, below);
        _above = above / common * below.Sign;
        _below = BigInteger.Abs(below / common);
    }

    public static ExactFraction Of(BigInteger value) => new(value, 1);

    public static ExactFraction operator +(ExactFraction a, ExactFraction b) => new((a._above * b._below) + (b._above * a._below), a._below * b._below);

    public static ExactFraction operator -(ExactFraction a, ExactFraction b) => new((a._above * b._below) - (b._above * a._below), a._below * b._below);

    public static ExactFraction operator *(ExactFraction a, ExactFraction b) => new(a._above * b._above, a._below * b._below);

    public static ExactFraction operator /(ExactFraction a, ExactFraction b) => new(a._above * b._below, a._below * b._above);

    public static ExactFraction operator /(ExactFraction a, int b) => new(a._above, a._below * b);

    /// <summary>Cut after at least 120 bits, then rounded by the conversion of integers.</summary>
    public double ToDouble()
    {
        long shift = 120 - (long)(BigInteger.Abs(_above).GetBitLength() - _below.GetBitLength());
        BigInteger quotient = shift >= 0 ? (_above << (int)shift) / _below : _above / (_below << (int)-shift);

        // The conversion of big integers to double cuts off; of 53 bits it is exact.
        int drop = (int)Math.Max(0, (long)BigInteger.Abs(quotient).GetBitLength() - 53);
        BigInteger half = drop > 0 ? BigInteger.One << (drop - 1) : 0;
        return Math.ScaleB((double)((quotient + half) >> drop), (int)(drop - shift));
    }
}
