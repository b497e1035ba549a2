using System.CommandLine;
using System.CommandLine.Parsing;
using System.Text;
using Campaigns.Catalog.Loading;
using Campaigns.Domain;
using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>The options of procedures that decide as experiments arrive, as several commands take them.</summary>
internal sealed class StreamOptions
{
    /// <summary>0 stands for no horizon: a value of null would not come out of the parser.</summary>
    private readonly Option<int> _horizon = new("--horizon")
    {
        Description = "Online: the number of experiments over which the level is spread, or none for no end.",
        HelpName = "N|none",
        CustomParser = HorizonOf,
    };

    private readonly Option<string?> _shape = TypedOptions.Word(
        "--shape", "Online: how the level is spread over the experiments.", string.Join('|', SpendingShape.All.Select(s => s.Key)), [.. SpendingShape.All.Select(s => s.Key)]);

    private readonly Option<double?> _initialWealth = Number("--initial-wealth", "Online (lord, saffron, addis): what may be spent before the first survivor (else half the level).");
    private readonly Option<double?> _lambda = Number("--lambda", "Online (saffron, addis, addis-spending): experiments with p up to this cost nothing (else 0.5; 0.25 for addis).");
    private readonly Option<double?> _tau = Number("--tau", "Online (addis, addis-spending): experiments with p above this cost nothing (else 0.5).");

    public IEnumerable<Option> All => [_horizon, _shape, _initialWealth, _lambda, _tau];

    public static string[] Keys => [.. OnlineRegistry.All.Select(p => p.Key)];

    /// <summary>Adds the options to a command.</summary>
    public Command AddTo(Command command)
    {
        foreach (Option option in All)
        {
            command.Options.Add(option);
        }

        return command;
    }

    /// <summary>What was said of a stream; null where nothing was.</summary>
    /// <param name="session">What was typed.</param>
    /// <param name="procedure">The procedure; null for a batch correction, which takes no such option.</param>
    /// <param name="level">The level.</param>
    /// <exception cref="UsageException">An option does not fit the procedure.</exception>
    public OnlineOptions? Typed(Session session, OnlineProcedure? procedure, SignificanceLevel level)
    {
        Settings(session, procedure is null ? [] : [procedure], level, planned: 1);
        return All.All(o => session.Typed.GetResult(o) is null)
            ? null
            : new OnlineOptions(
                session.Typed.GetResult(_horizon) is null ? null : session.Typed.GetValue(_horizon),
                session.Typed.GetValue(_shape),
                session.Typed.GetValue(_initialWealth),
                session.Typed.GetValue(_lambda),
                session.Typed.GetValue(_tau));
    }

    /// <summary>The settings of each procedure chosen: an option reaches those that take it, and one that none takes is refused.</summary>
    /// <param name="session">What was typed.</param>
    /// <param name="procedures">The online procedures chosen; may be none.</param>
    /// <param name="level">The level.</param>
    /// <param name="planned">The horizon where none is named.</param>
    /// <exception cref="UsageException">An option fits no procedure, or is out of its range.</exception>
    public OnlineSettings[] Settings(Session session, IReadOnlyList<OnlineProcedure> procedures, SignificanceLevel level, int planned)
    {
        RefuseUnused(session, procedures);
        return [.. procedures.Select(p => Of(p))];

        OnlineSettings Of(OnlineProcedure procedure)
        {
            try
            {
                return OnlineSettings.For(
                    procedure,
                    level,
                    Horizon(session, planned),
                    session.Typed.GetValue(_shape),
                    procedure.TakesWealth ? session.Typed.GetValue(_initialWealth) : null,
                    procedure.DefaultLambda is null ? null : session.Typed.GetValue(_lambda),
                    procedure.DefaultTau is null ? null : session.Typed.GetValue(_tau));
            }
            catch (OnlineSettingsException error)
            {
                throw new UsageException($"{procedure.Key}: {error.Message}");
            }
        }
    }

    private int? Horizon(Session session, int planned) => session.Typed.GetResult(_horizon) is null ? planned : session.Typed.GetValue(_horizon) is > 0 and var given ? given : null;

    private void RefuseUnused(Session session, IReadOnlyList<OnlineProcedure> procedures)
    {
        foreach (Option option in All)
        {
            OnlineProcedure[] takers = [.. OnlineRegistry.All.Where(p => Takes(p, option))];
            if (session.Typed.GetResult(option) is not null && !procedures.Intersect(takers).Any())
            {
                throw new UsageException($"{option.Name} belongs to {string.Join(", ", takers.Select(p => p.Key))}; no such procedure is chosen, so leave it out.");
            }
        }
    }

    private bool Takes(OnlineProcedure procedure, Option option) =>
        option == _initialWealth ? procedure.TakesWealth
        : option == _lambda ? procedure.DefaultLambda is not null
        : option != _tau || procedure.DefaultTau is not null;

    private static int HorizonOf(ArgumentResult typed) => typed.Tokens[0].Value == "none" ? 0 : TypedOptions.WholeOf(typed, "--horizon", 1, ", or none");

    private static Option<double?> Number(string name, string description) =>
        new(name) { Description = description, HelpName = "NUMBER", CustomParser = typed => NumberOf(typed, name) };

    private static double? NumberOf(ArgumentResult typed, string name)
    {
        string word = typed.Tokens[0].Value;
        if (DecimalText.Parse(Encoding.UTF8.GetBytes(word), DecimalMark.Point, out ParsedDecimal number) == NumberReading.Number)
        {
            return number.ToDouble();
        }

        typed.AddError($"{name} takes a number, for example 0.25, not '{word}'.");
        return null;
    }
}
