using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;

namespace Campaigns.Catalog.Tests.Results;

public sealed class TestOutlookTests : IDisposable
{
    private readonly TestCatalog _catalog = new();

    public TestOutlookTests() => _catalog.Seal(
        TestCatalog.Experiment("E1", 2, "a", "b"), TestCatalog.Experiment("E2", 2, "a", "b"), TestCatalog.Experiment("E3", 2, "a", "b"), TestCatalog.Experiment("E4", null, "a", "b"),
        TestCatalog.Experiment("E5", 2, "a", "b"));

    public void Dispose() => _catalog.Dispose();

    [Fact]
    public void The_outlook_names_what_the_run_then_does_in_every_state_of_a_campaign()
    {
        Compare([], []);
        _catalog.Load(TestCatalog.Rows("E1", "a", "1 2") + TestCatalog.Rows("E1", "b", "3 4") + TestCatalog.Rows("E2", "a", "1 2") + TestCatalog.Rows("E2", "b", "3"));
        _catalog.Load(TestCatalog.Rows("E4", "a", "1") + TestCatalog.Rows("E5", "a", "1 2") + TestCatalog.Rows("E5", "b", "3 5"));
        new WithdrawalStore(_catalog.Catalog).Decide(TestCatalog.Code, ["E5"], true, "no resin", "Ada");
        Compare(["E1", "E4"], ["E2"]);
        Compare([], ["E2"]);

        // A value that is left out keeps its experiment complete, and calls for a new test.
        new ExclusionStore(_catalog.Catalog).Decide(TestCatalog.Code, "E1", new ObservationPlace(2, null), true, "spilled", "Ada");
        new WithdrawalStore(_catalog.Catalog).Decide(TestCatalog.Code, ["E5"], false, "found more", "Ada");
        Compare(["E1", "E5"], ["E2"]);
        _catalog.Load(TestCatalog.Rows("E3", "a", "1 2") + TestCatalog.Rows("E2", "b", "5"));
        Compare(["E2"], ["E3"]);
        Compare(["E3"], ["E3"], includeIncomplete: true);
        Compare([], []);
    }

    [Fact]
    public void Before_the_seal_it_is_refused_as_the_run_is()
    {
        using TestCatalog open = new();
        open.Start();
        open.Plan(TestCatalog.Experiment("E1", 2, "a", "b"));
        string Refusal(Action work) => Assert.Throws<RefusedException>(work).Message;
        Assert.Equal(Refusal(() => open.Test()), Refusal(() => new TestOutlookReader(open.Catalog).Read(TestCatalog.Code, false, default)));
    }

    private void Compare(string[] toTest, string[] lacking, bool includeIncomplete = false)
    {
        string before = _catalog.Dump;
        TestOutlook outlook = new TestOutlookReader(_catalog.Catalog).Read(TestCatalog.Code, includeIncomplete, default);
        Assert.Equal(before, _catalog.Dump);
        Assert.Equal((string.Join(' ', toTest), string.Join(' ', lacking)), (string.Join(' ', outlook.ToTest), string.Join(' ', outlook.Lacking)));
        TestRunSummary summary = _catalog.Test(includeIncomplete);
        Assert.Equal(outlook.ToTest.Count, summary.Tested + summary.NotTestable);

        // A run that tested something counts those alone that it came upon; the outlook names all.
        Assert.InRange(summary.Incomplete, summary.Ran ? 0 : outlook.Lacking.Count, outlook.Lacking.Count);
    }
}
