namespace Campaigns.Statistics.Numerics;

/// <summary>Exact sums of one group's mantissas about the experiment's origin, for the narrow path of <see cref="ExactMoments"/>.</summary>
public struct GroupSums
{
    internal long Count;
    internal long Sum;
    internal ulong SquaresLow;
    internal ulong SquaresHigh;

    /// <summary>n Q, which the caller knows to fit.</summary>
    internal readonly UInt128 SquaresTimesCount
    {
        get
        {
            ulong high = Math.BigMul(SquaresLow, (ulong)Count, out ulong low);
            return new(high + (SquaresHigh * (ulong)Count), low);
        }
    }
}
