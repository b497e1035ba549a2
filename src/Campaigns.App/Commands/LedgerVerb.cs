using System.CommandLine;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Plans;

namespace Campaigns.App.Commands;

/// <summary>ledger: the record of everything that was done, in words.</summary>
internal sealed class LedgerVerb : Verb
{
    private const int ChangesShown = 10;

    private readonly Argument<string?> _code = new("CODE") { Description = "A campaign; without it, the whole catalog.", Arity = ArgumentArity.ZeroOrOne };
    private readonly Option<string?> _action = TypedOptions.Word("--action", "Only what was done so.", "WORD", [.. LedgerAction.All]);
    private readonly Option<string?> _experiment = TypedOptions.NotBlank(new Option<string?>("--experiment") { Description = "Only what touched this experiment of the campaign: its plan and seal, the files that brought its values, its tests and decisions.", HelpName = "EXPERIMENT" });
    private readonly Option<int> _from = TypedOptions.Whole("--from", 1, "Only entries from this number on.", 1);
    private readonly Option<string?> _by = TypedOptions.NotBlank(new Option<string?>("--by") { Description = "Only what this account did, or whoever acted under this name.", HelpName = "NAME" });
    private readonly Option<DateTimeOffset?> _since = TypedOptions.Day("--since", "Only entries from the beginning of this day on (UTC).", isEnd: false);
    private readonly Option<DateTimeOffset?> _until = TypedOptions.Day("--until", "Only entries up to the end of this day (UTC).", isEnd: true);

    public override IReadOnlyList<Verb> Under { get; } = [new LedgerVerifyVerb()];

    public override Command Build() => new("ledger", Describe("The record of everything that was done: who, when, what, the values before and after, and why. 'ledger verify' proves it whole.",
        "ledger PRIMERS --action exclude"))
    {
        _code, _action, _experiment, _from, _by, _since, _until,
    };

    public override int Run(Session session)
    {
        using Catalog.Catalog catalog = session.OpenCatalog();
        return catalog.Snapshot(() =>
        {
            LedgerFilter filter = Filter(session, catalog);
            var reader = new LedgerReader(catalog);
            if (session.Format == RowFormat.Table)
            {
                ForPeople(session, reader.Entries(filter), reader.Head);
            }
            else
            {
                session.Print(Rows(reader.Entries(filter)));
            }

            return ExitCode.Done;
        });
    }

    private LedgerFilter Filter(Session session, Catalog.Catalog catalog)
    {
        string? code = session.Typed.GetValue(_code), experiment = session.Typed.GetValue(_experiment);
        if (code is null && experiment is not null)
        {
            throw new UsageException("--experiment needs the campaign: campaigns ledger CODE --experiment EXPERIMENT.");
        }

        if (code is not null)
        {
            // A wrong code is said to be one, and not that nothing was done.
            StoredCampaign stored = new CampaignStore(catalog).Get(code);
            if (experiment is not null)
            {
                new PlanStore(catalog).Demand(stored, experiment);
            }
        }

        return new LedgerFilter
        {
            Campaign = code,
            Experiment = experiment,
            Action = session.Typed.GetValue(_action),
            From = session.Get(_from),
            By = session.Typed.GetValue(_by)?.Trim(),
            Since = session.Typed.GetValue(_since),
            Before = session.Typed.GetValue(_until),
        };
    }

    /// <summary>A sentence an entry, and under it what changed.</summary>
    private static void ForPeople(Session session, IEnumerable<LedgerEntry> entries, LedgerHead head)
    {
        int most = session.Get(SharedOptions.Top), shown = 0;
        long left = 0;
        foreach (LedgerEntry entry in entries)
        {
            if (most > 0 && shown == most)
            {
                left++;
                continue;
            }

            shown++;
            TextTable.Sentences(session.Host, [LedgerText.Sentence(entry)]);
            Indented(session.Host, entry.Changes.Take(ChangesShown).Select(LedgerText.Change));
            if (entry.Changes.Count > ChangesShown)
            {
                Indented(session.Host, [FormattableString.Invariant($"... and {entry.Changes.Count - ChangesShown} more changes; --format csv writes all.")]);
            }
        }

        string[] rest =
        [
            .. shown == 0 ? ["Nothing that was done fits."] : Array.Empty<string>(),
            .. left > 0 ? [FormattableString.Invariant($"... and {left} more entries; --top 0 shows all, --from N goes on from an entry.")] : Array.Empty<string>(),
        ];
        TextTable.Sentences(session.Host, rest);
        session.Host.Out.WriteLine();
        TextTable.Sentences(session.Host, [.. LedgerText.Legend, $"'campaigns ledger verify' proves the record whole. Head of the ledger: {head}"]);
    }

    private static void Indented(Host host, IEnumerable<string> sentences)
    {
        const string indent = "    ";
        foreach (string line in sentences.SelectMany(s => CellText.Wrap(s, host.Width - indent.Length)))
        {
            host.Out.WriteLine(indent + line);
        }
    }

    private static RowTable Rows(IEnumerable<LedgerEntry> entries) => new(
        [
            new("sequence", null, true), new("at", null), new("account", null), new("acting_as", null), new("version", null), new("action", null),
            new("campaign", null), new("subject", null), new("reason", null), new("changes", null), new("hash", null),
        ],
        entries.Select(e => (Cell[])
        [
            Cell.Whole(e.Sequence), Cell.Text(Words.ExactInstant(e.At)), Cell.Text(e.By.Account), Cell.Text(e.By.ActingAs), Cell.Text(e.ProgramVersion), Cell.Text(e.Action),
            Cell.Text(e.Campaign), Cell.Text(e.Subject), Cell.Text(e.Reason), Cell.Text(LedgerText.Changes(e)), Cell.Text(e.Hash),
        ]));
}
