using System.Collections.Concurrent;
using System.Runtime.ExceptionServices;
using System.Security.Cryptography;
using Campaigns.Catalog.Loading;

namespace Campaigns.Catalog.Originals;

/// <summary>The bytes of a file on their way to the reader of its rows, of which a copy is digested and compressed on a thread beside it.</summary>
/// <remarks>
/// What is kept is what was read: there is no second reading between which and the first the file could change.
/// Memory holds a few pieces, however large the file is; a reader that runs ahead waits.
/// </remarks>
/// <param name="path">The file, for what is said of it.</param>
/// <param name="file">Its bytes, from the start; owned.</param>
internal sealed class OriginalTap(string path, Stream file) : Stream
{
    /// <summary>Bytes of a piece; the last one of a file has fewer.</summary>
    public const int PieceSize = 1 << 20;

    private const int PiecesAhead = 2;

    private readonly BlockingCollection<Raw> _filled = new(PiecesAhead);
    private readonly ConcurrentBag<byte[]> _free = [];
    private byte[]? _buffer;
    private int _count;
    private CancellationToken _stop;
    private Thread? _thread;
    private ExceptionDispatchInfo? _fault;
    private FileDigest? _digest;
    private bool _isDisposed;

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

    /// <summary>SHA-256 and size of all that was read, once <see cref="Finish"/> has been called.</summary>
    public FileDigest Digest => _digest ?? throw new InvalidOperationException("The file has not been read to its end.");

    /// <summary>Starts the thread that compresses; until then no more than the head of the file may be read.</summary>
    /// <param name="put">Takes each piece, in the order of the file; may wait until there is room for it.</param>
    /// <param name="stop">Ends the thread and whoever waits for it.</param>
    public void Start(Action<OriginalPiece> put, CancellationToken stop)
    {
        _stop = stop;
        _thread = new Thread(() => Run(put)) { IsBackground = true, Name = "keeping the original" };
        _thread.Start();
    }

    /// <inheritdoc/>
    public override int Read(Span<byte> buffer)
    {
        int count = file.Read(buffer);
        Keep(buffer[..count]);
        return count;
    }

    /// <inheritdoc/>
    public override int Read(byte[] buffer, int offset, int count) => Read(buffer.AsSpan(offset, count));

    /// <summary>Reads on to the end of the file and waits until every piece has been given out.</summary>
    /// <exception cref="LoadingException">The file can no longer be read.</exception>
    public void Finish()
    {
        ReadToEnd();
        if (_count > 0)
        {
            PassOn();
        }

        Abandon();
        _fault?.Throw();
        _stop.ThrowIfCancellationRequested();
    }

    /// <summary>Gives out what has been read in whole pieces, and ends the thread; after <see cref="Finish"/> there is nothing left to do.</summary>
    public void Abandon()
    {
        _filled.CompleteAdding();
        _thread?.Join();
    }

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
        if (disposing && !_isDisposed)
        {
            _isDisposed = true;
            Abandon();
            _filled.Dispose();
            file.Dispose();
        }

        base.Dispose(disposing);
    }

    private void ReadToEnd()
    {
        byte[] rest = new byte[1 << 12];
        try
        {
            while (Read(rest) > 0)
            {
            }
        }
        catch (Exception e) when (FileOpening.IsOfTheWorld(e))
        {
            throw FileOpening.Explain(path, e);
        }
    }

    private void Keep(ReadOnlySpan<byte> bytes)
    {
        while (!bytes.IsEmpty)
        {
            _buffer ??= _free.TryTake(out byte[]? used) ? used : new byte[PieceSize];
            int fitting = Math.Min(bytes.Length, PieceSize - _count);
            bytes[..fitting].CopyTo(_buffer.AsSpan(_count));
            _count += fitting;
            bytes = bytes[fitting..];
            if (_count == PieceSize)
            {
                PassOn();
            }
        }
    }

    private void PassOn()
    {
        _filled.Add(new Raw(_buffer!, _count), _stop);
        _buffer = null;
        _count = 0;
    }

    private void Run(Action<OriginalPiece> put)
    {
        try
        {
            using IncrementalHash hash = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
            byte[] scratch = [];
            long size = 0;
            int position = 0;
            foreach (Raw raw in _filled.GetConsumingEnumerable(_stop))
            {
                ReadOnlySpan<byte> bytes = raw.Buffer.AsSpan(0, raw.Count);
                hash.AppendData(bytes);
                size += bytes.Length;
                byte[] content = PieceCompression.Compress(bytes, ref scratch);
                _free.Add(raw.Buffer);
                put(new OriginalPiece(++position, raw.Count, content));
            }

            _digest = new FileDigest(Convert.ToHexStringLower(hash.GetHashAndReset()), size);
        }
        catch (OperationCanceledException)
        {
            // Whoever stopped the reading knows.
        }
#pragma warning disable CA1031 // Handed over to the thread that reads the file, and thrown there.
        catch (Exception error)
        {
            _fault = ExceptionDispatchInfo.Capture(error);
            _free.Clear();
            while (_filled.TryTake(out _, Timeout.Infinite))
            {
                // The reader must not wait for room that nobody makes.
            }
        }
#pragma warning restore CA1031
    }

    private readonly record struct Raw(byte[] Buffer, int Count);
}
