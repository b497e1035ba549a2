namespace Campaigns.Benchmarks.Generating;

/// <summary>Repeatable draws made of integers alone, so that a synthetic campaign is the same on every machine.</summary>
/// <remarks>Each draw is a pure function of a purpose and an index (the finaliser of splitmix64: Steele, Lea and Flood 2014), so rows can be made in any order.</remarks>
internal static class Draws
{
    private const ulong Step = 0x9E3779B97F4A7C15;

    /// <summary>64 random bits.</summary>
    public static ulong Bits(int purpose, long index) => Mix(Mix((ulong)purpose * Step) ^ ((ulong)index * 0xD1342543DE82EF95));

    /// <summary>A whole number from 0 to <paramref name="bound"/> - 1; the bias is below 2^-32 for the bounds in use here.</summary>
    public static int Below(int bound, int purpose, long index) => (int)((Bits(purpose, index) >> 32) * (ulong)bound >> 32);

    /// <summary>A bell-shaped whole number with mean 0 and standard deviation 65,536: the sum of twelve 16-bit uniforms less its mean.</summary>
    public static long Bell(int purpose, long index)
    {
        long sum = -6 * 65_535;
        for (int part = 0; part < 3; part++)
        {
            ulong bits = Bits(purpose + part, index);
            sum += (long)((bits & 0xFFFF) + (bits >> 16 & 0xFFFF) + (bits >> 32 & 0xFFFF) + (bits >> 48));
        }

        return sum;
    }

    private static ulong Mix(ulong x)
    {
        x += Step;
        x = (x ^ (x >> 30)) * 0xBF58476D1CE4E5B9;
        x = (x ^ (x >> 27)) * 0x94D049BB133111EB;
        return x ^ (x >> 31);
    }
}
