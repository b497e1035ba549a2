using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Measurements;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Units;

namespace Campaigns.Catalog.Results;

/// <summary>What a test must know of an experiment besides its values.</summary>
/// <param name="Id">Key within the catalog.</param>
/// <param name="GroupCount">Groups of its set.</param>
/// <param name="GroupsArePlanned">Whether the plan named them.</param>
/// <param name="Replicates">Planned values in each group; null where the plan gives no number.</param>
/// <param name="Test">The planned test.</param>
/// <param name="Draws">Random arrangements that the test may draw.</param>
/// <param name="Excluded">Observations that are left out.</param>
internal readonly record struct ExperimentToTest(
    long Id,
    int GroupCount,
    bool GroupsArePlanned,
    int? Replicates,
    GroupTest Test,
    RandomDraws Draws,
    IReadOnlySet<StandingExclusions.Place> Excluded);

/// <summary>Some hundred experiments on their way from the catalog through their tests and back: packed values in, outcomes out.</summary>
internal sealed class TestBatch
{
    public const int Size = 256;

    private const int FewDrawing = 4;

    private readonly List<ExperimentToTest> _experiments = new(Size);
    private readonly List<TestOutcome?> _outcomes = new(Size);
    private readonly List<(int Experiment, long LoadId, int End)> _parts = new(Size);
    private byte[] _packed = new byte[1 << 16];
    private int _length;
    private int _drawing;

    public int Count => _experiments.Count;

    /// <summary>Experiments that draw random arrangements take a thousand times as long as others; a few of them make a batch, so that progress is seen and the work can be stopped.</summary>
    public bool IsFull => Count >= Size || _drawing >= FewDrawing;

    public long LastId => Count == 0 ? 0 : _experiments[^1].Id;

    public ExperimentToTest this[int index] => _experiments[index];

    /// <summary>The outcome of an experiment; null where it was left alone because planned values are missing.</summary>
    public TestOutcome? OutcomeOf(int index) => _outcomes[index];

    public void Clear()
    {
        _experiments.Clear();
        _outcomes.Clear();
        _parts.Clear();
        _length = 0;
        _drawing = 0;
    }

    public void Begin(in ExperimentToTest experiment)
    {
        _experiments.Add(experiment);
        _drawing += experiment.Test.DrawsAtRandom ? 1 : 0;
    }

    /// <summary>Adds what one load brought to the experiment begun last.</summary>
    public void Add(long loadId, ReadOnlySpan<byte> packed)
    {
        if (_length + packed.Length > _packed.Length)
        {
            Array.Resize(ref _packed, Math.Max(_length + packed.Length, _packed.Length * 2));
        }

        packed.CopyTo(_packed.AsSpan(_length));
        _length += packed.Length;
        _parts.Add((Count - 1, loadId, _length));
    }

    /// <summary>Runs the tests.</summary>
    /// <param name="includeIncomplete">Whether experiments short of their planned values are tested too.</param>
    /// <param name="values">Scratch.</param>
    public void Test(bool includeIncomplete, ObservationColumns values)
    {
        var completeness = new Completeness();
        var leftOut = new ExcludedPositions();
        int start = 0;
        int part = 0;
        for (int i = 0; i < Count; i++)
        {
            ExperimentToTest e = _experiments[i];
            values.Clear();
            leftOut.Begin(e.Excluded);
            for (; part < _parts.Count && _parts[part].Experiment == i; part++)
            {
                PackedMeasurements.Read(_packed.AsSpan(start, _parts[part].End - start), values);
                leftOut.Find(_parts[part].LoadId, values);
                start = _parts[part].End;
            }

            // A value that was measured and is left out was planned for: it keeps the experiment complete.
            bool ready = includeIncomplete || completeness.IsComplete(values, e.GroupCount, e.GroupsArePlanned, e.Replicates);
            values.RemoveAt(leftOut.Positions);
            _outcomes.Add(ready ? ExperimentalUnits.Test(e.Test, values.Sample(e.GroupCount), e.Draws) : null);
        }
    }
}
