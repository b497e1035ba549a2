using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Tests.Planning;

/// <summary>What a correction brings over a small campaign, by trying every outcome: each experiment real or not, its p-value in any of the cells that the levels cut, the correction itself deciding.</summary>
internal static class EveryOutcome
{
    public sealed record Sums(double TrueOnes, double FalseOnes, double AnyTrue, double AnyFalse, double FalseShare, double Total);

    /// <param name="correction">Decides.</param>
    /// <param name="level">Its level.</param>
    /// <param name="m">Experiments.</param>
    /// <param name="cuts">Every level that the correction compares with, ascending, distinct.</param>
    /// <param name="found">The power at each of them.</param>
    /// <param name="share">Probability of a real effect; null where their number is fixed.</param>
    /// <param name="number">The fixed number.</param>
    public static Sums Of(Correction correction, SignificanceLevel level, int m, double[] cuts, double[] found, double? share, int? number)
    {
        // A kind of experiment: a cell and whether its effect is real. Multisets of m kinds with their multinomial weight are all outcomes, order apart.
        int cells = cuts.Length + 1;
        double[] place = [.. Enumerable.Range(0, cells).Select(c => ((c == 0 ? 0 : cuts[c - 1]) + (c == cells - 1 ? 1 : cuts[c])) / 2)];
        double[] chance = [.. Enumerable.Range(0, 2 * cells).Select(k => Cell(k % cells, k < cells ? cuts : found) * (share is { } s ? (k < cells ? 1 - s : s) : 1))];
        int[] kinds = new int[m];
        var sums = new Sums(0, 0, 0, 0, 0, 0);
        Choose(0, 0, 1);
        return sums;

        double Cell(int cell, double[] at) => (cell == cells - 1 ? 1 : at[cell]) - (cell == 0 ? 0 : at[cell - 1]);

        void Choose(int position, int least, double weight)
        {
            if (position == m)
            {
                Judge(weight);
                return;
            }

            for (int kind = least; kind < 2 * cells; kind++)
            {
                // Multinomial: position + 1 over how often this kind has come.
                int times = 1;
                for (int i = position - 1; i >= 0 && kinds[i] == kind; i--)
                {
                    times++;
                }

                kinds[position] = kind;
                Choose(position + 1, kind, weight * chance[kind] * (position + 1) / times);
            }
        }

        void Judge(double weight)
        {
            if (number is { } fixedNumber)
            {
                if (kinds.Count(k => k >= cells) != fixedNumber)
                {
                    return;
                }

                weight /= Binomial(m, fixedNumber);
            }

            PValue[] adjusted = correction.Adjust(RankedFamily.Of([.. kinds.Select(k => place[k % cells])], m));
            int trueOnes = kinds.Where((k, i) => k >= cells && level.Rejects(adjusted[i])).Count();
            int falseOnes = kinds.Where((k, i) => k < cells && level.Rejects(adjusted[i])).Count();
            sums = new(
                sums.TrueOnes + (weight * trueOnes),
                sums.FalseOnes + (weight * falseOnes),
                sums.AnyTrue + (trueOnes > 0 ? weight : 0),
                sums.AnyFalse + (falseOnes > 0 ? weight : 0),
                sums.FalseShare + (falseOnes > 0 ? weight * falseOnes / (trueOnes + falseOnes) : 0),
                sums.Total + weight);
        }
    }

    private static double Binomial(int n, int k) => Enumerable.Range(1, k).Aggregate(1.0, (b, i) => b * (n - k + i) / i);
}
