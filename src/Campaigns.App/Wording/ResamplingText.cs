using Campaigns.App.Output;
using Campaigns.Domain;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.App.Wording;

/// <summary>The arrangements behind a permutation p-value, in words.</summary>
internal static class ResamplingText
{
    /// <summary>How p came about.</summary>
    public static string Sentence(Resampling resampling)
    {
        if (resampling.IsExact)
        {
            return FormattableString.Invariant($"Exact: {resampling.AsExtreme} of all {resampling.Arrangements} arrangements of the values over the groups are at least as extreme.");
        }

        double p = (resampling.AsExtreme + 1.0) / (resampling.Arrangements + 1.0);
        string error = NumberText.Screen(Math.Sqrt(p * (1 - p) / resampling.Arrangements), 2);
        return FormattableString.Invariant($"Monte Carlo: {resampling.AsExtreme} of {resampling.Arrangements} random arrangements (seed {resampling.Seed}) are at least as extreme, p = ({resampling.AsExtreme} + 1)/({resampling.Arrangements} + 1), standard error about {error}.");
    }

    /// <summary>A warning where the smallest p-value that the arrangements can show lies above the strictest threshold of its family, or above the level that the experiment was given; null where it does not.</summary>
    public static string? TooCoarse(Resampling resampling, FamilyStanding family, double? givenLevel)
    {
        double smallest = resampling.IsExact ? 1.0 / resampling.Arrangements : 1.0 / (resampling.Arrangements + 1.0);
        double strictest = givenLevel ?? family.Level.Value / family.Size;
        string threshold = givenLevel is null ? "the campaign's strictest threshold" : "the level that the experiment was given";
        string origin = givenLevel is null ? " (level over family size)" : "";
        return smallest <= strictest
            ? null
            : $"Warning: the smallest p these arrangements can show, {NumberText.Screen(smallest, 3)}, lies above {threshold}, {NumberText.Screen(strictest, 3)}{origin}: the experiment may be unable to survive whatever its data.";
    }
}
