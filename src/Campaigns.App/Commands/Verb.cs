using System.CommandLine;

namespace Campaigns.App.Commands;

/// <summary>One command: what can be typed, and what is then done. A new one is a file, and a line in <see cref="CommandLine"/>.</summary>
internal abstract class Verb
{
    /// <summary>The command with its arguments and options, described for the help text.</summary>
    public abstract Command Build();

    /// <summary>Does it.</summary>
    /// <returns>An exit code.</returns>
    public abstract int Run(Session session);

    /// <summary>The description of a command, with an example.</summary>
    protected static string Describe(string what, string example) => $"{what}\n\nExample:\n  campaigns {example}";
}
