using System.CommandLine;
using System.CommandLine.Help;
using System.CommandLine.Invocation;

namespace Campaigns.App.Commands;

/// <summary>The help text of a command, and under it an example.</summary>
internal sealed class HelpWithExample(HelpAction help, IReadOnlyDictionary<Command, Verb> verbs) : SynchronousCommandLineAction
{
    public override int Invoke(ParseResult parseResult)
    {
        int code = help.Invoke(parseResult);
        Command command = parseResult.CommandResult.Command;
        string example = verbs.TryGetValue(command, out Verb? verb) ? verb.Example : "campaigns run campaigns/adhesion-screen";
        parseResult.InvocationConfiguration.Output.WriteLine($"Example:\n  {example}");
        return code;
    }
}
