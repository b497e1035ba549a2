namespace Campaigns.App.Dashboard.Actions;

/// <summary>Everything that can be done from the dashboard, in the order of a campaign's life.</summary>
internal static class ActionList
{
    /// <summary>The actions.</summary>
    public static IReadOnlyList<DashboardAction> All { get; } =
    [
        new LoadAction(),
        new TestAction(),
        new ReviewAction(),
        new WithdrawAction(),
        new ExcludeAction(),
        new ReportAction(),
    ];

    /// <summary>The action of a key; null where there is none.</summary>
    /// <param name="key">The key's sign.</param>
    public static DashboardAction? Of(int key) => All.FirstOrDefault(a => a.Key == key);
}
