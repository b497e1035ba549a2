using System.Xml.Linq;
using Campaigns.App.Figures;
using Campaigns.App.Tests.Dashboard;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Tests.Figures;

public sealed class FigureSvgTests
{
    [Fact]
    public void It_tells_in_words_what_it_shows()
    {
        Figure figure = Sample();
        Drawing drawing = new(FigureSvg.Write(figure, "e1"));
        Assert.Equal("img", (string?)drawing.Root.Attribute("role"));
        Assert.Equal("e1-title e1-desc", (string?)drawing.Root.Attribute("aria-labelledby"));
        Assert.Equal(figure.Title, drawing.Title);
        Assert.Equal(figure.Alternative, drawing.Description);
        Assert.NotNull(drawing.Root.Attribute("viewBox"));
    }

    [Fact]
    public void The_same_figure_gives_the_same_bytes_every_time()
    {
        Figure figure = Sample();
        string first = FigureSvg.Write(figure, "e1");
        Assert.Equal(first, FigureSvg.Write(figure, "e1"));
        Assert.Equal(first, FigureSvg.Write(Sample(), "e1"));
    }

    [Fact]
    public void All_ids_begin_with_the_prefix_so_that_two_figures_share_none()
    {
        string[] first = [.. new Drawing(FigureSvg.Write(Sample(), "e1")).Ids], second = [.. new Drawing(FigureSvg.Write(Sample(), "e2")).Ids];
        Assert.Equal(first.Length, first.Distinct().Count());
        Assert.All(first, id => Assert.StartsWith("e1-", id, StringComparison.Ordinal));
        Assert.Empty(first.Intersect(second));
    }

    [Theory]
    [InlineData("")]
    [InlineData("1a")]
    [InlineData("a b")]
    [InlineData("a\"onload=")]
    public void A_prefix_that_could_not_stand_in_an_id_is_refused(string prefix) => Assert.Throws<ArgumentException>(() => FigureSvg.Write(Sample(), prefix));

    [Theory]
    [InlineData("</text><script>alert(1)</script>")]
    [InlineData("\" onload=\"alert(1)")]
    [InlineData("a & b < c > d")]
    [InlineData(SampleCampaign.Hostile)]
    [InlineData("\uFFFE\uFFFF and \uD800 alone \0")]
    [InlineData("]]> <!-- -->")]
    public void Names_from_data_stay_text(string name)
    {
        Figure figure = Sample(name);
        string svg = FigureSvg.Write(figure, "f");
        var root = XDocument.Parse(svg).Root!;
        string[] ours = ["svg", "title", "desc", "rect", "text", "clipPath", "g", "path"];
        Assert.All(root.DescendantsAndSelf(), e => Assert.Contains(e.Name.LocalName, ours));
        Assert.DoesNotContain(root.DescendantsAndSelf().SelectMany(e => e.Attributes()), a => a.Name.LocalName.StartsWith("on", StringComparison.OrdinalIgnoreCase) || a.Name.LocalName is "href" or "style");
        Assert.DoesNotContain(svg, c => c is < ' ' and not '\n' or '\u202e' or '\uFFFE');
        Assert.StartsWith(SafeTextOf(name)[..1], new Drawing(svg).Title, StringComparison.Ordinal);
    }

    [Fact]
    public void Nothing_outside_is_asked_for()
    {
        string svg = FigureSvg.Write(Sample(), "f").Replace("http://www.w3.org/2000/svg", "", StringComparison.Ordinal);
        Assert.DoesNotContain("http", svg, StringComparison.Ordinal);
        Assert.DoesNotContain("@import", svg, StringComparison.Ordinal);
        Assert.DoesNotMatch("url\\((?!#)", svg);
    }

    private static string SafeTextOf(string name) => FigureText.Safe(name);

    private static Figure Sample(string name = "E7")
    {
        CampaignStanding standing = SampleCampaign.Standing(8, "bh", withoutResult: 0);
        ExperimentResult result = standing.Experiments[6];
        PlannedExperiment plan = result.Plan with { Code = name, Response = name, Unit = name, Groups = [name, "b", "c", "d"], Control = name };
        ExperimentDetail detail = SampleCampaign.Detail(result with { Plan = plan });
        return ObservationsFigure.Of(standing, detail, [.. detail.Groups.SelectMany(g => g.Values.Select((v, i) => new TracedObservation(g.Label, "", name, i + 2, null, null, null, false) { Number = v }))]);
    }
}
