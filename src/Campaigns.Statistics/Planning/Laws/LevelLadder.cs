using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Planning.Laws;

/// <summary>The levels at which a correction compares the p-values of a campaign, rank by rank, and how a test comes out at each; computed when asked for.</summary>
internal sealed class LevelLadder
{
    /// <summary>What the laws may leave out of a mass, against the least chance of a survivor.</summary>
    private const double Precision = 1e-20;

    private readonly CampaignDesign _campaign;
    private readonly Correction _correction;
    private readonly double _level;
    private readonly TestCurve _curve;

    /// <summary>The ladder of a correction with a boundary for every rank.</summary>
    public LevelLadder(CampaignDesign campaign, Correction correction, SignificanceLevel level)
    {
        (_campaign, _curve) = (campaign, new TestCurve(campaign));

        // Benjamini and Yekutieli's correction is Benjamini and Hochberg's at q/(1 + 1/2 + ... + 1/m); that sum is formed once.
        (_correction, _level) = LargeCampaign.LevelOf(correction, campaign, level) is { } q ? (new BenjaminiHochberg(), q.Value) : (correction, level.Value);
        TestPoint first = At(1);
        double m = campaign.Experiments;
        double least = Math.Min(Rare(campaign.ShareNull * first.Level), Rare(campaign.ShareReal * first.Found));
        Negligible = Precision * Math.Min(1, m * least) / (m * m);

        static double Rare(double chance) => chance > 0 ? chance : 1;
    }

    /// <summary>Masses at most this change no result in the digits that a double holds: a survivor of each kind is at least as likely as the first rank makes it.</summary>
    public double Negligible { get; }

    /// <summary>A test at the level of a rank.</summary>
    /// <param name="rank">1 to m.</param>
    public TestPoint At(int rank) => _curve.At(_correction.BoundaryAt(rank, _campaign.Experiments, _level)!.Value);

    /// <summary>An experiment at the level of a rank, where it has a real effect with the campaign's probability.</summary>
    /// <param name="rank">1 to m.</param>
    public MixturePoint Mixture(int rank) => MixturePoint.Of(_campaign, At(rank));
}
