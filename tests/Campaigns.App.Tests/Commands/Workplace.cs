using System.Runtime.CompilerServices;
using System.Text;
using Campaigns.App.Commands;
using Campaigns.App.Output;
using Microsoft.Extensions.Time.Testing;

namespace Campaigns.App.Tests.Commands;

/// <summary>A folder of its own, a clock that stands still, and the command line in it.</summary>
internal sealed class Workplace : IDisposable
{
    public static readonly DateTimeOffset Now = new(2026, 3, 2, 9, 30, 0, TimeSpan.Zero);

    /// <summary>The account that the ledger names, whoever runs the tests.</summary>
    public const string Account = "lab";

    public Workplace() => Variables["CAMPAIGNS_CATALOG"] = Catalog;

    public string Folder { get; } = Directory.CreateTempSubdirectory("campaigns-test-").FullName;

    public string Catalog => At("campaigns.db");

    public Dictionary<string, string> Variables { get; } = [];

    public FakeTimeProvider Clock { get; } = new(Now);

    public int Width { get; init; } = 100;

    public bool IsTerminal { get; init; }

    public CancellationToken Cancel { get; init; }

    public static string Repository([CallerFilePath] string here = "") => Path.GetFullPath(Path.Combine(Path.GetDirectoryName(here)!, "..", "..", ".."));

    public static string Demo => Path.Combine(Repository(), "campaigns", "adhesion-screen");

    public string At(params string[] names) => Path.Combine([Folder, .. names]);

    public Ran Run(params string[] arguments)
    {
        using StringWriter standardOutput = new() { NewLine = "\n" }, standardError = new() { NewLine = "\n" };
        int code = CommandLine.Run(arguments, new Host
        {
            Out = standardOutput,
            Error = standardError,
            Clock = Clock,
            Account = Account,
            Variable = name => Variables.GetValueOrDefault(name),
            Width = Width,
            OutIsTerminal = IsTerminal,
            ErrorIsTerminal = IsTerminal,
            Cancel = Cancel,
        });
        return new Ran(code, standardOutput.ToString(), standardError.ToString());
    }

    /// <summary>Writes a file of UTF-8 text below the folder.</summary>
    public string Write(string name, string text)
    {
        string path = At(name.Split('/'));
        Directory.CreateDirectory(Path.GetDirectoryName(path)!);
        File.WriteAllText(path, text, new UTF8Encoding(false));
        return path;
    }

    /// <summary>A campaign folder; a plan or measurements that are null are left out.</summary>
    public string Campaign(string name, string? plan, string? measurements, string level = "0.05", string correction = "bh")
    {
        Write($"{name}/campaign.json", $$"""{"code": "{{name}}", "title": "Invented", "purpose": "Test", "errorRate": "false-discovery", "level": {{level}}, "correction": "{{correction}}", "test": "f", "followUp": "none"}""");
        if (plan is not null)
        {
            Write($"{name}/plan.csv", plan);
        }

        if (measurements is not null)
        {
            Write($"{name}/measurements/week-01.csv", measurements);
        }

        return At(name);
    }

    public void Dispose() => Directory.Delete(Folder, recursive: true);

    /// <summary>Two groups that differ, and two that do not: E1 survives, E2 does not.</summary>
    public const string TwoExperiments = """
        experiment,group,value
        E1,a,1.0
        E1,a,1.1
        E1,a,0.9
        E1,b,2.0
        E1,b,2.1
        E1,b,1.9
        E2,a,5.0
        E2,a,5.2
        E2,b,5.1
        E2,b,5.15

        """;
}
