using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Corrections;

/// <summary>A batch correction for many tests: one sealed class in one file, and one line in <see cref="CorrectionRegistry"/>.</summary>
/// <remarks>
/// A correction only gives adjusted p-values; whether a hypothesis is rejected is decided in one place, <see cref="SignificanceLevel.Rejects"/>.
/// A subclass writes <see cref="AdjustSorted"/> alone: sorting, the planned but untested rest of the family, tails below the range of doubles and the order of the input are dealt with once, here.
/// </remarks>
public abstract class Correction
{
    /// <summary>The short, frozen, lower-case word by which plans, files and commands name the correction.</summary>
    public abstract string Key { get; }

    /// <summary>The procedure's published name.</summary>
    public abstract string Name { get; }

    /// <summary>The error rate that the procedure holds.</summary>
    public abstract ErrorRate Controls { get; }

    /// <summary>The dependence between the p-values under which it is proved.</summary>
    public abstract Dependence ValidUnder { get; }

    /// <summary>The guarantee in one sentence for people.</summary>
    public abstract string Guarantee { get; }

    /// <summary>Where the procedure was published.</summary>
    public abstract string Source { get; }

    /// <summary>Adjusted p-values of a family, logarithms included, in the order in which the family's p-values were given.</summary>
    /// <param name="family">The p-values at hand with the size of the family they belong to.</param>
    /// <returns>One adjusted p-value for each p-value given.</returns>
    public PValue[] Adjust(RankedFamily family) => throw new NotImplementedException();

    /// <summary>Adjusted p-values as doubles, in the order in which the family's p-values were given.</summary>
    /// <param name="family">The p-values at hand with the size of the family they belong to.</param>
    /// <param name="adjusted">Takes one adjusted p-value for each p-value given.</param>
    public void Adjust(RankedFamily family, Span<double> adjusted) => throw new NotImplementedException();

    /// <summary>The procedure itself, on ascending p-values.</summary>
    /// <param name="sorted">The p-values at hand, ascending, in [0, 1].</param>
    /// <param name="familySize">Size of the family, at least the number of p-values; the rest counts as p = 1.</param>
    /// <param name="adjusted">Takes the adjusted p-values, ascending.</param>
    protected abstract void AdjustSorted(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted);
}

/// <summary>What kind of error a procedure holds at its level.</summary>
public enum ErrorRate
{
    /// <summary>Each test at the level on its own: nothing is held over the family.</summary>
    PerTest,

    /// <summary>The probability of at least one false rejection in the family.</summary>
    Familywise,

    /// <summary>The expected share of false rejections among all rejections.</summary>
    FalseDiscovery,
}

/// <summary>A condition on the joint law of the p-values, from the weakest demand to the strongest.</summary>
public enum Dependence
{
    /// <summary>Any joint law.</summary>
    Any,

    /// <summary>The p-values of true nulls satisfy Sidak's inequality: P(all above c) is at least the product; holds under independence and for two-sided normal tests of any correlation.</summary>
    Sidak,

    /// <summary>Simes' inequality holds for the true nulls; holds under independence and positive regression dependence.</summary>
    Simes,

    /// <summary>Positive regression dependence on the subset of true nulls; independence is a special case.</summary>
    PositiveRegression,

    /// <summary>Independent p-values.</summary>
    Independent,
}
