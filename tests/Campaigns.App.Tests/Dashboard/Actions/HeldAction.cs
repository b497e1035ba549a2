using Campaigns.App.Dashboard.Actions;
using Campaigns.App.Dashboard.Model;
using Campaigns.Catalog;

namespace Campaigns.App.Tests.Dashboard.Actions;

/// <summary>Work that comes as far as 45 of 100 and stands still until it is let go.</summary>
internal sealed class HeldAction(ManualResetEventSlim letGo) : DashboardAction
{
    public override char Key => 'h';

    public override string Name => "held work";

    public override string Does => "Stands still in the middle.";

    public override IReadOnlyList<ActionField> Fields(DashboardModel model, ActionDesk desk) => [new("how", "How long.", "long") { Words = ["long", "short"] }];

    public override Preview Rehearse(ActionWork work) => new(["It will stand still."]) { Expected = 100 };

    public override IReadOnlyList<string> CarryOut(ActionWork work)
    {
        work.Report(new WorkProgress("standing still", 45, work.Expected, "experiments"));
        letGo.Wait(CancellationToken.None);
        work.Cancel.ThrowIfCancellationRequested();
        return ["It stood still."];
    }
}
