using System.Numerics;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.Units;

/// <summary>The means of an experiment's specimens, exact: integers over a common divisor.</summary>
/// <remarks>Cost: about 25 ns a reading; integers of any size only where a sum over the common divisor does not fit 62 bits.</remarks>
public sealed class SpecimenMeans
{
    private const int NarrowBits = 62;

    private readonly BigInteger[] _wide = [];
    private readonly long[]? _narrow;
    private readonly ushort[] _groups;
    private readonly int[] _blocks = [];
    private readonly long[] _orders = [];
    private readonly BigInteger _divisor;
    private readonly int _decimals;
    private readonly int _groupCount;

    private SpecimenMeans(GroupedSample readings, SpecimenIndex index)
    {
        ReadingCounts = index.Counts;
        _decimals = readings.Decimals;
        _groupCount = readings.GroupCount;
        _groups = new ushort[Count];
        _blocks = readings.Blocks.IsEmpty ? [] : new int[Count];
        _orders = readings.Orders.IsEmpty ? [] : new long[Count];
        Place(readings, index.Specimens);
        BigInteger common = BigInteger.One;
        foreach (int n in ReadingCounts.Distinct())
        {
            common = common / BigInteger.GreatestCommonDivisor(common, n) * n;
        }

        _divisor = common * readings.Divisor;
        _narrow = readings.IsWide ? null : NarrowMeans(readings.Mantissas, index.Specimens, common);
        _wide = _narrow is null ? WideMeans(readings, index.Specimens, common) : [];
    }

    /// <summary>Specimens, readings without one counted for themselves.</summary>
    public int Count => ReadingCounts.Length;

    /// <summary>Readings of each specimen.</summary>
    public int[] ReadingCounts { get; }

    /// <summary>Whether readings of one specimen stand in several groups.</summary>
    public bool InSeveralGroups { get; private set; }

    /// <summary>Whether readings of one specimen stand in several blocks.</summary>
    public bool InSeveralBlocks { get; private set; }

    /// <summary>The means as a sample, in the order in which their first readings come. A specimen takes the earliest place in the run order that is recorded for one of its readings, whichever row comes first; its block is recorded only where it is recorded for every reading.</summary>
    public GroupedSample Sample => _narrow is null
        ? new GroupedSample(_wide, _decimals, _groups, _groupCount) { Divisor = _divisor, Blocks = _blocks, Orders = _orders }
        : new GroupedSample(_narrow, _decimals, _groups, _groupCount) { Divisor = _divisor, Blocks = _blocks, Orders = _orders };

    /// <summary>Averages the readings of each specimen.</summary>
    /// <param name="readings">All values of an experiment; one without a specimen counts as its own.</param>
    /// <returns>Null where no specimen has more than one reading, so that there is nothing to average.</returns>
    public static SpecimenMeans? Of(GroupedSample readings) =>
        SpecimenIndex.Of(readings) is { IsTrivial: false } index ? new SpecimenMeans(readings, index) : null;

    /// <summary>Finds group, block and place of every specimen, from all of its readings alike: which of them comes first makes no difference.</summary>
    private void Place(GroupedSample readings, int[] specimens)
    {
        var seen = new bool[Count];
        var unclear = new bool[_blocks.Length];
        Array.Fill(_blocks, -1);
        Array.Fill(_orders, GroupedSample.NoOrder);
        for (int i = 0; i < specimens.Length; i++)
        {
            int specimen = specimens[i];
            InSeveralGroups |= seen[specimen] && _groups[specimen] != readings.Groups[i];
            _groups[specimen] = seen[specimen] ? Math.Min(_groups[specimen], readings.Groups[i]) : readings.Groups[i];
            seen[specimen] = true;
            if (_blocks.Length > 0)
            {
                int block = readings.Blocks[i];
                bool isOther = block >= 0 && _blocks[specimen] >= 0 && _blocks[specimen] != block;
                InSeveralBlocks |= isOther;
                unclear[specimen] |= isOther || block < 0;
                _blocks[specimen] = Math.Max(_blocks[specimen], block);
            }

            if (_orders.Length > 0 && readings.Orders[i] != GroupedSample.NoOrder)
            {
                _orders[specimen] = _orders[specimen] == GroupedSample.NoOrder ? readings.Orders[i] : Math.Min(_orders[specimen], readings.Orders[i]);
            }
        }

        for (int j = 0; j < unclear.Length; j++)
        {
            _blocks[j] = unclear[j] ? -1 : _blocks[j];
        }
    }

    /// <summary>The means times the common multiple of the counts, where all fit 62 bits; else null.</summary>
    private long[]? NarrowMeans(ReadOnlySpan<long> mantissas, int[] specimens, BigInteger common)
    {
        if (common.GetBitLength() > NarrowBits)
        {
            return null;
        }

        var sums = new Int128[Count];
        for (int i = 0; i < specimens.Length; i++)
        {
            sums[specimens[i]] += mantissas[i];
        }

        Int128 limit = Int128.One << NarrowBits;
        var means = new long[Count];
        for (int j = 0; j < means.Length; j++)
        {
            // Two factors below 2^62 have a product below 2^124.
            Int128 mean = Int128.Abs(sums[j]) < limit ? sums[j] * ((long)common / ReadingCounts[j]) : limit;
            if (Int128.Abs(mean) >= limit)
            {
                return null;
            }

            means[j] = (long)mean;
        }

        return means;
    }

    private BigInteger[] WideMeans(GroupedSample readings, int[] specimens, BigInteger common)
    {
        var means = new BigInteger[Count];
        for (int i = 0; i < specimens.Length; i++)
        {
            means[specimens[i]] += readings.MantissaOf(i);
        }

        for (int j = 0; j < means.Length; j++)
        {
            means[j] *= common / ReadingCounts[j];
        }

        return means;
    }
}
