using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Online;

/// <summary>How many of the started experiments use up a position of the shape.</summary>
/// <remarks>
/// One that runs does, as if its p-value were the worst; one that has finished does not, if its p-value is at most lambda (a candidate) or above tau (discarded).
/// Sources: T. Zrnic, A. Ramdas and M. I. Jordan (2021), Journal of Machine Learning Research 22(33):1-39 for experiments that overlap; J. Tian and A. Ramdas (2019), Advances in Neural Information Processing Systems 32:9388-9396 for tau.
/// </remarks>
/// <param name="lambda">P-values up to this one give their position back; below 0 where none does.</param>
/// <param name="tau">P-values above this one give their position back; 1 where none does.</param>
internal sealed class SpentPositions(double lambda, double tau)
{
    /// <summary>How many positions are used up.</summary>
    public int Count { get; private set; }

    /// <summary>Every experiment that starts uses one up.</summary>
    public void Started() => Count++;

    /// <summary>Whether the experiment gives its position back now that its p-value is known.</summary>
    public bool GivesBack(PValue p)
    {
        bool givesBack = p.Value <= lambda || p.Value > tau;
        Count -= givesBack ? 1 : 0;
        return givesBack;
    }
}
