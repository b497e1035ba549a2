namespace Campaigns.Statistics.GroupTests;

/// <summary>One group of an experiment in figures.</summary>
/// <param name="Count">Values in the group; may be 0.</param>
/// <param name="Mean">Arithmetic mean, in units of the response; null for an empty group.</param>
/// <param name="StandardDeviation">With divisor n - 1; null for fewer than two values.</param>
/// <param name="StandardError">Standard deviation over the square root of n; null for fewer than two values.</param>
/// <param name="Lower">Lower end of the confidence interval of the mean, from the group's own standard deviation and Student's t with n - 1 degrees of freedom; null for fewer than two values, and where all of them are alike.</param>
/// <param name="Upper">Upper end of that interval; null where there is no lower one.</param>
public sealed record GroupSummary(int Count, double? Mean, double? StandardDeviation, double? StandardError, double? Lower, double? Upper);
