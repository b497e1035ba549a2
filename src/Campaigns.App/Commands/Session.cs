using System.CommandLine;
using Campaigns.App.Dashboard.Actions;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Output;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Loading;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.App.Commands;

/// <summary>One command at work: what was typed, and the world around it.</summary>
internal sealed class Session(Host host, ParseResult typed)
{
    private const int LongestName = 200;

    private List<string>? _held;

    public Host Host { get; } = host;

    public ParseResult Typed { get; } = typed;

    /// <summary>How rows are printed.</summary>
    public RowFormat Format => Typed.GetValue(SharedOptions.Format);

    /// <summary>The catalog's file: --catalog, else CAMPAIGNS_CATALOG, else campaigns.db in the current folder.</summary>
    public string CatalogPath =>
        Typed.GetValue(SharedOptions.Catalog)
        ?? (Host.Variable("CAMPAIGNS_CATALOG") is { Length: > 0 } named ? named : "campaigns.db");

    /// <summary>What a plan or a campaign may name.</summary>
    public static KnownKeys KnownKeys => new(
        [.. GroupTestRegistry.All.Select(t => t.Key)],
        FollowUpKeys.All,
        [.. CorrectionRegistry.All.Select(c => c.Key), .. StreamOptions.Keys]);

    /// <summary>Who acts: the account, and the name given with --as.</summary>
    public Actor Actor => new(Host.Account, Named(Typed.GetValue(SharedOptions.ActingAs)?.Trim()));

    private static string? Named(string? name)
    {
        CampaignRules.CheckLength("--as", name ?? "", LongestName);
        return name;
    }

    /// <summary>The head of the ledger that whoever typed the command has seen; null where none was given, or the command changes nothing.</summary>
    private LedgerHead? Seen => Typed.GetValue(SharedOptions.Seen);

    public Catalog.Catalog OpenCatalog() => Stoppable(Catalog.Catalog.Open(CatalogPath, Host.Clock, Actor, Seen));

    /// <summary>Where the dashboard opens the catalog for what is done from it, in the name of whoever started it.</summary>
    public ActionDesk Desk => new(seen => Catalog.Catalog.Open(CatalogPath, Host.Clock, Actor, seen), Actor, Host.Clock);

    public Catalog.Catalog OpenOrCreateCatalog() => Stoppable(Catalog.Catalog.OpenOrCreate(CatalogPath, Host.Clock, Actor, Seen));

    /// <summary>Opens the catalog for a proof of it, which also looks at one that somebody changed in ways for which every other command refuses it.</summary>
    public Catalog.Catalog OpenCatalogForProof() => Stoppable(Catalog.Catalog.OpenForProof(CatalogPath, Host.Clock, isReadOnly: false));

    public T Get<T>(Option<T> option) => Typed.GetValue(option)!;

    public T Get<T>(Argument<T> argument) => Typed.GetValue(argument)!;

    /// <summary>Does a piece of work and says only after it what it had to say: a sentence about a change is true once the change is kept.</summary>
    public T SayAfter<T>(Func<T> work)
    {
        _held = [];
        List<string> sentences;
        try
        {
            T result = work();
            sentences = _held;
            _held = null;
            sentences.ForEach(Say);
            return result;
        }
        finally
        {
            _held = null;
        }
    }

    /// <summary>Says what was done: to people on standard output, and beside rows for a script on standard error.</summary>
    public void Say(string sentence)
    {
        if (_held is not null)
        {
            _held.Add(sentence);
            return;
        }

        TextWriter writer = Format == RowFormat.Table ? Host.Out : Host.Error;
        foreach (string line in CellText.Wrap(sentence, Host.Width))
        {
            writer.WriteLine(line);
        }
    }

    public void Print(RowTable table) => RowPrinter.Print(Host, Format, table, Typed.GetValue(SharedOptions.Top));

    private Catalog.Catalog Stoppable(Catalog.Catalog catalog)
    {
        catalog.StopOn(Host.Cancel);
        return catalog;
    }

    /// <summary>Prints rows only where a script asked for them; people have read the sentence.</summary>
    public void PrintForScripts(RowTable table)
    {
        if (Format != RowFormat.Table)
        {
            Print(table);
        }
    }
}
