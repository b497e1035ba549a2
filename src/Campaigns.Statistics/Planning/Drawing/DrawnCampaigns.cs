using Campaigns.Statistics.Distributions;

namespace Campaigns.Statistics.Planning.Drawing;

/// <summary>Draws the p-values of campaigns: F of a noncentral over a central chi-squared for a real effect, uniform without one.</summary>
internal sealed class DrawnCampaigns(CampaignDesign campaign, ulong seed)
{
    private readonly double _df1 = campaign.Experiment.BetweenDegreesOfFreedom;
    private readonly double _df2 = campaign.Experiment.WithinDegreesOfFreedom;
    private readonly FDistribution _law = FDistribution.For(campaign.Experiment.BetweenDegreesOfFreedom, campaign.Experiment.WithinDegreesOfFreedom);

    /// <summary>Draws one campaign, from a stream of its own.</summary>
    /// <param name="number">Which.</param>
    /// <param name="pValues">Takes the p-values.</param>
    /// <param name="isReal">Takes which effects are real.</param>
    public void Draw(int number, Span<double> pValues, Span<bool> isReal)
    {
        var random = new Variates(seed, (ulong)number);
        ChooseReal(ref random, isReal);
        for (int i = 0; i < pValues.Length; i++)
        {
            pValues[i] = isReal[i] ? PValueOfEffect(ref random) : random.Uniform();
        }
    }

    private void ChooseReal(ref Variates random, Span<bool> isReal)
    {
        if (campaign.Real.Share is { } share)
        {
            foreach (ref bool each in isReal)
            {
                each = random.Uniform() < share;
            }

            return;
        }

        // Of those not yet looked at, the ones still to be chosen are any with the same probability.
        int wanted = campaign.Real.Number!.Value;
        for (int i = 0; i < isReal.Length; i++)
        {
            isReal[i] = random.Uniform() * (isReal.Length - i) < wanted;
            wanted -= isReal[i] ? 1 : 0;
        }
    }

    private double PValueOfEffect(ref Variates random)
    {
        double between = random.ChiSquared(_df1, campaign.Noncentrality) / _df1;
        double within = random.ChiSquared(_df2) / _df2;
        return _law.UpperTail(between / within);
    }
}
