using System.Collections.Concurrent;
using System.Runtime.ExceptionServices;
using Campaigns.Catalog.Measurements;

namespace Campaigns.Catalog.Results;

/// <summary>Tests batches of experiments on a thread of its own, in the order in which they are given, while the caller reads the next ones and stores the last ones.</summary>
internal sealed class TestPipeline : IDisposable
{
    private const int MostUnderWay = 4;

    private readonly BlockingCollection<TestBatch> _todo = [];
    private readonly BlockingCollection<TestBatch> _done = [];
    private readonly Stack<TestBatch> _free = new();
    private readonly Action<TestBatch> _store;
    private readonly Thread _thread;
    private ExceptionDispatchInfo? _fault;
    private int _underWay;

    /// <param name="includeIncomplete">Whether experiments short of their planned values are tested too.</param>
    /// <param name="store">Takes tested batches, on the caller's thread.</param>
    public TestPipeline(bool includeIncomplete, Action<TestBatch> store)
    {
        _store = store;
        _thread = new Thread(() => TestAll(includeIncomplete)) { IsBackground = true, Name = "testing experiments" };
        _thread.Start();
    }

    /// <summary>An empty batch.</summary>
    public TestBatch Fresh() => _free.TryPop(out TestBatch? batch) ? batch : new TestBatch();

    /// <summary>Gives a batch to be tested, and stores what is done meanwhile.</summary>
    public void Give(TestBatch batch)
    {
        _todo.Add(batch);
        _underWay++;
        while (_underWay >= MostUnderWay || _done.Count > 0)
        {
            StoreNext();
        }
    }

    /// <summary>Stores everything that is still under way.</summary>
    public void Finish()
    {
        _todo.CompleteAdding();
        while (_underWay > 0)
        {
            StoreNext();
        }
    }

    public void Dispose()
    {
        _todo.CompleteAdding();
        _thread.Join();
        _todo.Dispose();
        _done.Dispose();
    }

    private void StoreNext()
    {
        if (!_done.TryTake(out TestBatch? batch, Timeout.Infinite))
        {
            _fault!.Throw();
        }

        _underWay--;
        _store(batch!);
        batch!.Clear();
        _free.Push(batch);
    }

    private void TestAll(bool includeIncomplete)
    {
        var values = new ObservationColumns();
        try
        {
            foreach (TestBatch batch in _todo.GetConsumingEnumerable())
            {
                batch.Test(includeIncomplete, values);
                _done.Add(batch);
            }
        }
#pragma warning disable CA1031 // Handed over to the thread that stores, and thrown there.
        catch (Exception error)
        {
            _fault = ExceptionDispatchInfo.Capture(error);
        }
#pragma warning restore CA1031
        finally
        {
            _done.CompleteAdding();
        }
    }
}
