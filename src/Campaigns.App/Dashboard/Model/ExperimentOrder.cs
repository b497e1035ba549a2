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

        return column.Number is { } number ? ByNumber(experiments, number, isFalling) : ByText(experiments, column, isFalling);
    }

    private static int[] ByNumber(IReadOnlyList<ExperimentResult> experiments, Func<ExperimentResult, double?> number, bool isFalling)
    {
        double[] keys = new double[experiments.Count];
        int[] order = new int[experiments.Count];
        int with = 0, without = experiments.Count;
        for (int i = 0; i < experiments.Count; i++)
        {
            if (number(experiments[i]) is { } key)
            {
                keys[with] = isFalling ? -key : key;
                order[with++] = i;
            }
            else
            {
                order[--without] = i;
            }
        }

        Array.Sort(keys, order, 0, with);
        Array.Reverse(order, with, order.Length - with);
        for (int start = 0; start < with;)
        {
            int end = start + 1;
            while (end < with && keys[end] == keys[start])
            {
                end++;
            }

            Array.Sort(order, start, end - start);
            start = end;
        }

        return order;
    }

    private static int[] ByText(IReadOnlyList<ExperimentResult> experiments, ExperimentColumn column, bool isFalling)
    {
        string[] texts = new string[experiments.Count];
        for (int i = 0; i < texts.Length; i++)
        {
            texts[i] = column.TextOf(experiments[i]) ?? "";
        }

        (string Text, int Position)[] order = [.. texts.Select((text, i) => (text, i))];
        int sign = isFalling ? -1 : 1;
        Array.Sort(order, (a, b) => Compare(a, b, sign));
        return Array.ConvertAll(order, o => o.Position);
    }

    private static int Compare((string Text, int Position) a, (string Text, int Position) b, int sign)
    {
        int compared = a.Text.Length == 0 || b.Text.Length == 0
            ? (a.Text.Length == 0).CompareTo(b.Text.Length == 0)
            : sign * CodeOrder.Instance.Compare(a.Text, b.Text);
        return compared != 0 ? compared : a.Position.CompareTo(b.Position);
    }
}
