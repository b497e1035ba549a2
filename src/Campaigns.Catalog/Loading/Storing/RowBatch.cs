using System.Numerics;
using Campaigns.Catalog.Measurements;

namespace Campaigns.Catalog.Loading;

/// <summary>How a row's value is kept.</summary>
internal enum RowKind : byte
{
    /// <summary>A 64-bit mantissa.</summary>
    Narrow,

    /// <summary>A place in the list of wide mantissas.</summary>
    Wide,

    /// <summary>Marked as missing.</summary>
    Missing,
}

/// <summary>A row of a measurement file without its texts: experiment and group by their numbers in the file.</summary>
internal struct FileRow
{
    public long Mantissa;
    public int Experiment;
    public int Label;
    public uint Line;
    public short Decimals;
    public RowKind Kind;
}

/// <summary>Some thousand consecutive rows of a file, 24 bytes each, with what few of them have besides: wide mantissas, specimens, blocks, places in a run order.</summary>
internal sealed class RowBatch
{
    public const int Size = 1 << 14;

    private readonly FileRow[] _rows = new FileRow[Size];
    private readonly List<BigInteger> _wide = [];
    private readonly List<Description> _descriptions = [];
    private readonly Utf8Interner _texts = new();

    public int Count { get; private set; }

    public bool IsFull => Count == Size;

    public ref readonly FileRow this[int index] => ref _rows[index];

    public void Clear()
    {
        Count = 0;
        _wide.Clear();
        _descriptions.Clear();
        _texts.Clear();
    }

    public void Add(int experiment, int label, in MeasurementRow row)
    {
        ref FileRow kept = ref _rows[Count];
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
            kept.Kind = RowKind.Narrow;
            kept.Mantissa = row.Value.Mantissa;
        }

        AddDescription(row.Specimen, row.Block, row.Order);
        Count++;
    }

    /// <summary>Adds a row of another batch.</summary>
    public void Add(RowBatch other, int index)
    {
        ref FileRow kept = ref _rows[Count];
        kept = other._rows[index];
        if (kept.Kind == RowKind.Wide)
        {
            _wide.Add(other._wide[(int)kept.Mantissa]);
            kept.Mantissa = _wide.Count - 1;
        }

        Description description = index < other._descriptions.Count ? other._descriptions[index] : Description.None;
        AddDescription(other.TextOrNone(description.Specimen), other.TextOrNone(description.Block), description.Order);
        Count++;
    }

    /// <summary>Hands one row to the experiment that the sink has at hand.</summary>
    public void HandTo(ExperimentSink sink, int index)
    {
        ref FileRow row = ref _rows[index];
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

        if (index < _descriptions.Count)
        {
            Description description = _descriptions[index];
            sink.Values.Describe(TextOrNone(description.Specimen), TextOrNone(description.Block), description.Order);
        }
    }

    /// <summary>Either no row of a file is described or nearly all are, so the descriptions stand beside the rows, one each, from the first that has one.</summary>
    private void AddDescription(ReadOnlySpan<byte> specimen, ReadOnlySpan<byte> block, long? order)
    {
        if (_descriptions.Count > 0 || !specimen.IsEmpty || !block.IsEmpty || order is not null)
        {
            while (_descriptions.Count < Count)
            {
                _descriptions.Add(Description.None);
            }

            _descriptions.Add(new Description(InternOrNone(specimen), InternOrNone(block), order));
        }
    }

    private int InternOrNone(ReadOnlySpan<byte> text) => text.IsEmpty ? -1 : _texts.Intern(text);

    private ReadOnlySpan<byte> TextOrNone(int number) => number < 0 ? default : _texts[number];

    private readonly record struct Description(int Specimen, int Block, long? Order)
    {
        public static Description None => new(-1, -1, null);
    }
}
