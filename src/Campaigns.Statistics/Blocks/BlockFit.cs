using System.Numerics;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Blocks;

/// <summary>Group and block effects fitted to the values of an experiment, in units of its mantissas.</summary>
/// <remarks>
/// Adjusted totals come from exact integers. Residuals do not change when whole numbers are taken off a group or a block, which is done until the values are about as small as what the fit leaves of them:
/// then nothing cancels that 32 digits cannot spare, however far groups and blocks lie apart, and a fit that leaves nothing at all ends in values that are exactly zero.
/// Every number here has the same bits in whatever order the rows come: the origin is the smallest value, groups are eliminated in the order of their numbers, and squares are added in ascending order.
/// </remarks>
internal sealed class BlockFit
{
    /// <summary>Values at most this many times as large as what the fit leaves of them lose at most 12 of 32 digits in the squares.</summary>
    private static readonly WideReal Spare = WideReal.PowerOfTwo(40);

    private readonly BlockDesign _design;
    private readonly BlockElimination _elimination;

    /// <summary>Fits.</summary>
    /// <param name="design">A connected design.</param>
    /// <param name="elimination">Its normal equations.</param>
    /// <param name="sample">The values.</param>
    public BlockFit(BlockDesign design, BlockElimination elimination, GroupedSample sample)
    {
        _design = design;
        _elimination = elimination;
        var values = WholeNumbers.AboutSmallest(sample);
        var totals = new BlockTotals(design, values);
        BetweenBlocks = totals.BetweenBlocks();
        (WideReal[] effects, BetweenGroups) = elimination.Solve(totals.AdjustedTotals);
        (Effects, Roundings, Residuals, Residual) = Settle(values, totals, effects);
    }

    /// <summary>Effect of each group, up to a constant common to all.</summary>
    public WideReal[] Effects { get; }

    /// <summary>For each group a bound on the rounding error of its effect: effects that differ by no more than their bounds together are equal as far as 32 digits can tell.</summary>
    public WideReal[] Roundings { get; }

    /// <summary>For each value what the fit leaves of it.</summary>
    public WideReal[] Residuals { get; }

    /// <summary>Sum of squares of blocks, groups disregarded.</summary>
    public WideReal BetweenBlocks { get; }

    /// <summary>Sum of squares of groups, adjusted for blocks; zero exactly where it is zero.</summary>
    public WideReal BetweenGroups { get; }

    /// <summary>Residual sum of squares; zero exactly where it is zero.</summary>
    public WideReal Residual { get; }

    /// <summary>Takes whole numbers off until what is left is small enough.</summary>
    private (WideReal[] Effects, WideReal[] Roundings, WideReal[] Residuals, WideReal SumOfSquares) Settle(WholeNumbers values, BlockTotals totals, WideReal[] effects)
    {
        var taken = new BigInteger[effects.Length];
        while (true)
        {
            WideReal[] blockEffects = totals.BlockEffects(effects);
            WideReal[] residuals = Rest(values, effects, blockEffects);
            WideReal squares = SumOfSquares(residuals);
            if (values.Largest.Sign == 0 || ((squares * Spare) - (values.Largest * values.Largest)).Sign >= 0)
            {
                WideReal[] all = [.. effects.Select((effect, i) => taken[i].IsZero ? effect : WideReal.From(taken[i]) + effect)];
                return (all, _elimination.RoundingBounds(totals.AdjustedTotals), residuals, squares);
            }

            BigInteger[] whole = [.. effects.Select(e => e.ToWhole())];
            WholeNumbers rest = values.Less(_design.Groups, whole, _design.Blocks, [.. blockEffects.Select(e => e.ToWhole())]);
            if ((values.Largest - rest.Largest).Sign <= 0)
            {
                throw new InvalidOperationException("The effects of groups and blocks did not settle.");
            }

            taken = [.. taken.Zip(whole, BigInteger.Add)];
            values = rest;
            totals = new BlockTotals(_design, values);
            effects = _elimination.Solve(totals.AdjustedTotals).Effects;
        }
    }

    private WideReal[] Rest(WholeNumbers values, WideReal[] effects, WideReal[] blockEffects)
    {
        var rest = new WideReal[values.Count];
        for (int i = 0; i < rest.Length; i++)
        {
            rest[i] = values[i] - blockEffects[_design.Blocks[i]] - effects[_design.Groups[i]];
        }

        return rest;
    }

    private static WideReal SumOfSquares(WideReal[] residuals)
    {
        var squares = new WideReal[residuals.Length];
        for (int i = 0; i < squares.Length; i++)
        {
            squares[i] = residuals[i] * residuals[i];
        }

        return WideReal.SumSorted(squares);
    }
}
