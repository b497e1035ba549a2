using Campaigns.Domain;

namespace Campaigns.Catalog.Tests.Storing;

/// <summary>Readings of one specimen are not independent: they are averaged before the test, and belong to one group.</summary>
public sealed class SpecimenTests
{
    private const string Header = "experiment,group,specimen,value\n";

    [Fact]
    public void The_test_runs_on_the_means_of_the_specimens()
    {
        using var catalog = new TestCatalog();
        catalog.Seal(TestCatalog.Experiment("E"), TestCatalog.Experiment("M"));
        catalog.LoadFile(catalog.Write(Header
            + "E,A,a1,1\nE,A,a1,2\nE,A,a2,3\nE,A,a2,4\nE,A,a2,5\nE,B,b1,7\nE,B,b2,9\nE,B,b2,10\n"
            + "M,A,,1.5\nM,A,,4\nM,B,,7\nM,B,,9.5\n"));
        catalog.Test();
        ExperimentResult readings = catalog.Result("E");
        ExperimentResult means = catalog.Result("M");
        Assert.Equal((means.Statistic, means.Df1, means.Df2, means.P), (readings.Statistic, readings.Df1, readings.Df2, readings.P));
        Assert.Equal((8, 4), (readings.ObservationCount, readings.SpecimenCount));
        Assert.Equal((4, null), (means.ObservationCount, means.SpecimenCount));
    }

    [Fact]
    public void Planned_replicates_count_specimens_not_readings()
    {
        using var catalog = new TestCatalog();
        catalog.Seal(TestCatalog.Experiment("E", 2, "A", "B"));
        catalog.LoadFile(catalog.Write(Header + "E,A,a1,1\nE,A,a1,2\nE,B,b1,3\nE,B,b1,4\n"));
        Assert.Equal(ExperimentStatus.Incomplete, catalog.Result("E").Status);
        catalog.LoadFile(catalog.Write(Header + "E,A,a2,1\nE,B,b2,4\n"));
        Assert.Equal(ExperimentStatus.Ready, catalog.Result("E").Status);
        Assert.Equal(1, catalog.Test().Tested);
        Assert.Equal(4, catalog.Result("E").SpecimenCount);
    }

    [Fact]
    public void A_specimen_in_two_groups_is_refused_with_its_line()
    {
        using var catalog = new TestCatalog();
        catalog.Seal(TestCatalog.Experiment("E", null, "A", "B"));
        string before = catalog.Dump;
        RefusedException refused = Assert.Throws<RefusedException>(() => catalog.LoadFile(catalog.Write(Header + "E,A,s1,1\nE,A,s2,2\nE,B,s1,3\n")));
        string problem = Assert.Single(refused.Details);
        Assert.Contains("line 4, column specimen: specimen \"s1\" of experiment \"E\" stands in group \"B\" here and in group \"A\" before", problem, StringComparison.Ordinal);
        Assert.Equal(before, catalog.Dump);
    }

    [Fact]
    public void So_is_one_whose_other_group_came_with_an_earlier_file()
    {
        using var catalog = new TestCatalog();
        catalog.Seal(TestCatalog.Experiment("E", null, "A", "B"), TestCatalog.Experiment("F", null, "A", "B"));
        catalog.LoadFile(catalog.Write(Header + "E,A,s1,1\nF,B,s9,1\n"));
        string before = catalog.Dump;
        RefusedException refused = Assert.Throws<RefusedException>(() => catalog.LoadFile(catalog.Write(Header + "F,B,s1,1\nE,B,s1,3\n")));
        Assert.Contains("\"s1\" of experiment \"E\"", Assert.Single(refused.Details), StringComparison.Ordinal);
        Assert.Equal(before, catalog.Dump);
    }
}
