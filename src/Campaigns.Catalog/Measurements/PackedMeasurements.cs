using System.Numerics;

namespace Campaigns.Catalog.Measurements;

/// <summary>The layout in which one load's values for one experiment are kept.</summary>
/// <remarks>
/// A version byte, a byte of flags, the count of values and of decimals; then columns: mantissas, groups, lines, and where recorded run order, specimens and blocks.
/// A column holds its least value, a width, and the differences in as many bits as the widest needs (<see cref="PackWriter.Column"/>); a file's consecutive lines cost nothing, four decimals with a range of 10 about 17 bits.
/// Mantissas beyond 64 bits stand as length and bytes each. Packing and unpacking are O(n).
/// </remarks>
internal static class PackedMeasurements
{
    private const byte Version = 1;
    private const int MostValues = 100_000_000;

    /// <summary>More values than these take at least a bit each, so that the bytes at hand bound what a damaged count can ask for.</summary>
    private const int MostWithoutBits = 1 << 20;

    /// <summary>Far beyond the decimals of any number that can be typed.</summary>
    private const int MostDecimals = 10_000;

    [Flags]
    private enum Columns : byte
    {
        Plain = 0,
        Wide = 1,
        Order = 2,
        Specimen = 4,
        Block = 8,
    }

    [ThreadStatic]
    private static long[]? _scratch;

    public static void Write(ObservationColumns values, PackWriter writer)
    {
        Columns columns = (values.IsWide ? Columns.Wide : 0) | (values.HasOrder ? Columns.Order : 0)
            | (values.SpecimenNames.Count > 0 ? Columns.Specimen : 0) | (values.BlockNames.Count > 0 ? Columns.Block : 0);
        writer.Byte(Version);
        writer.Byte((byte)columns);
        writer.Unsigned((ulong)values.Count);
        writer.Signed(values.Decimals);
        Span<long> scratch = Scratch(values.Count);
        WriteMantissas(values, writer);
        for (int i = 0; i < scratch.Length; i++)
        {
            scratch[i] = values.Groups[i];
        }

        writer.Column(scratch, values.Count > MostWithoutBits ? 1 : 0);
        for (int i = 0; i < scratch.Length; i++)
        {
            scratch[i] = values.Lines[i] - i;
        }

        writer.Column(scratch);
        if (columns.HasFlag(Columns.Order))
        {
            WriteOrders(values, writer, scratch);
        }

        if (columns.HasFlag(Columns.Specimen))
        {
            WriteNames(values.SpecimenNames, values.Specimens, writer, scratch);
        }

        if (columns.HasFlag(Columns.Block))
        {
            WriteNames(values.BlockNames, values.Blocks, writer, scratch);
        }
    }

    /// <summary>Adds the packed values to the columns.</summary>
    /// <exception cref="CatalogException">The bytes are damaged.</exception>
    public static void Read(ReadOnlySpan<byte> packed, ObservationColumns values)
    {
        var reader = new PackReader(packed);
        if (reader.Byte() != Version)
        {
            throw PackReader.Damaged();
        }

        var columns = (Columns)reader.Byte();
        int count = reader.Count(columns.HasFlag(Columns.Wide) ? packed.Length : (int)Math.Min(MostValues, MostWithoutBits + (8L * packed.Length)));
        int decimals = reader.Signed() is >= -MostDecimals and <= MostDecimals and long read ? (int)read : throw PackReader.Damaged();
        Span<long> scratch = Scratch(count * 4);
        Span<long> groups = scratch[..count];
        Span<long> lines = scratch.Slice(count, count);
        Span<long> orders = scratch.Slice(2 * count, count);
        Span<long> mantissas = scratch.Slice(3 * count, count);
        BigInteger[]? wide = columns.HasFlag(Columns.Wide) ? new BigInteger[count] : null;
        if (wide is null)
        {
            reader.Column(mantissas);
        }
        else
        {
            for (int i = 0; i < count; i++)
            {
                wide[i] = new BigInteger(reader.Bytes());
            }
        }

        reader.Column(groups);
        reader.Column(lines);
        orders.Fill(ObservationColumns.NoOrder);
        if (columns.HasFlag(Columns.Order))
        {
            ReadOrders(ref reader, orders);
        }

        Names specimens = columns.HasFlag(Columns.Specimen) ? ReadNames(ref reader, count) : default;
        Names blocks = columns.HasFlag(Columns.Block) ? ReadNames(ref reader, count) : default;
        for (int i = 0; i < count; i++)
        {
            ushort group = groups[i] is >= 0 and <= ushort.MaxValue ? (ushort)groups[i] : throw PackReader.Damaged();
            if (wide is null)
            {
                values.Add(mantissas[i], decimals, group, lines[i] + i);
            }
            else
            {
                values.AddWide(wide[i], decimals, group, lines[i] + i);
            }

            if (columns > Columns.Wide)
            {
                values.Describe(specimens.Of(i), blocks.Of(i), orders[i] == ObservationColumns.NoOrder ? null : orders[i]);
            }
        }
    }

    private static void WriteMantissas(ObservationColumns values, PackWriter writer)
    {
        if (!values.IsWide)
        {
            writer.Column(values.Mantissas);
            return;
        }

        foreach (BigInteger mantissa in values.WideMantissas)
        {
            writer.Bytes(mantissa.ToByteArray());
        }
    }

    /// <summary>Run order: a column of "is it recorded", then the recorded ones (0 in the gaps).</summary>
    private static void WriteOrders(ObservationColumns values, PackWriter writer, Span<long> scratch)
    {
        for (int i = 0; i < scratch.Length; i++)
        {
            scratch[i] = values.Orders[i] == ObservationColumns.NoOrder ? 0 : 1;
        }

        writer.Column(scratch);
        for (int i = 0; i < scratch.Length; i++)
        {
            scratch[i] = values.Orders[i] == ObservationColumns.NoOrder ? 0 : values.Orders[i];
        }

        writer.Column(scratch);
    }

    private static void ReadOrders(ref PackReader reader, Span<long> orders)
    {
        var recorded = new long[orders.Length];
        reader.Column(recorded);
        reader.Column(orders);
        for (int i = 0; i < orders.Length; i++)
        {
            if (recorded[i] == 0)
            {
                orders[i] = ObservationColumns.NoOrder;
            }
        }
    }

    private static void WriteNames(Utf8Interner names, ReadOnlySpan<int> numbers, PackWriter writer, Span<long> scratch)
    {
        writer.Unsigned((ulong)names.Count);
        for (int i = 0; i < names.Count; i++)
        {
            writer.Bytes(names[i]);
        }

        for (int i = 0; i < scratch.Length; i++)
        {
            scratch[i] = numbers[i] + 1;
        }

        writer.Column(scratch);
    }

    private static Names ReadNames(ref PackReader reader, int count)
    {
        var texts = new byte[reader.Count(reader.BytesLeft) + 1][];
        texts[0] = [];
        for (int i = 1; i < texts.Length; i++)
        {
            texts[i] = reader.Bytes().ToArray();
        }

        var numbers = new long[count];
        reader.Column(numbers);
        foreach (long number in numbers)
        {
            if (number < 0 || number >= texts.Length)
            {
                throw PackReader.Damaged();
            }
        }

        return new Names(texts, numbers);
    }

    private static Span<long> Scratch(int length)
    {
        if (_scratch is null || _scratch.Length < length)
        {
            _scratch = new long[Math.Max(length, 256)];
        }

        return _scratch.AsSpan(0, length);
    }

    private readonly record struct Names(byte[][]? Texts, long[]? Numbers)
    {
        public ReadOnlySpan<byte> Of(int i) => Texts is null ? default : Texts[Numbers![i]];
    }
}
