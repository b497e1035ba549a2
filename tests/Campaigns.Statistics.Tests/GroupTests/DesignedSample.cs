using System.Globalization;
using System.Numerics;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.GroupTests;

/// <summary>One row of an experiment with its block and specimen; an empty word stands for one that is not recorded.</summary>
internal sealed record DesignedRow(string Group, string Block, string Specimen, string Value);

/// <summary>Rows of an experiment in blocks or with several readings of a specimen, as exact decimals.</summary>
internal sealed class DesignedSample
{
    private readonly BigInteger[] _mantissas;
    private readonly int _decimals;
    private readonly ushort[] _groups;
    private readonly int[] _blocks;
    private readonly int[] _specimens;

    public DesignedSample(IEnumerable<DesignedRow> rows)
    {
        Rows = [.. rows];
        (BigInteger Mantissa, int Exponent)[] values = [.. Rows.Select(r => TypedSample.ExactDecimal(r.Value))];
        int lowest = values.Min(v => v.Exponent);
        _decimals = -lowest;
        _mantissas = [.. values.Select(v => v.Mantissa * BigInteger.Pow(10, v.Exponent - lowest))];
        GroupNames = [.. Rows.Select(r => r.Group).Distinct()];
        _groups = [.. Rows.Select(r => (ushort)Array.IndexOf(GroupNames, r.Group))];
        _blocks = Numbers(r => r.Block);
        _specimens = Numbers(r => r.Specimen);
    }

    public DesignedRow[] Rows { get; }

    public string[] GroupNames { get; }

    public int[] Blocks => _blocks;

    public ushort[] Groups => _groups;

    /// <summary>In 64 bits where the mantissas fit.</summary>
    public GroupedSample Sample => _mantissas.All(m => m >= long.MinValue && m <= long.MaxValue)
        ? new GroupedSample(_mantissas.Select(m => (long)m).ToArray(), _decimals, _groups, GroupNames.Length) { Blocks = _blocks, Specimens = _specimens }
        : Wide;

    public GroupedSample Wide => new(_mantissas, _decimals, _groups, GroupNames.Length) { Blocks = _blocks, Specimens = _specimens };

    /// <summary>The experiments of a reference table with the columns experiment, group, value and the named one.</summary>
    public static Dictionary<string, DesignedSample> Read(string path, bool blocks) =>
        ReferenceTable.Read(path).Rows.GroupBy(r => r.Text("experiment")).ToDictionary(
            e => e.Key,
            e => new DesignedSample(e.Select(r => new DesignedRow(r.Text("group"), blocks ? r.Text("block") : "", blocks ? "" : r.Text("specimen"), r.Text("value")))));

    public DesignedSample Shuffled(int seed)
    {
        DesignedRow[] rows = [.. Rows];
        new Random(seed).Shuffle(rows);
        return new DesignedSample(rows);
    }

    /// <summary>Every value times a factor plus a constant, exactly.</summary>
    public DesignedSample Shifted(BigInteger factor, BigInteger constant) =>
        new(Rows.Select((r, i) => r with { Value = ((_mantissas[i] * factor) + constant).ToString(CultureInfo.InvariantCulture) }));

    private int[] Numbers(Func<DesignedRow, string> word)
    {
        string[] names = [.. Rows.Select(word).Where(w => w.Length > 0).Distinct()];
        return names.Length == 0 ? [] : [.. Rows.Select(r => Array.IndexOf(names, word(r)))];
    }
}
