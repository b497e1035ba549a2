using Campaigns.App.Figures;
using Campaigns.App.Tests.Figures;

namespace Campaigns.App.Tests.Commands;

public sealed class PlotVerbTests
{
    [Fact]
    public void An_experiment_gives_its_observations_and_a_campaign_its_ranking()
    {
        using Workplace place = Made();
        Drawing observations = new(place.Run("plot", "lab", "E1").Well().Out), ranking = new(place.Run("plot", "lab").Well().Out);
        Assert.Equal("E1: values by group", observations.Title);
        Assert.Equal(6, observations.Marks("value").Count);
        Assert.Equal("lab: p-values in order of their size", ranking.Title);
        Assert.Single(ranking.Marks("survives"));
    }

    [Fact]
    public void Every_figure_of_the_demonstration_is_drawn_or_told_and_the_same_twice()
    {
        using Workplace place = new();
        place.Run("run", Workplace.Demo).Well();
        foreach (FigureKind kind in FigureList.All)
        {
            string[] arguments = kind.IsOfExperiment ? ["plot", "adhesion-screen", "GS-09", "--figure", kind.Key] : ["plot", "adhesion-screen", "--figure", kind.Key];
            string svg = place.Run(arguments).Well().Out;
            Assert.NotEmpty(new Drawing(svg).SeriesNames);
            Assert.Equal(svg, place.Run(arguments).Well().Out);
        }
    }

    [Fact]
    public void A_file_is_written_whole_and_not_over_another_one()
    {
        using Workplace place = Made();
        string file = place.At("e1.svg");
        Ran ran = place.Run("plot", "lab", "E1", "--out", file).Well();
        Assert.Contains("6 values in 2 groups", ran.Out.ReplaceLineEndings(" "), StringComparison.Ordinal);
        string first = File.ReadAllText(file);
        Assert.Equal(place.Run("plot", "lab", "E1").Well().Out, first);
        place.Run("plot", "lab", "E2", "--out", file).Refused(3, "exists", "--force");
        Assert.Equal(first, File.ReadAllText(file));
        place.Run("plot", "lab", "E2", "--out", file, "--force").Well();
        Assert.StartsWith("E2", new Drawing(File.ReadAllText(file)).Title, StringComparison.Ordinal);
        Assert.DoesNotContain(Directory.GetFiles(place.Folder), f => f.Contains(".draft-", StringComparison.Ordinal));
    }

    [Fact]
    public void A_script_gets_what_was_written_as_a_row()
    {
        using Workplace place = Made();
        CsvText row = place.Run("plot", "lab", "E1", "--out", place.At("x.svg"), "--format", "csv").Well().Csv;
        Assert.Equal("observations", row.Column("figure")[0]);
        Assert.Contains("6 values", row.Column("alternative")[0], StringComparison.Ordinal);
    }

    [Fact]
    public void What_cannot_be_drawn_is_refused_in_a_sentence()
    {
        using Workplace place = Made();
        place.Run("plot", "lab", "E1", "--figure", "comparisons").Refused(3, "No picture of comparisons inside E1", "names no follow-up");
        place.Run("plot", "lab", "E1", "--figure", "ranking").Refused(2, "shows the whole campaign");
        place.Run("plot", "lab", "--figure", "observations").Refused(2, "shows one experiment");
        place.Run("plot", "lab", "E9").Refused(3, "no experiment 'E9'");
        place.Run("plot", "lab", "--force").Refused(2, "--force goes with --out");
        place.Run("plot", "lab", "--format", "json").Refused(2, "--out");
        place.Run("plot", "lab", "--out", place.Folder).Refused(3, "is a folder");
        place.Run("plot", "lab", "--out", place.At("nowhere", "x.svg")).Refused(3, "could not be written");
    }

    private static Workplace Made()
    {
        Workplace place = new();
        place.Run("run", place.Campaign("lab", null, Workplace.TwoExperiments)).Well();
        return place;
    }
}
