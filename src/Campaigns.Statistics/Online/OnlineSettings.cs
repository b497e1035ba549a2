using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Online;

/// <summary>The settings of a stream, chosen before it starts and fixed from then on.</summary>
public sealed record OnlineSettings
{
    /// <summary>The longest horizon, in experiments.</summary>
    public const int LongestHorizon = 10_000_000;

    private OnlineSettings(SignificanceLevel level, string shape)
    {
        Level = level;
        Shape = shape;
    }

    /// <summary>The level at which the error rate is held.</summary>
    public SignificanceLevel Level { get; }

    /// <summary>The key of the <see cref="SpendingShape"/>.</summary>
    public string Shape { get; }

    /// <summary>The number of experiments over which the shape is spread, 0 after it; null for no end.</summary>
    public int? Horizon { get; private init; }

    /// <summary>What may be spent before the first rejection, above 0 and at most the level; null where the procedure takes none.</summary>
    public double? InitialWealth { get; private init; }

    /// <summary>The p-value up to which an experiment is a candidate, and costs nothing; null where the procedure takes none.</summary>
    public double? Lambda { get; private init; }

    /// <summary>The p-value above which an experiment is discarded, and costs nothing, in (0, 1]; null where the procedure takes none.</summary>
    public double? Tau { get; private init; }

    /// <summary>Settings of a procedure, with its defaults for what is not given.</summary>
    /// <param name="procedure">The procedure.</param>
    /// <param name="level">The level at which it holds its error rate.</param>
    /// <param name="horizon">The number of experiments planned, from 1 to <see cref="LongestHorizon"/>; null for no end.</param>
    /// <param name="shape">Key of the shape.</param>
    /// <param name="initialWealth">Above 0 and at most the level; half the level where not given.</param>
    /// <param name="lambda">In (0, 1) or below <paramref name="tau"/>.</param>
    /// <param name="tau">Above <paramref name="lambda"/> and at most 1.</param>
    /// <exception cref="OnlineSettingsException">A setting is out of its range, or the procedure does not use it.</exception>
    public static OnlineSettings For(
        OnlineProcedure procedure, SignificanceLevel level, int? horizon, string? shape = null, double? initialWealth = null, double? lambda = null, double? tau = null)
    {
        var settings = new OnlineSettings(level, shape ?? procedure.DefaultShape)
        {
            Horizon = horizon,
            InitialWealth = Taken(procedure, "initial wealth", initialWealth, procedure.TakesWealth ? level.Value / 2 : null),
            Lambda = Taken(procedure, "lambda", lambda, procedure.DefaultLambda),
            Tau = Taken(procedure, "tau", tau, procedure.DefaultTau),
        };
        settings.Check(procedure);
        return settings;
    }

    private static double? Taken(OnlineProcedure procedure, string name, double? given, double? usual) =>
        given is null || usual is not null
            ? given ?? usual
            : throw new OnlineSettingsException($"{procedure.Name} ('{procedure.Key}') takes no {name}: leave it out.");

    private void Check(OnlineProcedure procedure)
    {
        if (SpendingShape.Find(Shape) is not { } shape)
        {
            throw new OnlineSettingsException($"There is no shape '{Shape}'; known are {string.Join(", ", SpendingShape.All.Select(s => s.Key))}.");
        }

        if (Horizon is < 1 or > LongestHorizon)
        {
            throw new OnlineSettingsException(FormattableString.Invariant($"A horizon is a number of experiments from 1 to {LongestHorizon}, or none; not {Horizon}."));
        }

        if (Horizon is null && shape.SumOfAll is null)
        {
            throw new OnlineSettingsException($"The shape '{Shape}' needs a horizon: spread without end, every share would be 0.");
        }

        if (InitialWealth is { } wealth && !(wealth > 0 && wealth <= Level.Value))
        {
            throw new OnlineSettingsException(FormattableString.Invariant($"The initial wealth lies above 0 and is at most the level {Level}; {wealth:R} does not."));
        }

        CheckLambda(procedure);
    }

    private void CheckLambda(OnlineProcedure procedure)
    {
        if (Lambda is not { } lambda)
        {
            return;
        }

        double tau = Tau ?? 1;
        bool good = (lambda > 0 || (lambda == 0 && procedure.LambdaMayBeZero)) && lambda < tau && tau <= 1;
        if (!good)
        {
            string least = procedure.LambdaMayBeZero ? "is at least 0" : "lies above 0";
            throw new OnlineSettingsException(
                Tau is null
                    ? FormattableString.Invariant($"Lambda {least} and below 1; {lambda:R} does not fit.")
                    : FormattableString.Invariant($"Lambda {least} and below tau, and tau is at most 1; lambda {lambda:R} with tau {tau:R} does not fit."));
        }
    }
}
