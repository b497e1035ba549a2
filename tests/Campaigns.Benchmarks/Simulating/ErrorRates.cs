using System.Globalization;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Probability;

namespace Campaigns.Benchmarks.Simulating;

/// <summary>How often each omnibus test rejects where all means are equal, by simulation: as Markdown tables.</summary>
internal static class ErrorRates
{
    /// <summary>Replicates unless told otherwise: standard errors of 0.0015 at a rate of 0.05.</summary>
    public const int UsualReplicates = 20_000;

    /// <summary>Random arrangements of a permutation test: the smallest p-value is 1/2,000, so that both levels can be reached exactly.</summary>
    private const int Arrangements = 1_999;

    private static readonly SignificanceLevel[] Levels = [new(0.05), new(0.001)];

    /// <summary>Simulates every design under every registered test; tests within blocks where the design has blocks. The same numbers on every run.</summary>
    /// <param name="replicates">Experiments a design.</param>
    /// <param name="output">Receives a table a level.</param>
    public static void Print(int replicates, TextWriter output)
    {
        long[][,] rejections = new long[NullDesign.All.Count][,];
        Parallel.For(0, rejections.Length, i => rejections[i] = Count(i, replicates));
        for (int level = 0; level < Levels.Length; level++)
        {
            output.WriteLine(string.Create(CultureInfo.InvariantCulture, $"Rejections at {Levels[level].Value}, {replicates} experiments each, with standard errors"));
            output.WriteLine();
            output.WriteLine("| n of each group, errors normal unless said | " + string.Join(" | ", GroupTestRegistry.All.Select(t => t.Key)) + " |");
            output.WriteLine("|---|" + string.Concat(GroupTestRegistry.All.Select(_ => "---|")));
            for (int i = 0; i < rejections.Length; i++)
            {
                output.WriteLine($"| {NullDesign.All[i].Name} | " + string.Join(" | ", GroupTestRegistry.All.Select((_, test) => Cell(rejections[i][test, level], replicates))) + " |");
            }

            output.WriteLine();
        }
    }

    /// <summary>Rejections by test and level; -1 where the test needs blocks and the design has none.</summary>
    private static long[,] Count(int number, int replicates)
    {
        NullDesign design = NullDesign.All[number];
        ushort[] groups = design.Groups;
        int[] blocks = design.Blocks;
        var mantissas = new long[groups.Length];
        long[,] counts = new long[GroupTestRegistry.All.Count, Levels.Length];
        for (int replicate = 0; replicate < replicates; replicate++)
        {
            GroupedSample sample = design.Draw(number, replicate, groups, blocks, mantissas);
            for (int test = 0; test < GroupTestRegistry.All.Count; test++)
            {
                bool applies = blocks.Length > 0 || !GroupTestRegistry.All[test].UsesBlocks;
                PValue p = applies && GroupTestRegistry.All[test].Test(sample, new RandomDraws((ulong)replicate + 1, Arrangements)) is Tested tested ? tested.P : PValue.One;
                for (int level = 0; level < Levels.Length; level++)
                {
                    counts[test, level] = !applies ? -1 : counts[test, level] + (Levels[level].Rejects(p) ? 1 : 0);
                }
            }
        }

        return counts;
    }

    private static string Cell(long rejections, int replicates)
    {
        double rate = (double)rejections / replicates;
        return rejections < 0 ? "" : string.Create(CultureInfo.InvariantCulture, $"{rate:0.0000} ± {Math.Sqrt(rate * (1 - rate) / replicates):0.0000}");
    }
}
