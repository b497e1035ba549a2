using Campaigns.App.Dashboard.Model;
using Campaigns.App.Wording;
using Campaigns.Catalog.Results;

namespace Campaigns.App.Dashboard.Actions;

/// <summary>Runs the planned tests.</summary>
internal sealed class TestAction : DashboardAction
{
    private const string Incomplete = "incomplete";
    private const string LeftAlone = "left alone";

    /// <inheritdoc/>
    public override char Key => 't';

    /// <inheritdoc/>
    public override string Name => "test";

    /// <inheritdoc/>
    public override string Does => "Runs the planned test of every experiment that is complete and not yet tested; it is then closed to more data.";

    /// <inheritdoc/>
    public override IReadOnlyList<ActionField> Fields(DashboardModel model, ActionDesk desk) =>
    [
        new(Incomplete, "Experiments that are short of their planned values: left alone, or tested too, which is recorded.", LeftAlone) { Words = [LeftAlone, "tested too"] },
    ];

    /// <inheritdoc/>
    public override Preview Rehearse(ActionWork work)
    {
        // Tests themselves are not rehearsed: nobody should see a result before the decision to test.
        TestOutlook outlook = new TestOutlookReader(work.Catalog).Read(work.Campaign, TakesIncomplete(work), work.Cancel);
        return new Preview([.. TestWording.Outlook(work.Campaign, outlook, TakesIncomplete(work))], outlook.ToTest.Count > 0) { Expected = outlook.ToTest.Count };
    }

    /// <inheritdoc/>
    public override IReadOnlyList<string> CarryOut(ActionWork work)
    {
        TestRunSummary summary = new TestRunner(work.Catalog).Run(work.Campaign, TakesIncomplete(work), progress => work.Report(progress with { Total = work.Expected }), work.Cancel);
        return summary.Ran ? [TestWording.Summary(work.Campaign, summary), TestWording.Next(work.Campaign, work.Steps)] : [TestWording.Summary(work.Campaign, summary)];
    }

    private static bool TakesIncomplete(ActionWork work) => work.Values[Incomplete] != LeftAlone;
}
