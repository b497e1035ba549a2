using Campaigns.Statistics.Probability;

namespace Campaigns.Domain;

/// <summary>One experiment in one review, as it was stored.</summary>
/// <param name="P">Its p-value.</param>
/// <param name="AdjustedP">Its adjusted p-value.</param>
/// <param name="Survives">Whether that was at most the level of its family.</param>
public readonly record struct ReviewLine(PValue P, PValue AdjustedP, bool Survives);
