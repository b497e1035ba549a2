using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Model;

/// <summary>Sorts experiments by a column.</summary>
public static class ExperimentOrder
{
    /// <summary>The order by a column: what has no value comes last either way, ties stay in the plan's order.</summary>
    /// <param name="experiments">The experiments in the plan's order.</param>
    /// <param name="column">The column; null for the plan's order.</param>
    /// <param name="isFalling">Whether the largest comes first.</param>
    /// <returns>Positions in <paramref name="experiments"/>, first to last.</returns>
    public static int[] By(IReadOnlyList<ExperimentResult> experiments, ExperimentColumn? column, bool isFalling)
    {
        if (column is null)
        {
            int[] plan = [.. Enumerable.Range(0, experiments.Count)];
            if (isFalling)
            {
                Array.Reverse(plan);
            }

            return plan;
        }

        return column.Number is { } number
            ? Sorted(experiments, e => number(e) is { } value ? (true, value) : (false, 0), Comparer<double>.Default, isFalling)
            : Sorted(experiments, e => column.TextOf(e) is { Length: > 0 } text ? (true, CodeOrder.KeyOf(text)) : (false, ""), StringComparer.Ordinal, isFalling);
    }

    private static int[] Sorted<TKey>(IReadOnlyList<ExperimentResult> experiments, Func<ExperimentResult, (bool Has, TKey Key)> keyOf, IComparer<TKey> comparer, bool isFalling)
    {
        TKey[] keys = new TKey[experiments.Count];
        int[] order = new int[experiments.Count];
        int with = 0, without = experiments.Count;
        for (int i = 0; i < experiments.Count; i++)
        {
            (bool has, TKey key) = keyOf(experiments[i]);
            order[has ? with : --without] = i;
            if (has)
            {
                keys[with++] = key;
            }
        }

        Array.Reverse(order, with, order.Length - with);
        Array.Sort(keys, order, 0, with, comparer);
        if (isFalling)
        {
            Array.Reverse(keys, 0, with);
            Array.Reverse(order, 0, with);
        }

        // The library's sort does not keep ties in order.
        for (int start = 0; start < with;)
        {
            int end = start + 1;
            while (end < with && comparer.Compare(keys[end], keys[start]) == 0)
            {
                end++;
            }

            Array.Sort(order, start, end - start);
            start = end;
        }

        return order;
    }
}
