using System.CommandLine;
using System.CommandLine.Help;
using System.CommandLine.Invocation;
using Campaigns.App.Output;

namespace Campaigns.App.Commands;

/// <summary>The whole command line: every command in one list, and the one place where a run's outcome becomes an exit code.</summary>
internal static class CommandLine
{
    private static readonly Func<Verb>[] Verbs =
    [
        () => new RunVerb(),
        () => new StartVerb(),
        () => new PlanVerb(),
        () => new FamiliesVerb(),
        () => new SealVerb(),
        () => new LoadVerb(),
        () => new RegisterVerb(),
        () => new TestVerb(),
        () => new DecisionsVerb(),
        () => new RestreamVerb(),
        () => new ReviewVerb(),
        () => new ReviewsVerb(),
        () => new HistoryVerb(),
        () => new ResultsVerb(),
        () => new SurvivorsVerb(),
        () => new ComparisonsVerb(),
        () => new CorrectionsVerb(),
        () => new PermuteVerb(),
        () => new AdjustVerb(),
        () => new SizeVerb(),
        () => new RiskVerb(),
        () => new BoundVerb(),
        () => new OverallVerb(),
        () => new ExcludeVerb(),
        () => new WithdrawVerb(),
        () => new ListVerb(),
        () => new ShowVerb(),
        () => new ReportVerb(),
        () => new PlotVerb(),
        () => new ExportVerb(),
        () => new LedgerVerb(),
        () => new DashboardVerb(),
        () => new BackupVerb(),
        () => new RestoreCheckVerb(),
        () => new UpgradeVerb(),
        () => new CompletionVerb(),
    ];

    // A name that begins with "@" is a name, not a file of arguments.
    private static readonly ParserConfiguration Parsing = new() { ResponseFileTokenReplacer = null, EnablePosixBundling = false };

    private static readonly Lazy<(RootCommand Root, IReadOnlyDictionary<Command, Verb> Verbs)> Tree = new(Build);

    /// <summary>Runs what was typed.</summary>
    /// <returns>The exit code of <see cref="ExitCode"/>.</returns>
    public static int Run(string[] arguments, Host host)
    {
        (RootCommand root, IReadOnlyDictionary<Command, Verb> verbs) = Tree.Value;
        ParseResult typed = root.Parse(arguments, Parsing);
        bool isVerb = typed.Action is null or ParseErrorAction || typed.Action == typed.CommandResult.Command.Action;
        if (isVerb && Complaint.Of(typed, root) is { } complaint)
        {
            host.Error.WriteLine(SafeText.Escape(complaint));
            return ExitCode.WrongUsage;
        }

        return Outcome.Of(host, () => isVerb
            ? verbs[typed.CommandResult.Command].Run(new Session(host, typed))
            : typed.Invoke(new InvocationConfiguration { Output = host.Out, Error = host.Error, EnableDefaultExceptionHandler = false }));
    }

    private static (RootCommand Root, IReadOnlyDictionary<Command, Verb> Verbs) Build()
    {
        var root = new RootCommand("Campaigns keeps many group-comparison experiments, tests each, corrects over the whole campaign, and shows what survives.")
        {
            SharedOptions.Catalog,
            SharedOptions.Format,
            SharedOptions.ActingAs,
            SharedOptions.Top,
        };
        var verbs = new Dictionary<Command, Verb>();
        foreach (Func<Verb> make in Verbs)
        {
            Add(root, make(), verbs);
        }

        HelpOption help = root.Options.OfType<HelpOption>().Single();
        help.Aliases.Clear();
        help.Aliases.Add("-h");
        help.Action = new HelpWithExample((HelpAction)help.Action!, verbs);
        return (root, verbs);
    }

    private static void Add(Command parent, Verb verb, Dictionary<Command, Verb> verbs)
    {
        Command command = verb.Build();
        command.SetAction(_ => ExitCode.Done);
        parent.Add(command);
        verbs.Add(command, verb);
        foreach (Verb under in verb.Under)
        {
            Add(command, under, verbs);
        }
    }
}
