using Campaigns.Statistics.Checks.Computation;

namespace Campaigns.Statistics.Checks;

/// <summary>The size of the largest group over that of the smallest.</summary>
/// <remarks>Warns where a group has no value or a single one, and from a ratio of 2 on: the F test shrugs off unequal spreads in groups of one size, and may be wrong several times over where sizes differ as well.</remarks>
public sealed class Balance : ExperimentCheck
{
    private const double Limit = 2;

    /// <inheritdoc/>
    public override string Key => "balance";

    /// <inheritdoc/>
    public override string Name => "Balance of group sizes";

    /// <inheritdoc/>
    public override string CannotSee => "It does not know why values are missing; missing because they were out of range is worse than missing by accident.";

    /// <inheritdoc/>
    public override string Advice => "Unless it was planned so (a control with more values, say), find out what is missing; equal sizes protect the F test against unequal spreads.";

    /// <inheritdoc/>
    public override string Source => "G. E. P. Box, Some theorems on quadratic forms applied in the study of analysis of variance problems, Annals of Mathematical Statistics 25 (1954) 290.";

    /// <inheritdoc/>
    public override CheckFinding Look(CheckSubject subject)
    {
        var counts = new int[subject.Units.GroupCount];
        foreach (ushort group in subject.Units.Groups)
        {
            counts[group]++;
        }

        int largest = 0;
        int smallest = 0;
        for (int i = 1; i < counts.Length; i++)
        {
            largest = counts[i] > counts[largest] ? i : largest;
            smallest = counts[i] < counts[smallest] ? i : smallest;
        }

        if (counts.Count(n => n > 0) < 2)
        {
            return new CheckFinding(CheckVerdict.NotPossible, "Fewer than two groups hold values.");
        }

        string fewest = $"{CheckText.Count(counts[smallest], "value", "values")} in {subject.Labels[smallest]}";
        string most = $"{counts[largest]} in {subject.Labels[largest]}";
        if (counts[smallest] == 0)
        {
            return new CheckFinding(CheckVerdict.Warns, $"There is no value in {subject.Labels[smallest]}, against {most}.");
        }

        double ratio = (double)counts[largest] / counts[smallest];
        string saw = counts[largest] == counts[smallest]
            ? $"All groups have {CheckText.Count(counts[smallest], "value", "values")}."
            : $"Group sizes run from {fewest} to {most}.";
        return new CheckFinding(ratio >= Limit || counts[smallest] == 1 ? CheckVerdict.Warns : CheckVerdict.Quiet, saw, ratio);
    }
}
