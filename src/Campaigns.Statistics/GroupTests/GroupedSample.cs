using System.Numerics;
using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.GroupTests;

/// <summary>The observations of one experiment as the decimal numbers that were typed: value i is mantissa i times 10 to the power of minus <see cref="Decimals"/> over <see cref="Divisor"/>, and belongs to group <see cref="Groups"/>[i].</summary>
/// <remarks>
/// The divisor is 1 for what was typed; means of several readings keep their exact value as an integer over a common divisor.
/// Two tiers. Nearly every experiment fits the first: mantissas are 64-bit integers in <see cref="Mantissas"/>.
/// Where the typed digits or the spread of magnitudes are too wide for that, <see cref="WideMantissas"/> holds them instead; exactly one of the two spans is in use.
/// Both give the same, exact, results. The spans are borrowed: a sample lives no longer than the buffers it was made from.
/// </remarks>
public readonly ref struct GroupedSample
{
    private readonly BigInteger _divisor;

    /// <summary>Makes a sample of 64-bit mantissas.</summary>
    /// <param name="mantissas">Any order; missing values left out.</param>
    /// <param name="decimals">Digits after the decimal point shared by all mantissas; negative for multiples of a power of ten.</param>
    /// <param name="groups">For each mantissa its group, 0 to <paramref name="groupCount"/> - 1.</param>
    /// <param name="groupCount">Groups that the experiment compares, those without a value included.</param>
    /// <exception cref="ArgumentException">The spans differ in length.</exception>
    public GroupedSample(ReadOnlySpan<long> mantissas, int decimals, ReadOnlySpan<ushort> groups, int groupCount)
    {
        if (mantissas.Length != groups.Length)
        {
            throw new ArgumentException("Every value needs its group.", nameof(groups));
        }

        Mantissas = mantissas;
        Decimals = decimals;
        Groups = groups;
        GroupCount = groupCount;
    }

    /// <summary>Makes a sample of mantissas of any size.</summary>
    /// <inheritdoc cref="GroupedSample(ReadOnlySpan{long}, int, ReadOnlySpan{ushort}, int)"/>
    public GroupedSample(ReadOnlySpan<BigInteger> wideMantissas, int decimals, ReadOnlySpan<ushort> groups, int groupCount)
    {
        if (wideMantissas.Length != groups.Length)
        {
            throw new ArgumentException("Every value needs its group.", nameof(groups));
        }

        WideMantissas = wideMantissas;
        IsWide = true;
        Decimals = decimals;
        Groups = groups;
        GroupCount = groupCount;
    }

    /// <summary>The mantissas, where they fit 64 bits; empty for a wide sample.</summary>
    public ReadOnlySpan<long> Mantissas { get; }

    /// <summary>The mantissas of a wide sample; empty otherwise.</summary>
    public ReadOnlySpan<BigInteger> WideMantissas { get; }

    /// <summary>Whether <see cref="WideMantissas"/> is in use.</summary>
    public bool IsWide { get; }

    /// <summary>Digits after the decimal point shared by all mantissas; may be negative.</summary>
    public int Decimals { get; }

    /// <summary>For each value its group, 0 to <see cref="GroupCount"/> - 1.</summary>
    public ReadOnlySpan<ushort> Groups { get; }

    /// <summary>Groups that the experiment compares, those without a value included.</summary>
    public int GroupCount { get; }

    /// <summary>Number of values.</summary>
    public int Count => Groups.Length;

    /// <summary>The mark of a value without a place in a run order, in <see cref="Orders"/>.</summary>
    public const long NoOrder = long.MinValue;

    /// <summary>What every mantissa is to be divided by, besides the power of ten; positive, 1 unless given.</summary>
    /// <exception cref="ArgumentOutOfRangeException">Not positive.</exception>
    public BigInteger Divisor
    {
        get => _divisor.IsZero ? BigInteger.One : _divisor;
        init => _divisor = value.Sign > 0 ? value : throw new ArgumentOutOfRangeException(nameof(value), "A divisor is positive.");
    }

    /// <summary>One unit of the mantissas in units of the response: 10 to the power of minus <see cref="Decimals"/>, over <see cref="Divisor"/>.</summary>
    public WideReal Unit => _divisor.IsZero || _divisor.IsOne
        ? WideReal.PowerOfTen(-(long)Decimals)
        : WideReal.PowerOfTen(-(long)Decimals) / WideReal.From(_divisor);

    /// <summary>For each value the number of its specimen, -1 where none is recorded; empty where the experiment records none. A number stands for one name within the experiment.</summary>
    public ReadOnlySpan<int> Specimens { get; init; }

    /// <summary>For each value the number of its block, -1 where none is recorded; empty where the experiment records none.</summary>
    public ReadOnlySpan<int> Blocks { get; init; }

    /// <summary>For each value its place in the run order, <see cref="NoOrder"/> where none is recorded; empty where the experiment records none.</summary>
    public ReadOnlySpan<long> Orders { get; init; }

    /// <summary>The mantissa of a value, whichever span holds it.</summary>
    /// <param name="i">0 to <see cref="Count"/> - 1.</param>
    public BigInteger MantissaOf(int i) => IsWide ? WideMantissas[i] : Mantissas[i];
}
