using Campaigns.Statistics.Planning;

namespace Campaigns.App.Commands;

/// <summary>An effect to find, however it was typed.</summary>
internal sealed class SizeEffect
{
    private readonly double? _cohenF;
    private readonly double[]? _means;
    private readonly double _difference;
    private readonly double? _deviation;

    private SizeEffect(double? cohenF, double[]? means, double difference, double? deviation)
    {
        _cohenF = cohenF;
        _means = means;
        _difference = difference;
        _deviation = deviation;
    }

    /// <summary>Cohen's f itself; with the standard deviation within groups, where differences are wanted in the unit of the response.</summary>
    public static SizeEffect OfCohenF(double f, double? deviation) => new(f, null, 0, deviation);

    /// <summary>Means, or their differences from one of them.</summary>
    public static SizeEffect OfMeans(double[] means, double deviation) => new(null, means, means.Max() - means.Min(), deviation);

    /// <summary>Two groups a difference apart, the others in the middle.</summary>
    public static SizeEffect OfDifference(double difference, double deviation) => new(null, null, difference, deviation);

    /// <summary>Cohen's f in a design; in balanced designs it does not depend on the replicates.</summary>
    /// <param name="design">Groups and their sizes.</param>
    /// <param name="sizes">The sizes in the order of the means; null in a balanced design.</param>
    public double CohenF(OneWayDesign design, int[]? sizes)
    {
        double f = _cohenF
            ?? (_means is not null
                ? OneWayPower.CohenFOfMeans(_means, sizes ?? [.. Enumerable.Repeat(1, _means.Length)], _deviation!.Value)
                : OneWayPower.CohenF(design, OneWayPower.NoncentralityOfDifference(design, _difference, _deviation!.Value)));
        return f is > 1e-100 and < 1e100
            ? f
            : throw new UsageException("The effect is beyond all measure against the standard deviation; check --effect, --means, --difference and --sd.");
    }

    /// <summary>The largest difference of two means; null where no standard deviation was given.</summary>
    public double? LargestDifference(OneWayDesign design, double noncentrality) =>
        _cohenF is null ? _difference
        : _deviation is { } deviation ? OneWayPower.LargestDifference(design, noncentrality, deviation)
        : null;
}
