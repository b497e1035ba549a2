using System.Runtime.CompilerServices;

namespace Campaigns.Statistics.Permutation;

/// <summary>Draws random arrangements of any design by shuffling positions, and compares each as it is drawn.</summary>
/// <remarks>A partial Fisher-Yates shuffle: the largest group needs neither draws nor a sum. Cost: about 2 ns for each value outside the largest group.</remarks>
internal static class Shuffles
{
    /// <summary>How many of the next <paramref name="draws"/> arrangements of a stream give at least the observed F.</summary>
    public static int CountAsExtreme(PermutationScores scores, RandomNumbers random, int draws)
    {
        int[] order = [.. Enumerable.Range(0, scores.Design.Count)];
        int count = 0;
        for (int draw = 0; draw < draws; draw++)
        {
            double s = Draw(scores, order, ref random);
            if (s >= scores.Low && (s >= scores.High || scores.IsAsExtreme(order)))
            {
                count++;
            }
        }

        return count;
    }

    private static double Draw(PermutationScores scores, int[] order, ref RandomNumbers shared)
    {
        RandomNumbers random = shared;
        ReadOnlySpan<int> sizes = scores.Design.Sizes[..^1];
        double[] weights = scores.Weights;
        double rest = scores.Total;
        double spread = 0;
        int at = 0;
        for (int group = 0; group < sizes.Length; group++)
        {
            double sum = DrawGroup(order, at, sizes[group], scores.Values, ref random);
            at += sizes[group];
            rest -= sum;
            spread += sum * weights[group] * sum;
        }

        shared = random;
        return spread + (rest * weights[^1] * rest);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static double DrawGroup(int[] order, int at, int size, double[] values, ref RandomNumbers random)
    {
        double sum = 0;
        for (int end = at + size; at < end; at++)
        {
            int other = at + (int)random.Below((uint)(order.Length - at));
            int position = order[other];
            order[other] = order[at];
            order[at] = position;
            sum += values[position];
        }

        return sum;
    }
}
