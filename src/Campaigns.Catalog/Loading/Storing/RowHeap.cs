using System.Numerics;
using Campaigns.Catalog.Measurements;

namespace Campaigns.Catalog.Loading;

/// <summary>The rows of a file whose experiments do not come together, kept until the end and then handed out experiment by experiment.</summary>
/// <remarks>24 bytes a row, in blocks that never move, so that a growing file is never copied; the order within an experiment is the file's. Handing out costs O(rows).</remarks>
internal sealed class RowHeap
{
    private const int BlockSize = 1 << 16;

    private readonly List<Row[]> _blocks = [];
    private readonly List<BigInteger> _wide = [];
    private readonly Dictionary<int, Description> _descriptions = [];
    private readonly Utf8Interner _texts = new();
    private int _count;

    public int Count => _count;

    public void Add(int experiment, int label, in MeasurementRow row)
    {
        if (_count % BlockSize == 0)
        {
            _blocks.Add(new Row[BlockSize]);
        }

        ref Row kept = ref _blocks[^1][_count % BlockSize];
        kept.Experiment = experiment;
        kept.Label = label;
        kept.Line = (uint)row.Line;
        kept.Decimals = (short)row.Value.Decimals;
        if (row.IsMissing)
        {
            kept.Kind = RowKind.Missing;
        }
        else if (row.Value.IsWide)
        {
            kept.Kind = RowKind.Wide;
            kept.Mantissa = _wide.Count;
            _wide.Add(row.Value.WideMantissa);
        }
        else
        {
            kept.Mantissa = row.Value.Mantissa;
        }

        if (!row.Specimen.IsEmpty || !row.Block.IsEmpty || row.Order is not null)
        {
            _descriptions[_count] = new Description(InternOrNone(row.Specimen), InternOrNone(row.Block), row.Order);
        }

        _count++;
    }

    /// <summary>Hands the rows to a sink, the experiments in the order of their numbers.</summary>
    public void HandTo(ExperimentSink sink, Utf8Interner codes, CancellationToken cancel)
    {
        (int[] order, int[] starts) = ByExperiment(codes.Count);
        for (int experiment = 0; experiment < codes.Count; experiment++)
        {
            if ((experiment & 0xff) == 0)
            {
                cancel.ThrowIfCancellationRequested();
            }

            sink.Begin(codes[experiment], this[order[starts[experiment]]].Line);
            for (int i = starts[experiment]; i < starts[experiment + 1]; i++)
            {
                Hand(order[i], sink);
            }

            sink.End();
        }
    }

    private ref Row this[int index] => ref _blocks[index / BlockSize][index % BlockSize];

    private void Hand(int index, ExperimentSink sink)
    {
        ref Row row = ref this[index];
        ushort group = sink.GroupOf(row.Label, row.Line);
        switch (row.Kind)
        {
            case RowKind.Missing:
                sink.Values.MissingCount++;
                return;
            case RowKind.Wide:
                sink.Values.AddWide(_wide[(int)row.Mantissa], row.Decimals, group, row.Line);
                break;
            default:
                sink.Values.Add(row.Mantissa, row.Decimals, group, row.Line);
                break;
        }

        if (_descriptions.Count > 0 && _descriptions.TryGetValue(index, out Description description))
        {
            sink.Values.Describe(TextOrNone(description.Specimen), TextOrNone(description.Block), description.Order);
        }
    }

    /// <summary>A counting sort of the rows by experiment: stable, O(rows).</summary>
    private (int[] Order, int[] Starts) ByExperiment(int experiments)
    {
        var starts = new int[experiments + 1];
        for (int i = 0; i < _count; i++)
        {
            starts[this[i].Experiment + 1]++;
        }

        for (int e = 0; e < experiments; e++)
        {
            starts[e + 1] += starts[e];
        }

        int[] next = starts[..^1];
        var order = new int[_count];
        for (int i = 0; i < _count; i++)
        {
            order[next[this[i].Experiment]++] = i;
        }

        return (order, starts);
    }

    private int InternOrNone(ReadOnlySpan<byte> text) => text.IsEmpty ? -1 : _texts.Intern(text);

    private ReadOnlySpan<byte> TextOrNone(int number) => number < 0 ? default : _texts[number];

    private enum RowKind : byte
    {
        Narrow,
        Wide,
        Missing,
    }

    private struct Row
    {
        public long Mantissa;
        public int Experiment;
        public int Label;
        public uint Line;
        public short Decimals;
        public RowKind Kind;
    }

    private readonly record struct Description(int Specimen, int Block, long? Order);
}
