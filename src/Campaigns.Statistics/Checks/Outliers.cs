using Campaigns.Statistics.Checks.Computation;
using Campaigns.Statistics.Distributions;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Units;

namespace Campaigns.Statistics.Checks;

/// <summary>The value that lies farthest from what all others say: externally studentised residuals with Bonferroni's limit.</summary>
/// <remarks>
/// t = e/sqrt((1 - h) s^2), s^2 the residual mean square of the layout fitted without that value: fitted anew from the exact values, so that a value a million standard deviations off has all its digits too.
/// The p-value is that of |t| with one degree of freedom less than the residual, times the number of values that leave a residual. Warns below 0.05.
/// </remarks>
public sealed class Outliers : ExperimentCheck
{
    private const double Level = 0.05;

    /// <inheritdoc/>
    public override string Key => "outliers";

    /// <inheritdoc/>
    public override string Name => "Values that stand out";

    /// <inheritdoc/>
    public override string CannotSee => "Two far values of one group hide each other, and where spreads differ a value of a noisy group may look far.";

    /// <inheritdoc/>
    public override string Advice => "Look for a cause in the record (typing, mix-up, instrument); never leave a value out for this alone, and where there is a cause report the result with and without it.";

    /// <inheritdoc/>
    public override string Source => "R. D. Cook and S. Weisberg, Residuals and Influence in Regression, Chapman and Hall, 1982, section 2.2.";

    /// <inheritdoc/>
    public override CheckFinding Look(CheckSubject subject)
    {
        if (Residuals.Obstacle(subject) is { } obstacle)
        {
            return new CheckFinding(CheckVerdict.NotPossible, obstacle);
        }

        FittedLayout fit = subject.Fit!;
        if (fit.DegreesOfFreedom < 2)
        {
            return new CheckFinding(CheckVerdict.NotPossible, "A single residual degree of freedom is left: without the value in question nothing would tell how far values scatter.");
        }

        (int farthest, int free) = Farthest(subject.Units, fit);
        string place = subject.Places is { } places ? $" ({places[farthest]})" : "";
        string value = $"{CheckText.ValueOf(subject.Units, farthest)} in {subject.Labels[subject.Units.Groups[farthest]]}{place}";
        WideReal rest = MeanSquareWithout(subject.Units, fit, farthest);
        if (rest.Sign == 0)
        {
            return new CheckFinding(CheckVerdict.NotPossible, $"Without the value {value} there would be no scatter left to hold it against.");
        }

        WideReal residual = WideReal.From(fit.Residuals[farthest]) * fit.Scale;
        double t = (residual / WideReal.Sqrt(rest * WideReal.From(1 - fit.Leverages[farthest]))).ToDouble();
        t = Math.Clamp(t, double.MinValue, double.MaxValue);
        PValue p = PValue.FromLog(Math.Min(0, StudentT.LogTwoSidedTail(t, fit.DegreesOfFreedom - 1) + Math.Log(free)));
        bool warns = p.Value < Level;
        string figures = $"studentised residual {CheckText.Figure(t)} ({CheckText.P(p)}, adjusted for {free} values)";
        return new CheckFinding(
            warns ? CheckVerdict.Warns : CheckVerdict.Quiet,
            warns ? $"The value {value} stands out: {figures}." : $"No value stands out; the farthest is {value}: {figures}.",
            t,
            p);
    }

    /// <summary>The value whose studentised residual is the largest in size, of several the one of the first group, the smallest and the one that lies lowest, and the number of values that leave a residual.</summary>
    private static (int Farthest, int Free) Farthest(GroupedSample units, FittedLayout fit)
    {
        int farthest = -1;
        int free = 0;
        double largest = -1;
        for (int i = 0; i < fit.Residuals.Count; i++)
        {
            if (Residuals.IsFree(fit, i))
            {
                free++;
                double square = fit.Residuals[i] * fit.Residuals[i] / (1 - fit.Leverages[i]);
                if (square > largest || (square == largest && IsBefore(units, fit, i, farthest)))
                {
                    largest = square;
                    farthest = i;
                }
            }
        }

        return (farthest, free);
    }

    private static bool IsBefore(GroupedSample units, FittedLayout fit, int i, int other) =>
        units.Groups[i] != units.Groups[other] ? units.Groups[i] < units.Groups[other]
        : units.MantissaOf(i) != units.MantissaOf(other) ? units.MantissaOf(i) < units.MantissaOf(other)
        : fit.Residuals[i] < fit.Residuals[other];

    /// <summary>The residual mean square of the same layout without one value, in squared units of the response.</summary>
    private static WideReal MeanSquareWithout(GroupedSample units, FittedLayout fit, int without)
    {
        ushort[] groups = Without(units.Groups, without);
        int[] blocks = fit.WithinBlocks ? Without(units.Blocks, without) : [];
        GroupedSample rest = units.IsWide
            ? new GroupedSample(Without(units.WideMantissas, without), units.Decimals, groups, units.GroupCount) { Divisor = units.Divisor, Blocks = blocks }
            : new GroupedSample(Without(units.Mantissas, without), units.Decimals, groups, units.GroupCount) { Divisor = units.Divisor, Blocks = blocks };
        FittedLayout fitted = (fit.WithinBlocks ? FittedLayout.InBlocks(rest) : FittedLayout.OneWay(rest))
            ?? throw new InvalidOperationException("A value that does not fix its own fitted value was left out, and the rest could not be fitted.");
        double squares = 0;
        foreach (double residual in fitted.Residuals.OrderBy(Math.Abs)) // In one order whatever that of the rows, so that no bit depends on it.
        {
            squares += residual * residual;
        }

        return WideReal.From(squares / fitted.DegreesOfFreedom) * fitted.Scale * fitted.Scale;
    }

    private static T[] Without<T>(ReadOnlySpan<T> values, int without) => [.. values[..without], .. values[(without + 1)..]];
}
