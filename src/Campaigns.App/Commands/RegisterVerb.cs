using System.CommandLine;
using Campaigns.App.Wording;
using Campaigns.Catalog.Streams;

namespace Campaigns.App.Commands;

/// <summary>register: experiments start at the bench and get their levels.</summary>
internal sealed class RegisterVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Argument<string[]> _experiments = TypedOptions.NotBlank(new Argument<string[]>("EXPERIMENT") { Description = "Experiments, in the order in which they start.", Arity = ArgumentArity.OneOrMore });

    public override Command Build() => new("register", Describe("Give experiments their levels when they start at the bench, in a campaign that is judged as its experiments arrive. Those that are not registered are so just before their test.",
        "register PRIMERS E07 E08"))
    {
        _code, _experiments, SharedOptions.Seen,
    };

    public override int Run(Session session)
    {
        string code = session.Get(_code);
        using Catalog.Catalog catalog = session.OpenCatalog();
        IReadOnlyList<StreamStore.Line> lines = new StreamStore(catalog).Register(code, session.Get(_experiments));
        session.Print(DecisionRows.Of(lines) with
        {
            Below = [FormattableString.Invariant($"Registered {Counted.Of(lines.Count, "experiment")} of {code}. The levels stand; 'campaigns test {code}' decides."), .. OnlineText.WithoutLevel(lines.Select(l => l.Entry)) is { } late ? [late] : (string[])[]],
        });
        return ExitCode.Done;
    }
}
