namespace Campaigns.Catalog.Loading;

/// <summary>The groups that the rows of one experiment name, numbered from 0 in the order of their first appearance.</summary>
internal sealed class ExperimentLabels
{
    private const int FewLabels = 16;

    private readonly Dictionary<int, int> _many = [];
    private int[] _ids = new int[FewLabels];
    private long[] _firstLines = new long[FewLabels];
    private int _last;

    public int Count { get; private set; }

    /// <summary>File-wide numbers of the labels.</summary>
    public ReadOnlySpan<int> Ids => _ids.AsSpan(0, Count);

    /// <summary>Line on which each label came first.</summary>
    public long FirstLine(int number) => _firstLines[number];

    public void Clear()
    {
        Count = 0;
        _last = 0;
        _many.Clear();
    }

    /// <summary>The experiment's own number of a label.</summary>
    /// <param name="id">The label's file-wide number.</param>
    /// <param name="line">The line that names it.</param>
    public ushort NumberOf(int id, long line)
    {
        if (_last < Count && _ids[_last] == id)
        {
            return (ushort)_last;
        }

        if (Count <= FewLabels)
        {
            int at = Ids.IndexOf(id);
            _last = at >= 0 ? at : Add(id, line);
        }
        else if (!_many.TryGetValue(id, out _last))
        {
            _last = Add(id, line);
        }

        return (ushort)_last;
    }

    private int Add(int id, long line)
    {
        if (Count > ushort.MaxValue)
        {
            throw new LoadingException(FormattableString.Invariant($"Line {line} names the {Count + 1}th group of one experiment; an experiment compares at most {ushort.MaxValue + 1} groups."));
        }

        if (Count == _ids.Length)
        {
            Array.Resize(ref _ids, Count * 2);
            Array.Resize(ref _firstLines, Count * 2);
        }

        _ids[Count] = id;
        _firstLines[Count] = line;
        if (Count == FewLabels)
        {
            for (int i = 0; i < Count; i++)
            {
                _many[_ids[i]] = i;
            }
        }

        if (Count >= FewLabels)
        {
            _many[id] = Count;
        }

        return Count++;
    }
}
