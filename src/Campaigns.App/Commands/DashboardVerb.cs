using System.CommandLine;
using System.Globalization;
using Campaigns.App.Dashboard;
using Campaigns.App.Dashboard.Pages;
using Campaigns.App.Dashboard.Picture;
using Campaigns.Catalog.Exporting;
using Campaigns.Catalog.Plans;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>dashboard: the text-mode dashboard.</summary>
internal sealed class DashboardVerb : Verb
{
    private readonly Argument<string?> _code = new("CODE") { Description = "The campaign; without it, where the catalog holds several, the programme is shown first.", Arity = ArgumentArity.ZeroOrOne };
    private readonly Option<bool> _ascii = new("--ascii") { Description = "Draw with ASCII signs alone." };

    private readonly Option<string?> _picture = TypedOptions.NotBlank(new Option<string?>("--picture") { Description = "Write one page as a picture (SVG) instead; needs no terminal.", HelpName = "FILE.svg" });
    private readonly Option<string?> _page = TypedOptions.Word("--page", "The page that is shown first, or drawn.", "NAME", ignoresCase: true, [.. PageList.All.Select(p => p.Name.ToLowerInvariant())]);
    private readonly Option<(int Width, int Height)?> _size = NewSize();
    private readonly Option<bool> _force = new("--force") { Description = "With --picture, take the place of a file that is there." };

    public override Command Build() => new("dashboard", Describe("The text-mode dashboard of a campaign; F1 shows its keys.", "dashboard PRIMERS"))
    {
        _code, _ascii, _page, _picture, _size, _force,
    };

    public override int Run(Session session)
    {
        if (session.Typed.GetValue(_picture) is null && (session.Typed.GetValue(_size) is not null || session.Get(_force)))
        {
            throw new UsageException("--size and --force go with --picture: the terminal has a size of its own.");
        }

        using Catalog.Catalog catalog = session.OpenCatalog();
        (string code, string page) = Opening(catalog, session.Typed.GetValue(_code));
        page = session.Typed.GetValue(_page) is { } asked ? PageList.All.First(p => p.Name.Equals(asked, StringComparison.OrdinalIgnoreCase)).Name : page;
        if (session.Typed.GetValue(_picture) is not { } file)
        {
            return DashboardProgram.Run(new CatalogSource(catalog), code, page, session.Get(_ascii), session.Desk);
        }

        FileEnding.Fits(file, "The picture of a page is SVG: name a .svg file.", ".svg");
        (int width, int height) = session.Typed.GetValue(_size) ?? UsualSize;
        string svg = catalog.Snapshot(() => ScreenPicture.Draw(new CatalogSource(catalog), code, page, width, height, session.Get(_ascii), session.Host.Variable));
        NewFile.Write(catalog, file, session.Get(_force), writer => writer.Write(svg));
        session.Say(FormattableString.Invariant($"Wrote '{file}': the page {page} of {code}, {width} by {height} cells."));
        return ExitCode.Done;
    }

    private static readonly (int, int) UsualSize = (120, 40);

    private static Option<(int Width, int Height)?> NewSize() => new("--size")
    {
        Description = "With --picture, cells across and rows (else 120x40).",
        HelpName = "WIDTHxHEIGHT",
        CustomParser = typed =>
        {
            string word = typed.Tokens[0].Value;
            string[] parts = word.Split('x');
            if (parts.Length == 2 && int.TryParse(parts[0], NumberStyles.None, CultureInfo.InvariantCulture, out int width) && int.TryParse(parts[1], NumberStyles.None, CultureInfo.InvariantCulture, out int height)
                && width is >= 80 and <= 400 && height is >= 24 and <= 200)
            {
                return (width, height);
            }

            typed.AddError($"--size takes cells across and rows, from 80x24 to 400x200, for example 120x40, not '{word}'.");
            return null;
        },
    };

    /// <summary>The campaign that is opened first and the page that is shown first: what was asked for, or of several campaigns the programme, the one opened last at hand.</summary>
    internal static (string Campaign, string Page) Opening(Catalog.Catalog catalog, string? asked)
    {
        const string one = "Experiments", all = "Programme";
        var campaigns = new CampaignStore(catalog);
        if (asked is not null)
        {
            // Refused here where there is none, before the terminal is taken.
            return (campaigns.Get(asked).Campaign.Code, one);
        }

        string[] codes = [.. campaigns.All().Select(c => c.Campaign.Code)];
        return codes switch
        {
            [string only] => (only, one),
            [] => throw new RefusedException("The catalog holds no campaigns yet; 'campaigns start CODE' opens one."),
            _ => (codes[^1], all),
        };
    }
}
