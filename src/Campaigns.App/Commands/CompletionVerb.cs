using System.CommandLine;

namespace Campaigns.App.Commands;

/// <summary>completion: a script for the shell that completes commands and options.</summary>
internal sealed class CompletionVerb : Verb
{
    private readonly Argument<string> _shell = new("SHELL") { Description = "bash, zsh or fish." };

    public CompletionVerb() => _shell.AcceptOnlyFromAmong("bash", "zsh", "fish");

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
                    local IFS=$'\n'
                    COMPREPLY=( $(campaigns "[suggest:${COMP_POINT}]" "${COMP_LINE}" 2>/dev/null) )
                }
                complete -o default -F _campaigns campaigns

                """,
            "zsh" =>
                """
                #compdef campaigns
                _campaigns() {
                    local -a words_found
                    words_found=("${(@f)$(campaigns "[suggest:${#BUFFER}]" "${BUFFER}" 2>/dev/null)}")
                    compadd -a words_found
                    _files
                }
                compdef _campaigns campaigns

                """,
            _ =>
                """
                complete -c campaigns -a '(campaigns "[suggest:"(commandline -C)"]" (commandline -cp) 2>/dev/null)'

                """,
        });
        return ExitCode.Done;
    }
}
