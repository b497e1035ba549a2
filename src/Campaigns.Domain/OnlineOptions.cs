namespace Campaigns.Domain;

/// <summary>What a campaign says of its online procedure before the seal; null leaves the procedure's default.</summary>
/// <param name="Horizon">Experiments that the spending shape is spread over; 0 for no end; null for the planned number.</param>
/// <param name="Shape">Key of the spending shape.</param>
/// <param name="InitialWealth">Initial wealth, from 0 to the level.</param>
/// <param name="Lambda">The bound of candidates, in (0, 1).</param>
/// <param name="Tau">The bound of the selected, in (0, 1].</param>
public sealed record OnlineOptions(int? Horizon = null, string? Shape = null, double? InitialWealth = null, double? Lambda = null, double? Tau = null);
