using System.Globalization;
using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.FollowUps;

/// <summary>Comparisons of groups within blocks.</summary>
public sealed class FollowUpsInBlocksTests
{
    private const int GroupCount = 4;

    /// <summary>Complete blocks: R's TukeyHSD of the group factor after the block factor. Its quantile of the studentized range is good to about 1e-6.</summary>
    [Fact]
    public void In_complete_blocks_Tukey_gives_what_TukeyHSD_gives()
    {
        RProgram.SkipIfAbsent();
        (int Group, int Block, long Value)[] rows = Complete(5);
        string input = "g,b,v\n" + string.Concat(rows.Select(r => string.Create(CultureInfo.InvariantCulture, $"g{r.Group},b{r.Block},{r.Value / 1000.0}\n")));
        const string Script = """
            d <- read.csv(file('stdin'), colClasses = c('factor', 'factor', 'numeric'))
            t <- TukeyHSD(aov(v ~ b + g, data = d), 'g')$g
            cat(sprintf('%.17g,%.17g,%.17g,%.17g\n', t[, 1], t[, 2], t[, 3], t[, 4]))
            """;
        double[][] answers = [.. RProgram.Run(Script, input).Split('\n', StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries)
            .Select(l => l.Split(',').Select(t => double.Parse(t, CultureInfo.InvariantCulture)).ToArray())];
        IReadOnlyList<GroupComparison> lines = new TukeyKramer().Compare(Estimates(rows), null, 0.95);
        Assert.Equal(answers.Length, lines.Count);
        foreach ((double[] r, GroupComparison line) in answers.Zip(lines))
        {
            Assert.Equal(12, line.DegreesOfFreedom);
            Assert.Equal(r[0], line.Difference, 1e-12);
            Assert.Equal(r[1], line.Lower!.Value, 1e-5);
            Assert.Equal(r[2], line.Upper!.Value, 1e-5);
            Assert.Equal(r[3], line.P!.Value.Value, 1e-5);
        }
    }

    [Fact]
    public void In_complete_blocks_Dunnetts_correlations_are_one_half()
    {
        DunnettLaw law = DunnettLaw.For([Math.Sqrt(0.5), Math.Sqrt(0.5), Math.Sqrt(0.5)], 12);
        Assert.All(new Dunnett().Compare(Estimates(Complete(5)), 2, 0.95), l => Relative.AssertNear(law.UpperTail(Math.Abs(l.Statistic!.Value)), l.P!.Value.Value, 1e-12, "p"));
    }

    /// <summary>Each pair of groups together in the same number of blocks: differences with a control again have correlations of one half.</summary>
    [Fact]
    public void In_balanced_incomplete_blocks_Dunnetts_correlations_are_one_half()
    {
        (int Group, int Block, long Value)[] rows = [.. Complete(GroupCount).Where(r => r.Group != r.Block)];
        GroupEstimates estimates = Estimates(rows);
        DunnettLaw law = DunnettLaw.For([Math.Sqrt(0.5), Math.Sqrt(0.5), Math.Sqrt(0.5)], estimates.DegreesOfFreedom);
        Assert.All(new Dunnett().Compare(estimates, 0, 0.95), l => Relative.AssertNear(law.UpperTail(Math.Abs(l.Statistic!.Value)), l.P!.Value.Value, 1e-12, "p"));
    }

    /// <summary>An adjusted p-value is never below the comparison's own.</summary>
    [Fact]
    public void In_unbalanced_blocks_every_procedure_but_Games_Howell_answers()
    {
        (int Group, int Block, long Value)[] rows = [.. Complete(6).Where(r => (r.Group, r.Block) is not ((0, 0) or (1, 0) or (2, 3) or (3, 4) or (1, 5) or (3, 5)))];
        GroupEstimates estimates = Estimates(rows);
        foreach (FollowUp followUp in FollowUpRegistry.All.Where(f => f.Key != "games-howell"))
        {
            Assert.All(followUp.Compare(estimates, 1, 0.95), l =>
            {
                double own = StudentT.LogTwoSidedTail(estimates.T(l.GroupA, l.GroupB), estimates.DegreesOfFreedom);
                Assert.True(l.P!.Value.Log >= own - 1e-12);
                Assert.True(l.Lower < l.Difference && l.Difference < l.Upper);
            });
        }

        Assert.All(new GamesHowell().Compare(estimates, null, 0.95), l => Assert.Equal("groups compared within blocks have no variance of their own", l.Obstacle));
    }

    private static GroupEstimates Estimates((int Group, int Block, long Value)[] rows)
    {
        long[] values = [.. rows.Select(r => r.Value)];
        ushort[] groups = [.. rows.Select(r => (ushort)r.Group)];
        int[] blocks = [.. rows.Select(r => r.Block)];
        return GroupEstimates.InBlocks(new GroupedSample(values, 3, groups, GroupCount) { Blocks = blocks })!;
    }

    private static (int Group, int Block, long Value)[] Complete(int blocks)
    {
        var random = new Random(20261209);
        return [.. Enumerable.Range(0, blocks).SelectMany(b => Enumerable.Range(0, GroupCount).Select(g => (g, b, (300L * g) + (2000L * b) + random.Next(1000))))];
    }
}
