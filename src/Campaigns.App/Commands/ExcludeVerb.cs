using System.CommandLine;
using Campaigns.App.Wording;
using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>exclude: leave an observation out of the analysis, with a reason and a name; the value is kept.</summary>
internal sealed class ExcludeVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Argument<string> _experiment = TypedOptions.NotBlank(new Argument<string>("EXPERIMENT") { Description = "The experiment." });
    private readonly Option<int> _line = TypedOptions.Whole("--line", 1, "Line of the observation in the file that brought it, as 'campaigns export' and the checks of 'campaigns show' name it.");
    private readonly Option<string?> _file = TypedOptions.NotBlank(new Option<string?>("--file") { Description = "That file, where several hold a value of the experiment on this line.", HelpName = "NAME" });
    private readonly Option<string> _reason = TypedOptions.NotBlank(new Option<string>("--reason") { Description = "Why; recorded and shown wherever the experiment is.", HelpName = "TEXT", Required = true });
    private readonly Option<bool> _takeBack = new("--take-back") { Description = "Take an excluded observation in again; that too is recorded." };

    public ExcludeVerb() => _line.Required = true;

    public override Command Build() => new("exclude", Describe("Leave one observation out of the analysis, with a reason and a name. The value is kept, results with and without it are shown, and every output of the experiment says so.",
        "exclude PRIMERS E07 --line 41 --reason \"panel dropped\" --as \"A. Moss\""))
    {
        _code, _experiment, _line, _file, _reason, _takeBack, SharedOptions.Seen,
    };

    public override int Run(Session session)
    {
        string code = session.Get(_code);
        using Catalog.Catalog catalog = session.OpenCatalog();
        ExcludedObservation decision = new ExclusionStore(catalog).Decide(
            code,
            session.Get(_experiment),
            new ObservationPlace(session.Get(_line), session.Typed.GetValue(_file)),
            exclude: !session.Get(_takeBack),
            session.Get(_reason).Trim(),
            session.Actor.Name);
        session.Say(ExclusionText.Recorded(decision));
        CampaignStanding standing = new StandingReader(catalog).Read(code);
        ExperimentDetail detail = new DetailReader(catalog).Read(standing, decision.Experiment);
        session.Print(ExperimentSections.Tests(detail) with { WhenEmpty = "The experiment was not tested yet, so that there is no result to show with and without it." });
        if (ExclusionText.Next(standing.Campaign) is { } next)
        {
            session.Say(next);
        }

        return ExitCode.Done;
    }
}
