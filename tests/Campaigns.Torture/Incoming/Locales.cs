using System.Diagnostics;
using System.Globalization;
using System.Runtime.InteropServices;
using Microsoft.Extensions.Time.Testing;

namespace Campaigns.Torture.Incoming;

/// <summary>T17: what the program says does not depend on the locale: as a process that is told one, as a process with the tables of all locales at hand, and inside a process whose forms of numbers and dates are another's.</summary>
internal sealed class Locales : TortureTest
{
    private static readonly string[] Names = ["C", "de_DE.UTF-8", "tr_TR.UTF-8", "ar_SA.UTF-8", "fa_IR.UTF-8"];

    public override string Key => "T17";

    public override string What => "every command under the locales C, de_DE, tr_TR, ar_SA, fa_IR";

    public override int Full => 5;

    public override int Short => 2;

    public override void Run(Tally tally, int tries, Random random)
    {
        bool isFull = tries >= Full;
        IReadOnlyList<(string, string)> inProcess = InProcess(CultureInfo.InvariantCulture, isFull);
        tally.Try("the script uses every command", () =>
            LocaleScript.LeftOut(inProcess.Single(s => s.Item1 == "--help").Item2, inProcess) is { Count: > 0 } left ? $"it leaves out {string.Join(", ", left)}" : null);
        foreach (string name in isFull ? Names[1..] : [Names[1], Names[^1]])
        {
            tally.Try($"forms of {name}", () => Different(inProcess, InProcess(Forms(name), isFull)));
        }

        using Workbench worked = Fixed();
        new LocaleScript(worked, arguments => worked.Run(arguments), hidesInstants: false).Work();
        IReadOnlyList<(string, string)> answers = Asked(worked, (bench, arguments) => bench.Run(arguments));
        string? tables = ConfigurationWithTables();
        (string What, string? Tables)[] ways = tables is null ? [("process under", null)] : [("process under", null), ("process with the tables of", tables)];
        if (!isFull)
        {
            // The one in which case matters most, with what it needs to know of case.
            ways = ways[^1..];
        }

        IReadOnlyList<(string, string)> worksAsProcess = isFull ? WorkAsProcess("C", tables: null) : [];
        foreach (string name in isFull ? Names : [Names[2]])
        {
            foreach ((string what, string? configuration) in ways)
            {
                tally.Try($"{what} {name}", () => Different(answers, Asked(worked, (bench, arguments) => Process(bench, name, configuration, arguments)))
                    ?? (isFull ? Different(worksAsProcess, WorkAsProcess(name, configuration)) : null));
            }
        }

        if (tables is not null)
        {
            File.Delete(tables);
        }
    }

    private static string? Different(IReadOnlyList<(string Command, string Text)> expected, IReadOnlyList<(string Command, string Text)> actual)
    {
        for (int i = 0; i < expected.Count; i++)
        {
            if (i >= actual.Count || expected[i] != actual[i])
            {
                return $"'{expected[i].Command}' said\n{(i < actual.Count ? actual[i].Text : "nothing")}\ninstead of\n{expected[i].Text}";
            }
        }

        return null;
    }

    private static IReadOnlyList<(string Command, string Text)> InProcess(CultureInfo culture, bool inAllFormats)
    {
        CultureInfo before = CultureInfo.CurrentCulture;
        CultureInfo beforeUi = CultureInfo.CurrentUICulture;
        try
        {
            CultureInfo.CurrentCulture = CultureInfo.CurrentUICulture = CultureInfo.DefaultThreadCurrentCulture = CultureInfo.DefaultThreadCurrentUICulture = culture;
            using Workbench bench = Fixed();
            return new LocaleScript(bench, arguments => bench.Run(arguments), hidesInstants: false).Run(inAllFormats);
        }
        finally
        {
            (CultureInfo.CurrentCulture, CultureInfo.CurrentUICulture) = (before, beforeUi);
            CultureInfo.DefaultThreadCurrentCulture = CultureInfo.DefaultThreadCurrentUICulture = null;
        }
    }

    /// <summary>The forms of numbers and dates of a locale, as its tables give them; this process itself knows the invariant ones alone.</summary>
    private static CultureInfo Forms(string name)
    {
        var culture = (CultureInfo)CultureInfo.InvariantCulture.Clone();
        NumberFormatInfo numbers = culture.NumberFormat;
        (numbers.NumberDecimalSeparator, numbers.NumberGroupSeparator, numbers.NegativeSign, numbers.PercentSymbol) = name[..2] switch
        {
            "de" => (",", ".", "-", "%"),
            "tr" => (",", ".", "-", "%"),
            "ar" => ("\u066B", "\u066C", "\u061C-", "\u066A\u061C"),
            _ => ("\u066B", "\u066C", "\u200E\u2212", "\u066A"),
        };
        numbers.PercentDecimalSeparator = numbers.CurrencyDecimalSeparator = numbers.NumberDecimalSeparator;
        numbers.PositiveSign = name[..2] == "fa" ? "\u200E+" : "+";
        numbers.NaNSymbol = name[..2] == "ar" ? "\u0644\u064A\u0633\u00A0\u0631\u0642\u0645" : "NaN";
        numbers.PositiveInfinitySymbol = "\u221E";
        DateTimeFormatInfo dates = culture.DateTimeFormat;
        dates.DateSeparator = name[..2] is "ar" or "fa" ? "/" : ".";
        dates.TimeSeparator = name[..2] == "fa" ? "٫" : ".";
        return culture;
    }

    private static Workbench Fixed() => new() { Clock = new FakeTimeProvider(new DateTimeOffset(2026, 3, 2, 9, 30, 0, TimeSpan.Zero)) };

    /// <summary>The answers from a copy of a catalog in which the work was done.</summary>
    private static IReadOnlyList<(string Command, string Text)> Asked(Workbench worked, Func<Workbench, string[], Ran> run)
    {
        using Workbench bench = Fixed();
        foreach (string file in Directory.EnumerateFiles(worked.Folder))
        {
            File.Copy(file, bench.At(Path.GetFileName(file)));
        }

        return new LocaleScript(bench, arguments => run(bench, arguments), hidesInstants: false).AskInTurn();
    }

    /// <summary>The work itself as processes, whose clock goes on; what is said without instants.</summary>
    private static IReadOnlyList<(string Command, string Text)> WorkAsProcess(string locale, string? tables)
    {
        using var bench = new Workbench();
        var script = new LocaleScript(bench, arguments => Process(bench, locale, tables, arguments), hidesInstants: true);
        script.Work();
        return script.Said;
    }

    private static Ran Process(Workbench bench, string locale, string? tables, string[] arguments)
    {
        var start = tables is null
            ? new ProcessStartInfo(Workbench.Program, arguments)
            : new ProcessStartInfo(DotnetHost, ["exec", "--runtimeconfig", tables, Path.Combine(AppContext.BaseDirectory, "campaigns.dll"), .. arguments]);
        (start.RedirectStandardOutput, start.RedirectStandardError, start.WorkingDirectory) = (true, true, bench.Folder);
        (start.StandardOutputEncoding, start.StandardErrorEncoding) = (new System.Text.UTF8Encoding(false), new System.Text.UTF8Encoding(false));
        start.Environment["CAMPAIGNS_CATALOG"] = bench.Catalog;
        start.Environment["COLUMNS"] = "100";
        start.Environment["LANG"] = start.Environment["LC_ALL"] = locale;
        using Process process = System.Diagnostics.Process.Start(start)!;
        Task<string> standardOutput = process.StandardOutput.ReadToEndAsync(), standardError = process.StandardError.ReadToEndAsync();
        process.WaitForExit();
        return new Ran(process.ExitCode, standardOutput.GetAwaiter().GetResult(), standardError.GetAwaiter().GetResult());
    }

    private static string DotnetHost => Path.GetFullPath(Path.Combine(RuntimeEnvironment.GetRuntimeDirectory(), "..", "..", "..", OperatingSystem.IsWindows() ? "dotnet.exe" : "dotnet"));

    /// <summary>A configuration under which the program knows the tables of locales, which it ships without; null where the machine has no such tables.</summary>
    private static string? ConfigurationWithTables()
    {
        string shipped = File.ReadAllText(Path.Combine(AppContext.BaseDirectory, "campaigns.runtimeconfig.json"));
        string known = shipped.Replace("\"System.Globalization.Invariant\": true", "\"System.Globalization.Invariant\": false", StringComparison.Ordinal);
        string path = Path.Combine(Path.GetTempPath(), FormattableString.Invariant($"campaigns-torture-{Environment.ProcessId}.runtimeconfig.json"));
        File.WriteAllText(path, known);
        using var bench = new Workbench();
        bool isKnown = shipped != known && File.Exists(DotnetHost) && Process(bench, "C", path, ["--help"]).Code == 0;
        if (!isKnown)
        {
            File.Delete(path);
            Console.Error.WriteLine("T17: this machine has no tables of locales; processes with them are left out.");
        }

        return isKnown ? path : null;
    }
}
