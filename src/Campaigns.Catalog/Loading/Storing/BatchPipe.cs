using System.Collections.Concurrent;
using System.Runtime.ExceptionServices;
using Campaigns.Catalog.Originals;

namespace Campaigns.Catalog.Loading;

/// <summary>Hands batches of rows from a thread that makes them to the one that stores them, in the order in which they were made, a few batches ahead.</summary>
/// <remarks>Pieces of the file itself come through the same pipe, so that whoever stores them never waits for the one while the other is what blocks its maker.</remarks>
internal sealed class BatchPipe : IDisposable
{
    private const int BatchesAhead = 6;

    private readonly BlockingCollection<Item> _full = new(BatchesAhead);
    private readonly ConcurrentBag<RowBatch> _free = [];
    private readonly CancellationTokenSource _stop;
    private readonly Action<OriginalPiece>? _store;
    private readonly Thread _thread;
    private ExceptionDispatchInfo? _fault;

    /// <param name="make">Makes the batches, on a thread of its own: takes empty ones with <see cref="Fresh"/> and gives them with <see cref="Put(RowBatch)"/>.</param>
    /// <param name="name">What the thread does.</param>
    /// <param name="cancel">Stops the making.</param>
    /// <param name="store">Stores a piece of the file, on the thread that asks for the batches; null where none come.</param>
    public BatchPipe(Action<BatchPipe> make, string name, CancellationToken cancel, Action<OriginalPiece>? store = null)
    {
        _store = store;
        _stop = CancellationTokenSource.CreateLinkedTokenSource(cancel);
        _thread = new Thread(() => Run(make)) { IsBackground = true, Name = name };
        _thread.Start();
    }

    /// <summary>An empty batch, for the maker.</summary>
    public RowBatch Fresh() => _free.TryTake(out RowBatch? batch) ? batch : new RowBatch();

    /// <summary>Passes a batch on, for the maker.</summary>
    public void Put(RowBatch batch) => _full.Add(new Item(batch, null), _stop.Token);

    /// <summary>Passes a piece of the file on, for a thread that the maker waits for.</summary>
    public void Put(OriginalPiece piece) => _full.Add(new Item(null, piece), _stop.Token);

    /// <summary>Tells the maker, and threads that it started, to stop.</summary>
    public CancellationToken Stop => _stop.Token;

    /// <summary>The next batch; null when all were given out. Pieces that come before it are stored.</summary>
    public RowBatch? Next()
    {
        while (_full.TryTake(out Item item, Timeout.Infinite, _stop.Token))
        {
            if (item.Batch is not null)
            {
                return item.Batch;
            }

            _store!(item.Piece!);
        }

        _thread.Join();
        _fault?.Throw();

        // A maker that was stopped has given out less than all: that is never the end.
        _stop.Token.ThrowIfCancellationRequested();
        return null;
    }

    /// <summary>Gives a batch back that is no longer needed.</summary>
    public void Recycle(RowBatch batch)
    {
        batch.Clear();
        _free.Add(batch);
    }

    public void Dispose()
    {
        _stop.Cancel();
        _thread.Join();
        _full.Dispose();
        _stop.Dispose();
    }

    private void Run(Action<BatchPipe> make)
    {
        try
        {
            make(this);
        }
        catch (OperationCanceledException)
        {
            // Whoever stopped the pipe knows.
        }
#pragma warning disable CA1031 // Handed over to the thread that asks for the batches, and thrown there.
        catch (Exception error)
        {
            _fault = ExceptionDispatchInfo.Capture(error);
        }
#pragma warning restore CA1031
        finally
        {
            _full.CompleteAdding();
        }
    }

    private readonly record struct Item(RowBatch? Batch, OriginalPiece? Piece);
}
