using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Results;

/// <summary>The tested part of a family as columns: experiments and their p-values, in the plan's order.</summary>
internal sealed class FamilyColumns
{
    private long[] _experimentIds;
    private PValue[] _p;

    public FamilyColumns(int capacity = 256)
    {
        _experimentIds = new long[capacity];
        _p = new PValue[capacity];
    }

    /// <param name="experimentIds">Keys, ascending.</param>
    /// <param name="p">One p-value for each.</param>
    /// <param name="count">How many of them there are; the rest of the arrays, which are of one length, is room for more.</param>
    public FamilyColumns(long[] experimentIds, PValue[] p, int count)
    {
        _experimentIds = experimentIds;
        _p = p;
        Count = count;
    }

    /// <summary>Experiments with a p-value.</summary>
    public int Count { get; private set; }

    /// <summary>Keys, ascending.</summary>
    public ReadOnlySpan<long> ExperimentIds => _experimentIds.AsSpan(0, Count);

    /// <summary>One p-value for each.</summary>
    public ReadOnlySpan<PValue> P => _p.AsSpan(0, Count);

    /// <summary>The p-values as memory that may be kept.</summary>
    public ReadOnlyMemory<PValue> PMemory => _p.AsMemory(0, Count);

    public void Add(long experimentId, PValue p)
    {
        if (Count == _p.Length)
        {
            Array.Resize(ref _experimentIds, Math.Max(16, Count * 2));
            Array.Resize(ref _p, Math.Max(16, Count * 2));
        }

        _experimentIds[Count] = experimentId;
        _p[Count++] = p;
    }

    /// <summary>These columns with newer p-values in the place of older ones and added ones in their order; null in the newer ones takes an experiment out. O(n + m).</summary>
    /// <remarks>Experiments that all come after those at hand are added to these very columns: then it takes O(m).</remarks>
    /// <param name="newer">The newer ones, by ascending keys.</param>
    public FamilyColumns With(IReadOnlyList<(long ExperimentId, PValue? P)> newer)
    {
        if (Count == 0 || newer.Count == 0 || newer[0].ExperimentId > _experimentIds[Count - 1])
        {
            foreach ((long id, PValue? p) in newer.Where(n => n.P is not null))
            {
                Add(id, p!.Value);
            }

            return this;
        }

        var merged = new FamilyColumns(Count + newer.Count);
        int old = 0;
        foreach ((long id, PValue? p) in newer)
        {
            int next = ExperimentIds[old..].BinarySearch(id);
            next = old + (next < 0 ? ~next : next);
            merged.Append(this, old, next);
            old = next;
            if (old < Count && _experimentIds[old] == id)
            {
                old++;
            }

            if (p is { } given)
            {
                merged.Add(id, given);
            }
        }

        merged.Append(this, old, Count);
        return merged;
    }

    /// <summary>Adds a stretch of other columns; there is room for it.</summary>
    private void Append(FamilyColumns other, int from, int to)
    {
        other.ExperimentIds[from..to].CopyTo(_experimentIds.AsSpan(Count));
        other.P[from..to].CopyTo(_p.AsSpan(Count));
        Count += to - from;
    }
}
