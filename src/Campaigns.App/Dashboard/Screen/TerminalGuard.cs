using System.Runtime.InteropServices;
using Terminal.Gui.App;

namespace Campaigns.App.Dashboard.Screen;

/// <summary>Gives the terminal back however the dashboard ends: by a signal, by a fault on any thread, by the terminal going away.</summary>
/// <remarks>
/// Terminal.Gui 2.5.0 restores the terminal on a normal end only, and leaves the cursor keys in application mode even then.
/// A signal asks the main loop to stop; if that has not led to the end within <see cref="Patience"/> (or half of it, where the terminal is gone
/// and every write to it fails), the process is ended here, and where even that does not come to its end, the system is told to end it.
/// </remarks>
public sealed class TerminalGuard : IDisposable
{
    /// <summary>How long the main loop has to stop after a signal.</summary>
    public static readonly TimeSpan Patience = TimeSpan.FromSeconds(2);

    private const int WatchEvery = 500;
    private static readonly TimeSpan PatienceWithExit = TimeSpan.FromSeconds(1);

    // Bracketed paste, mouse reports, colours, alternate screen, cursor, cursor-key and keypad mode, in this order.
    private const string Restore = "\e[?2004l\e[?1003l\e[?1015l\e[?1006l\e[0m\e[?1049l\e[?25h\e[?1l\e>";
    private const int StandardInput = 0;
    private const string RestoreKeys = "\e[?1l\e>";
    private static readonly (PosixSignal Signal, int Number)[] Signals =
        [(PosixSignal.SIGHUP, 1), (PosixSignal.SIGINT, 2), (PosixSignal.SIGQUIT, 3), (PosixSignal.SIGTERM, 15)];

    private readonly IApplication _app;
    private readonly ScreenThread _screen;
    private readonly List<PosixSignalRegistration> _registrations = [];
    private readonly Timer _watch;
    private Timer? _patience;
    private int _stopping;

    /// <summary>Guards from now on.</summary>
    /// <param name="app">The application, initialised.</param>
    public TerminalGuard(IApplication app)
    {
        _app = app;
        _screen = new ScreenThread(app);
        foreach ((PosixSignal signal, int number) in Signals)
        {
            _registrations.Add(PosixSignalRegistration.Create(signal, context =>
            {
                context.Cancel = true;
                Stop(128 + number);
            }));
        }

        AppDomain.CurrentDomain.UnhandledException += OnFault;
        _watch = new Timer(_ => StopWhenTerminalIsGone(), null, WatchEvery, WatchEvery);
    }

    /// <summary>Exit code that a signal asks for; 0 where none came.</summary>
    public int ExitCode { get; private set; }

    /// <summary>Asks the main loop to stop, from any thread.</summary>
    /// <param name="exitCode">Exit code of the process: 128 and the signal's number.</param>
    public void Stop(int exitCode)
    {
        if (Interlocked.Exchange(ref _stopping, 1) != 0)
        {
            return;
        }

        ExitCode = exitCode;
        _patience = new Timer(_ => EndNow(exitCode), null, (long)(IsTerminalGone ? Patience / 2 : Patience).TotalMilliseconds, -1);
        _screen.Post(StopAll);
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        _watch.Dispose();
        _screen.Dispose();
        AppDomain.CurrentDomain.UnhandledException -= OnFault;
        _app.Dispose();
        Write(RestoreKeys);
        foreach (PosixSignalRegistration registration in _registrations)
        {
            registration.Dispose();
        }

        _patience?.Dispose();
    }

    private void StopAll()
    {
        foreach (SessionToken session in _app.SessionStack?.ToArray() ?? [])
        {
            if (session.Runnable is { } runnable)
            {
                _app.RequestStop(runnable);
            }
        }
    }

    private static bool IsTerminalGone => !OperatingSystem.IsWindows() && IsTerminal(StandardInput) == 0;

    // A closed terminal need not send a signal (the starter may have had it ignored): then reads end at once, for ever.
    private void StopWhenTerminalIsGone()
    {
        if (IsTerminalGone)
        {
            Stop(129);
        }
    }

    // What .NET offers remembers its first answer.
    [DllImport("libc", EntryPoint = "isatty")]
    [DefaultDllImportSearchPaths(DllImportSearchPath.SafeDirectories)]
    private static extern int IsTerminal(int fileDescriptor);

    [DllImport("libc", EntryPoint = "_exit")]
    [DefaultDllImportSearchPaths(DllImportSearchPath.SafeDirectories)]
    private static extern void EndAtOnce(int exitCode);

    private static void OnFault(object sender, UnhandledExceptionEventArgs e) => Write(Restore);

    private static void EndNow(int exitCode)
    {
        Write(Restore);
        if (!OperatingSystem.IsWindows())
        {
            // What was registered for the end of the process may wait for a terminal that never answers.
            new Thread(() =>
            {
                Thread.Sleep(PatienceWithExit);
                EndAtOnce(exitCode);
            })
            {
                IsBackground = true,
            }.Start();
        }

        Environment.Exit(exitCode);
    }

    private static void Write(string sequence)
    {
        try
        {
            using Stream output = Console.OpenStandardOutput();
            output.Write(System.Text.Encoding.ASCII.GetBytes(sequence));
        }
        catch (IOException)
        {
            // The terminal is gone: nothing is left to restore.
        }
    }
}
