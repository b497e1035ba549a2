using System.Numerics;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Catalog.Measurements;

/// <summary>The observations of one experiment as columns, in the order in which they were loaded: a buffer that is filled, packed or tested, cleared and used again.</summary>
/// <remarks>
/// All values share one count of decimals; a value with more makes the others grow by a power of ten, which changes no number.
/// Mantissas are 64-bit integers until one does not fit (below 2^62 in size); from then on all of them are of any size.
/// </remarks>
internal sealed class ObservationColumns
{
    private const long LargestMantissa = 1L << 62;

    private static readonly long[] PowersOfTen = BuildPowersOfTen();

    private long[] _mantissas = new long[64];
    private BigInteger[]? _wide;
    private ushort[] _groups = new ushort[64];
    private long[] _lines = new long[64];
    private long[] _orders = new long[64];
    private int[] _specimens = new int[64];
    private int[] _blocks = new int[64];

    /// <summary>Values held.</summary>
    public int Count { get; private set; }

    /// <summary>Rows whose value was marked as missing; they have no place in the columns.</summary>
    public int MissingCount { get; set; }

    /// <summary>Decimals that all mantissas share.</summary>
    public int Decimals { get; private set; }

    /// <summary>Whether the mantissas outgrew 64 bits.</summary>
    public bool IsWide { get; private set; }

    /// <summary>Whether any value has a place in a run order.</summary>
    public bool HasOrder { get; private set; }

    public ReadOnlySpan<long> Mantissas => _mantissas.AsSpan(0, IsWide ? 0 : Count);

    public ReadOnlySpan<BigInteger> WideMantissas => IsWide ? _wide.AsSpan(0, Count) : default;

    public Span<ushort> Groups => _groups.AsSpan(0, Count);

    /// <summary>Line of each value in its file, from 1.</summary>
    public ReadOnlySpan<long> Lines => _lines.AsSpan(0, Count);

    /// <summary>Place in the run order, or <see cref="NoOrder"/>.</summary>
    public ReadOnlySpan<long> Orders => _orders.AsSpan(0, Count);

    /// <summary>Number in <see cref="SpecimenNames"/>, or -1.</summary>
    public ReadOnlySpan<int> Specimens => _specimens.AsSpan(0, Count);

    /// <summary>Number in <see cref="BlockNames"/>, or -1.</summary>
    public ReadOnlySpan<int> Blocks => _blocks.AsSpan(0, Count);

    public Utf8Interner SpecimenNames { get; } = new();

    public Utf8Interner BlockNames { get; } = new();

    /// <summary>The mark of a value without a place in a run order.</summary>
    public static long NoOrder => long.MinValue;

    public void Clear()
    {
        Count = 0;
        MissingCount = 0;
        Decimals = 0;
        IsWide = false;
        HasOrder = false;
        SpecimenNames.Clear();
        BlockNames.Clear();
    }

    /// <summary>Adds a value with a 64-bit mantissa.</summary>
    public void Add(long mantissa, int decimals, ushort group, long line)
    {
        Reserve();
        if (Count == 0)
        {
            Decimals = decimals;
        }

        if (IsWide || !TryAlign(ref mantissa, decimals))
        {
            AddWide(mantissa, decimals, group, line);
            return;
        }

        _mantissas[Count] = mantissa;
        AddPlace(group, line);
    }

    /// <summary>Adds a value with a mantissa of any size.</summary>
    public void AddWide(BigInteger mantissa, int decimals, ushort group, long line)
    {
        Reserve();
        if (Count == 0)
        {
            Decimals = decimals;
        }

        Widen();
        if (decimals < Decimals)
        {
            mantissa *= BigInteger.Pow(10, Decimals - decimals);
        }
        else if (decimals > Decimals)
        {
            var factor = BigInteger.Pow(10, decimals - Decimals);
            for (int i = 0; i < Count; i++)
            {
                _wide![i] *= factor;
            }

            Decimals = decimals;
        }

        _wide![Count] = mantissa;
        AddPlace(group, line);
    }

    /// <summary>Gives the value added last its specimen, block and place in the run order, where these are recorded.</summary>
    public void Describe(ReadOnlySpan<byte> specimen, ReadOnlySpan<byte> block, long? order)
    {
        int last = Count - 1;
        if (!specimen.IsEmpty)
        {
            _specimens[last] = SpecimenNames.Intern(specimen);
        }

        if (!block.IsEmpty)
        {
            _blocks[last] = BlockNames.Intern(block);
        }

        if (order is { } place)
        {
            _orders[last] = place;
            HasOrder = true;
        }
    }

    /// <summary>The sample to test; it borrows these columns.</summary>
    /// <exception cref="CatalogException">A stored group lies outside the experiment's set.</exception>
    public GroupedSample Sample(int groupCount)
    {
        foreach (ushort group in Groups)
        {
            if (group >= groupCount)
            {
                throw PackReader.Damaged();
            }
        }

        ReadOnlySpan<int> specimens = SpecimenNames.Count > 0 ? Specimens : default;
        ReadOnlySpan<int> blocks = BlockNames.Count > 0 ? Blocks : default;
        ReadOnlySpan<long> orders = HasOrder ? Orders : default;
        return IsWide
            ? new GroupedSample(WideMantissas, Decimals, Groups, groupCount) { Specimens = specimens, Blocks = blocks, Orders = orders }
            : new GroupedSample(Mantissas, Decimals, Groups, groupCount) { Specimens = specimens, Blocks = blocks, Orders = orders };
    }

    /// <summary>Takes values out of the columns, the others keeping their order.</summary>
    /// <param name="positions">Their positions, ascending.</param>
    public void RemoveAt(IReadOnlyList<int> positions)
    {
        if (positions.Count == 0)
        {
            return;
        }

        int next = 0;
        int kept = 0;
        for (int i = 0; i < Count; i++)
        {
            if (next < positions.Count && positions[next] == i)
            {
                next++;
                continue;
            }

            _mantissas[kept] = _mantissas[i];
            _groups[kept] = _groups[i];
            _lines[kept] = _lines[i];
            _orders[kept] = _orders[i];
            _specimens[kept] = _specimens[i];
            _blocks[kept] = _blocks[i];
            if (IsWide)
            {
                _wide![kept] = _wide[i];
            }

            kept++;
        }

        Count = kept;
    }

    /// <summary>The typed text of a value: its mantissa with the shared count of decimals.</summary>
    public string Text(int i) => DecimalWriter.Write(IsWide ? _wide![i] : _mantissas[i], Decimals);

    /// <summary>The double nearest to a value.</summary>
    public double NearestDouble(int i) => DecimalWriter.NearestDouble(IsWide ? _wide![i] : _mantissas[i], Decimals);

    private bool TryAlign(ref long mantissa, int decimals)
    {
        if (decimals > Decimals && !TryShift(decimals - Decimals))
        {
            return false;
        }

        return TryScale(ref mantissa, Decimals - decimals);
    }

    private bool TryShift(int powerOfTen)
    {
        for (int i = 0; i < Count; i++)
        {
            long scaled = _mantissas[i];
            if (!TryScale(ref scaled, powerOfTen))
            {
                return false;
            }
        }

        for (int i = 0; i < Count; i++)
        {
            TryScale(ref _mantissas[i], powerOfTen);
        }

        Decimals += powerOfTen;
        return true;
    }

    /// <summary>Multiplies by a power of ten where the product fits; where it does not, the mantissa stays as it was.</summary>
    private static bool TryScale(ref long mantissa, int powerOfTen)
    {
        if (powerOfTen >= PowersOfTen.Length)
        {
            return mantissa == 0;
        }

        Int128 scaled = (Int128)mantissa * PowersOfTen[powerOfTen];
        if (scaled >= LargestMantissa || scaled <= -LargestMantissa)
        {
            return false;
        }

        mantissa = (long)scaled;
        return true;
    }

    private void Widen()
    {
        if (_wide is null || _wide.Length < _mantissas.Length)
        {
            Array.Resize(ref _wide, _mantissas.Length);
        }

        if (!IsWide)
        {
            for (int i = 0; i < Count; i++)
            {
                _wide[i] = _mantissas[i];
            }

            IsWide = true;
        }
    }

    private void AddPlace(ushort group, long line)
    {
        _groups[Count] = group;
        _lines[Count] = line;
        _orders[Count] = NoOrder;
        _specimens[Count] = -1;
        _blocks[Count] = -1;
        Count++;
    }

    private void Reserve()
    {
        if (Count == _mantissas.Length)
        {
            int length = Count * 2;
            Array.Resize(ref _mantissas, length);
            Array.Resize(ref _groups, length);
            Array.Resize(ref _lines, length);
            Array.Resize(ref _orders, length);
            Array.Resize(ref _specimens, length);
            Array.Resize(ref _blocks, length);
        }
    }

    private static long[] BuildPowersOfTen()
    {
        var powers = new long[19];
        powers[0] = 1;
        for (int i = 1; i < powers.Length; i++)
        {
            powers[i] = powers[i - 1] * 10;
        }

        return powers;
    }
}
