using System.Globalization;
using System.Numerics;
using Campaigns.Statistics.Checks;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;
using Campaigns.Statistics.Units;

namespace Campaigns.Statistics.Tests.Checks;

/// <summary>Rows of an experiment as exact decimals, for the checks.</summary>
internal sealed class CheckedExperiment
{
    private readonly BigInteger[] _mantissas;
    private readonly int _decimals;
    private readonly ushort[] _groups;
    private readonly long[] _orders;
    private readonly int[] _blocks;

    private CheckedExperiment((string Group, (BigInteger Mantissa, int Exponent) Value)[] rows, IEnumerable<string> labels, long[] orders, int[] blocks)
    {
        Labels = [.. labels.Distinct()];
        int lowest = rows.Length == 0 ? 0 : rows.Min(r => r.Value.Exponent);
        _mantissas = [.. rows.Select(r => r.Value.Mantissa * BigInteger.Pow(10, r.Value.Exponent - lowest))];
        _decimals = -lowest;
        _groups = [.. rows.Select(r => (ushort)Array.IndexOf(Labels, r.Group))];
        _orders = orders;
        _blocks = blocks;
    }

    public string[] Labels { get; }

    /// <summary>Values as they were typed.</summary>
    public static CheckedExperiment OfText(IEnumerable<(string Group, string Value)> rows) => OfText(rows, [], []);

    public static CheckedExperiment OfText(IEnumerable<(string Group, string Value)> rows, long[] orders, int[] blocks)
    {
        (string Group, string Value)[] all = [.. rows];
        return new([.. all.Select(r => (r.Group, TypedSample.ExactDecimal(r.Value)))], all.Select(r => r.Group), orders, blocks);
    }

    /// <summary>Values of groups A, B, C, ..., separated by spaces.</summary>
    public static CheckedExperiment Of(params string[] groups) =>
        new(
            [.. groups.SelectMany((values, i) => values.Split(' ', StringSplitOptions.RemoveEmptyEntries).Select(v => (Letter(i), TypedSample.ExactDecimal(v))))],
            groups.Select((_, i) => Letter(i)),
            [],
            []);

    /// <summary>The doubles nearest to what a table holds, all their binary digits, with the table's run order where it has one.</summary>
    public static CheckedExperiment OfTable(IEnumerable<ReferenceRow> rows, bool withOrder)
    {
        ReferenceRow[] all = [.. rows];
        return new(
            [.. all.Select(r => (r.Text("group"), TypedSample.ExactDecimal(r.Number("value"))))],
            all.Select(r => r.Text("group")),
            withOrder ? [.. all.Select(r => (long)r.Integer("order"))] : [],
            []);
    }

    public CheckedExperiment InOrder(params long[] orders) =>
        new([.. _groups.Select((g, i) => (Labels[g], (_mantissas[i], -_decimals)))], Labels, orders, _blocks);

    public CheckFinding Look(ExperimentCheck check)
    {
        GroupedSample units = Units();
        return check.Look(new CheckSubject { Units = units, Fit = Fit(units), Labels = Labels });
    }

    public IReadOnlyList<CheckLine> Report()
    {
        GroupedSample units = Units();
        return CheckReport.Of(new CheckSubject { Units = units, Fit = Fit(units), Labels = Labels });
    }

    private static FittedLayout? Fit(GroupedSample units) => FittedLayout.OneWay(units);

    private GroupedSample Units() =>
        _mantissas.All(m => m >= long.MinValue && m <= long.MaxValue)
            ? new GroupedSample(_mantissas.Select(m => (long)m).ToArray(), _decimals, _groups, Labels.Length) { Orders = _orders, Blocks = _blocks }
            : new GroupedSample(_mantissas, _decimals, _groups, Labels.Length) { Orders = _orders, Blocks = _blocks };

    private static string Letter(int i) => i < 26 ? ((char)('A' + i)).ToString() : "G" + i.ToString(CultureInfo.InvariantCulture);
}
