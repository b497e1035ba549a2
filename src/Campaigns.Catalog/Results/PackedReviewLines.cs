using Campaigns.Catalog.Measurements;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Results;

/// <summary>The layout in which a review's lines are kept: a version byte, the count, then columns of experiment keys, p-values and adjusted p-values as bits of doubles, and the logarithms of those below the range of doubles.</summary>
/// <remarks>About 18 bytes a line; O(n) to pack and to unpack.</remarks>
internal static class PackedReviewLines
{
    private const byte Version = 1;
    private const int BytesPerLine = 20;

    // For what was tested since: a few experiments that arrive are added without copying all.
    private const int Room = 256;

    public static PackWriter Pack(ReadOnlySpan<long> experimentIds, ReadOnlySpan<PValue> p, ReadOnlySpan<PValue> adjusted)
    {
        var writer = new PackWriter((experimentIds.Length * BytesPerLine) + 64);
        writer.Byte(Version);
        writer.Unsigned((ulong)experimentIds.Length);
        writer.Column(experimentIds);
        WritePValues(writer, p);
        WritePValues(writer, adjusted);
        return writer;
    }

    /// <summary>The tested experiments of a review with their p-values.</summary>
    public static FamilyColumns UnpackFamily(ReadOnlySpan<byte> packed)
    {
        PackReader reader = Open(packed, out int count);
        var ids = new long[count + Room];
        reader.Column(ids.AsSpan(0, count));
        return new FamilyColumns(ids, ReadPValues(ref reader, count, Room), count);
    }

    /// <summary>Every line of a review.</summary>
    public static (FamilyColumns Family, PValue[] Adjusted) Unpack(ReadOnlySpan<byte> packed)
    {
        PackReader reader = Open(packed, out int count);
        var ids = new long[count];
        reader.Column(ids);
        return (new FamilyColumns(ids, ReadPValues(ref reader, count), count), ReadPValues(ref reader, count));
    }

    private static PackReader Open(ReadOnlySpan<byte> packed, out int count)
    {
        var reader = new PackReader(packed);
        if (reader.Byte() != Version)
        {
            throw PackReader.Damaged();
        }

        // Keys differ, so that each takes a bit at least: a damaged count cannot ask for more than the bytes at hand could hold.
        count = reader.Count(Math.Min(int.MaxValue / 64, packed.Length) * 8);
        return reader;
    }

    private static void WritePValues(PackWriter writer, ReadOnlySpan<PValue> values)
    {
        var bits = new long[values.Length];
        var logs = new List<long>();
        for (int i = 0; i < bits.Length; i++)
        {
            bits[i] = BitConverter.DoubleToInt64Bits(values[i].Value);
            if (values[i].Value < LogStoredBelow)
            {
                logs.Add(BitConverter.DoubleToInt64Bits(values[i].Log));
            }
        }

        writer.Column(bits);
        writer.Column(logs.ToArray());
    }

    private static PValue[] ReadPValues(ref PackReader reader, int count, int room = 0)
    {
        var bits = new long[count];
        reader.Column(bits);
        int small = 0;
        foreach (long b in bits)
        {
            small += BitConverter.Int64BitsToDouble(b) < LogStoredBelow ? 1 : 0;
        }

        var logs = new long[small];
        reader.Column(logs);
        var values = new PValue[count + room];
        for (int i = 0, log = 0; i < count; i++)
        {
            double value = BitConverter.Int64BitsToDouble(bits[i]);
            double known = value < LogStoredBelow ? BitConverter.Int64BitsToDouble(logs[log++]) : 0;
            if (!(value >= 0 && value <= 1 && (value >= LogStoredBelow || known < 0)))
            {
                throw PackReader.Damaged();
            }

            values[i] = value < LogStoredBelow ? PValue.FromValueAndLog(value, known) : PValue.FromValue(value);
        }

        return values;
    }

    /// <summary>Below this a double has lost digits (subnormal numbers), or all of them, so that the logarithm is kept as well.</summary>
    public const double LogStoredBelow = 1e-290;
}
