using System.Globalization;
using System.Xml.Linq;
using Campaigns.App.Dashboard;
using Campaigns.App.Tests.Commands;

namespace Campaigns.App.Tests.Dashboard;

[Collection(ScreenTests.Name)]
public sealed class ScreenPictureTests
{
    private static readonly XNamespace Svg = "http://www.w3.org/2000/svg";

    [Theory]
    [InlineData(80, 24, false)]
    [InlineData(120, 40, false)]
    [InlineData(100, 30, true)]
    public void Every_sign_of_the_screen_stands_in_its_cell(int width, int height, bool ascii)
    {
        using Workplace place = Made();
        string file = place.At("screen.svg");
        string[] arguments = ["dashboard", "lab", "--picture", file, "--page", "experiments", "--size", $"{width.ToString(CultureInfo.InvariantCulture)}x{height.ToString(CultureInfo.InvariantCulture)}", .. ascii ? ["--ascii"] : Array.Empty<string>()];
        place.Run(arguments).Well();
        var root = XDocument.Load(file).Root!;
        string[,] read = Read(root, width, height);
        using Catalog.Catalog catalog = Catalog.Catalog.Open(place.Catalog, place.Clock, new Catalog.Ledger.Actor("lab", null), null);
        using TestScreen screen = new(width, height, new CatalogSource(catalog), ascii);
        for (int y = 0; y < height; y++)
        {
            string[] cells = screen.CellsOf(y);
            for (int x = 0; x < width; x++)
            {
                Assert.Equal(cells[x].Trim(), read[y, x] ?? "");
            }
        }
    }

    [Fact]
    public void It_is_the_same_every_time_and_tells_what_it_is()
    {
        using Workplace place = Made();
        place.Run("dashboard", "lab", "--picture", place.At("a.svg"), "--page", "ranking").Well();
        place.Run("dashboard", "lab", "--picture", place.At("b.svg"), "--page", "ranking").Well();
        Assert.Equal(File.ReadAllText(place.At("a.svg")), File.ReadAllText(place.At("b.svg")));
        XElement root = XDocument.Load(place.At("a.svg")).Root!;
        Assert.Equal("Dashboard of lab, page Ranking", root.Element(Svg + "title")!.Value);
        Assert.Equal("img", (string?)root.Attribute("role"));
        string[] ours = ["svg", "title", "desc", "rect", "text"];
        Assert.All(root.DescendantsAndSelf(), e => Assert.Contains(e.Name.LocalName, ours));
    }

    [Fact]
    public void A_file_that_is_there_stays_and_wrong_sizes_are_refused()
    {
        using Workplace place = Made();
        string file = place.Write("there.svg", "mine");
        place.Run("dashboard", "lab", "--picture", file).Refused(3, "exists", "--force");
        Assert.Equal("mine", File.ReadAllText(file));
        place.Run("dashboard", "lab", "--picture", file, "--force").Well();
        place.Run("dashboard", "lab", "--picture", place.At("x.svg"), "--size", "10x10").Refused(2, "80x24");
        place.Run("dashboard", "lab", "--size", "100x30").Refused(2, "--picture");
        place.Run("dashboard", "lab", "--picture", place.At("x.svg"), "--page", "nowhere").Refused(2, "nowhere");
    }

    [Fact]
    public void A_picture_never_takes_the_place_of_the_catalog_nor_of_another_kind_of_file()
    {
        using Workplace place = Made();
        byte[] before = File.ReadAllBytes(place.Catalog);
        place.Run("dashboard", "lab", "--picture", place.Catalog, "--force").Refused(3, "catalog");
        Assert.Equal(before, File.ReadAllBytes(place.Catalog));
        place.Run("dashboard", "lab", "--picture", place.At("x.png")).Refused(2, ".png", ".svg");
        place.Run("plot", "lab", "--out", place.At("x.pdf")).Refused(2, ".pdf", ".svg");
        place.Run("report", "lab", "--out", place.At("x.pdf")).Refused(2, ".pdf", ".html");
        Assert.False(File.Exists(place.At("x.png")) || File.Exists(place.At("x.pdf")));
    }

    private static Workplace Made()
    {
        Workplace place = new();
        place.Run("run", place.Campaign("lab", null, Workplace.TwoExperiments)).Well();
        return place;
    }

    /// <summary>The signs by the cells in which their middles lie; a word has one place, which is its middle, so that programs without places for every letter draw it right.</summary>
    private static string[,] Read(XElement root, int width, int height)
    {
        double across = (Number(root, "width") - 16) / width, down = (Number(root, "height") - 16) / height;
        string[,] cells = new string[height, width];
        foreach (XElement text in root.Elements(Svg + "text"))
        {
            int y = (int)((Number(text, "y") - 8) / down);
            double middle = Number(text, "x") - 8;
            if (text.Attribute("textLength") is null)
            {
                Assert.Null(cells[y, (int)(middle / across)]);
                cells[y, (int)(middle / across)] = text.Value;
                continue;
            }

            Assert.Equal(text.Value.Length * across, Number(text, "textLength"), 0.1);
            for (int i = 0; i < text.Value.Length; i++)
            {
                int x = (int)((middle + ((i + 0.5 - (text.Value.Length / 2.0)) * across)) / across);
                Assert.Null(cells[y, x]);
                cells[y, x] = text.Value[i..(i + 1)];
            }
        }

        return cells;
    }

    private static double Number(XElement e, string name) => double.Parse((string)e.Attribute(name)!, NumberStyles.Float, CultureInfo.InvariantCulture);
}
