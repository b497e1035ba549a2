using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Numerics;

namespace Campaigns.Statistics.Units;

/// <summary>The additive layout of an experiment fitted to its values: residuals and leverages, for the checks.</summary>
/// <remarks>Residuals are scaled by a power of two so that squares neither overflow nor vanish: residual i in units of the response is <see cref="Residuals"/>[i] times <see cref="Scale"/>.</remarks>
public sealed class FittedLayout
{
    private FittedLayout(double[] residuals, double[] leverages, int degreesOfFreedom, WideReal scale, bool withinBlocks)
    {
        Residuals = residuals;
        Leverages = leverages;
        DegreesOfFreedom = degreesOfFreedom;
        Scale = scale;
        WithinBlocks = withinBlocks;
    }

    /// <summary>For each value of the sample, in its order, value less fitted value, scaled: each correct to about 15 digits of the largest.</summary>
    public IReadOnlyList<double> Residuals { get; }

    /// <summary>For each value the share of its own in its fitted value, in (0, 1]: 1/n for plain groups.</summary>
    public IReadOnlyList<double> Leverages { get; }

    /// <summary>Residual degrees of freedom; positive.</summary>
    public int DegreesOfFreedom { get; }

    /// <summary>What the residuals are to be multiplied by.</summary>
    public WideReal Scale { get; }

    /// <summary>Whether blocks are fitted besides the groups.</summary>
    public bool WithinBlocks { get; }

    /// <summary>Fits group means.</summary>
    /// <param name="units">Independent values.</param>
    /// <returns>Null where no residual degree of freedom is left.</returns>
    public static FittedLayout? OneWay(GroupedSample units)
    {
        ExactMoments moments = ExactMoments.Of(units, new GroupSums[units.GroupCount]);
        int groups = 0;
        for (int i = 0; i < units.GroupCount; i++)
        {
            groups += moments.CountOf(i) > 0 ? 1 : 0;
        }

        if (units.Count - groups < 1)
        {
            return null;
        }

        var exact = new WideReal[units.Count];
        var leverages = new double[units.Count];
        for (int i = 0; i < exact.Length; i++)
        {
            int group = units.Groups[i];
            double n = moments.CountOf(group);
            exact[i] = (units.IsWide ? WideReal.From(units.WideMantissas[i]) : WideReal.From((Int128)units.Mantissas[i])) - (moments.Sum(group) / n);
            leverages[i] = 1 / n;
        }

        return Scaled(exact, leverages, units.Count - groups, units.Unit, withinBlocks: false);
    }

    /// <summary>Scales exact residuals so that the largest lies in [0.5, 2).</summary>
    private static FittedLayout Scaled(WideReal[] exact, double[] leverages, int degreesOfFreedom, WideReal unit, bool withinBlocks)
    {
        double largest = double.NegativeInfinity;
        foreach (WideReal residual in exact)
        {
            largest = residual.Sign == 0 ? largest : Math.Max(largest, (residual.Sign < 0 ? -residual : residual).Log());
        }

        WideReal scale = WideReal.PowerOfTwo(double.IsInfinity(largest) ? 0 : (long)Math.Floor(largest / Math.Log(2)));
        return new FittedLayout([.. exact.Select(r => (r / scale).ToDouble())], leverages, degreesOfFreedom, scale * unit, withinBlocks);
    }
}
