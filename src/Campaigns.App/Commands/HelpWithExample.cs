using System.CommandLine;
using System.CommandLine.Help;
using System.CommandLine.Invocation;

namespace Campaigns.App.Commands;

/// <summary>The help text of a command, and under it an example.</summary>
internal sealed class HelpWithExample(HelpAction help, IReadOnlyDictionary<Command, Verb> verbs) : SynchronousCommandLineAction
{
    public override int Invoke(ParseResult parseResult)
    {
        Command command = parseResult.CommandResult.Command;
        int code = Describe(parseResult, command);
        string example = verbs.TryGetValue(command, out Verb? verb) ? verb.Example : "campaigns run campaigns/adhesion-screen";
        parseResult.InvocationConfiguration.Output.WriteLine($"Example:\n  {example}");
        return code;
    }

    /// <summary>An option of the whole program that the command takes in another way is described there alone.</summary>
    private int Describe(ParseResult parseResult, Command command)
    {
        Option[] shadowed = [.. parseResult.RootCommandResult.Command.Options.Where(o => command is not RootCommand && command.Options.Any(own => own.Name == o.Name) && !o.Hidden)];
        Array.ForEach(shadowed, o => o.Hidden = true);
        try
        {
            return help.Invoke(parseResult);
        }
        finally
        {
            Array.ForEach(shadowed, o => o.Hidden = false);
        }
    }
}
