using System.CommandLine;

namespace Campaigns.App.Commands;

/// <summary>One command: what can be typed, and what is then done. A new one is a file, and a line in <see cref="CommandLine"/>.</summary>
internal abstract class Verb
{
    /// <summary>A line that shows how the command is typed, for its help text; known once it is built.</summary>
    public string Example { get; private set; } = "";

    /// <summary>Commands under this one, as in "ledger verify".</summary>
    public virtual IReadOnlyList<Verb> Under => [];

    /// <summary>The command with its arguments and options, described for the help text.</summary>
    public abstract Command Build();

    /// <summary>Does it.</summary>
    /// <returns>An exit code.</returns>
    public abstract int Run(Session session);

    /// <summary>Takes the description of the command and an example of it.</summary>
    /// <returns>The description.</returns>
    protected string Describe(string what, string example)
    {
        Example = $"campaigns {example}";
        return what;
    }
}
