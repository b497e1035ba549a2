namespace Campaigns.Statistics.Planning.Laws;

/// <summary>The law of a step-down procedure whose levels depend on rank alone, where every experiment has a real effect with the same probability.</summary>
/// <remarks>
/// R is the least i at which N_(i+1), the count of p-values up to t_(i+1), is no more than i: the first rank whose p-value lies above its level; then exactly i p-values lie up to t_(i+1), and they survive. The walk goes up from rank 1: given that L p-values lie above t_(i-1), each of them lies up to t_i with probability (H(t_i) - H(t_(i-1)))/(1 - H(t_(i-1))), independently, and is then false with probability pi0 (t_i - t_(i-1))/(H(t_i) - H(t_(i-1))). Walks with N_i = i - 1 end at rank i.
/// Survivors are no independent draws here, since early ones had to be small. So beside the probability of each state the walk carries its expected false and true survivors and the chance of any, all as sums of positive terms.
/// This walk was derived here; exact laws by other sums: Roquain and Villers (2011), Annals of Statistics 39:584-612. Time: ranks up to the last survivor times the spread of N times the few that pass a step.
/// </remarks>
internal sealed class StepDownOfShare
{
    private const int Alive = 0;
    private const int FalseOnes = 1;
    private const int TrueOnes = 2;
    private const int AnyFalse = 3;
    private const int AnyTrue = 4;
    private const int Kinds = 5;

    private readonly CampaignDesign _campaign;
    private readonly LevelLadder _ladder;
    private readonly LeavingKernel _kernel;
    private readonly SurvivorTally _tally = new();
    private double[][] _now;
    private double[][] _next;
    private int _low;
    private int _high;

    private StepDownOfShare(CampaignDesign campaign, LevelLadder ladder)
    {
        (_campaign, _ladder) = (campaign, ladder);
        int m = campaign.Experiments;
        _kernel = new LeavingKernel(m);
        _now = [.. Enumerable.Range(0, Kinds).Select(_ => new double[m + 1])];
        _next = [.. Enumerable.Range(0, Kinds).Select(_ => new double[m + 1])];
    }

    public static CampaignExpectation Expect(CampaignDesign campaign, LevelLadder ladder, CancellationToken stop) =>
        new StepDownOfShare(campaign, ladder).Walk(stop);

    private CampaignExpectation Walk(CancellationToken stop)
    {
        int m = _campaign.Experiments;
        MixturePoint at = _ladder.Mixture(1);
        Begin(at);
        for (int rank = 1; ; rank++)
        {
            // Above t_rank lie L; walks with L = m - rank + 1 end, all others have more below.
            if (_high == m - rank + 1)
            {
                Take(rank - 1);
            }

            if (_high < _low || _high == 0 || rank == m)
            {
                break;
            }

            stop.ThrowIfCancellationRequested();
            MixturePoint beyond = _ladder.Mixture(rank + 1);
            Pass(at, beyond);
            at = beyond;
        }

        // Whatever is left has passed every rank.
        if (_high >= _low)
        {
            Take(m);
        }

        return _tally.Of(_campaign);
    }

    /// <summary>The first rank: binomial.</summary>
    private void Begin(MixturePoint first)
    {
        int m = _campaign.Experiments;
        (_low, _high) = BinomialMasses.Fill(m, first.Above, first.Below, _ladder.Negligible, _now[Alive]);
        (double falseOne, double trueOne) = (first.FalseBelow / first.Below, first.TrueBelow / first.Below);
        for (int above = _low; above <= _high; above++)
        {
            double mass = _now[Alive][above];
            int below = m - above;
            _now[FalseOnes][above] = mass * below * falseOne;
            _now[TrueOnes][above] = mass * below * trueOne;
            _now[AnyFalse][above] = mass * MixturePoint.AtLeastOne(falseOne, trueOne, below);
            _now[AnyTrue][above] = mass * MixturePoint.AtLeastOne(trueOne, falseOne, below);
        }
    }

    /// <summary>From one rank's level to the next one's.</summary>
    private void Pass(MixturePoint at, MixturePoint beyond)
    {
        double falseOnes = Math.Max(0, beyond.FalseBelow - at.FalseBelow);
        double trueOnes = Math.Max(0, beyond.TrueBelow - at.TrueBelow);
        double both = falseOnes + trueOnes;
        if (both <= 0)
        {
            return;
        }

        (int parts, double leave) = LeavingKernel.Cut(both / at.Above, _high);
        for (int part = 0; part < parts; part++)
        {
            PassPart(leave, falseOnes / both, trueOnes / both);
        }
    }

    private void PassPart(double leave, double falseOne, double trueOne)
    {
        int least = _low;
        _kernel.Start(_low, _high, leave, _ladder.Negligible);
        do
        {
            int k = _kernel.Leaving;
            least = Math.Max(0, _low - k);
            double newFalse = MixturePoint.AtLeastOne(falseOne, trueOne, k);
            double newTrue = MixturePoint.AtLeastOne(trueOne, falseOne, k);
            Carry(Alive, Alive, 1);
            Carry(FalseOnes, FalseOnes, 1);
            Carry(TrueOnes, TrueOnes, 1);
            Carry(AnyFalse, AnyFalse, 1 - newFalse);
            Carry(AnyTrue, AnyTrue, 1 - newTrue);
            if (k > 0)
            {
                Carry(Alive, FalseOnes, k * falseOne);
                Carry(Alive, TrueOnes, k * trueOne);
                Carry(Alive, AnyFalse, newFalse);
                Carry(Alive, AnyTrue, newTrue);
            }
        }
        while (_kernel.Next());

        foreach (double[] kind in _now)
        {
            Array.Clear(kind, _low, _high - _low + 1);
        }

        (_now, _next) = (_next, _now);
        _low = least;
        Trim();
    }

    private void Carry(int from, int to, double scale)
    {
        int first = _kernel.First;
        Vectors.AddProducts(_next[to].AsSpan(first - _kernel.Leaving, _high - first + 1), _kernel.Weights, _now[from].AsSpan(first), scale);
    }

    private void Trim()
    {
        while (_low <= _high && _now[Alive][_low] <= _ladder.Negligible)
        {
            Forget(_low++);
        }

        while (_high >= _low && _now[Alive][_high] <= _ladder.Negligible)
        {
            Forget(_high--);
        }
    }

    private void Take(int survivors)
    {
        int above = _high;
        if (survivors > 0)
        {
            _tally.Add(survivors, _now[TrueOnes][above], _now[FalseOnes][above], _now[AnyTrue][above], _now[AnyFalse][above]);
        }

        Forget(above);
        _high--;
    }

    private void Forget(int above)
    {
        foreach (double[] kind in _now)
        {
            kind[above] = 0;
        }
    }
}
