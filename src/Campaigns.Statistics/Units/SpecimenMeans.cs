using System.Numerics;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.Units;

/// <summary>The means of an experiment's specimens, exact: integers over a common divisor.</summary>
public sealed class SpecimenMeans
{
    private readonly BigInteger[] _mantissas;
    private readonly long[]? _narrow;
    private readonly ushort[] _groups;
    private readonly int[] _blocks;
    private readonly long[] _orders;
    private readonly BigInteger _divisor;
    private readonly int _decimals;
    private readonly int _groupCount;

    private SpecimenMeans(GroupedSample readings, int[] unitOf, int units)
    {
        _groups = new ushort[units];
        _blocks = new int[units];
        _orders = new long[units];
        _decimals = readings.Decimals;
        _groupCount = readings.GroupCount;
        ReadingCounts = new int[units];
        var sums = new BigInteger[units];
        for (int i = 0; i < unitOf.Length; i++)
        {
            Add(readings, i, unitOf[i], sums);
        }

        BigInteger common = 1;
        foreach (int n in ReadingCounts)
        {
            common = common / BigInteger.GreatestCommonDivisor(common, n) * n;
        }

        _divisor = common * readings.Divisor;
        _mantissas = [.. sums.Select((sum, unit) => sum * (common / ReadingCounts[unit]))];
        _narrow = _mantissas.All(m => BigInteger.Abs(m) < (BigInteger.One << 62)) ? [.. _mantissas.Select(m => (long)m)] : null;
    }

    /// <summary>Specimens, readings without one counted for themselves.</summary>
    public int Count => _groups.Length;

    /// <summary>Readings of each specimen.</summary>
    public int[] ReadingCounts { get; }

    /// <summary>Whether readings of one specimen stand in several groups.</summary>
    public bool InSeveralGroups { get; private set; }

    /// <summary>Whether readings of one specimen stand in several blocks.</summary>
    public bool InSeveralBlocks { get; private set; }

    /// <summary>The means as a sample, in the order in which their first readings come; a specimen takes its place in the run order from its first reading.</summary>
    public GroupedSample Sample => _narrow is null
        ? new GroupedSample(_mantissas, _decimals, _groups, _groupCount) { Divisor = _divisor, Blocks = _blocks, Orders = _orders }
        : new GroupedSample(_narrow, _decimals, _groups, _groupCount) { Divisor = _divisor, Blocks = _blocks, Orders = _orders };

    /// <summary>Averages the readings of each specimen.</summary>
    /// <param name="readings">All values of an experiment; one without a specimen counts as its own.</param>
    /// <returns>Null where no specimen has more than one reading, so that there is nothing to average.</returns>
    public static SpecimenMeans? Of(GroupedSample readings)
    {
        if (readings.Specimens.IsEmpty)
        {
            return null;
        }

        var unitOf = new int[readings.Count];
        var unitOfSpecimen = new Dictionary<int, int>();
        int units = 0;
        for (int i = 0; i < unitOf.Length; i++)
        {
            int specimen = readings.Specimens[i];
            if (specimen < 0 || unitOfSpecimen.TryAdd(specimen, units))
            {
                unitOf[i] = units++;
            }
            else
            {
                unitOf[i] = unitOfSpecimen[specimen];
            }
        }

        return units == readings.Count ? null : new SpecimenMeans(readings, unitOf, units);
    }

    private void Add(GroupedSample readings, int i, int unit, BigInteger[] sums)
    {
        int block = readings.Blocks.IsEmpty ? -1 : readings.Blocks[i];
        long order = readings.Orders.IsEmpty ? GroupedSample.NoOrder : readings.Orders[i];
        if (ReadingCounts[unit]++ == 0)
        {
            _groups[unit] = readings.Groups[i];
            _blocks[unit] = block;
            _orders[unit] = order;
        }

        InSeveralGroups |= _groups[unit] != readings.Groups[i];
        InSeveralBlocks |= _blocks[unit] != block;
        sums[unit] += readings.MantissaOf(i);
    }
}
