using System.CommandLine;
using System.CommandLine.Parsing;
using System.Text;
using Campaigns.Catalog.Loading;

namespace Campaigns.App.Commands;

/// <summary>Options that take one number or several, separated by commas.</summary>
internal static class NumberLists
{
    /// <summary>Real numbers above a bound, and below another where there is one.</summary>
    public static Option<double[]?> Reals(string name, string helpName, string description, double above, double below = double.PositiveInfinity) =>
        New<double>(name, helpName, description, double.IsPositiveInfinity(below)
            ? FormattableString.Invariant($"numbers above {above}")
            : FormattableString.Invariant($"numbers between {above} and {below}, both excluded"), number =>
            number.ToDouble() is var value && value > above && value < below ? value : null);

    /// <summary>Whole numbers within two bounds.</summary>
    public static Option<int[]?> Wholes(string name, string helpName, string description, int least, int most) =>
        New<int>(name, helpName, description, FormattableString.Invariant($"whole numbers from {least} to {most}"), number =>
            number.ToDouble() is var value && value >= least && value <= most && value == Math.Floor(value) ? (int)value : null);

    /// <summary>Any numbers, as they were typed.</summary>
    public static Option<ParsedDecimal[]?> Any(string name, string helpName, string description) =>
        New<ParsedDecimal>(name, helpName, description, "numbers", number => number);

    /// <summary>The numbers; null where the option was not typed (the parser then gives an empty list).</summary>
    public static T[]? Given<T>(Session session, Option<T[]?> option) => session.Typed.GetValue(option) is { Length: > 0 } values ? values : null;

    private static Option<T[]?> New<T>(string name, string helpName, string description, string what, Func<ParsedDecimal, T?> take)
        where T : struct => new(name)
        {
            Description = description,
            HelpName = helpName,
            Arity = ArgumentArity.ExactlyOne,
            CustomParser = typed => Of(typed, name, what, take),
        };

    private static T[]? Of<T>(ArgumentResult typed, string name, string what, Func<ParsedDecimal, T?> take)
        where T : struct
    {
        var values = new List<T>();
        foreach (string word in typed.Tokens[0].Value.Split(',', StringSplitOptions.TrimEntries))
        {
            if (DecimalText.Parse(Encoding.UTF8.GetBytes(word), DecimalMark.Point, out ParsedDecimal number) != NumberReading.Number || take(number) is not { } value)
            {
                typed.AddError($"{name} takes {what}, separated by commas, with a decimal point, not '{word}'.");
                return null;
            }

            values.Add(value);
        }

        return [.. values];
    }
}
