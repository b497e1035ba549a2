using Campaigns.Statistics.Blocks;
using Campaigns.Statistics.Distributions;
namespace Campaigns.Statistics.GroupTests;

/// <summary>The F test of groups within blocks: the analysis of variance of the additive two-way layout, groups adjusted for blocks.</summary>
/// <remarks>For complete and incomplete blocks and any counts; statistic and table from <see cref="BlockLayout"/>, the p-value as in <see cref="FTest"/>. With a single block it is the one-way F test.</remarks>
public sealed class BlockFTest : GroupTest
{
    /// <inheritdoc/>
    public override string Key => "block-f";

    /// <inheritdoc/>
    public override string Name => "Analysis of variance within blocks, F test";

    /// <inheritdoc/>
    public override string Hypothesis => "Within blocks, all groups have the same mean.";

    /// <inheritdoc/>
    public override string Assumes => "Independent observations; a block shifts all groups by the same amount; about the sum of group and block effect a normal law with the same variance everywhere.";

    /// <inheritdoc/>
    public override string Source => "R. A. Fisher, The Design of Experiments, 1935; F. Yates 1936, Annals of Eugenics 7:121 (incomplete blocks).";

    /// <inheritdoc/>
    public override bool UsesBlocks => true;

    /// <inheritdoc/>
    /// <remarks>Groups that do not differ within blocks give F = 0 and p = 1. The reason why a sample is not testable is the first that holds of: a value has no block, too few groups, groups that no block links, no residual degree of freedom, no variation within blocks, none but that of the groups.</remarks>
    public override TestOutcome Test(GroupedSample sample, RandomDraws draws)
    {
        var layout = BlockLayout.Of(sample);
        if (layout.Obstacle is NotTestableReason reason)
        {
            return new NotTestable(layout.GroupCount, layout.Count, reason);
        }

        VariationTable table = layout.Table();
        int df1 = layout.BetweenDegreesOfFreedom;
        int df2 = layout.ResidualDegreesOfFreedom;
        return new Tested(layout.GroupCount, layout.Count, table.F, df1, df2, FDistribution.For(df1, df2).UpperTailPValue(layout.F), table);
    }
}
