using System.Numerics;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Blocks;

/// <summary>Which groups meet in which blocks, and how often: the plan of an experiment in blocks, without its values.</summary>
/// <remarks>
/// Groups are numbered from 0 in the order of the sample's own numbers, those without a value left out: they are eliminated one after the other, and which comes first must not depend on the order of the rows.
/// Blocks are numbered as they first come. Nothing may depend on that order: whatever is added up over blocks is an exact integer, or is sorted before.
/// </remarks>
internal sealed class BlockDesign
{
    private readonly int[] _valuesByBlock;
    private readonly int[] _valueStarts;
    private readonly int[] _cellStarts;
    private readonly int[] _cellGroups;
    private readonly int[] _cellCounts;

    private BlockDesign(int[] groups, int[] blocks, int[] groupNumbers, int blockCount)
    {
        Groups = groups;
        Blocks = blocks;
        GroupNumbers = groupNumbers;
        GroupCounts = new int[groupNumbers.Length];
        BlockCounts = new int[blockCount];
        for (int i = 0; i < groups.Length; i++)
        {
            GroupCounts[groups[i]]++;
            BlockCounts[blocks[i]]++;
        }

        BlockSizes = [.. BlockCounts.Distinct().Order()];
        SizeOfBlock = [.. BlockCounts.Select(n => Array.BinarySearch(BlockSizes, n))];
        foreach (int size in BlockSizes)
        {
            CommonMultiple = CommonMultiple / BigInteger.GreatestCommonDivisor(CommonMultiple, size) * size;
        }

        Cofactors = [.. BlockSizes.Select(size => CommonMultiple / size)];
        _valueStarts = Starts(BlockCounts);
        _valuesByBlock = Sorted(Sorted([.. Enumerable.Range(0, groups.Length)], groups, Starts(GroupCounts)), blocks, _valueStarts);
        (_cellStarts, _cellGroups, _cellCounts) = Cells();
        IsConnected = Connected();
    }

    /// <summary>For each value its group.</summary>
    public int[] Groups { get; }

    /// <summary>For each value its block.</summary>
    public int[] Blocks { get; }

    /// <summary>For each group its number in the sample.</summary>
    public int[] GroupNumbers { get; }

    /// <summary>Values of each group; positive.</summary>
    public int[] GroupCounts { get; }

    /// <summary>Values of each block; positive.</summary>
    public int[] BlockCounts { get; }

    /// <summary>The different block counts, ascending.</summary>
    public int[] BlockSizes { get; }

    /// <summary>For each block the place of its count in <see cref="BlockSizes"/>.</summary>
    public int[] SizeOfBlock { get; }

    /// <summary>The least common multiple of the block counts.</summary>
    public BigInteger CommonMultiple { get; } = BigInteger.One;

    /// <summary>For each of <see cref="BlockSizes"/> the common multiple over it.</summary>
    public BigInteger[] Cofactors { get; }

    /// <summary>Whether every two groups share a block, or are linked by a chain of groups that do.</summary>
    public bool IsConnected { get; }

    /// <summary>Reads the design of a sample.</summary>
    /// <param name="sample">Any sample.</param>
    /// <returns>Null where a value has no block.</returns>
    /// <exception cref="ArgumentException">A value names a group that the sample does not have.</exception>
    public static BlockDesign? Of(GroupedSample sample)
    {
        if (sample.Blocks.Length != sample.Count)
        {
            return null;
        }

        (int[] groupNumbers, int[] numberOfGroup) = NumberGroups(sample);
        var numberOfBlock = new Dictionary<int, int>();
        int[] groups = new int[sample.Count];
        int[] blocks = new int[sample.Count];
        for (int i = 0; i < groups.Length; i++)
        {
            int block = sample.Blocks[i];
            if (block < 0)
            {
                return null;
            }

            groups[i] = numberOfGroup[sample.Groups[i]];
            if (!numberOfBlock.TryGetValue(block, out blocks[i]))
            {
                blocks[i] = numberOfBlock.Count;
                numberOfBlock.Add(block, blocks[i]);
            }
        }

        return new BlockDesign(groups, blocks, groupNumbers, numberOfBlock.Count);
    }

    /// <summary>The values of a block, those of a group together.</summary>
    /// <param name="block">Its number.</param>
    public ReadOnlySpan<int> ValuesIn(int block) => _valuesByBlock.AsSpan(_valueStarts[block].._valueStarts[block + 1]);

    /// <summary>The groups that a block holds.</summary>
    /// <param name="block">Its number.</param>
    public ReadOnlySpan<int> GroupsIn(int block) => _cellGroups.AsSpan(_cellStarts[block].._cellStarts[block + 1]);

    /// <summary>How many values of each of <see cref="GroupsIn"/> the block holds.</summary>
    /// <param name="block">Its number.</param>
    public ReadOnlySpan<int> CountsIn(int block) => _cellCounts.AsSpan(_cellStarts[block].._cellStarts[block + 1]);

    /// <summary>How strongly the blocks tie every two groups together: the sum over blocks of n_ij n_hj / n_j, which is what the normal equations, blocks eliminated, hold off their diagonal with a minus sign.</summary>
    public DoubleDouble[,] Ties()
    {
        int k = GroupNumbers.Length;
        var ties = new DoubleDouble[k, k];
        var products = new long[k, k];
        foreach (IGrouping<int, int> blocks in Enumerable.Range(0, BlockCounts.Length).GroupBy(j => BlockCounts[j]).OrderBy(g => g.Key))
        {
            Array.Clear(products);
            foreach (int block in blocks)
            {
                AddProducts(block, products);
            }

            for (int i = 0; i < k; i++)
            {
                for (int h = 0; h < k; h++)
                {
                    ties[i, h] = products[i, h] == 0 ? ties[i, h] : ties[i, h] + (DoubleDouble.From((Int128)products[i, h]) / blocks.Key);
                }
            }
        }

        return ties;
    }

    private void AddProducts(int block, long[,] products)
    {
        ReadOnlySpan<int> groups = GroupsIn(block);
        ReadOnlySpan<int> counts = CountsIn(block);
        for (int a = 0; a < groups.Length; a++)
        {
            for (int b = 0; b < groups.Length; b++)
            {
                products[groups[a], groups[b]] += a == b ? 0 : (long)counts[a] * counts[b];
            }
        }
    }

    /// <summary>Numbers the groups that hold a value.</summary>
    /// <returns>For each number its group in the sample, and the other way about.</returns>
    private static (int[] Groups, int[] Numbers) NumberGroups(GroupedSample sample)
    {
        var holdsValue = new bool[sample.GroupCount];
        foreach (ushort group in sample.Groups)
        {
            if (group >= holdsValue.Length)
            {
                throw new ArgumentException(FormattableString.Invariant($"A value belongs to group {group}, which the sample does not have."));
            }

            holdsValue[group] = true;
        }

        int[] groups = [.. Enumerable.Range(0, holdsValue.Length).Where(g => holdsValue[g])];
        var numbers = new int[holdsValue.Length];
        for (int i = 0; i < groups.Length; i++)
        {
            numbers[groups[i]] = i;
        }

        return (groups, numbers);
    }

    /// <summary>For each label the place of its first value once values are sorted by label, and the number of all values.</summary>
    private static int[] Starts(int[] counts)
    {
        var starts = new int[counts.Length + 1];
        for (int i = 0; i < counts.Length; i++)
        {
            starts[i + 1] = starts[i] + counts[i];
        }

        return starts;
    }

    /// <summary>Values sorted by label, those of a label in the order in which they came.</summary>
    private static int[] Sorted(int[] values, int[] labels, int[] starts)
    {
        int[] next = [.. starts];
        var sorted = new int[values.Length];
        foreach (int value in values)
        {
            sorted[next[labels[value]]++] = value;
        }

        return sorted;
    }

    /// <summary>Counts the values of each group in each block, block after block.</summary>
    private (int[] Starts, int[] Groups, int[] Counts) Cells()
    {
        var starts = new int[BlockCounts.Length + 1];
        var groups = new List<int>();
        var counts = new List<int>();
        for (int block = 0; block < BlockCounts.Length; block++)
        {
            starts[block] = groups.Count;
            foreach (int i in ValuesIn(block))
            {
                if (groups.Count > starts[block] && groups[^1] == Groups[i])
                {
                    counts[^1]++;
                }
                else
                {
                    groups.Add(Groups[i]);
                    counts.Add(1);
                }
            }
        }

        starts[^1] = groups.Count;
        return (starts, [.. groups], [.. counts]);
    }

    private bool Connected()
    {
        int[] parents = [.. Enumerable.Range(0, GroupNumbers.Length)];
        int parts = parents.Length;
        for (int block = 0; block < BlockCounts.Length; block++)
        {
            ReadOnlySpan<int> groups = GroupsIn(block);
            for (int a = 1; a < groups.Length; a++)
            {
                int one = Root(parents, groups[0]);
                int other = Root(parents, groups[a]);
                parts -= one == other ? 0 : 1;
                parents[other] = one;
            }
        }

        return parts <= 1;
    }

    private static int Root(int[] parents, int group)
    {
        while (parents[group] != group)
        {
            group = parents[group] = parents[parents[group]];
        }

        return group;
    }
}
