using System.Drawing;
using Campaigns.App.Dashboard;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Pages;
using Campaigns.App.Dashboard.Screen;
using Campaigns.Domain;
using Terminal.Gui.App;
using Terminal.Gui.Drawing;
using Terminal.Gui.Drivers;
using Terminal.Gui.Input;
using Terminal.Gui.Testing;
using Terminal.Gui.Text;
using Terminal.Gui.Time;

namespace Campaigns.App.Tests.Dashboard;

/// <summary>The dashboard on a terminal in memory.</summary>
internal sealed class TestScreen : IDisposable
{
    private readonly VirtualTimeProvider _time = new();
    private readonly IApplication _app;
    private readonly DashboardWindow _window;
    private readonly SessionToken _session;

    public TestScreen(int width, int height, CampaignStanding standing, bool ascii = false, bool colour = true)
        : this(width, height, SampleCampaign.Source(standing), ascii, colour)
    {
    }

    public TestScreen(int width, int height, IDashboardSource source, bool ascii = false, bool colour = true, string page = "Experiments")
    {
        Theme theme = Theme.For(name => name == "NO_COLOR" && !colour ? "1" : null);
        theme.Apply();
        _app = Application.Create(_time);
        _app.Init(DriverRegistry.Names.ANSI);
        _app.Driver!.SetScreenSize(width, height);
        Model = new DashboardModel(source, source.Campaigns()[0].Campaign.Code, SampleCampaign.Find);
        Model.TurnTo(PageList.PlaceOf(page));
        _window = new DashboardWindow(Model, ascii ? GlyphSet.Ascii : GlyphSet.Full, theme);
        _session = _app.Begin(_window)!;
        _app.LayoutAndDraw();
    }

    public DashboardModel Model { get; }

    public bool IsStopped => _window.StopRequested;

    public IReadOnlyList<string> Lines
    {
        get
        {
            Cell[,] cells = _app.Driver!.Contents!;
            return [.. Enumerable.Range(0, cells.GetLength(0)).Select(y => string.Concat(CellsOf(y)).TrimEnd())];
        }
    }

    public string Text => string.Join('\n', Lines) + "\n";

    /// <summary>What the terminal would be sent, escape sequences and all.</summary>
    public string Sent => _app.Driver!.ToAnsi();

    public TestScreen Press(params Key[] keys)
    {
        foreach (Key key in keys)
        {
            _app.InjectKey(key);
        }

        _app.LayoutAndDraw();
        return this;
    }

    /// <summary>Lets time pass, and what was put off happen.</summary>
    public TestScreen Wait(TimeSpan time)
    {
        _time.Advance(time);
        _app.TimedEvents!.RunTimers();
        _app.LayoutAndDraw();
        return this;
    }

    /// <summary>Turns to a page by its digit.</summary>
    public TestScreen Turn(string page) => Press(new Key((char)('1' + PageList.PlaceOf(page))));

    public TestScreen Type(string text) => Press([.. text.Select(c => new Key(c))]);

    public TestScreen Click(int x, int y)
    {
        _app.InjectSequence(InputInjectionExtensions.LeftButtonClick(new Point(x, y)));
        _app.LayoutAndDraw();
        return this;
    }

    public TestScreen Wheel(int x, int y, bool down)
    {
        _app.InjectMouse(new Mouse { ScreenPosition = new Point(x, y), Flags = down ? MouseFlags.WheeledDown : MouseFlags.WheeledUp });
        _app.LayoutAndDraw();
        return this;
    }

    public TestScreen Resize(int width, int height)
    {
        _app.Driver!.SetScreenSize(width, height);
        _app.LayoutAndDraw();
        return this;
    }

    /// <summary>The cells of a row; the second cell of a wide sign is empty.</summary>
    public string[] CellsOf(int y)
    {
        Cell[,] cells = _app.Driver!.Contents!;
        string[] row = new string[cells.GetLength(1)];
        for (int x = 0; x < row.Length; x++)
        {
            row[x] = cells[y, x].Grapheme;
            if (row[x].GetColumns() == 2 && x + 1 < row.Length)
            {
                row[++x] = "";
            }
        }

        return row;
    }

    public void Dispose()
    {
        _app.End(_session);
        _window.Dispose();
        _app.Dispose();
    }
}
