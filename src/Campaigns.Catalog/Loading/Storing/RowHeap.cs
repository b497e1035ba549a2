using Campaigns.Catalog.Measurements;

namespace Campaigns.Catalog.Loading;

/// <summary>The rows of a file whose experiments do not come together, kept until the end and then handed out experiment by experiment.</summary>
/// <remarks>24 bytes a row, in batches that never move, so that a growing file is never copied; the order within an experiment is the file's. Handing out costs O(rows).</remarks>
internal sealed class RowHeap
{
    private readonly List<RowBatch> _batches = [];

    /// <summary>Keeps a batch; all but the last must be full.</summary>
    public void Add(RowBatch batch) => _batches.Add(batch);

    /// <summary>The rows in batches, the experiments in the order of their codes, so that the catalog's index grows at its end; put together on a thread of its own.</summary>
    public BatchPipe InOrder(Utf8Interner codes, CancellationToken cancel) =>
        new(pipe => PutInOrder(codes, pipe), "ordering measurements", cancel);

    private void PutInOrder(Utf8Interner codes, BatchPipe pipe)
    {
        (int[] order, int[] starts) = ByExperiment(codes.Count);
        int[] byCode = [.. Enumerable.Range(0, codes.Count)];
        Array.Sort(byCode, (a, b) => codes[a].SequenceCompareTo(codes[b]));
        RowBatch batch = pipe.Fresh();
        foreach (int experiment in byCode)
        {
            for (int i = starts[experiment]; i < starts[experiment + 1]; i++)
            {
                batch.Add(_batches[order[i] / RowBatch.Size], order[i] % RowBatch.Size);
                if (batch.IsFull)
                {
                    pipe.Put(batch);
                    batch = pipe.Fresh();
                }
            }
        }

        pipe.Put(batch);
    }

    private ref readonly FileRow Row(int index) => ref _batches[index / RowBatch.Size][index % RowBatch.Size];

    /// <summary>A counting sort of the rows by experiment: stable, O(rows).</summary>
    private (int[] Order, int[] Starts) ByExperiment(int experiments)
    {
        var starts = new int[experiments + 1];
        int rows = 0;
        foreach (RowBatch batch in _batches)
        {
            for (int i = 0; i < batch.Count; i++)
            {
                starts[batch[i].Experiment + 1]++;
            }

            rows += batch.Count;
        }

        for (int e = 0; e < experiments; e++)
        {
            starts[e + 1] += starts[e];
        }

        int[] next = starts[..^1];
        var order = new int[rows];
        for (int i = 0; i < rows; i++)
        {
            order[next[Row(i).Experiment]++] = i;
        }

        return (order, starts);
    }
}
