using Campaigns.Catalog.Ledger;

namespace Campaigns.App.Output;

/// <summary>The world around one run of the program: streams, clock, environment, and the wish to stop.</summary>
internal sealed class Host
{
    /// <summary>Where rows and sentences go.</summary>
    public required TextWriter Out { get; init; }

    /// <summary>Where progress, notices and errors go.</summary>
    public required TextWriter Error { get; init; }

    /// <summary>Where instants come from.</summary>
    public required TimeProvider Clock { get; init; }

    /// <summary>The account under which the program runs, as the ledger names it.</summary>
    public string Account { get; init; } = Actor.OfProcess.Account;

    /// <summary>Reads an environment variable.</summary>
    public required Func<string, string?> Variable { get; init; }

    /// <summary>Whether people watch standard output.</summary>
    public bool OutIsTerminal { get; init; }

    /// <summary>Whether people watch standard error.</summary>
    public bool ErrorIsTerminal { get; init; }

    /// <summary>Columns of text that fit a line.</summary>
    public int Width { get; init; } = 100;

    /// <summary>Whether standard output may be styled: where people watch it, on a terminal that can, and NO_COLOR is not set.</summary>
    public bool OutIsStyled => OutIsTerminal && string.IsNullOrEmpty(Variable("NO_COLOR")) && Variable("TERM") != "dumb";

    /// <summary>Asks long work to stop.</summary>
    public CancellationToken Cancel { get; init; }

    /// <summary>Writes a notice: something that people should know and that changes no result.</summary>
    public void Notice(string sentence) => Error.WriteLine(SafeText.Escape(sentence));

    /// <summary>The host of a real process.</summary>
    public static Host OfProcess(CancellationToken cancel)
    {
        bool outIsTerminal = !Console.IsOutputRedirected;
        return new Host
        {
            Out = new StreamWriter(Console.OpenStandardOutput(), new System.Text.UTF8Encoding(false), 1 << 15) { AutoFlush = false, NewLine = "\n" },
            Error = new StreamWriter(Console.OpenStandardError(), new System.Text.UTF8Encoding(false)) { AutoFlush = true, NewLine = "\n" },
            Clock = TimeProvider.System,
            Variable = Environment.GetEnvironmentVariable,
            OutIsTerminal = outIsTerminal,
            ErrorIsTerminal = !Console.IsErrorRedirected,
            Width = outIsTerminal ? TerminalWidth() : RedirectedWidth(Environment.GetEnvironmentVariable("COLUMNS")),
            Cancel = cancel,
        };
    }

    private static int TerminalWidth()
    {
        try
        {
            return Math.Max(40, Console.WindowWidth);
        }
        catch (IOException)
        {
            return 80;
        }
    }

    private static int RedirectedWidth(string? columns) =>
        int.TryParse(columns, System.Globalization.NumberStyles.None, System.Globalization.CultureInfo.InvariantCulture, out int width) ? Math.Max(40, width) : 120;
}
