using Campaigns.Statistics.Online;

namespace Campaigns.Domain;

/// <summary>A stream of a campaign: experiments that an online procedure decides one after another, with settings that were fixed when it started.</summary>
/// <param name="Number">Number in the campaign, from 1; the latest takes new experiments.</param>
/// <param name="Procedure">The online procedure.</param>
/// <param name="Settings">Its settings.</param>
/// <param name="Reason">Why it was started in the place of an earlier one; null for the first, which starts with the seal.</param>
/// <param name="StartedAt">When.</param>
public sealed record StreamHead(int Number, OnlineProcedure Procedure, OnlineSettings Settings, string? Reason, DateTimeOffset StartedAt);
