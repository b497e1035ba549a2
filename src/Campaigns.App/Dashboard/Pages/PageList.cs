namespace Campaigns.App.Dashboard.Pages;

/// <summary>The pages of the dashboard, in the order in which people see them.</summary>
public static class PageList
{
    /// <summary>What makes each page; the last one explains the keys.</summary>
    public static IReadOnlyList<Func<PageContext, DashboardPage>> All { get; } =
    [
        context => new ExperimentsPage(context),
        context => new RankingPage(context),
        context => new HelpPage(context),
    ];
}
