using Campaigns.Catalog.Measurements;
using Campaigns.Catalog.Originals;

namespace Campaigns.Catalog.Loading;

/// <summary>Reads a measurement file on a thread of its own and hands out its rows in batches, so that reading the next rows and storing the last ones go on at the same time.</summary>
/// <remarks>
/// The numbers of experiments and labels are given out by the reading thread alone; whoever holds a batch may look up the texts of the numbers in it.
/// The order of the rows is the file's, so what comes of it does not depend on the threads.
/// </remarks>
internal sealed class RowSource : IDisposable
{
    private readonly BatchPipe _pipe;

    /// <param name="file">The opened file; it is read by the source's thread until that has ended.</param>
    /// <param name="tap">The file's bytes, which <paramref name="file"/> reads through it.</param>
    /// <param name="store">Stores a piece of the file, on the thread that asks for the batches.</param>
    /// <param name="cancel">Stops the reading.</param>
    public RowSource(MeasurementFile file, OriginalTap tap, Action<OriginalPiece> store, CancellationToken cancel) =>
        _pipe = new BatchPipe(pipe => ReadAll(file, tap, pipe), "reading measurements", cancel, store);

    /// <summary>Experiments by their numbers in the file.</summary>
    public Utf8Interner Codes { get; } = new();

    /// <summary>Group labels by their numbers in the file.</summary>
    public Utf8Interner Labels { get; } = new();

    /// <summary>The next batch; null at the end of the file, when the file may be asked for its problems.</summary>
    public RowBatch? Next() => _pipe.Next();

    /// <summary>Gives a batch back that is no longer needed.</summary>
    public void Recycle(RowBatch batch) => _pipe.Recycle(batch);

    public void Dispose() => _pipe.Dispose();

    private void ReadAll(MeasurementFile file, OriginalTap tap, BatchPipe pipe)
    {
        tap.Start(pipe.Put, pipe.Stop);
        try
        {
            ReadRows(file, pipe);
            if (file.Problems.IsEmpty)
            {
                tap.Finish();
            }
        }
        finally
        {
            tap.Abandon();
        }
    }

    private void ReadRows(MeasurementFile file, BatchPipe pipe)
    {
        RowBatch batch = pipe.Fresh();
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
                pipe.Put(batch);
                batch = pipe.Fresh();
            }
        }

        pipe.Put(batch);
    }
}
