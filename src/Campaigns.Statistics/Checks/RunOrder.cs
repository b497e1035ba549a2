using Campaigns.Statistics.Checks.Computation;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Units;

namespace Campaigns.Statistics.Checks;

/// <summary>Whether neighbours in run order resemble one another, or alternate, more than chance would have it: von Neumann's ratio of the residuals with its exact moments for the layout at hand.</summary>
/// <remarks>Needs the place of every value in one run order without ties, and four residual degrees of freedom, below which the law of the ratio is no beta law even roughly. Warns below p = 0.05, two-sided.</remarks>
public sealed class RunOrder : ExperimentCheck
{
    private const double Level = 0.05;
    private const int FewestDegreesOfFreedom = 4;

    /// <inheritdoc/>
    public override string Key => "run-order";

    /// <inheritdoc/>
    public override string Name => "Drift over the run order";

    /// <inheritdoc/>
    public override string CannotSee => "A drift that goes along with the groups, as where all of one group were measured before the next, cannot be told from a difference between groups.";

    /// <inheritdoc/>
    public override string Advice => "Plot the residuals in run order and look for warming up, wear, ageing or carry-over; randomise the order next time, or run in blocks. No test mends values that depend on their neighbours.";

    /// <inheritdoc/>
    public override string Source => "J. von Neumann, Annals of Mathematical Statistics 12 (1941) 367; moments and beta law: J. Durbin and G. S. Watson, Biometrika 37 (1950) 409 and 38 (1951) 159.";

    /// <inheritdoc/>
    public override CheckFinding Look(CheckSubject subject)
    {
        if ((Residuals.Obstacle(subject) ?? OrderObstacle(subject.Units)) is { } obstacle)
        {
            return new CheckFinding(CheckVerdict.NotPossible, obstacle);
        }

        FittedLayout fit = subject.Fit!;
        int[] runs = InOrder(subject.Units.Orders);
        if (fit.DegreesOfFreedom < FewestDegreesOfFreedom)
        {
            return new CheckFinding(CheckVerdict.NotPossible, $"Too few values: {fit.DegreesOfFreedom} of the {FewestDegreesOfFreedom} residual degrees of freedom that are needed.");
        }

        if (Tied(subject.Units.Orders, runs) is { } tied)
        {
            return new CheckFinding(CheckVerdict.NotPossible, FormattableString.Invariant($"Several values share place {tied} in the run order, so that it is not known which came first."));
        }

        if (Law(subject.Units, fit, runs) is not { } law || law.DegreesOfFreedom != fit.DegreesOfFreedom)
        {
            return new CheckFinding(CheckVerdict.NotPossible, "Groups and blocks lie along the run order in such a way that nothing is left to tell a drift by.");
        }

        return Judge(fit, runs, law);
    }

    private static CheckFinding Judge(FittedLayout fit, int[] runs, SuccessiveDifferences law)
    {
        double ratio = Ratio(fit.Residuals, runs);
        PValue p = law.TwoSidedPValue(ratio);
        bool warns = p.Value < Level;
        string figures = $"ratio of successive differences {CheckText.Figure(ratio)} where {CheckText.Figure(law.Mean)} is expected ({CheckText.P(p)})";
        string saw =
            !warns ? $"No sign of drift or alternation in run order: {figures}."
            : ratio < law.Mean ? $"Drift: neighbours in run order resemble one another, {figures}."
            : $"Alternation: neighbours in run order lie on opposite sides, {figures}.";
        return new CheckFinding(warns ? CheckVerdict.Warns : CheckVerdict.Quiet, saw, ratio, p);
    }

    private static string? OrderObstacle(GroupedSample units)
    {
        int missing = units.Orders.Count(GroupedSample.NoOrder);
        return units.Orders.IsEmpty || missing == units.Count ? "No run order is recorded."
            : missing > 0 ? $"{missing} of {units.Count} values have no place in the run order."
            : null;
    }

    private static int[] InOrder(ReadOnlySpan<long> orders)
    {
        var runs = new int[orders.Length];
        for (int i = 0; i < runs.Length; i++)
        {
            runs[i] = i;
        }

        Array.Sort(orders.ToArray(), runs);
        return runs;
    }

    private static long? Tied(ReadOnlySpan<long> orders, int[] runs)
    {
        for (int i = 1; i < runs.Length; i++)
        {
            if (orders[runs[i]] == orders[runs[i - 1]])
            {
                return orders[runs[i]];
            }
        }

        return null;
    }

    private static SuccessiveDifferences? Law(GroupedSample units, FittedLayout fit, int[] runs)
    {
        var groups = new int[runs.Length];
        var blocks = new int[runs.Length];
        var numberOfBlock = new Dictionary<int, int>(); // In run order, which is the same whatever the order of the rows.
        for (int i = 0; i < runs.Length; i++)
        {
            groups[i] = units.Groups[runs[i]];
            int block = fit.WithinBlocks ? units.Blocks[runs[i]] : 0;
            numberOfBlock.TryAdd(block, numberOfBlock.Count);
            blocks[i] = numberOfBlock[block];
        }

        return fit.WithinBlocks ? SuccessiveDifferences.WithinBlocks(blocks, groups) : SuccessiveDifferences.OneWay(groups);
    }

    private static double Ratio(IReadOnlyList<double> residuals, int[] runs)
    {
        double differences = 0;
        double squares = 0;
        for (int i = 0; i < runs.Length; i++)
        {
            double residual = residuals[runs[i]];
            squares += residual * residual;
            if (i > 0)
            {
                double difference = residual - residuals[runs[i - 1]];
                differences += difference * difference;
            }
        }

        return differences / squares;
    }
}
