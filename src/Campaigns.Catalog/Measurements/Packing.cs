using System.Numerics;

namespace Campaigns.Catalog.Measurements;

/// <summary>Grows a buffer of packed columns: variable-length integers, and columns of small integers in as many bits as the largest needs.</summary>
/// <param name="capacity">Bytes to begin with.</param>
internal sealed class PackWriter(int capacity = 1024)
{
    private byte[] _buffer = new byte[capacity];
    private int _length;

    public ReadOnlySpan<byte> Written => _buffer.AsSpan(0, _length);

    public void Clear() => _length = 0;

    public void Byte(byte value)
    {
        Reserve(1);
        _buffer[_length++] = value;
    }

    /// <summary>An unsigned integer, seven bits a byte, the lowest first.</summary>
    public void Unsigned(ulong value)
    {
        Reserve(10);
        while (value >= 0x80)
        {
            _buffer[_length++] = (byte)(value | 0x80);
            value >>= 7;
        }

        _buffer[_length++] = (byte)value;
    }

    /// <summary>A signed integer, with the sign in the lowest bit so that small ones stay short.</summary>
    public void Signed(long value) => Unsigned(((ulong)value << 1) ^ (ulong)(value >> 63));

    public void Bytes(ReadOnlySpan<byte> bytes)
    {
        Unsigned((ulong)bytes.Length);
        Reserve(bytes.Length);
        bytes.CopyTo(_buffer.AsSpan(_length));
        _length += bytes.Length;
    }

    /// <summary>A column: its least value, the width in bits, and every value less the least, packed. The count is known to the reader.</summary>
    /// <param name="values">The values.</param>
    /// <param name="leastWidth">Bits that each takes at least; 0 lets a column of equal values cost nothing.</param>
    /// <remarks>O(n).</remarks>
    public void Column(ReadOnlySpan<long> values, int leastWidth = 0)
    {
        long least = values.IsEmpty ? 0 : long.MaxValue;
        long most = values.IsEmpty ? 0 : long.MinValue;
        foreach (long value in values)
        {
            least = Math.Min(least, value);
            most = Math.Max(most, value);
        }

        int width = Math.Max(leastWidth, 64 - BitOperations.LeadingZeroCount((ulong)most - (ulong)least));
        Signed(least);
        Byte((byte)width);
        Reserve((int)((((long)values.Length * width) + 7) / 8) + 8);
        ulong pending = 0;
        int pendingBits = 0;
        foreach (long value in values)
        {
            ulong rest = (ulong)value - (ulong)least;
            pending |= rest << pendingBits;
            pendingBits += width;
            if (pendingBits >= 64)
            {
                System.Buffers.Binary.BinaryPrimitives.WriteUInt64LittleEndian(_buffer.AsSpan(_length), pending);
                _length += 8;
                pendingBits -= 64;
                pending = pendingBits == 0 ? 0 : rest >> (width - pendingBits);
            }
        }

        for (; pendingBits > 0; pendingBits -= 8, pending >>= 8)
        {
            _buffer[_length++] = (byte)pending;
        }
    }

    private void Reserve(int extra)
    {
        if (_length + extra > _buffer.Length)
        {
            Array.Resize(ref _buffer, Math.Max(_length + extra, _buffer.Length * 2));
        }
    }
}

/// <summary>Reads what <see cref="PackWriter"/> wrote; whatever cannot be such is reported as damage.</summary>
internal ref struct PackReader(ReadOnlySpan<byte> packed)
{
    private ReadOnlySpan<byte> _rest = packed;

    public readonly int BytesLeft => _rest.Length;

    public byte Byte() => Take(1)[0];

    public ulong Unsigned()
    {
        ulong value = 0;
        for (int shift = 0; shift < 64; shift += 7)
        {
            byte part = Byte();
            value |= (ulong)(part & 0x7f) << shift;
            if (part < 0x80)
            {
                return value;
            }
        }

        throw Damaged();
    }

    public long Signed()
    {
        ulong value = Unsigned();
        return (long)(value >> 1) ^ -(long)(value & 1);
    }

    public int Count(int most)
    {
        ulong value = Unsigned();
        return value <= (ulong)most ? (int)value : throw Damaged();
    }

    public ReadOnlySpan<byte> Bytes() => Take(Count(_rest.Length));

    /// <summary>A column of as many values as the span holds.</summary>
    public void Column(Span<long> values)
    {
        long least = Signed();
        int width = Byte();
        if (width > 64)
        {
            throw Damaged();
        }

        ReadOnlySpan<byte> packed = Take((int)((((long)values.Length * width) + 7) / 8));
        ulong mask = width == 64 ? ulong.MaxValue : (1UL << width) - 1;
        for (int i = 0; i < values.Length; i++)
        {
            values[i] = (long)((ulong)least + (Bits(packed, (long)i * width, width) & mask));
        }
    }

    private static ulong Bits(ReadOnlySpan<byte> packed, long firstBit, int width)
    {
        int at = (int)(firstBit >> 3);
        int shift = (int)(firstBit & 7);
        if (at + 9 <= packed.Length)
        {
            ulong low = System.Buffers.Binary.BinaryPrimitives.ReadUInt64LittleEndian(packed[at..]);
            return shift == 0 ? low : (low >> shift) | ((ulong)packed[at + 8] << (64 - shift));
        }

        ulong value = 0;
        for (int i = 0; i * 8 < width + shift; i++)
        {
            int up = (i * 8) - shift;
            value |= up < 0 ? (ulong)packed[at + i] >> -up : (ulong)packed[at + i] << up;
        }

        return value;
    }

    private ReadOnlySpan<byte> Take(int length)
    {
        if (length > _rest.Length)
        {
            throw Damaged();
        }

        ReadOnlySpan<byte> taken = _rest[..length];
        _rest = _rest[length..];
        return taken;
    }

    public static CatalogException Damaged() =>
        new("Packed columns in the catalog are damaged; restore the catalog from a copy.");
}
