using System.Numerics;
using Campaigns.Catalog.Measurements;
using Campaigns.Statistics.CampaignPermutation;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Units;

namespace Campaigns.Catalog.Results;

/// <summary>The units of one experiment by name, in an order that does not depend on that of the rows.</summary>
/// <remarks>Readings of a specimen are averaged as in the test. Where every unit has a name, units stand in the order of group and name; else in that of their values.</remarks>
internal sealed class SpecimenUnits
{
    private readonly BigInteger[] _values;
    private readonly BigInteger _divisor;
    private readonly int _decimals;
    private readonly int _groupCount;

    private SpecimenUnits(GroupedSample units, Unit[] ordered, int groupCount)
    {
        _values = [.. ordered.Select(u => u.Value)];
        _divisor = units.Divisor;
        _decimals = units.Decimals;
        _groupCount = groupCount;
        Groups = [.. ordered.Select(u => u.Group)];
        Blocks = [.. ordered.Select(u => u.Block)];
        Names = ordered.All(u => u.Name is not null) ? [.. ordered.Select(u => (u.Label, u.Name!))] : [];
    }

    /// <summary>For each unit its group.</summary>
    public ushort[] Groups { get; }

    /// <summary>For each unit the name of its block; null where none is recorded.</summary>
    public string?[] Blocks { get; }

    /// <summary>For each unit its group's label and its own name; empty where a unit has no name, so that nothing tells on what else it was measured.</summary>
    public (string Group, string Name)[] Names { get; }

    /// <summary>Reads the units of an experiment.</summary>
    /// <param name="values">Its values, excluded ones left out.</param>
    /// <param name="labels">Labels of its groups.</param>
    public static SpecimenUnits Of(ObservationColumns values, string[] labels)
    {
        GroupedSample readings = values.Sample(labels.Length);
        GroupedSample units = SpecimenMeans.Of(readings) is { } means ? means.Sample : readings;
        string?[] names = NamesOf(values, units.Count);

        // Groups are numbered by their labels, so that experiments that list the same groups differently agree.
        string[] inOrder = [.. labels.Order(StringComparer.Ordinal)];
        var all = new Unit[units.Count];
        for (int i = 0; i < all.Length; i++)
        {
            string label = labels[units.Groups[i]];
            int block = units.Blocks.IsEmpty ? -1 : units.Blocks[i];
            all[i] = new Unit((ushort)Array.BinarySearch(inOrder, label, StringComparer.Ordinal), label, names[i], block < 0 ? null : values.BlockNames.Text(block), units.MantissaOf(i));
        }

        Unit[] ordered = names.All(n => n is not null)
            ? [.. all.OrderBy(u => u.Group).ThenBy(u => u.Name, StringComparer.Ordinal)]
            : [.. all.OrderBy(u => u.Value).ThenBy(u => u.Group).ThenBy(u => u.Block, StringComparer.Ordinal)];
        return new SpecimenUnits(units, ordered, labels.Length);
    }

    /// <summary>Adds the experiment's response to a set of these units.</summary>
    /// <param name="set">The set.</param>
    /// <param name="statistic">What is computed from it.</param>
    public void AddTo(SpecimenSet set, PermutedStatistic statistic) => set.Add(new GroupedSample(_values, _decimals, Groups, _groupCount) { Divisor = _divisor }, statistic);

    /// <summary>Names of the units, numbered as the means of specimens are: in the order in which their first readings come, a reading without a specimen for itself.</summary>
    private static string?[] NamesOf(ObservationColumns values, int count)
    {
        var names = new string?[count];
        var seen = new HashSet<int>();
        int next = 0;
        for (int i = 0; i < values.Count; i++)
        {
            int specimen = values.Specimens[i];
            if (specimen < 0 || values.SpecimenNames.Count == 0)
            {
                next++;
            }
            else if (seen.Add(specimen))
            {
                names[next++] = values.SpecimenNames.Text(specimen);
            }
        }

        return names;
    }

    private readonly record struct Unit(ushort Group, string Label, string? Name, string? Block, BigInteger Value);
}
