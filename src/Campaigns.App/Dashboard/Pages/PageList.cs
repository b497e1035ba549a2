namespace Campaigns.App.Dashboard.Pages;

/// <summary>The pages of the dashboard, in the order in which people see them.</summary>
public static class PageList
{
    /// <summary>The name of each page and what makes it; the last one explains the keys.</summary>
    public static IReadOnlyList<(string Name, Func<PageContext, DashboardPage> Make)> All { get; } =
    [
        ("Programme", context => new ProgrammePage(context)),
        ("Experiments", context => new ExperimentsPage(context)),
        ("Ranking", context => new RankingPage(context)),
        ("Risk", context => new RiskPage(context)),
        ("Reviews", context => new ReviewsPage(context)),
        ("Ledger", context => new LedgerPage(context)),
        ("Help", context => new HelpPage(context)),
    ];

    /// <summary>Place of a page, from 0.</summary>
    /// <param name="name">Its name.</param>
    /// <exception cref="ArgumentException">There is no such page.</exception>
    public static int PlaceOf(string name)
    {
        for (int i = 0; i < All.Count; i++)
        {
            if (All[i].Name == name)
            {
                return i;
            }
        }

        throw new ArgumentException($"There is no page '{name}'.", nameof(name));
    }
}
