using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Checks.Computation;

/// <summary>How far the values of each group lie apart, from exact sums, and which groups have the largest and the smallest standard deviation.</summary>
internal sealed class GroupSpreads
{
    private readonly long[] _counts;
    private readonly WideReal[] _variances;
    private readonly IReadOnlyList<string> _labels;
    private readonly WideReal _unit;

    private GroupSpreads(GroupedSample sample, IReadOnlyList<string> labels, bool withinBlocks)
    {
        ExactMoments moments = ExactMoments.Of(sample, new GroupSums[sample.GroupCount]);
        _labels = labels;
        _unit = sample.Unit;
        _counts = new long[sample.GroupCount];
        _variances = new WideReal[sample.GroupCount];
        for (int i = 0; i < _counts.Length; i++)
        {
            long n = _counts[i] = moments.CountOf(i);
            if (n >= 2)
            {
                _variances[i] = moments.CountTimesSquaredDeviations(i) / n / (n - 1);
                Largest = Largest < 0 || (_variances[i] - _variances[Largest]).Sign > 0 ? i : Largest;
                Smallest = Smallest < 0 || (_variances[i] - _variances[Smallest]).Sign < 0 ? i : Smallest;
            }
        }

        Obstacle = withinBlocks
            ? "The groups are compared within blocks, and what the blocks add stands inside the spread of every group."
            : FindObstacle();
    }

    /// <summary>The group with the largest standard deviation, the first of several; -1 where no group holds two values.</summary>
    public int Largest { get; } = -1;

    /// <summary>The group with the smallest one.</summary>
    public int Smallest { get; } = -1;

    /// <summary>Groups of the experiment, those without a value included.</summary>
    public int GroupCount => _counts.Length;

    /// <summary>Why the spreads of the groups cannot be held against each other, as a sentence; null where they can.</summary>
    public string? Obstacle { get; }

    /// <summary>Looks at the groups of an experiment.</summary>
    /// <remarks>
    /// Residuals of a layout with blocks mix the variances of all groups (with two groups they are equal and opposite), and values mix them with that of the blocks.
    /// There is no simple sound test, so there is none here: M. E. O'Neill and K. L. Mathews, Biometrics 58 (2002) 216, show what it takes.
    /// </remarks>
    public static GroupSpreads Of(CheckSubject subject) =>
        new(subject.Units, subject.Labels, subject.Fit is { WithinBlocks: true });

    /// <summary>Values of a group.</summary>
    public long CountOf(int group) => _counts[group];

    /// <summary>Variance of a group, divisor n - 1, in squared units of its mantissas; zero exactly where its values are all the same.</summary>
    public WideReal VarianceOf(int group) => _variances[group];

    /// <summary>Standard deviation of a group in units of the response.</summary>
    public double StandardDeviationOf(int group) => (WideReal.Sqrt(_variances[group]) * _unit).ToDouble();

    /// <summary>The extremes of the spread and a p-value in words.</summary>
    /// <param name="differ">Whether the check calls the spreads different.</param>
    /// <param name="p">Its p-value.</param>
    /// <param name="forReference">Whether the check is shown for reference alone, so that its word is not the last one.</param>
    public string Words(bool differ, PValue p, bool forReference)
    {
        string largest = CheckText.Figure(StandardDeviationOf(Largest));
        string smallest = CheckText.Figure(StandardDeviationOf(Smallest));
        string leftOut = _counts.Contains(1) ? ", groups of one value left out" : "";
        return Largest == Smallest ? $"No sign of different spreads: all standard deviations are {largest} ({CheckText.P(p)}){leftOut}."
            : differ
            ? $"{(forReference ? "By this test alone, spreads differ" : "Spreads differ")}: standard deviation {largest} in {_labels[Largest]} against {smallest} in {_labels[Smallest]} ({CheckText.P(p)}){leftOut}."
            : $"No sign of different spreads: standard deviations from {smallest} in {_labels[Smallest]} to {largest} in {_labels[Largest]} ({CheckText.P(p)}){leftOut}.";
    }

    private string? FindObstacle() =>
        _counts.Count(n => n > 0) < 2 ? "Fewer than two groups hold values."
        : _counts.Count(n => n > 1) < 2 ? "Fewer than two groups hold more than one value."
        : _variances[Largest].Sign == 0 ? "The values inside every group are all the same."
        : null;
}
