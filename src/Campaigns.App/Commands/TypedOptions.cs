using System.CommandLine;
using System.CommandLine.Parsing;
using System.Globalization;
using System.Text;
using Campaigns.Catalog.Loading;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>Options and arguments that take words of a kind, and refuse others in plain words.</summary>
internal static class TypedOptions
{
    /// <summary>A whole number from a least one up.</summary>
    public static Option<int> Whole(string name, int least, string description, int? usual = null) =>
        WithUsual(new Option<int>(name) { Description = description, HelpName = "N", CustomParser = typed => WholeOf(typed, name, least) }, usual);

    /// <inheritdoc cref="Whole"/>
    public static Option<int?> WholeOrNone(string name, int least, string description) =>
        new(name) { Description = description, HelpName = "N", CustomParser = typed => WholeOf(typed, name, least) };

    /// <summary>A level: a number between 0 and 1, both excluded.</summary>
    public static Option<double> Level(string description, double usual = 0.05) =>
        WithUsual(new Option<double>("--level") { Description = description, HelpName = "NUMBER", CustomParser = LevelOf }, (double?)usual);

    /// <summary>A level where one is given.</summary>
    public static Option<double?> LevelOrNone(string description) =>
        new("--level") { Description = description, HelpName = "NUMBER", CustomParser = typed => LevelOf(typed) };

    /// <summary>A day of the calendar, YYYY-MM-DD, as the instant at which it begins in UTC, or ends.</summary>
    public static Option<DateTimeOffset?> Day(string name, string description, bool isEnd) => new(name)
    {
        Description = description,
        HelpName = "DAY",
        CustomParser = typed =>
        {
            string word = typed.Tokens[0].Value;
            if (DateOnly.TryParseExact(word, "yyyy-MM-dd", CultureInfo.InvariantCulture, DateTimeStyles.None, out DateOnly day) && day < DateOnly.MaxValue)
            {
                return new DateTimeOffset(day.AddDays(isEnd ? 1 : 0), TimeOnly.MinValue, TimeSpan.Zero);
            }

            typed.AddError($"{name} takes a day as YYYY-MM-DD, for example 2026-12-01, not '{word}'.");
            return null;
        },
    };

    /// <summary>One of a few words.</summary>
    public static Option<string?> Word(string name, string description, string helpName, params string[] words)
    {
        var option = new Option<string?>(name) { Description = description, HelpName = helpName, CustomParser = typed => WordOf(typed, name, words) };
        option.CompletionSources.Add(words);
        return option;
    }

    /// <summary>One of a few words, in small letters or capitals.</summary>
    public static Option<string?> Word(string name, string description, string helpName, bool ignoresCase, params string[] words)
    {
        Option<string?> option = Word(name, description, helpName, words);
        if (ignoresCase)
        {
            option.CustomParser = typed => words.FirstOrDefault(w => w.Equals(typed.Tokens[0].Value, StringComparison.OrdinalIgnoreCase)) ?? WordOf(typed, name, words);
        }

        return option;
    }

    /// <summary>A text that must not be empty.</summary>
    public static Option<T> NotBlank<T>(Option<T> option)
    {
        option.Validators.Add(typed => RefuseBlank(typed, option.Name));
        return option;
    }

    /// <inheritdoc cref="NotBlank{T}(Option{T})"/>
    public static Argument<T> NotBlank<T>(Argument<T> argument)
    {
        argument.Validators.Add(typed => RefuseBlank(typed, argument.Name));
        return argument;
    }

    /// <summary>The word typed, where it is one of a few; else an error that names the nearest.</summary>
    public static string? WordOf(ArgumentResult typed, string name, IReadOnlyList<string> words)
    {
        string word = typed.Tokens[0].Value;
        if (words.Contains(word, StringComparer.Ordinal))
        {
            return word;
        }

        string near = Nearest.Of(word, words) is { } nearest ? $" (did you mean '{nearest}'?)" : "";
        typed.AddError($"{name} takes {string.Join(", ", words.SkipLast(1))} or {words[^1]}, not '{word}'{near}.");
        return null;
    }

    /// <summary>The whole number typed, from a least one up; else an error.</summary>
    public static int WholeOf(ArgumentResult typed, string name, int least, string orElse = "")
    {
        string word = typed.Tokens[0].Value;
        if (!int.TryParse(word, NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture, out int number) || number < least)
        {
            typed.AddError(FormattableString.Invariant($"{name} takes a whole number from {least} to {int.MaxValue}{orElse}, not '{word}'."));
        }

        return number;
    }

    private static double LevelOf(ArgumentResult typed)
    {
        string word = typed.Tokens[0].Value;
        double level = DecimalText.Parse(Encoding.UTF8.GetBytes(word), DecimalMark.Point, out ParsedDecimal number) == NumberReading.Number ? number.ToDouble() : 0;
        if (!(level > 0 && level < 1))
        {
            typed.AddError($"--level takes a number between 0 and 1, both excluded, for example 0.05, not '{word}'.");
        }

        return level;
    }

    private static void RefuseBlank(SymbolResult typed, string name)
    {
        if (typed.Tokens.Any(t => string.IsNullOrWhiteSpace(t.Value)))
        {
            typed.AddError($"{name} must not be empty.");
        }
    }

    private static Option<T> WithUsual<T>(Option<T> option, T? usual)
        where T : struct
    {
        if (usual is { } value)
        {
            option.DefaultValueFactory = _ => value;
        }

        return option;
    }
}
