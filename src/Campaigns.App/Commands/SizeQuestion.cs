using Campaigns.Statistics.Planning;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>A design with its replicates; null where groups are unequal.</summary>
internal sealed record SizeDesign(OneWayDesign Design, int? Replicates);

/// <summary>One combination of what was typed, and what was computed for it.</summary>
/// <param name="Groups">Groups.</param>
/// <param name="Replicates">Observations in each group; null where they are unequal.</param>
/// <param name="Observations">Observations in all.</param>
/// <param name="Level">The level of the one test.</param>
/// <param name="Effect">Cohen's f.</param>
/// <param name="Noncentrality">Lambda.</param>
/// <param name="Power">The power at that lambda.</param>
/// <param name="LargestDifference">Of two means, in the unit of the response; null where no standard deviation was given.</param>
/// <param name="WantedPower">The power asked for; null where power was computed.</param>
internal sealed record SizeAnswer(int Groups, int? Replicates, long Observations, double Level, double Effect, double Noncentrality, double Power, double? LargestDifference, double? WantedPower);

/// <summary>What the command size was asked: of effects, designs and powers one list is empty, and is computed.</summary>
internal sealed record SizeQuestion
{
    public required int Groups { get; init; }

    public required IReadOnlyList<SizeEffect> Effects { get; init; }

    /// <summary>Standard deviations, for rows without an effect of their own; one null where none was given.</summary>
    public required IReadOnlyList<double?> Deviations { get; init; }

    public required IReadOnlyList<SizeDesign> Designs { get; init; }

    /// <summary>Unequal sizes in the order of the groups; null in balanced designs.</summary>
    public required int[]? Sizes { get; init; }

    public required IReadOnlyList<double> Powers { get; init; }

    public required IReadOnlyList<double> Levels { get; init; }

    public required int Tests { get; init; }

    public bool AsksReplicates => Designs.Count == 0;

    public bool AsksPower => Powers.Count == 0;

    /// <summary>A row a combination, levels first, then designs, effects, and powers.</summary>
    public IEnumerable<SizeAnswer> Answers() => Levels.SelectMany(level => AtLevel(new SignificanceLevel(level / Tests)));

    private IEnumerable<SizeAnswer> AtLevel(SignificanceLevel level)
    {
        foreach (double power in Powers.Where(p => p <= level.Value))
        {
            throw new UsageException(FormattableString.Invariant($"--power {power} is not above the level {level}, which a test reaches without any effect; ask for more power."));
        }

        return AsksReplicates ? Effects.SelectMany(effect => Powers.Select(power => Replicates(level, effect, power)))
            : AsksPower ? Designs.SelectMany(design => Effects.Select(effect => Answer(design, level, effect, Lambda(design.Design, effect), null)))
            : Designs.SelectMany(design => Deviations.SelectMany(deviation => Powers.Select(power => SmallestEffect(design, level, deviation, power))));
    }

    private SizeAnswer Replicates(SignificanceLevel level, SizeEffect effect, double power)
    {
        double f = effect.CohenF(OneWayDesign.Balanced(Groups, 2), null);
        if (OneWayPower.SmallestReplicates(Groups, f, level, power) is not { } n)
        {
            throw new UsageException(FormattableString.Invariant($"An effect of f = {f:G4} is too small: even {OneWayPower.MostReplicates} replicates in each of {Groups} groups do not find it with power {power} at level {level}; ask for a larger effect."));
        }

        var design = new SizeDesign(OneWayDesign.Balanced(Groups, n), n);
        return Answer(design, level, effect, Lambda(design.Design, effect), power);
    }

    private SizeAnswer SmallestEffect(SizeDesign design, SignificanceLevel level, double? deviation, double power)
    {
        double lambda = OneWayPower.SmallestNoncentrality(design.Design, level, power);
        return Answer(design, level, SizeEffect.OfCohenF(OneWayPower.CohenF(design.Design, lambda), deviation), lambda, power);
    }

    private double Lambda(OneWayDesign design, SizeEffect effect) => OneWayPower.Noncentrality(design, effect.CohenF(design, Sizes));

    private SizeAnswer Answer(SizeDesign design, SignificanceLevel level, SizeEffect effect, double lambda, double? wanted) => new(
        Groups, design.Replicates, design.Design.Observations, level.Value, effect.CohenF(design.Design, Sizes), lambda,
        OneWayPower.Power(design.Design, level, lambda), effect.LargestDifference(design.Design, lambda), wanted);
}
