using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.CampaignPermutation;

/// <summary>One response at work in a step-down adjustment, or a p-value that was given.</summary>
internal sealed class Hypothesis
{
    /// <summary>The set of the response; null for a given p-value.</summary>
    public SpecimenSet? Set { get; init; }

    /// <summary>The response; null for a given p-value.</summary>
    public ExactResponse? Response { get; init; }

    /// <summary>Larger the more extreme: the observed share of variation, or minus the p-value.</summary>
    public double Evidence { get; set; }

    /// <summary>Its own p-value.</summary>
    public PValue P { get; set; }

    /// <summary>The arrangements behind <see cref="P"/>; null for a given one.</summary>
    public Resampling? Resampling { get; set; }

    /// <summary>Place in the order of the evidence, from 0.</summary>
    public int Position { get; set; }

    /// <summary>The adjusted p-value.</summary>
    public PValue Adjusted { get; set; }
}
