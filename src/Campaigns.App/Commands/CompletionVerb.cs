using System.CommandLine;

namespace Campaigns.App.Commands;

/// <summary>completion: a script for the shell that completes commands and options.</summary>
internal sealed class CompletionVerb : Verb
{
    private static readonly string[] Shells = ["bash", "zsh", "fish"];

    private readonly Argument<string> _shell = new("SHELL") { Description = "bash, zsh or fish.", CustomParser = typed => TypedOptions.WordOf(typed, "SHELL", Shells)! };

    public CompletionVerb() => _shell.CompletionSources.Add(Shells);

    public override Command Build() => new("completion", Describe("Print a script that makes the shell complete commands and options.", "completion bash > ~/.local/share/bash-completion/completions/campaigns"))
    {
        _shell,
    };

    public override int Run(Session session)
    {
        session.Host.Out.Write(session.Get(_shell) switch
        {
            "bash" =>
                """
                _campaigns() {
                    local IFS=$'\n' word="${COMP_WORDS[COMP_CWORD]}" found
                    found=$(campaigns "[suggest:${COMP_POINT}]" "${COMP_LINE}" 2>/dev/null)
                    [[ $word == -* ]] || found=$(grep -v '^-' <<< "$found")
                    COMPREPLY=( $(compgen -W "$found" -- "$word") )
                }
                complete -o default -F _campaigns campaigns

                """,
            "zsh" =>
                """
                #compdef campaigns
                _campaigns() {
                    local -a words_found
                    words_found=("${(@f)$(campaigns "[suggest:${CURSOR}]" "${BUFFER}" 2>/dev/null)}")
                    compadd -a words_found
                    _files
                }
                compdef _campaigns campaigns

                """,
            _ =>
                """
                complete -c campaigns -a '(campaigns "[suggest:"(commandline -C)"]" "$(commandline -p)" 2>/dev/null)'

                """,
        });
        return ExitCode.Done;
    }
}
