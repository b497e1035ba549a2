using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.Catalog.Reviewing;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>history: which experiment survived in which review.</summary>
internal sealed class HistoryVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Option<bool> _changed = new("--changed") { Description = "Only experiments that survive in one review and not in another." };

    public override Command Build() => new("history", Describe("Which experiment survived in which review: a row an experiment, a column a review; files have a row for each.", "history PRIMERS --changed"))
    {
        _code, _changed,
    };

    public override int Run(Session session)
    {
        string code = session.Get(_code);
        using Catalog.Catalog catalog = session.OpenCatalog();
        ReviewHistory history = new ReviewReader(catalog).History(code);
        IReadOnlyList<ExperimentHistory> shown = session.Get(_changed) ? [.. history.Experiments.Where(e => e.HasChanged)] : history.Experiments;
        session.Print(session.Format == RowFormat.Table ? HistoryTables.ForPeople(code, history, shown) : HistoryTables.ForScripts(history, shown));
        return ExitCode.Done;
    }
}
