namespace Campaigns.Statistics.FollowUps;

/// <summary>A procedure that compares groups two by two inside one experiment and pays for the number of comparisons there: one sealed class in one file, and one line in <see cref="FollowUpRegistry"/>.</summary>
public abstract class FollowUp
{
    /// <summary>The short, frozen, lower-case word by which plans, files and commands name the procedure.</summary>
    public abstract string Key { get; }

    /// <summary>The procedure's name in the field's words.</summary>
    public abstract string Name { get; }

    /// <summary>Which pairs it compares, and what its p-values and intervals hold together.</summary>
    public abstract string Holds { get; }

    /// <summary>What must hold for that to be true.</summary>
    public abstract string Assumes { get; }

    /// <summary>Where the method was published.</summary>
    public abstract string Source { get; }

    /// <summary>Whether every other group is held against the control, which the plan must then name.</summary>
    public virtual bool NeedsControl => false;

    /// <summary>Whether groups that are adjusted for blocks can be compared; not where every group's own variance is used.</summary>
    public virtual bool WorksWithinBlocks => true;

    /// <summary>Compares the groups of one experiment.</summary>
    /// <param name="estimates">What is known of the groups.</param>
    /// <param name="control">The control's number; null where there is none.</param>
    /// <param name="confidence">Simultaneous confidence of the intervals, in (0, 1).</param>
    /// <returns>A line a pair, later group less earlier one in the order of group numbers (group less control where held against a control), pairs in that order; groups without a value are left out. Empty where the procedure needs a control and there is none, or the control has no value.</returns>
    /// <exception cref="ArgumentOutOfRangeException">The confidence is outside (0, 1).</exception>
    public abstract IReadOnlyList<GroupComparison> Compare(GroupEstimates estimates, int? control, double confidence);
}
