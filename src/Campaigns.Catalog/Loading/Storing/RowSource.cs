using System.Collections.Concurrent;
using System.Runtime.ExceptionServices;
using Campaigns.Catalog.Measurements;

namespace Campaigns.Catalog.Loading;

/// <summary>Reads a measurement file on a thread of its own and hands out its rows in batches, so that reading the next rows and storing the last ones go on at the same time.</summary>
/// <remarks>
/// The numbers of experiments and labels are given out by the reading thread alone; whoever holds a batch may look up the texts of the numbers in it.
/// The order of the rows is the file's, so what comes of it does not depend on the threads.
/// </remarks>
internal sealed class RowSource : IDisposable
{
    private const int BatchesAhead = 4;

    private readonly BlockingCollection<RowBatch> _full = new(BatchesAhead);
    private readonly ConcurrentBag<RowBatch> _free = [];
    private readonly CancellationTokenSource _stop;
    private readonly Thread _thread;
    private ExceptionDispatchInfo? _fault;

    /// <param name="file">The opened file; it is read by the source's thread until that has ended.</param>
    /// <param name="cancel">Stops the reading.</param>
    public RowSource(MeasurementFile file, CancellationToken cancel)
    {
        _stop = CancellationTokenSource.CreateLinkedTokenSource(cancel);
        _thread = new Thread(() => ReadAll(file)) { IsBackground = true, Name = "reading measurements" };
        _thread.Start();
    }

    /// <summary>Experiments by their numbers in the file.</summary>
    public Utf8Interner Codes { get; } = new();

    /// <summary>Group labels by their numbers in the file.</summary>
    public Utf8Interner Labels { get; } = new();

    /// <summary>The next batch; null at the end of the file, when the file may be asked for its problems.</summary>
    public RowBatch? Next()
    {
        if (_full.TryTake(out RowBatch? batch, Timeout.Infinite, _stop.Token))
        {
            return batch;
        }

        _thread.Join();
        _fault?.Throw();
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

    private void ReadAll(MeasurementFile file)
    {
        try
        {
            RowBatch batch = Fresh();
            int experiment = -1;
            while (file.Read(out MeasurementRow row))
            {
                if (experiment < 0 || !row.Experiment.SequenceEqual(Codes[experiment]))
                {
                    experiment = Codes.Intern(row.Experiment);
                }

                batch.Add(experiment, Labels.Intern(row.Group), row);
                if (batch.IsFull)
                {
                    _full.Add(batch, _stop.Token);
                    batch = Fresh();
                }
            }

            _full.Add(batch, _stop.Token);
        }
        catch (OperationCanceledException)
        {
            // Whoever stopped the source knows.
        }
#pragma warning disable CA1031 // Handed over to the thread that asks for the rows, and thrown there.
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

    private RowBatch Fresh() => _free.TryTake(out RowBatch? batch) ? batch : new RowBatch();
}
