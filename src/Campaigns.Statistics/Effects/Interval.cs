namespace Campaigns.Statistics.Effects;

/// <summary>A confidence interval.</summary>
/// <param name="Lower">Lower bound; at most the upper one.</param>
/// <param name="Upper">Upper bound.</param>
public readonly record struct Interval(double Lower, double Upper);
