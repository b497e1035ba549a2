using System.Buffers;
using System.Buffers.Binary;
using System.Runtime.InteropServices;
using System.Text;
using System.Text.Unicode;

namespace Campaigns.Catalog.Loading;

/// <summary>Turns the bytes of a file into whole characters of UTF-8, and stops at the first that are none.</summary>
internal sealed class SourceDecoder : IDisposable
{
    private const int RawSize = 1 << 15;
    /// <summary>Bytes of the longest character.</summary>
    public const int LongestCharacter = 4;

    private readonly Stream _bytes;
    private readonly byte[] _raw;
    private int _rawStart;
    private int _rawEnd;

    /// <summary>Takes over a stream and looks at its first bytes.</summary>
    public SourceDecoder(Stream bytes)
    {
        _bytes = bytes;
        _raw = new byte[RawSize];
        _rawEnd = bytes.ReadAtLeast(_raw, LongestCharacter, throwOnEndOfStream: false);
        Kind = KindOf(_raw.AsSpan(0, _rawEnd), out int markLength);
        _rawStart = markLength;
        HasMark = markLength > 0;
    }

    /// <summary>The form of the file.</summary>
    public SourceKind Kind { get; }

    /// <summary>Whether the file began with a byte-order mark.</summary>
    public bool HasMark { get; }

    /// <summary>Whether bytes were met that are no characters.</summary>
    public bool IsInvalid { get; private set; }

    private bool IsWide => Kind is SourceKind.Utf16Little or SourceKind.Utf16Big;

    /// <summary>Gives the next whole characters.</summary>
    /// <param name="buffer">Room for thousands of bytes.</param>
    /// <returns>Bytes of valid UTF-8; 0 at the end, and at bytes that are no characters.</returns>
    public int Read(Span<byte> buffer)
    {
        if (Kind is SourceKind.Utf16Unmarked or SourceKind.Workbook)
        {
            IsInvalid = true;
        }

        return IsInvalid ? 0 : IsWide ? ReadWide(buffer) : ReadNarrow(buffer);
    }

    /// <inheritdoc/>
    public void Dispose() => _bytes.Dispose();

    private static SourceKind KindOf(ReadOnlySpan<byte> start, out int markLength)
    {
        markLength = start.StartsWith("\uFEFF"u8) ? 3 : start.StartsWith((ReadOnlySpan<byte>)[0xFF, 0xFE]) || start.StartsWith((ReadOnlySpan<byte>)[0xFE, 0xFF]) ? 2 : 0;
        return markLength == 2 ? (start[0] == 0xFF ? SourceKind.Utf16Little : SourceKind.Utf16Big)
            : start.StartsWith("PK\u0003\u0004"u8) ? SourceKind.Workbook
            : start.Length >= 4 && ((start[0] == 0 && start[2] == 0 && start[1] != 0 && start[3] != 0) || (start[1] == 0 && start[3] == 0 && start[0] != 0 && start[2] != 0)) ? SourceKind.Utf16Unmarked
            : SourceKind.Utf8;
    }

    private int ReadNarrow(Span<byte> buffer)
    {
        int count = Math.Min(buffer.Length, _rawEnd - _rawStart);
        _raw.AsSpan(_rawStart, count).CopyTo(buffer);
        _rawStart += count;
        bool isEnd = false;
        int cut;
        do
        {
            if (_rawStart == _rawEnd && count < buffer.Length)
            {
                int read = _bytes.Read(buffer[count..]);
                isEnd = read == 0;
                count += read;
            }

            cut = Ascii.IsValid(buffer[..count]) ? 0 : CutTail(buffer[..count]);
        }
        while (cut > 0 && cut == count && !isEnd);

        int whole = count - cut;
        int valid = Utf8.IsValid(buffer[..whole]) ? whole : ValidLength(buffer[..whole]);
        IsInvalid = valid < whole || (isEnd && cut > 0);
        if (!IsInvalid)
        {
            KeepForNextTime(buffer[whole..count]);
        }

        return valid;
    }

    private void KeepForNextTime(ReadOnlySpan<byte> cut)
    {
        if (_rawStart < _rawEnd)
        {
            _rawStart -= cut.Length;
        }
        else
        {
            cut.CopyTo(_raw);
            _rawStart = 0;
            _rawEnd = cut.Length;
        }
    }

    /// <summary>Bytes at the end that are the start of a character only.</summary>
    private static int CutTail(ReadOnlySpan<byte> text)
    {
        for (int back = 1; back < LongestCharacter && back <= text.Length; back++)
        {
            byte b = text[^back];
            if ((b & 0xC0) != 0x80)
            {
                int length = b >= 0xF0 ? 4 : b >= 0xE0 ? 3 : b >= 0xC0 ? 2 : 1;
                return length > back ? back : 0;
            }
        }

        return 0;
    }

    private static int ValidLength(ReadOnlySpan<byte> text)
    {
        int at = 0;
        while (at < text.Length && Rune.DecodeFromUtf8(text[at..], out _, out int length) == OperationStatus.Done)
        {
            at += length;
        }

        return at;
    }

    private int ReadWide(Span<byte> buffer)
    {
        while (true)
        {
            Span<byte> raw = _raw.AsSpan(_rawStart, (_rawEnd - _rawStart) & ~1);
            OperationStatus status = OperationStatus.NeedMoreData;
            int written = 0;
            if (raw.Length > 0)
            {
                status = Transcode(raw, buffer, out int read, out written);
                _rawStart += read;
            }

            if (written > 0)
            {
                return written;
            }

            if (status == OperationStatus.InvalidData)
            {
                IsInvalid = true;
                return 0;
            }

            if (!Refill())
            {
                IsInvalid = _rawEnd > _rawStart;
                return 0;
            }
        }
    }

    private OperationStatus Transcode(ReadOnlySpan<byte> raw, Span<byte> buffer, out int read, out int written)
    {
        ReadOnlySpan<char> chars = MemoryMarshal.Cast<byte, char>(raw);
        char[]? swapped = null;
        if ((Kind == SourceKind.Utf16Big) == BitConverter.IsLittleEndian)
        {
            swapped = ArrayPool<char>.Shared.Rent(chars.Length);
            BinaryPrimitives.ReverseEndianness(MemoryMarshal.Cast<char, ushort>(chars), MemoryMarshal.Cast<char, ushort>(swapped.AsSpan()));
            chars = swapped.AsSpan(0, chars.Length);
        }

        OperationStatus status = Utf8.FromUtf16(chars, buffer, out int charsRead, out written, replaceInvalidSequences: false, isFinalBlock: false);
        read = charsRead * sizeof(char);
        if (swapped is not null)
        {
            ArrayPool<char>.Shared.Return(swapped);
        }

        return status;
    }

    private bool Refill()
    {
        _raw.AsSpan(_rawStart, _rawEnd - _rawStart).CopyTo(_raw);
        _rawEnd -= _rawStart;
        _rawStart = 0;
        int count = _bytes.Read(_raw.AsSpan(_rawEnd));
        _rawEnd += count;
        return count > 0;
    }
}
