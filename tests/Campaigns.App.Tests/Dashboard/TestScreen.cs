using System.Drawing;
using System.Runtime.ExceptionServices;
using Campaigns.App.Dashboard;
using Campaigns.App.Dashboard.Actions;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Dialogs;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Pages;
using Campaigns.App.Dashboard.Screen;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
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

    public TestScreen(int width, int height, IDashboardSource source, bool ascii = false, bool colour = true, string page = "Experiments", ActionDesk? desk = null)
    {
        Theme theme = Theme.For(name => name == "NO_COLOR" && !colour ? "1" : null);
        theme.Apply();
        _app = Application.Create(_time);
        _app.Init(DriverRegistry.Names.ANSI);
        _app.Driver!.SetScreenSize(width, height);
        Model = new DashboardModel(source, source.Campaigns()[0].Campaign.Code, key => (ErrorProcedure?)SampleCampaign.Find(key) ?? CorrectionRegistry.Find(key));
        Model.TurnTo(PageList.PlaceOf(page));
        _window = new DashboardWindow(Model, ascii ? GlyphSet.Ascii : GlyphSet.Full, theme, desk);
        _session = _app.Begin(_window)!;
        _app.LayoutAndDraw();
    }

    public DashboardModel Model { get; }

    /// <summary>The keys below the page at hand, as many as there are.</summary>
    public IReadOnlyList<(string Key, string Does)> Footer => _window.FooterKeys;

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

    /// <summary>Hands on what was thrown while the screen was drawn.</summary>
    public bool Excuse(Exception error)
    {
        bool goesOn = _window.Excuse(error);
        _app.LayoutAndDraw();
        return goesOn;
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

    /// <summary>Presses a key that opens a dialog, and goes through a script while it stands: a step each time round the loop.</summary>
    /// <param name="opens">The key.</param>
    /// <param name="script">What is done and looked at; the dialog is closed at its end, where it still stands.</param>
    public TestScreen InDialog(Key opens, IEnumerable<int> script) => InDialog(() => _app.InjectKey(opens), script);

    /// <summary>Goes through a script while the dialog of an action stands.</summary>
    /// <param name="run">The action.</param>
    /// <param name="script">What is done and looked at.</param>
    public TestScreen InDialog(ActionRun run, IEnumerable<int> script) => InDialog(
        () =>
        {
            using ActionDialog dialog = new(run, GlyphSet.Full, Theme.For(_ => null));
            _app.Run(dialog);
        },
        script);

    private TestScreen InDialog(Action open, IEnumerable<int> script)
    {
        using IEnumerator<int> steps = script.GetEnumerator();
        Exception? failed = null;
        long end = Environment.TickCount64 + 15_000;
        void Step(object? sender, EventArgs<IApplication?> e)
        {
            try
            {
                if (_app.TopRunnable is not PopUp || (steps.MoveNext() && Environment.TickCount64 < end))
                {
                    return;
                }

                Assert.True(Environment.TickCount64 < end, "The script did not come to its end in 15 s:\n" + Text);
            }
#pragma warning disable CA1031 // An exception here would leave the loop with the dialog open; it is thrown below.
            catch (Exception error)
            {
                failed ??= error;
            }
#pragma warning restore CA1031
            _app.RequestStop(_app.TopRunnable!);
        }

        _app.Iteration += Step;
        Application.MaximumIterationsPerSecond = 1000;
        try
        {
            open();
        }
        finally
        {
            _app.Iteration -= Step;
            Application.MaximumIterationsPerSecond = Application.DefaultMaximumIterationsPerSecond;
        }

        if (failed is not null)
        {
            ExceptionDispatchInfo.Throw(failed);
        }

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
