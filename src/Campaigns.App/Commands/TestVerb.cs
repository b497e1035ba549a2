using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Results;

namespace Campaigns.App.Commands;

/// <summary>test: run the planned tests.</summary>
internal sealed class TestVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Option<bool> _incomplete = new("--incomplete") { Description = "Test experiments too that are short of their planned values; recorded." };

    public override Command Build() => new("test", Describe("Run the planned test of every experiment that is complete and not yet tested; it is then closed to more data.",
        "test PRIMERS"))
    {
        _code, _incomplete, SharedOptions.Seen,
    };

    public override int Run(Session session)
    {
        string code = session.Get(_code);
        using Catalog.Catalog catalog = session.OpenCatalog();
        TestRunSummary summary = Test(session, catalog, code, session.Get(_incomplete));
        session.PrintForScripts(new RowTable(
            [new Column("campaign", null), new Column("tested", null, true), new Column("not_testable", null, true), new Column("incomplete", null, true)],
            [[Cell.Text(code), Cell.Whole(summary.Tested), Cell.Whole(summary.NotTestable), Cell.Whole(summary.Incomplete)]]));
        return ExitCode.Done;
    }

    /// <summary>Tests and says what came of it.</summary>
    public static TestRunSummary Test(Session session, Catalog.Catalog catalog, string code, bool includeIncomplete)
    {
        using var line = new ProgressLine(session.Host);
        TestRunSummary summary = new TestRunner(catalog).Run(code, includeIncomplete, line.Report, session.Host.Cancel);
        line.Dispose();
        session.Say(TestWording.Summary(code, summary));
        return summary;
    }
}
