using System.Diagnostics;
using System.Globalization;
using Campaigns.Statistics.CampaignPermutation;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Permutation;

namespace Campaigns.Benchmarks.Kernels;

/// <summary>Milliseconds of a few large kernels, median of seven, as lines "name milliseconds" for a comparison with other programs.</summary>
internal static class Timings
{
    private const int Million = 1_000_000;
    private const int Hundredth = 10_000;
    private const int Repeats = 7;
    private const int PermutedExperiments = 200;

    public static void Print(TextWriter output)
    {
        double[] p = Inputs.PValues(Million);
        Line("adjust", () =>
        {
            RankedFamily family = RankedFamily.Of(p, Million);
            foreach (string key in new[] { "bonferroni", "holm", "bh" })
            {
                CorrectionRegistry.Find(key)!.Adjust(family, new double[Million]);
            }
        });

        double[] f = Inputs.FStatistics(Million);
        double sum = 0;
        Line("tails", () =>
        {
            FDistribution law = FDistribution.For(4, 45);
            foreach (double x in f)
            {
                sum += law.UpperTailPValue(x).Log;
            }
        });

        double[] fewer = p[..100_000];
        Line("hommel", () => CorrectionRegistry.Find("hommel")!.Adjust(RankedFamily.Of(fewer, fewer.Length), new double[fewer.Length]));

        PermutationScores[] permuted = Inputs.Experiments(PermutedExperiments);
        Line("permute-one", () => RandomArrangements.CountAsExtreme(permuted[0], new RandomDraws(1, 10 * Million)));
        Line("permute-shared", () => RandomArrangements.CountAsExtreme(permuted, new RandomDraws(1, 2 * Million / 10)));

        SpecimenSet responses = Inputs.Responses(PermutedExperiments);
        var campaign = new PermutationRun(new RandomDraws(1, Hundredth));
        Line("permute-max-t", () => StepDownPermutation.MaxT([responses], campaign));
        Line("permute-min-p", () => StepDownPermutation.MinP([responses], campaign));

        double[] q = Inputs.RangeStatistics(Million);
        Line("range", () =>
        {
            StudentizedRange law = StudentizedRange.For(5, 45);
            foreach (double x in q)
            {
                sum += law.UpperTailPValue(x).Log;
            }
        });

        // As Games-Howell asks: every pair its own degrees of freedom.
        Line("range-df", () =>
        {
            for (int i = 0; i < Hundredth; i++)
            {
                sum += StudentizedRange.Direct(5, 12 + (i / 1000.0)).UpperTailPValue(q[i]).Log;
            }
        });

        Line("dunnett-tails", () =>
        {
            double[] lambdas = Inputs.Lambdas(4);
            for (int i = 0; i < Hundredth; i++)
            {
                sum += DunnettLaw.For(lambdas, 45).UpperTailPValue(q[i]).Log;
            }
        });

        // Games-Howell solves for a critical value of its own for every pair: a hundredth of the experiments.
        GroupEstimates[] experiments = Inputs.Estimates(Million / 10);
        foreach (FollowUp followUp in FollowUpRegistry.All)
        {
            bool isSlow = followUp.Key == "games-howell";
            GroupEstimates[] compared = isSlow ? experiments[..(experiments.Length / 100)] : experiments;
            Line(isSlow ? followUp.Key + "/100" : followUp.Key, () => sum += compared.Sum(e => followUp.Compare(e, 0, 0.95)[0].P!.Value.Value));
        }

        void Line(string name, Action work) =>
            output.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{name} {MedianMilliseconds(work):F2}"));
    }

    private static double MedianMilliseconds(Action work)
    {
        work();
        var times = new double[Repeats];
        for (int i = 0; i < Repeats; i++)
        {
            long start = Stopwatch.GetTimestamp();
            work();
            times[i] = Stopwatch.GetElapsedTime(start).TotalMilliseconds;
        }

        Array.Sort(times);
        return times[Repeats / 2];
    }
}
