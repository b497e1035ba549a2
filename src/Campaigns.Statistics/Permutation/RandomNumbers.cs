using System.Numerics;
using System.Runtime.CompilerServices;

namespace Campaigns.Statistics.Permutation;

/// <summary>A stream of repeatable random numbers: the generator SFC64, one of 2^64 streams of one of 2^64 seeds.</summary>
/// <remarks>
/// Streams never overlap: every step is a bijection of a state that holds its own step count, so two streams that start apart are apart at each step, for 2^64 steps.
/// Work that is cut into pieces, each with its own stream, therefore gives the same result on one core and on many.
/// A mutable struct, for loops that keep it in registers: pass it by reference, a copy repeats the numbers. <c>default</c> was never seeded and is no stream.
/// Source: C. Doty-Humphrey, PractRand (public domain), generator sfc64 with its 18 rounds after seeding with three words; here the seed, the stream and 0. Bounded numbers: D. Lemire, Fast random integer generation in an interval, ACM Transactions on Modeling and Computer Simulation 29(1), 2019.
/// </remarks>
public struct RandomNumbers
{
    private const int RoundsAfterSeeding = 18;

    private ulong _a;
    private ulong _b;
    private ulong _c;
    private ulong _counter;

    /// <summary>Starts a stream.</summary>
    /// <param name="seed">Any number.</param>
    /// <param name="stream">Which of the seed's streams; any number.</param>
    public RandomNumbers(ulong seed, ulong stream)
    {
        _a = seed;
        _b = stream;
        _counter = 1;
        for (int i = 0; i < RoundsAfterSeeding; i++)
        {
            Next();
        }
    }

    /// <summary>The next 64 random bits.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public ulong Next()
    {
        ulong result = _a + _b + _counter++;
        _a = _b ^ (_b >> 11);
        _b = _c + (_c << 3);
        _c = BitOperations.RotateLeft(_c, 24) + result;
        return result;
    }

    /// <summary>A whole number from 0 to <paramref name="bound"/> - 1, each with exactly the same probability.</summary>
    /// <param name="bound">At least 1; 0 gives 0.</param>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public uint Below(uint bound)
    {
        ulong product = (Next() >> 32) * bound;

        // Draws again where the product belongs to the few numbers that are left over when 2^32 is shared out; the division is hardly ever reached.
        while ((uint)product < bound && (uint)product < (0u - bound) % bound)
        {
            product = (Next() >> 32) * bound;
        }

        return (uint)(product >> 32);
    }
}
