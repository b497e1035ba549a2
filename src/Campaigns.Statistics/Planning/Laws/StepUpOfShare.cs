namespace Campaigns.Statistics.Planning.Laws;

/// <summary>The law of a step-up procedure whose levels depend on rank alone, where every experiment has a real effect with the same probability.</summary>
/// <remarks>
/// Levels t_1 to t_m ascend; R is the greatest j with N_j at least j, where N_j counts p-values up to t_j, and the p-values up to t_R survive. N_m is binomial; given N_j = n each of the n p-values lies below t_(j-1) with probability H(t_(j-1))/H(t_j), independently. The walk goes down from m and stops where N_j = j.
/// Given R = j the j survivors are independent draws from what lies below t_j, so each is false with probability pi0 t_j/H(t_j): the law of R is all that is needed.
/// This walk was derived here; exact laws of such procedures by other sums: Glueck, Mandel, Karimpour-Fard, Hunter and Muller (2008), International Journal of Biostatistics 4:11; Roquain and Villers (2011), Annals of Statistics 39:584-612. Time m times the spread of N times the few that leave at a step.
/// </remarks>
internal static class StepUpOfShare
{
    public static CampaignExpectation Expect(CampaignDesign campaign, LevelLadder ladder, CancellationToken stop)
    {
        int m = campaign.Experiments;
        var tally = new SurvivorTally();
        double[] now = new double[m + 1];
        double[] next = new double[m + 1];
        var kernel = new LeavingKernel(m);
        MixturePoint at = ladder.Mixture(m);
        (int low, int high) = BinomialMasses.Fill(m, at.Below, at.Above, ladder.Negligible, now);
        for (int j = m; ; j--)
        {
            stop.ThrowIfCancellationRequested();
            if (high == j)
            {
                Take(tally, at, j, now[j]);
                now[j] = 0;
                high--;
            }

            if (j == 1 || high < Math.Max(low, 1))
            {
                return tally.Of(campaign);
            }

            MixturePoint below = ladder.Mixture(j - 1);
            (int parts, double leave) = LeavingKernel.Cut((at.Below - below.Below) / at.Below, high);
            for (int part = 0; part < parts; part++)
            {
                (low, high) = Thin(kernel, now, next, low, high, leave, ladder.Negligible);
                (now, next) = (next, now);
            }

            at = below;
        }
    }

    private static void Take(SurvivorTally tally, MixturePoint at, int j, double probability)
    {
        double falseOne = at.FalseBelow / at.Below;
        double trueOne = at.TrueBelow / at.Below;
        tally.Add(
            j,
            probability * j * trueOne,
            probability * j * falseOne,
            probability * MixturePoint.AtLeastOne(trueOne, falseOne, j),
            probability * MixturePoint.AtLeastOne(falseOne, trueOne, j));
    }

    private static (int Low, int High) Thin(LeavingKernel kernel, double[] now, double[] next, int low, int high, double leave, double negligible)
    {
        int least = low;
        kernel.Start(low, high, leave, negligible);
        do
        {
            int first = kernel.First;
            least = Math.Max(0, low - kernel.Leaving);
            Vectors.AddProducts(next.AsSpan(first - kernel.Leaving, high - first + 1), kernel.Weights, now.AsSpan(first), 1);
        }
        while (kernel.Next());

        Array.Clear(now, low, high - low + 1);
        while (least < high && next[least] <= negligible)
        {
            next[least++] = 0;
        }

        while (high > least && next[high] <= negligible)
        {
            next[high--] = 0;
        }

        return (least, high);
    }
}
