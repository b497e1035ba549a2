using System.Buffers;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.Permutation;

/// <summary>Draws random arrangements and counts those that give at least the observed F, for one experiment or for many of one design on the same arrangements.</summary>
/// <remarks>
/// Draws are cut into pieces of <see cref="DrawsPerPiece"/>, each with its own stream of the seed (<see cref="RandomNumbers"/>): counts do not depend on the number of threads, nor on which experiments are tested together.
/// The same arrangements for many experiments leave each p-value what it is, and make the sampling errors of their p-values dependent.
/// </remarks>
public static class RandomArrangements
{
    /// <summary>Draws that share one stream.</summary>
    public const int DrawsPerPiece = 1024;

    /// <summary>Counts for one experiment.</summary>
    /// <param name="scores">The experiment.</param>
    /// <param name="draws">How many arrangements, from which seed.</param>
    /// <param name="threads">Most threads to work on it, at least 1; changes nothing in the count.</param>
    /// <param name="stop">Ends the work, at the latest after a piece.</param>
    /// <returns>Arrangements that give at least the observed F, 0 to the number of draws.</returns>
    /// <exception cref="ArgumentOutOfRangeException">Fewer than one draw or thread.</exception>
    /// <exception cref="OperationCanceledException">Stopped.</exception>
    public static long CountAsExtreme(PermutationScores scores, RandomDraws draws, int threads = 1, CancellationToken stop = default) =>
        CountAsExtreme([scores], draws, threads, stop)[0];

    /// <summary>Counts for many experiments of one design. Eight or more of up to 64 values are compared eight at a time, which is the fast way: 0.4 ns an arrangement and experiment for 4 groups of 6.</summary>
    /// <param name="experiments">Experiments of one design; a few hundred at a time keep the tables in the cache.</param>
    /// <param name="draws">How many arrangements, from which seed.</param>
    /// <param name="threads">Most threads to work on it, at least 1; changes nothing in the counts.</param>
    /// <param name="stop">Ends the work, at the latest after a piece.</param>
    /// <returns>For each experiment what it would get alone.</returns>
    /// <exception cref="ArgumentException">The designs differ.</exception>
    /// <exception cref="ArgumentOutOfRangeException">Fewer than one draw or thread.</exception>
    /// <exception cref="OperationCanceledException">Stopped.</exception>
    public static long[] CountAsExtreme(IReadOnlyList<PermutationScores> experiments, RandomDraws draws, int threads = 1, CancellationToken stop = default)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(draws.Count, 1, nameof(draws));
        ArgumentOutOfRangeException.ThrowIfLessThan(threads, 1);
        if (experiments.Any(e => !e.Design.Equals(experiments[0].Design)))
        {
            throw new ArgumentException("Experiments of different designs cannot share arrangements.", nameof(experiments));
        }

        var counts = new long[experiments.Count];
        if (counts.Length == 0)
        {
            return counts;
        }

        PermutationDesign design = experiments[0].Design;
        if (design.Count > SubsetDraws.MostValues)
        {
            Run(draws.Count, Orders(experiments, draws), counts, threads, stop);
            return counts;
        }

        double[] memory = ArrayPool<double>.Shared.Rent(PackedSubsetSums.MemoryOf(design, experiments.Count));
        Run(draws.Count, Sets(experiments, draws, memory), counts, threads, stop);
        ArrayPool<double>.Shared.Return(memory);
        return counts;
    }

    /// <summary>Does all pieces of the work, which add to the counts that they are given.</summary>
    private static void Run(int draws, Action<int, long[]> piece, long[] counts, int threads, CancellationToken stop)
    {
        int pieces = ((draws - 1) / DrawsPerPiece) + 1;
        if (threads == 1)
        {
            for (int i = 0; i < pieces; i++)
            {
                stop.ThrowIfCancellationRequested();
                piece(i, counts);
            }

            return;
        }

        Parallel.For(
            0,
            pieces,
            new ParallelOptions { MaxDegreeOfParallelism = threads, CancellationToken = stop },
            () => new long[counts.Length],
            (i, _, own) =>
            {
                piece(i, own);
                return own;
            },
            own =>
            {
                lock (counts)
                {
                    for (int i = 0; i < counts.Length; i++)
                    {
                        counts[i] += own[i];
                    }
                }
            });
    }

    private static int DrawsOf(int piece, RandomDraws draws) => Math.Min(DrawsPerPiece, draws.Count - (piece * DrawsPerPiece));

    /// <summary>One piece of work on designs of up to 64 values.</summary>
    private static Action<int, long[]> Sets(IReadOnlyList<PermutationScores> experiments, RandomDraws draws, double[] memory)
    {
        SubsetDraws subsets = experiments[0].Design.Subsets;
        SubsetSums? single = experiments.Count == 1 ? new(experiments[0]) : null;
        PackedSubsetSums[] packs = single is null ? PackedSubsetSums.Of(experiments, memory) : [];
        return (piece, counts) =>
        {
            int length = DrawsOf(piece, draws) * subsets.SetsPerDraw;
            ulong[] buffer = ArrayPool<ulong>.Shared.Rent(length);
            Span<ulong> sets = buffer.AsSpan(0, length);
            subsets.Draw(new RandomNumbers(draws.Seed, (ulong)piece), sets);
            counts[0] += single?.CountAsExtreme(sets) ?? 0;
            for (int i = 0; i < packs.Length; i++)
            {
                packs[i].CountAsExtreme(sets, counts.AsSpan(i * PackedSubsetSums.Lanes));
            }

            ArrayPool<ulong>.Shared.Return(buffer);
        };
    }

    /// <summary>One piece of work on larger designs.</summary>
    private static Action<int, long[]> Orders(IReadOnlyList<PermutationScores> experiments, RandomDraws draws) => (piece, counts) =>
    {
        for (int i = 0; i < experiments.Count; i++)
        {
            counts[i] += Shuffles.CountAsExtreme(experiments[i], new RandomNumbers(draws.Seed, (ulong)piece), DrawsOf(piece, draws));
        }
    };
}
