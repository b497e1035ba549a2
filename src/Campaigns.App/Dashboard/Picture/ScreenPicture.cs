using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Pages;
using Campaigns.App.Dashboard.Screen;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Online;
using Terminal.Gui.App;
using Terminal.Gui.Drivers;
using Terminal.Gui.Time;

namespace Campaigns.App.Dashboard.Picture;

/// <summary>The dashboard drawn in memory, without a terminal, as a picture for a notebook.</summary>
internal static class ScreenPicture
{
    private const string NoTerminal = "DisableRealDriverIO";

    /// <summary>Draws one page as it looks when it is opened.</summary>
    /// <param name="source">Where everything comes from.</param>
    /// <param name="campaign">The campaign that is open.</param>
    /// <param name="page">Name of the page.</param>
    /// <param name="width">Cells across.</param>
    /// <param name="height">Rows.</param>
    /// <param name="ascii">Whether to draw with ASCII signs alone.</param>
    /// <param name="environment">The value of an environment variable, or null: NO_COLOR is heeded.</param>
    /// <returns>One svg element.</returns>
    public static string Draw(IDashboardSource source, string campaign, string page, int width, int height, bool ascii, Func<string, string?> environment)
    {
        // The library looks at this before it touches the terminal, and only there.
        Environment.SetEnvironmentVariable(NoTerminal, "1");
        Theme theme = Theme.For(environment);
        theme.Apply();
        DashboardModel model = new(source, campaign, key => (ErrorProcedure?)CorrectionRegistry.Find(key) ?? OnlineRegistry.Find(key));
        model.TurnTo(PageList.PlaceOf(page));

        // A clock that stands still: the picture depends on the catalog alone.
        using IApplication app = Application.Create(new VirtualTimeProvider());
        app.Init(DriverRegistry.Names.ANSI);
        app.Driver!.SetScreenSize(width, height);
        using DashboardWindow window = new(model, ascii ? GlyphSet.Ascii : GlyphSet.Full, theme);
        SessionToken session = app.Begin(window)!;
        app.LayoutAndDraw();
        string svg = CellSvg.Write(
            app.Driver.Contents!,
            $"Dashboard of {campaign}, page {page}",
            FormattableString.Invariant($"The text screen of {width} by {height} cells as the program draws it; 'campaigns dashboard {campaign}' shows it live."));
        app.End(session);
        return svg;
    }
}
