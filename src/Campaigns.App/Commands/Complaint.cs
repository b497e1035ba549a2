using System.CommandLine;
using System.CommandLine.Parsing;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>Says in one sentence what is wrong with what was typed, and what was probably meant.</summary>
internal static class Complaint
{
    private const int LongestShown = 100;
    private const int LongestWord = 10_000;

    /// <summary>The sentence; null where nothing is wrong.</summary>
    /// <param name="typed">What was typed, parsed.</param>
    /// <param name="root">The whole command line.</param>
    public static string? Of(ParseResult typed, RootCommand root)
    {
        Command command = typed.CommandResult.Command;
        string help = command == root ? "'campaigns --help' lists the commands" : $"'campaigns {NameOf(command, root)} --help' explains it";
        if (typed.Tokens.Select(t => Unwritable(t.Value)).FirstOrDefault(c => c is not null) is { } unwritable)
        {
            return unwritable;
        }

        if (FirstUnknown(typed) is { } word)
        {
            return Unknown(word, command, root, help);
        }

        return typed.Errors.Count == 0 ? null
            : command == root && typed.Tokens.Count == 0 ? $"A command is missing; {help}."
            : MissingArgument(typed) is { } missing ? $"'campaigns {NameOf(command, root)}' needs {missing.Name}: {char.ToLowerInvariant(missing.Description![0])}{missing.Description[1..].TrimEnd('.')}; {help}."
            : $"{typed.Errors[0].Message.TrimEnd('.')}; {help}.";
    }

    /// <summary>A text that no record should hold: with a control character, or half of a character. The name of a file that is there may have one.</summary>
    private static string? Unwritable(string word)
    {
        if (word.Length > LongestWord)
        {
            return FormattableString.Invariant($"'{word[..LongestShown]}...' is longer than {LongestWord} characters: shorten it.");
        }

        for (int i = 0; i < word.Length; i++)
        {
            if (char.IsHighSurrogate(word[i]) && i + 1 < word.Length && char.IsLowSurrogate(word[i + 1]))
            {
                i++;
            }
            else if (char.IsSurrogate(word[i]) || (char.IsControl(word[i]) && !File.Exists(word) && !Directory.Exists(word)))
            {
                string start = word.Length <= LongestShown ? word : string.Concat(word.AsSpan(0, LongestShown), "...");
                return FormattableString.Invariant($"'{start}' has {(char.IsSurrogate(word[i]) ? "half of a character" : "a control character")} (U+{(int)word[i]:X4}): take it out.");
            }
        }

        return null;
    }

    /// <summary>A word that fits nowhere. One that looks like an option is none that we know, even where it could stand for an argument: nothing of ours begins with a hyphen, and a file's name may follow after "--".</summary>
    private static string? FirstUnknown(ParseResult typed)
    {
        bool isEscaped = typed.Tokens.Any(t => t.Type == TokenType.DoubleDash);
        IEnumerable<string> arguments = isEscaped ? [] : typed.CommandResult.Children.OfType<ArgumentResult>().SelectMany(a => a.Tokens).Select(t => t.Value).Where(LooksLikeOption);
        return arguments.FirstOrDefault() ?? (typed.UnmatchedTokens is [string first, ..] ? first : null);
    }

    /// <summary>The first argument that is not there; what is missing first is said first, before options that are missing too.</summary>
    private static Argument? MissingArgument(ParseResult typed) => typed.CommandResult.Command.Arguments
        .FirstOrDefault(a => a.Arity.MinimumNumberOfValues > (typed.GetResult(a)?.Tokens.Count ?? 0) && a.Description is { Length: > 0 });

    private static string Unknown(string word, Command command, RootCommand root, string help)
    {
        if (LooksLikeOption(word))
        {
            IEnumerable<string> options = command.Options.Concat(root.Options.Where(o => o.Recursive)).Select(o => o.Name);
            string name = word.Split('=')[0];
            string escape = command.Arguments.Count > 0 ? ", and a name that begins with a hyphen is typed after '--'" : "";
            return $"There is no option '{name}'{Meant(Nearest.Of(name, options))}; {help}{escape}.";
        }

        return command == root
            ? $"There is no command '{word}'{Meant(Nearest.Of(word, root.Subcommands.Select(c => c.Name)))}; {help}."
            : $"'{word}' is too much for 'campaigns {NameOf(command, root)}'; {help}.";
    }

    /// <summary>The words that call a command: its own, after that of the command it stands under.</summary>
    private static string NameOf(Command command, RootCommand root) =>
        command.Parents.OfType<Command>().FirstOrDefault() is { } parent && parent != root ? $"{NameOf(parent, root)} {command.Name}" : command.Name;

    private static string Meant(string? nearest) => nearest is null ? "" : $" (did you mean '{nearest}'?)";

    private static bool LooksLikeOption(string word) => word.Length > 1 && word[0] == '-' && (word[1] == '-' || char.IsLetter(word[1]));
}
