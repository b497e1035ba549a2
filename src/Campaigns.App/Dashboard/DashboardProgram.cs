using Campaigns.App.Dashboard.Actions;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Pages;
using Campaigns.App.Dashboard.Screen;
using Campaigns.App.Output;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Online;
using Terminal.Gui.App;

namespace Campaigns.App.Dashboard;

/// <summary>Runs the dashboard in the terminal that the program was started from.</summary>
public static class DashboardProgram
{
    private const string FirstCell = "\e[H";
    private const int WrongUsage = 2;

    /// <summary>Shows the campaigns of a catalog until the user quits.</summary>
    /// <param name="source">Where everything comes from.</param>
    /// <param name="campaign">The campaign that is opened first.</param>
    /// <param name="page">Name of the page that is shown first.</param>
    /// <param name="ascii">Whether to draw with ASCII signs alone.</param>
    /// <param name="desk">Where actions open the catalog; null where nothing can be done.</param>
    /// <returns>0 after quitting; 2, with a sentence on standard error, where standard input or output is no terminal; 128 and its number after a signal.</returns>
    /// <remarks>What <paramref name="source"/> throws at the beginning passes through; later a catalog that cannot be read is told on the screen, and all else passes through after the terminal was given back.</remarks>
    public static int Run(IDashboardSource source, string campaign, string page, bool ascii, ActionDesk? desk = null)
    {
        ArgumentNullException.ThrowIfNull(source);
        if (Console.IsInputRedirected || Console.IsOutputRedirected)
        {
            Console.Error.WriteLine("The dashboard needs a terminal for input and output; to read results in a file or a pipe, use 'results' with --format csv or json.");
            return WrongUsage;
        }

        // A large campaign takes a good part of a second to read: the screen's library gets ready meanwhile, and what is typed waits.
        Task<DashboardModel> reading = Task.Run(() => new DashboardModel(source, campaign, key => (ErrorProcedure?)CorrectionRegistry.Find(key) ?? OnlineRegistry.Find(key)));
        DashboardModel model;
        Theme theme = Theme.For(Environment.GetEnvironmentVariable);
        theme.Apply();
        IApplication app = Application.Create();
        using TerminalGuard guard = new(app);
        try
        {
            app.Init();
            Console.Out.Write($"{FirstCell}Reading {SafeText.Escape(campaign)} ...");
        }
        finally
        {
            // Whatever happens, nobody closes the catalog under whoever reads it.
            model = reading.GetAwaiter().GetResult();
        }

        model.TurnTo(PageList.PlaceOf(page));
        using LoopPace pace = new(app, TimeProvider.System);
        using DashboardWindow window = new(model, ascii ? GlyphSet.Ascii : GlyphSet.Full, theme, desk);
        app.Run(window, window.Excuse);
        return guard.ExitCode;
    }
}
