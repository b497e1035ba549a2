using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.Catalog.Tests.Excluding;

/// <summary>An observation is left out with a reason and a name, is kept all the same, and shows wherever it matters.</summary>
public sealed class ExclusionTests
{
    // Group means 2 and 12 without line 5 (the value 90), so F and p change with it.
    private const string Rows = "E,A,1\nE,A,2\nE,A,3\nE,A,90\nE,B,11\nE,B,12\nE,B,13\n";

    [Fact]
    public void A_value_left_out_before_the_test_does_not_count_and_is_listed()
    {
        using TestCatalog catalog = Loaded();
        ExcludedObservation decision = Exclude(catalog, 5);
        Assert.Equal(("A", "90", 5L, true), (decision.Group, decision.Value, decision.Line, decision.IsExcluded));
        Assert.Equal(ExperimentStatus.Ready, catalog.Result("E").Status);
        Assert.Equal(new TestRunSummary(1, 0, 0, true), catalog.Test());
        ExperimentResult result = catalog.Result("E");

        // Worked by hand: F = (6 * 25)/1 / (4/4) = 150 on (1, 4) degrees of freedom.
        Assert.Equal((150.0, 1.0, 4.0, 6), (result.Statistic, result.Df1, result.Df2, result.ObservationCount));
        Assert.Equal(["excluded: value 90 of group A (line 5 of data-1.csv), by Ada: spilled"], result.Amendments);
    }

    [Fact]
    public void A_value_left_out_after_the_test_calls_for_a_new_test_and_the_old_result_stays_in_the_record()
    {
        using TestCatalog catalog = Loaded();
        catalog.Test();
        double before = catalog.Result("E").Statistic!.Value;
        Exclude(catalog, 5);
        Assert.Equal((ExperimentStatus.Ready, null), (catalog.Result("E").Status, catalog.Result("E").P));
        Assert.Equal(new TestRunSummary(1, 0, 0, true), catalog.Test());
        Assert.Equal(150, catalog.Result("E").Statistic);
        Assert.Equal(new TestRunSummary(0, 0, 0, false), catalog.Test());
        Assert.Equal(2, Raw.Integer(catalog.Catalog.Connection, "SELECT count(*) FROM test_results"));
        Assert.Equal(1, Raw.Integer(catalog.Catalog.Connection, FormattableString.Invariant($"SELECT count(*) FROM test_results WHERE statistic = {before:R}")));

        // Taken in again: the first result returns, with both decisions told.
        catalog.Clock.Advance(TimeSpan.FromHours(1));
        Exclude(catalog, 5, exclude: false);
        Assert.Equal(new TestRunSummary(1, 0, 0, true), catalog.Test());
        Assert.Equal(before, catalog.Result("E").Statistic);
        Assert.Equal(2, catalog.Result("E").Amendments.Count);
    }

    [Fact]
    public void An_exclusion_does_not_make_an_experiment_incomplete()
    {
        using var catalog = new TestCatalog();
        catalog.Seal(TestCatalog.Experiment("E", 3, "A", "B"));
        catalog.Load("E,A,1\nE,A,2\nE,A,3\nE,B,11\nE,B,12\nE,B,13\n");
        Exclude(catalog, 4);
        Assert.Equal(new TestRunSummary(1, 0, 0, true), catalog.Test());
        Assert.Equal(5, catalog.Result("E").ObservationCount);
    }

    [Fact]
    public void What_is_not_there_or_is_so_already_is_refused_and_nothing_changes()
    {
        using TestCatalog catalog = Loaded();
        catalog.Load("F,A,1\nF,B,2\n");
        string before = catalog.Dump;
        foreach ((string experiment, long line, string? file, bool exclude, string reason) in new[]
        {
            ("X", 5L, null, true, "no experiment 'X'"), ("E", 99L, null, true, "stands on line 99; its values came from data-1.csv"),
            ("E", 5L, "other.csv", true, "of 'other.csv'"), ("E", 5L, null, false, "is not excluded"), ("F", 5L, null, true, "stands on line 5"),
        })
        {
            RefusedException refused = Assert.Throws<RefusedException>(() => new ExclusionStore(catalog.Catalog).Decide(TestCatalog.Code, experiment, new ObservationPlace(line, file), exclude, "r", "n"));
            Assert.Contains(reason, refused.Message, StringComparison.Ordinal);
        }

        Assert.Equal(before, catalog.Dump);
        Exclude(catalog, 5);
        Assert.Contains("excluded already", Assert.Throws<RefusedException>(() => Exclude(catalog, 5)).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void The_same_line_of_two_files_needs_the_name_of_one()
    {
        using TestCatalog catalog = Loaded();
        catalog.Load("E,A,7\nE,A,8\nE,A,9\nE,A,10\n");
        Assert.Contains("several files (data-1.csv, data-2.csv)", Assert.Throws<RefusedException>(() => Exclude(catalog, 5)).Message, StringComparison.Ordinal);
        Assert.Equal("10", Exclude(catalog, 5, file: "data-2.csv").Value);
        catalog.Test();
        Assert.Equal(10, catalog.Result("E").ObservationCount);
    }

    [Fact]
    public void The_family_heeds_an_exclusion_that_came_after_its_review()
    {
        using TestCatalog catalog = Loaded();
        catalog.Test();
        catalog.Review();
        Exclude(catalog, 5);
        catalog.Test();
        Assert.True(catalog.Review().IsNew);
        Assert.Equal(catalog.Result("E").P, new OverviewReader(catalog.Catalog).ReadSurvivors(TestCatalog.Code, 5).Survivors.Single().P);
        Assert.Equal(1, new OverviewReader(catalog.Catalog).Read(catalog.Campaigns.Get(TestCatalog.Code)).AmendedCount);
    }

    private static TestCatalog Loaded()
    {
        var catalog = new TestCatalog();
        catalog.Seal(TestCatalog.Experiment("E"), TestCatalog.Experiment("F"));
        catalog.Load(Rows);
        return catalog;
    }

    private static ExcludedObservation Exclude(TestCatalog catalog, long line, bool exclude = true, string? file = null) =>
        new ExclusionStore(catalog.Catalog).Decide(TestCatalog.Code, "E", new ObservationPlace(line, file), exclude, "spilled", "Ada");
}
