namespace Campaigns.Catalog.Loading;

/// <summary>The bytes of a text file as checked UTF-8 without a byte-order mark, whatever Unicode form the file has; ends at the first fault.</summary>
/// <remarks>
/// Every byte that is handed on is part of a whole, valid character and none is NUL. At the first that is not, the stream ends and
/// <see cref="Fault"/> says where and why: no exception has to find its way through a reader, and all problems before it can be told.
/// </remarks>
internal sealed class SourceText : Stream
{
    /// <summary>How much of the start can be looked at before reading.</summary>
    public const int HeadSize = 1 << 16;

    private readonly SourceDecoder _decoder;
    private readonly byte[] _text = new byte[HeadSize];
    private int _start;
    private int _end;
    private long _lineBreaks;
    private bool _endsInReturn;

    /// <summary>Takes over a stream of bytes and looks at its start.</summary>
    public SourceText(Stream bytes)
    {
        _decoder = new SourceDecoder(bytes);
        while (_end < HeadSize - SourceDecoder.LongestCharacter && Fill(_end) > 0)
        {
        }
    }

    /// <summary>The form of the file.</summary>
    public SourceKind Kind => _decoder.Kind;

    /// <summary>Whether the file began with a byte-order mark.</summary>
    public bool HasMark => _decoder.HasMark;

    /// <summary>Why the text ends before the file does; null while none was met.</summary>
    public SourceFault? Fault { get; private set; }

    /// <summary>Bytes of UTF-8 that were made so far, without those that were skipped.</summary>
    public long Length8 { get; private set; }

    /// <summary>Lines at the start that were skipped.</summary>
    public int SkippedLines { get; private set; }

    /// <summary>The start of the text; all of it where it is shorter than <see cref="HeadSize"/>.</summary>
    public ReadOnlySpan<byte> Head => _text.AsSpan(_start, _end - _start);

    /// <inheritdoc/>
    public override bool CanRead => true;

    /// <inheritdoc/>
    public override bool CanSeek => false;

    /// <inheritdoc/>
    public override bool CanWrite => false;

    /// <inheritdoc/>
    public override long Length => throw new NotSupportedException();

    /// <inheritdoc/>
    public override long Position
    {
        get => throw new NotSupportedException();
        set => throw new NotSupportedException();
    }

    /// <summary>Leaves out the first line, which is in the head.</summary>
    /// <param name="length">Its bytes, line break included.</param>
    public void SkipFirstLine(int length)
    {
        _start += length;
        Length8 -= length;
        SkippedLines = 1;
    }

    /// <inheritdoc/>
    public override int Read(Span<byte> buffer)
    {
        if (_start == _end)
        {
            _start = 0;
            _end = 0;
            Fill(0);
        }

        int count = Math.Min(buffer.Length, _end - _start);
        _text.AsSpan(_start, count).CopyTo(buffer);
        _start += count;
        return count;
    }

    /// <inheritdoc/>
    public override int Read(byte[] buffer, int offset, int count) => Read(buffer.AsSpan(offset, count));

    /// <inheritdoc/>
    public override void Flush()
    {
    }

    /// <inheritdoc/>
    public override long Seek(long offset, SeekOrigin origin) => throw new NotSupportedException();

    /// <inheritdoc/>
    public override void SetLength(long value) => throw new NotSupportedException();

    /// <inheritdoc/>
    public override void Write(byte[] buffer, int offset, int count) => throw new NotSupportedException();

    /// <inheritdoc/>
    protected override void Dispose(bool disposing)
    {
        if (disposing)
        {
            _decoder.Dispose();
        }

        base.Dispose(disposing);
    }

    private int Fill(int from)
    {
        if (Fault is not null)
        {
            return 0;
        }

        Span<byte> room = _text.AsSpan(from);
        int count = _decoder.Read(room);
        int nul = room[..count].IndexOf((byte)0);
        bool hasFault = nul >= 0 || _decoder.IsInvalid;
        count = nul >= 0 ? nul : count;
        CountLines(room[..count]);
        Length8 += count;
        _end = from + count;
        if (hasFault)
        {
            Fault = Explain(nul >= 0);
        }

        return count;
    }

    private void CountLines(ReadOnlySpan<byte> text)
    {
        if (text.IsEmpty)
        {
            return;
        }

        _lineBreaks += text.Count((byte)'\n');
        if (_endsInReturn && text[0] == '\n')
        {
            _lineBreaks--;
        }

        if (text.Contains((byte)'\r'))
        {
            _lineBreaks += text.Count((byte)'\r') - text.Count("\r\n"u8);
        }

        _endsInReturn = text[^1] == '\r';
    }

    private SourceFault Explain(bool isNul)
    {
        long line = _lineBreaks + 1;
        return _decoder.Kind switch
        {
            SourceKind.Workbook => new(0, "not-text", "is a spreadsheet workbook or an archive, not text: save the sheet as CSV (UTF-8)."),
            SourceKind.Utf16Unmarked => new(line, "utf16-without-mark", "looks like UTF-16 without a byte-order mark: save the file as UTF-8."),
            SourceKind.Utf16Little or SourceKind.Utf16Big when !isNul => new(line, "not-utf16", "has bytes that are not UTF-16 as its byte-order mark says: save the file as UTF-8."),
            _ when isNul => new(line, "nul-byte", "has a NUL character, so it is no text: export the file again."),
            _ => new(line, "not-utf8", "has bytes that are not UTF-8 (perhaps an older Windows or Latin-1 encoding): save the file as UTF-8."),
        };
    }
}
