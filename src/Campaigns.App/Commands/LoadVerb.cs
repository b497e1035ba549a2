using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Loading;

namespace Campaigns.App.Commands;

/// <summary>load: take measurement files.</summary>
internal sealed class LoadVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Argument<string[]> _files = TypedOptions.NotBlank(new Argument<string[]>("FILE") { Description = "Measurement files with the columns experiment, group, value, and where recorded specimen, block, order.", Arity = ArgumentArity.OneOrMore });
    private readonly Option<string?> _amend = TypedOptions.NotBlank(new Option<string?>("--amend") { Description = "Why values are added to experiments that were tested already; recorded and shown.", HelpName = "REASON" });

    public override Command Build() => new("load", Describe("Load measurement files, each whole or not at all; the same file is never loaded twice.",
        "load PRIMERS week-01.csv week-02.csv"))
    {
        _code, _files, _amend, SharedOptions.DecimalMark, SharedOptions.Separator, SharedOptions.Columns, SharedOptions.Seen,
    };

    public override int Run(Session session)
    {
        var options = new LoadOptions(SharedOptions.Reading(session, MeasurementFile.ColumnNames), session.Typed.GetValue(_amend)?.Trim());
        using Catalog.Catalog catalog = session.OpenCatalog();
        var rows = new List<Cell[]>();
        try
        {
            foreach (string file in session.Get(_files))
            {
                rows.Add(Load(session, catalog, session.Get(_code), file, options));
            }
        }
        finally
        {
            // Files before a refused one stay loaded, and a script must hear of them; where none was, its output stays empty.
            if (rows.Count > 0)
            {
                session.PrintForScripts(new RowTable(Columns, rows));
            }
        }

        return ExitCode.Done;
    }

    public static IReadOnlyList<Column> Columns { get; } =
    [
        new("file", null), new("sha256", null), new("rows", null, true), new("missing", null, true),
        new("experiments", null, true), new("new_experiments", null, true), new("amended", null),
    ];

    /// <summary>Loads one file, unless it was loaded before, and says what it brought.</summary>
    /// <returns>Whether it was loaded.</returns>
    public static bool LoadUnlessKnown(Session session, Catalog.Catalog catalog, string code, string file, LoadOptions options)
    {
        using var line = new ProgressLine(session.Host);
        LoadSummary? load = new MeasurementLoader(catalog).LoadUnlessKnown(code, file, options, line.Report, session.Host.Cancel);
        line.Dispose();
        if (load is not null)
        {
            Say(session, code, load);
        }

        return load is not null;
    }

    private static Cell[] Load(Session session, Catalog.Catalog catalog, string code, string file, LoadOptions options)
    {
        using var line = new ProgressLine(session.Host);
        LoadSummary load = new MeasurementLoader(catalog).Load(code, file, options, line.Report, session.Host.Cancel);
        line.Dispose();
        Say(session, code, load);
        return
        [
            Cell.Text(load.FileName), Cell.Text(load.Sha256), Cell.Whole(load.RowCount), Cell.Whole(load.MissingCount),
            Cell.Whole(load.ExperimentCount), Cell.Whole(load.NewExperimentCount), Cell.Text(string.Join('|', load.AmendedExperiments)),
        ];
    }

    private static void Say(Session session, string code, LoadSummary load)
    {
        session.Say(LoadWording.Loaded(load));
        foreach (string notice in LoadWording.Notices(load))
        {
            session.Host.Notice(notice);
        }

        if (LoadWording.Amended(code, load) is { } amended)
        {
            session.Say(amended);
        }
    }
}
