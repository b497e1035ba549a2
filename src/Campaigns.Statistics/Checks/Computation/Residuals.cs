using Campaigns.Statistics.Units;

namespace Campaigns.Statistics.Checks.Computation;

/// <summary>The residuals of a fitted layout that can say anything: those of values that do not fix their own fitted value.</summary>
internal static class Residuals
{
    /// <summary>From here on a leverage counts as 1: the value alone determines its fitted value, and its residual is zero whatever it is.</summary>
    private const double Full = 1 - 1e-9;

    /// <summary>Why there are no residuals to look at, as a sentence; null where there are.</summary>
    public static string? Obstacle(CheckSubject subject) =>
        !HoldsTwoGroups(subject.Units.Groups) ? "Fewer than two groups hold values."
        : subject.Fit is not { } fit ? "There are no residuals: groups, or groups and blocks, fit every value exactly whatever it is."
        : fit.Residuals.Any(r => r != 0) ? null
        : fit.WithinBlocks ? "Groups and blocks fit every value exactly."
        : "The values inside every group are all the same.";

    /// <summary>Whether a value leaves a residual.</summary>
    public static bool IsFree(FittedLayout fit, int i) => fit.Leverages[i] < Full;

    private static bool HoldsTwoGroups(ReadOnlySpan<ushort> groups) => !groups.IsEmpty && groups.ContainsAnyExcept(groups[0]);
}
