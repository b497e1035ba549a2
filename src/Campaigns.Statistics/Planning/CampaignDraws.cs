namespace Campaigns.Statistics.Planning;

/// <summary>How campaigns are to be drawn: the same seed draws the same campaigns, on any number of threads.</summary>
/// <param name="Seed">Seed of the random numbers.</param>
/// <param name="Count">Campaigns to draw, at least 2.</param>
public sealed record CampaignDraws(ulong Seed, int Count)
{
    /// <summary>Ends the drawing early.</summary>
    public CancellationToken Stop { get; init; }

    /// <summary>Told after each drawn campaign, from any thread.</summary>
    public Action? Drawn { get; init; }
}
