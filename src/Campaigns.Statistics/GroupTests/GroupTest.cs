using Campaigns.Statistics.Units;

namespace Campaigns.Statistics.GroupTests;

/// <summary>An omnibus test of "all group means are equal": one sealed class in one file, and one line in <see cref="GroupTestRegistry"/>.</summary>
public abstract class GroupTest
{
    /// <summary>The short, frozen, lower-case word by which plans, files and commands name the test.</summary>
    public abstract string Key { get; }

    /// <summary>The test's name in the field's words.</summary>
    public abstract string Name { get; }

    /// <summary>The hypothesis that a small p-value speaks against.</summary>
    public abstract string Hypothesis { get; }

    /// <summary>What must hold for the p-value to mean what it says.</summary>
    public abstract string Assumes { get; }

    /// <summary>Where the method was published.</summary>
    public abstract string Source { get; }

    /// <summary>Whether the test compares groups within blocks, so that every value needs its block.</summary>
    public virtual bool UsesBlocks => false;

    /// <summary>Whether the test may draw random arrangements, so that it needs a seed.</summary>
    public virtual bool DrawsAtRandom => false;

    /// <summary>Tests one experiment whose values are independent (of each specimen one; <see cref="ExperimentalUnits"/> sees to that).</summary>
    /// <param name="sample">Its observations; at least the group count must be set.</param>
    /// <param name="draws">How many random arrangements to draw, and from which seed, where the test draws any.</param>
    /// <returns><see cref="Tested"/>, or <see cref="NotTestable"/> with the reason.</returns>
    public abstract TestOutcome Test(GroupedSample sample, RandomDraws draws);

    /// <summary>Tests one experiment with <see cref="RandomDraws.Usual"/>.</summary>
    /// <inheritdoc cref="Test(GroupedSample, RandomDraws)"/>
    public TestOutcome Test(GroupedSample sample) => Test(sample, RandomDraws.Usual);
}
