using System.CommandLine;
using Campaigns.App.Figures;
using Campaigns.App.Output;
using Campaigns.Catalog.Exporting;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>plot: one figure as a file of SVG.</summary>
internal sealed class PlotVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Argument<string?> _experiment = new("EXPERIMENT") { Description = "The experiment, for figures of one.", Arity = ArgumentArity.ZeroOrOne };
    private readonly Option<string?> _figure = TypedOptions.Word(
        "--figure", $"Which figure; of an experiment: {Listed(true)}; of the campaign: {Listed(false)}.", "KEY", [.. FigureList.All.Select(k => k.Key)]);

    private readonly Option<string?> _out = TypedOptions.NotBlank(new Option<string?>("--out") { Description = "The file to write (else standard output).", HelpName = "FILE.svg" });
    private readonly Option<bool> _force = new("--force") { Description = "Take the place of a file that is there." };

    public override Command Build() => new("plot", Describe("Draw one figure as vector graphics (SVG), with a title and its content in words. Without --figure: the observations of the experiment, or the ranking of the campaign.",
        "plot PRIMERS E07 --out E07.svg"))
    {
        _code, _experiment, _figure, _out, _force,
    };

    public override int Run(Session session)
    {
        string code = session.Get(_code);
        string? experiment = session.Typed.GetValue(_experiment);
        FigureKind kind = Kind(session.Typed.GetValue(_figure), experiment, code);
        string? file = session.Typed.GetValue(_out);
        if (session.Get(_force) && file is null)
        {
            throw new UsageException("--force goes with --out: standard output takes the place of nothing.");
        }

        if (file is null && session.Format != RowFormat.Table)
        {
            throw new UsageException("The figure itself goes to standard output here; for rows about it (--format), name a file with --out.");
        }

        if (file is null && session.Host.OutIsTerminal)
        {
            throw new UsageException($"A drawing in SVG is nothing to read on a terminal, and nothing was written: name a file with --out, as in 'campaigns plot {code} --out figure.svg'.");
        }

        if (file is not null)
        {
            FileEnding.Fits(file, "A figure is SVG: name a .svg file.", ".svg");
        }

        using Catalog.Catalog catalog = session.OpenCatalog();
        Figure figure = catalog.Snapshot(() => kind.Make(new FigureSource(catalog, code, experiment)));
        if (!figure.HasPicture)
        {
            throw new RefusedException($"{figure.Alternative} Nothing was written.");
        }

        string svg = FigureSvg.Write(figure, "figure");
        if (file is null)
        {
            session.Host.Out.Write(svg);
            return ExitCode.Done;
        }

        NewFile.Write(catalog, file, session.Get(_force), writer => writer.Write(svg));
        session.Say($"Wrote '{file}': {figure.Title}. {figure.Alternative}");
        session.PrintForScripts(new RowTable(
            [new("file", null), new("figure", null), new("title", null), new("alternative", null)],
            [[Cell.Text(file), Cell.Text(figure.Key), Cell.Text(figure.Title), Cell.Text(figure.Alternative)]]));
        return ExitCode.Done;
    }

    private static FigureKind Kind(string? key, string? experiment, string code)
    {
        FigureKind kind = FigureList.Find(key ?? (experiment is null ? FigureList.UsualOfCampaign : FigureList.UsualOfExperiment))!;
        return kind.IsOfExperiment == experiment is not null ? kind
            : throw new UsageException(kind.IsOfExperiment
                ? $"The figure '{kind.Key}' shows one experiment: 'campaigns plot {code} EXPERIMENT --figure {kind.Key}'."
                : $"The figure '{kind.Key}' shows the whole campaign; leave '{experiment}' out, or ask for a figure of an experiment: {Listed(true)}.");
    }

    private static string Listed(bool isOfExperiment) => string.Join(", ", FigureList.All.Where(k => k.IsOfExperiment == isOfExperiment).Select(k => k.Key));
}
