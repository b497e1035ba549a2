using Campaigns.Domain;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.TrueNulls;

namespace Campaigns.App.Dashboard.Model;

/// <summary>How many p-values of a campaign lie in each twentieth of the range from 0 to 1, and the estimated share of true nulls among them.</summary>
public sealed class PHistogram
{
    /// <summary>Bars.</summary>
    public const int Bars = 20;

    private readonly int[] _counts = new int[Bars];

    /// <summary>Counts the tested experiments of a campaign, whatever their family.</summary>
    /// <param name="standing">The campaign as it stands.</param>
    public PHistogram(CampaignStanding standing)
    {
        ArgumentNullException.ThrowIfNull(standing);
        PValue[] p = [.. standing.Experiments.Where(e => e.P is not null).Select(e => e.P!.Value)];
        Tested = p.Length;
        foreach (PValue value in p)
        {
            _counts[BarOf(value.Value)]++;
        }

        TrueNulls = TrueNullShare.Estimate(p);
        Others = [TrueNullShare.EstimateByBootstrap(p), TrueNullShare.EstimateBySmoother(p)];
    }

    /// <summary>P-values counted.</summary>
    public int Tested { get; }

    /// <summary>P-values in each bar: above its left end, up to its right end; the first holds 0 too.</summary>
    public IReadOnlyList<int> Counts => _counts;

    /// <summary>The estimate that <c>corrections</c> and <c>adjust</c> give.</summary>
    public TrueNullShare TrueNulls { get; }

    /// <summary>Estimates by other methods.</summary>
    public IReadOnlyList<TrueNullShare> Others { get; }

    /// <summary>P-values of true nulls to expect in every bar; null without an estimate.</summary>
    public double? ExpectedNulls => TrueNulls.Share * Tested / Bars;

    private static int BarOf(double p)
    {
        // The quotients k/20.0 decide, not the product.
        int bar = Math.Clamp((int)(p * Bars), 0, Bars - 1);
        bar -= bar > 0 && p <= bar / (double)Bars ? 1 : 0;
        return bar + (bar < Bars - 1 && p > (bar + 1) / (double)Bars ? 1 : 0);
    }
}
