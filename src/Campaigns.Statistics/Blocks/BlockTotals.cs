using System.Numerics;
using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Blocks;

/// <summary>Exact totals of whole numbers by group and by block.</summary>
/// <remarks>Cost: one pass over the values and one over the cells in 128-bit integers for every 62 bits of the values; integers of any size only once a group and a block.</remarks>
internal sealed class BlockTotals
{
    private readonly BlockDesign _design;
    private readonly BigInteger[] _groupTotals;
    private readonly BigInteger[] _blockTotals;
    private readonly BigInteger[,] _expected;

    /// <summary>Adds up.</summary>
    /// <param name="design">Where each value stands.</param>
    /// <param name="values">The values.</param>
    public BlockTotals(BlockDesign design, WholeNumbers values)
    {
        _design = design;
        _groupTotals = new BigInteger[design.GroupCounts.Length];
        _blockTotals = new BigInteger[design.BlockCounts.Length];
        _expected = new BigInteger[design.GroupCounts.Length, design.BlockSizes.Length];
        for (int p = 0; p < values.LimbCount; p++)
        {
            Add(values.Limb(p), WholeNumbers.Shift(p));
        }

        AdjustedTotals = [.. _groupTotals.Select((total, i) => AdjustedTotal(i, total))];
    }

    /// <summary>Of each group Q_i = T_i - sum over blocks of n_ij T_j / n_j; each zero exactly where it is zero.</summary>
    public WideReal[] AdjustedTotals { get; }

    /// <summary>Sum of squares of blocks, groups disregarded: the sum of (N T_j - n_j T)^2/(n_j N^2), numerators exact.</summary>
    public WideReal BetweenBlocks()
    {
        BigInteger total = BigInteger.Zero;
        foreach (BigInteger block in _blockTotals)
        {
            total += block;
        }

        double count = _design.Blocks.Length;
        var squares = new WideReal[_blockTotals.Length];
        for (int j = 0; j < squares.Length; j++)
        {
            WideReal above = WideReal.From((_blockTotals[j] * _design.Blocks.Length) - (total * _design.BlockCounts[j]));
            squares[j] = above * above / _design.BlockCounts[j];
        }

        return WideReal.SumSorted(squares) / count / count;
    }

    /// <summary>The effects of blocks that go with given effects of groups.</summary>
    /// <param name="groupEffects">One a group.</param>
    public WideReal[] BlockEffects(WideReal[] groupEffects)
    {
        var effects = new WideReal[_blockTotals.Length];
        for (int j = 0; j < effects.Length; j++)
        {
            ReadOnlySpan<int> groups = _design.GroupsIn(j);
            ReadOnlySpan<int> counts = _design.CountsIn(j);
            WideReal rest = WideReal.From(_blockTotals[j]);
            for (int a = 0; a < groups.Length; a++)
            {
                rest -= groupEffects[groups[a]] * WideReal.From((double)counts[a]);
            }

            effects[j] = rest / _design.BlockCounts[j];
        }

        return effects;
    }

    private void Add(ReadOnlySpan<long> limb, int shift)
    {
        var groupTotals = new Int128[_groupTotals.Length];
        var blockTotals = new Int128[_blockTotals.Length];
        for (int i = 0; i < limb.Length; i++)
        {
            groupTotals[_design.Groups[i]] += limb[i];
            blockTotals[_design.Blocks[i]] += limb[i];
        }

        int sizes = _design.BlockSizes.Length;
        var expected = new Int128[groupTotals.Length * sizes];
        for (int j = 0; j < blockTotals.Length; j++)
        {
            ReadOnlySpan<int> groups = _design.GroupsIn(j);
            ReadOnlySpan<int> counts = _design.CountsIn(j);
            for (int a = 0; a < groups.Length; a++)
            {
                expected[(groups[a] * sizes) + _design.SizeOfBlock[j]] += blockTotals[j] * counts[a];
            }

            _blockTotals[j] += (BigInteger)blockTotals[j] << shift;
        }

        for (int i = 0; i < groupTotals.Length; i++)
        {
            _groupTotals[i] += (BigInteger)groupTotals[i] << shift;
            for (int s = 0; s < sizes; s++)
            {
                _expected[i, s] += (BigInteger)expected[(i * sizes) + s] << shift;
            }
        }
    }

    private WideReal AdjustedTotal(int group, BigInteger total)
    {
        BigInteger scaled = total * _design.CommonMultiple;
        for (int s = 0; s < _design.BlockSizes.Length; s++)
        {
            scaled -= _expected[group, s] * _design.Cofactors[s];
        }

        return WideReal.From(scaled) / WideReal.From(_design.CommonMultiple);
    }
}
