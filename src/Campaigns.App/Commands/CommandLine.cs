using System.CommandLine;
using System.CommandLine.Help;
using Campaigns.App.Output;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>The whole command line: every command in one list, and the one place where a run's outcome becomes an exit code.</summary>
internal static class CommandLine
{
    private static readonly Func<Verb>[] Verbs =
    [
        () => new RunVerb(),
        () => new StartVerb(),
        () => new PlanVerb(),
        () => new SealVerb(),
        () => new LoadVerb(),
        () => new TestVerb(),
        () => new ReviewVerb(),
        () => new ResultsVerb(),
        () => new SurvivorsVerb(),
        () => new CorrectionsVerb(),
        () => new AdjustVerb(),
        () => new RiskVerb(),
        () => new ListVerb(),
        () => new ShowVerb(),
        () => new ExportVerb(),
        () => new DashboardVerb(),
        () => new UpgradeVerb(),
        () => new CompletionVerb(),
    ];

    /// <summary>Runs what was typed.</summary>
    /// <returns>The exit code of <see cref="ExitCode"/>.</returns>
    public static int Run(string[] arguments, Host host)
    {
        RootCommand root = Build(host);
        ParseResult typed = root.Parse(arguments);
        if (typed.Errors.Count > 0 && typed.Action is not HelpAction)
        {
            Complain(typed, root, host);
            return ExitCode.WrongUsage;
        }

        return Outcome.Of(host, () => typed.Invoke(new InvocationConfiguration { Output = host.Out, Error = host.Error, EnableDefaultExceptionHandler = false }));
    }

    private static RootCommand Build(Host host)
    {
        var root = new RootCommand("Campaigns keeps many group-comparison experiments, tests each, corrects over the whole campaign, and shows what survives.")
        {
            SharedOptions.Catalog,
            SharedOptions.Format,
            SharedOptions.Top,
        };
        foreach (Func<Verb> make in Verbs)
        {
            Verb verb = make();
            Command command = verb.Build();
            command.SetAction(typed => verb.Run(new Session(host, typed)));
            root.Add(command);
        }

        return root;
    }

    private static void Complain(ParseResult typed, RootCommand root, Host host)
    {
        foreach (string message in typed.Errors.Select(e => e.Message).Distinct(StringComparer.Ordinal))
        {
            host.Error.WriteLine(SafeText.Escape(message));
        }

        string[] words = [.. root.Subcommands.Select(c => c.Name)];
        if (typed.CommandResult.Command == root && typed.UnmatchedTokens is [string first, ..])
        {
            host.Error.WriteLine(Nearest.Of(first, words) is { } near
                ? $"Did you mean '{near}'? 'campaigns {near} --help' explains it."
                : "'campaigns --help' lists the commands.");
        }
        else if (typed.CommandResult.Command != root)
        {
            host.Error.WriteLine($"'campaigns {typed.CommandResult.Command.Name} --help' explains the command.");
        }
    }
}
