namespace Campaigns.Statistics.Numerics;

/// <summary>Exact sums of one group's mantissas about the experiment's origin, for the narrow path of <see cref="ExactMoments"/>.</summary>
public struct GroupSums
{
    internal long Count;
    internal long Sum;
    internal ulong SquaresLow;
    internal ulong SquaresHigh;

    /// <summary>n Q - S^2, never negative; <see cref="ExactMoments"/> has seen to it that n Q fits.</summary>
    internal readonly UInt128 CountTimesSquaredDeviations
    {
        get
        {
            ulong high = Math.BigMul(SquaresLow, (ulong)Count, out ulong low);
            return new UInt128(high + (SquaresHigh * (ulong)Count), low) - (UInt128)Math.BigMul(Sum, Sum);
        }
    }
}
