using Campaigns.Catalog.Results;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;

namespace Campaigns.Catalog.Tests.Results;

public sealed class WaitingDataReaderTests
{
    private static readonly PlannedExperiment[] Plan =
    [
        TestCatalog.Experiment("E1", 2, "a", "b"), TestCatalog.Experiment("E2", 2, "a", "b"), TestCatalog.Experiment("E3", 2, "a", "b"), TestCatalog.Experiment("E4", null, "a", "b"),
    ];

    [Fact]
    public void Data_wait_from_their_load_until_their_test()
    {
        using TestCatalog catalog = new();
        catalog.Seal(Plan);
        Assert.Equal(new WaitingData(4, 0, 0), Waiting(catalog));
        catalog.Load(TestCatalog.Rows("E1", "a", "1.0 1.2") + TestCatalog.Rows("E1", "b", "2.0 2.1") + TestCatalog.Rows("E2", "a", "1.0 1.3") + TestCatalog.Rows("E4", "a", "5.0"));
        Assert.Equal(new WaitingData(4, 3, 2), Waiting(catalog));
        catalog.Test();

        // E4 has no planned number and one group alone: it was tested, without a result, and waits no more.
        Assert.Equal(new WaitingData(4, 1, 0), Waiting(catalog));
        catalog.Load(TestCatalog.Rows("E2", "b", "1.0 1.3"));
        Assert.Equal(new WaitingData(4, 1, 1), Waiting(catalog));
        catalog.Test();
        Assert.Equal(new WaitingData(4, 0, 0), Waiting(catalog));
    }

    [Fact]
    public void What_the_counts_call_ready_is_what_a_test_run_takes_where_the_groups_are_even()
    {
        using TestCatalog catalog = new();
        catalog.Seal(Plan);
        catalog.Load(TestCatalog.Rows("E1", "a", "1.0 1.2") + TestCatalog.Rows("E1", "b", "2.0 2.1") + TestCatalog.Rows("E2", "a", "1.0 1.3") + TestCatalog.Rows("E3", "a", "1 2") + TestCatalog.Rows("E3", "b", "3 4"));
        WaitingData waiting = Waiting(catalog);
        TestRunSummary run = catalog.Test();
        Assert.Equal(waiting.AsManyAsPlanned, run.Tested + run.NotTestable);
        Assert.Equal(waiting.NeverTested - waiting.AsManyAsPlanned, run.Incomplete);
    }

    [Fact]
    public void Withdrawn_experiments_and_missing_values_alone_do_not_wait()
    {
        using TestCatalog catalog = new();
        catalog.Seal(Plan);
        catalog.Load(TestCatalog.Rows("E1", "a", "1.0 1.2") + "E2,a,\nE2,b,\n");
        Assert.Equal(new WaitingData(4, 1, 0), Waiting(catalog));
        new WithdrawalStore(catalog.Catalog).Decide(TestCatalog.Code, ["E1"], withdraw: true, "panel broke", "Ada");
        Assert.Equal(new WaitingData(4, 0, 0), Waiting(catalog));
    }

    [Fact]
    public void An_empty_catalog_has_no_campaign_that_waits()
    {
        using TestCatalog catalog = new();
        Assert.Empty(new WaitingDataReader(catalog.Catalog).Read());
    }

    private static WaitingData Waiting(TestCatalog catalog) => new WaitingDataReader(catalog.Catalog).Read()[TestCatalog.Code];
}
