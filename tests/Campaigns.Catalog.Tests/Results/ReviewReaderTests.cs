using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Reviewing;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Tests.Results;

public sealed class ReviewReaderTests
{
    private const string Apart = "1.0 1.1 1.2 1.3", Beside = "5.0 5.1 5.2 5.3", Alike = "1.02 1.11 1.19 1.31";

    [Fact]
    public void Each_review_tells_what_stood_behind_it_on_its_day()
    {
        using TestCatalog catalog = Reviewed();
        IReadOnlyList<ReviewRecord> records = new ReviewReader(catalog.Catalog).Records(TestCatalog.Code);

        // Entries of the ledger: start 1, plan 2, seal 3, load 4, test 5, review 6, load 7, test 8, review 9.
        Assert.Equal([(1, 0, 1, 16L, 6L), (2, 0, 2, 24L, 9L)], records.Select(r => (r.Head.Number, r.PlanVersion, r.Files, r.Rows, r.LedgerSequence!.Value)));
        Assert.Equal([("bh", 0.05, 3, 2, 1, false), ("bh", 0.05, 3, 3, 2, false)], records.Select(r => (r.Head.Correction, r.Head.Level.Value, r.Head.FamilySize, r.Head.TestedCount, r.Head.SurvivorCount, r.Head.IsInterim)));
        Assert.Equal(ProgramVersion.Current, records[0].Head.ProgramVersion);
        Assert.Equal(catalog.Clock.GetUtcNow(), records[1].Head.At);
        Assert.All(records, r => Assert.Empty(r.Families));
    }

    [Fact]
    public void Lines_are_those_of_the_day_whatever_came_after()
    {
        using TestCatalog catalog = Reviewed();
        var first = new ReviewReader(catalog.Catalog).Lines(TestCatalog.Code, 1).Lines;
        catalog.Load(TestCatalog.Rows("E1", "B", "1.2 1.3"), "late panels");
        catalog.Test();
        catalog.Review();
        IReadOnlyList<ReviewReader.NamedLine> again = new ReviewReader(catalog.Catalog).Lines(TestCatalog.Code, 1).Lines;
        Assert.Equal([("E1", true), ("E2", false)], again.Select(l => (l.Experiment, l.Line.Survives)));
        Assert.Equal(first, again);
        Assert.NotEqual(first[0].Line.P, new ReviewReader(catalog.Catalog).Lines(TestCatalog.Code, 3).Lines[0].Line.P);
    }

    [Fact]
    public void A_review_that_is_not_there_is_refused_with_those_that_are()
    {
        using TestCatalog catalog = Reviewed();
        Assert.Contains("reviews 1 to 2", Assert.Throws<RefusedException>(() => new ReviewReader(catalog.Catalog).Lines(TestCatalog.Code, 3)).Message, StringComparison.Ordinal);
        using var empty = new TestCatalog();
        empty.Seal(TestCatalog.Experiment("E1"));
        Assert.Contains("no review yet", Assert.Throws<RefusedException>(() => new ReviewReader(empty.Catalog).Lines(TestCatalog.Code, 1)).Message, StringComparison.Ordinal);
        Assert.Contains("no review yet", Assert.Throws<RefusedException>(() => new ReviewReader(empty.Catalog).History(TestCatalog.Code)).Message, StringComparison.Ordinal);
        Assert.Empty(new ReviewReader(empty.Catalog).Records(TestCatalog.Code));
    }

    [Fact]
    public void What_was_first_tested_what_received_values_and_what_awaits_a_test_are_told_apart()
    {
        using TestCatalog catalog = Reviewed();
        Assert.Equal(["E3 gained first-tested "], Told(catalog, 1, 2));

        catalog.Load(TestCatalog.Rows("E2", "B", "40 41 42 43 44 45 46 47"), "a second plate");
        catalog.Test();
        catalog.Review();
        Assert.Equal(["E2 gained own-p added-values (a second plate)"], Told(catalog, 2, 3));
        Assert.Equal(["E2 gained own-p added-values (a second plate)", "E3 gained first-tested "], Told(catalog, 1, 3));

        catalog.Clock.Advance(TimeSpan.FromHours(1));
        Exclude(catalog, "E1", line: 2, exclude: true, "a scratch");
        catalog.Review();
        Assert.Equal(["E1 lost awaits-test exclusion (a scratch)"], Told(catalog, 3, 4));
        catalog.Test();
        Exclude(catalog, "E1", line: 2, exclude: false, "no scratch after all");
        catalog.Test();
        catalog.Review();
        Assert.Equal(["E1 gained awaits-test exclusion-taken-back (no scratch after all)"], Told(catalog, 4, 5));
        Assert.Empty(Told(catalog, 3, 5));
        Assert.True(new ReviewComparer(catalog.Catalog).Compare(TestCatalog.Code, 3, 5).Comparison.NothingChanged);
    }

    [Fact]
    public void An_interim_review_counts_less_and_the_whole_one_loses_by_the_size_of_the_family()
    {
        using var catalog = new TestCatalog();
        catalog.Seal([.. Enumerable.Range(1, 40).Select(i => TestCatalog.Experiment(FormattableString.Invariant($"E{i}")))]);
        catalog.Load(TestCatalog.Rows("E1", "A", Apart) + TestCatalog.Rows("E1", "B", "1.3 1.4 1.5 1.6"));
        catalog.Test();
        catalog.Review(testedOnly: true);
        catalog.Review();
        Assert.Equal(["E1 lost family-size "], Told(catalog, 1, 2));
    }

    [Fact]
    public void The_history_has_a_line_of_each_review_for_each_experiment()
    {
        using TestCatalog catalog = Reviewed();
        ReviewHistory history = new ReviewReader(catalog.Catalog).History(TestCatalog.Code);
        Assert.Equal([1, 2], history.Reviews.Select(r => r.Number));
        Assert.Equal(["E1 + +", "E2 - -", "E3   +"], history.Experiments.Select(e => $"{e.Code} {string.Join(' ', e.Lines.Select(l => l is null ? " " : l.Value.Survives ? "+" : "-"))}"));
        Assert.Equal(["E3"], history.Experiments.Where(e => e.HasChanged).Select(e => e.Code));
    }

    [Fact]
    public void Reviews_of_several_families_keep_the_level_of_each()
    {
        using var catalog = new TestCatalog();
        catalog.Campaigns.Open(new Campaign { Code = TestCatalog.Code, ErrorRate = ErrorRate.Familywise, Level = new SignificanceLevel(0.05), Correction = "holm", OpenedAt = catalog.Clock.GetUtcNow() });
        catalog.Plan(TestCatalog.Experiment("E1") with { Family = "one" }, TestCatalog.Experiment("E2") with { Family = "two" });
        catalog.Campaigns.Seal(TestCatalog.Code);
        catalog.Load(TestCatalog.Rows("E1", "A", Apart) + TestCatalog.Rows("E1", "B", Beside) + TestCatalog.Rows("E2", "A", Apart) + TestCatalog.Rows("E2", "B", Alike));
        catalog.Test();
        catalog.Review();
        ReviewRecord record = new ReviewReader(catalog.Catalog).Records(TestCatalog.Code).Single();
        Assert.Equal([("one", 0.025, 1), ("two", 0.025, 0)], record.Families.Select(f => (f.Name, f.Level.Value, f.Survivors)));
        Assert.Equal([("E1", "one", true), ("E2", "two", false)], new ReviewReader(catalog.Catalog).Lines(TestCatalog.Code, 1).Lines.Select(l => (l.Experiment, l.Family.Name, l.Line.Survives)));
    }

    [Fact]
    public void A_withdrawal_and_an_amendment_of_the_plan_are_told_apart()
    {
        using TestCatalog catalog = Reviewed();
        new WithdrawalStore(catalog.Catalog).Decide(TestCatalog.Code, ["E1"], true, "wrong primer", "the test");
        catalog.Review();
        Assert.Equal(["E1 lost withdrawn withdrawal (wrong primer)"], Told(catalog, 2, 3));
        new WithdrawalStore(catalog.Catalog).Decide(TestCatalog.Code, ["E1"], false, "the primer was right", "the test");
        catalog.Test();
        catalog.Review();
        Assert.Equal(["E1 gained withdrawn withdrawal-taken-back (the primer was right)"], Told(catalog, 3, 4));
        new PlanStore(catalog.Catalog).Register(TestCatalog.Code, [.. Enumerable.Range(5, 3).Select(i => TestCatalog.Experiment(FormattableString.Invariant($"E{i}")))], "three more shades");
        catalog.Load(TestCatalog.Rows("E5", "A", Apart) + TestCatalog.Rows("E5", "B", Beside));
        catalog.Test();
        catalog.Review();
        Assert.Equal(["E5 gained first-tested amended-in (three more shades)"], Told(catalog, 4, 5));
        ReviewComparison compared = new ReviewComparer(catalog.Catalog).Compare(TestCatalog.Code, 4, 5).Comparison;
        Assert.Equal((3, 6, 3), (compared.SizesBefore.Single(), compared.SizesAfter.Single(), compared.FamilyChanges.Single().AmendedIn));
        Assert.Equal([0, 0, 0, 0, 1], new ReviewReader(catalog.Catalog).Records(TestCatalog.Code).Select(r => r.PlanVersion));
    }

    private static string[] Told(TestCatalog catalog, int earlier, int later)
    {
        (ReviewComparison comparison, IReadOnlyDictionary<long, string> codes) = new ReviewComparer(catalog.Catalog).Compare(TestCatalog.Code, earlier, later);
        return [.. comparison.Differences.Select(d => $"{codes[d.Key]} {(d.IsGained ? "gained" : "lost")} {d.Reason.Word()} {string.Join(", ", d.Events.Select(e => $"{e.Cause.Word()} ({e.Reason})"))}")];
    }

    private static void Exclude(TestCatalog catalog, string experiment, long line, bool exclude, string reason) =>
        new ExclusionStore(catalog.Catalog).Decide(TestCatalog.Code, experiment, new ObservationPlace(line, "data-1.csv"), exclude, reason, "the test");

    /// <summary>Three planned experiments: E1 differs, E2 does not; after the first review E3 comes and differs.</summary>
    private static TestCatalog Reviewed()
    {
        var catalog = new TestCatalog();
        catalog.Seal(TestCatalog.Experiment("E1"), TestCatalog.Experiment("E2"), TestCatalog.Experiment("E3"));
        catalog.Load(TestCatalog.Rows("E1", "A", Apart) + TestCatalog.Rows("E1", "B", Beside) + TestCatalog.Rows("E2", "A", Apart) + TestCatalog.Rows("E2", "B", Alike));
        catalog.Test();
        catalog.Review();
        catalog.Clock.Advance(TimeSpan.FromDays(7));
        catalog.Load(TestCatalog.Rows("E3", "A", Apart) + TestCatalog.Rows("E3", "B", Beside));
        catalog.Test();
        catalog.Review();
        return catalog;
    }
}
