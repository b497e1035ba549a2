using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Streams;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Tests.Withdrawing;

/// <summary>An experiment is withdrawn with a reason and a name: before any data it leaves the family, afterwards it stays in it and counts with p = 1.</summary>
public sealed class WithdrawalTests
{
    private const string Beside = "5.0 5.1 5.2 5.3", Apart = "1.0 1.1 1.2 1.3", Alike = "1.02 1.11 1.19 1.31";

    [Theory]
    [InlineData("bh")]
    [InlineData("holm")]
    public void Withdrawn_before_any_data_an_experiment_leaves_the_family_and_the_others_are_corrected_over_fewer(string correction)
    {
        using TestCatalog catalog = Tested(correction);
        double p = catalog.Result("E1").P!.Value.Value;
        AssertFamily(catalog, size: 4, tested: 3, counts: default);
        Withdraw(catalog, "E4");

        // The smallest of m p-values is multiplied by m under both corrections.
        AssertFamily(catalog, size: 3, tested: 3, counts: new WithdrawnCounts(0, 1, 1));
        Assert.Equal(3 * p, catalog.Result("E1").AdjustedP!.Value.Value, 3 * p * 1e-15);
        Assert.Equal((ExperimentStatus.Withdrawn, null, true), (catalog.Result("E4").Status, catalog.Result("E4").Survives, catalog.Result("E4").LeftFamily));
        Withdraw(catalog, "E4", takeBack: true);
        AssertFamily(catalog, size: 4, tested: 3, counts: default);
        Assert.Equal(4 * p, catalog.Result("E1").AdjustedP!.Value.Value, 4 * p * 1e-15);
        Assert.Equal(2, catalog.Result("E4").Amendments.Count);
    }

    [Theory]
    [InlineData("bh")]
    [InlineData("holm")]
    public void Withdrawn_after_its_data_an_experiment_stays_in_the_family_and_no_other_gains_by_it(string correction)
    {
        using TestCatalog catalog = Tested(correction);
        catalog.Review();
        Dictionary<string, PValue> before = catalog.Standing.Experiments.Where(e => e.P is not null).ToDictionary(e => e.Plan.Code, e => e.AdjustedP!.Value);
        Withdraw(catalog, "E3");
        AssertFamily(catalog, size: 4, tested: 2, counts: new WithdrawnCounts(1, 0, 0));
        ExperimentResult gone = catalog.Result("E3");
        Assert.Equal((ExperimentStatus.Withdrawn, null, null, null, false), (gone.Status, gone.P, gone.AdjustedP, gone.Survives, gone.LeftFamily));
        Assert.Contains("withdrawn after its data came, so that it counts with p = 1, by Ada: panel broke", gone.Amendments);
        foreach (ExperimentResult other in catalog.Standing.Experiments.Where(e => e.P is not null))
        {
            Assert.True(other.AdjustedP!.Value >= before[other.Plan.Code], other.Plan.Code);
        }

        Assert.Equal(3, Raw.Integer(catalog.Catalog.Connection, "SELECT count(*) FROM test_results"));
        Assert.Equal((1, 0), (catalog.Standing.DecisionsSinceReview, catalog.Standing.AwaitingNewTest));
        ReviewTaken review = catalog.Review();
        Assert.Equal((true, 4, 2), (review.IsNew, review.Review.FamilySize, review.Review.TestedCount));
        Assert.False(catalog.Review().IsNew);
        Assert.Equal(0, catalog.Standing.DecisionsSinceReview);
    }

    [Fact]
    public void A_withdrawn_survivor_is_none_and_is_one_again_when_it_was_taken_back_and_tested()
    {
        using TestCatalog catalog = Tested("bh");
        PValue p = catalog.Result("E1").P!.Value;
        Assert.True(catalog.Result("E1").Survives);
        Withdraw(catalog, "E1");
        Assert.Equal(new TestRunSummary(0, 0, 0, false), catalog.Test());
        Assert.DoesNotContain(new OverviewReader(catalog.Catalog).ReadSurvivors(TestCatalog.Code, 9).Survivors, e => e.Plan.Code == "E1");
        Withdraw(catalog, "E1", takeBack: true);
        Assert.Equal((ExperimentStatus.Ready, null, 1), (catalog.Result("E1").Status, catalog.Result("E1").P, catalog.Standing.AwaitingNewTest));
        AssertFamily(catalog, size: 4, tested: 2, counts: default);
        Assert.Equal(new TestRunSummary(1, 0, 0, true), catalog.Test());
        Assert.Equal((true, p), (catalog.Result("E1").Survives, catalog.Result("E1").P));
        Assert.Equal(new TestRunSummary(0, 0, 0, false), catalog.Test());
        AssertFamily(catalog, size: 4, tested: 3, counts: default);
    }

    [Fact]
    public void A_withdrawn_experiment_takes_no_measurements_and_is_left_alone_by_tests()
    {
        using TestCatalog catalog = Tested("bh");
        Withdraw(catalog, "E4");
        RefusedException refused = catalog.Refused(Rows("E4", Apart, Beside));
        Assert.Contains("line 2", refused.Details[0], StringComparison.Ordinal);
        Assert.Contains("is withdrawn and takes no measurements", refused.Details[0], StringComparison.Ordinal);
        Withdraw(catalog, "E4", takeBack: true);
        catalog.Load(Rows("E4", Apart, Beside));
        Withdraw(catalog, "E4");
        AssertFamily(catalog, size: 4, tested: 3, counts: new WithdrawnCounts(1, 0, 0));
        Assert.Equal(new TestRunSummary(0, 0, 0, false), catalog.Test());
        Assert.Equal(new TestRunSummary(0, 0, 0, false), catalog.Test(includeIncomplete: true));
        Withdraw(catalog, "E4", takeBack: true);
        Assert.Equal(new TestRunSummary(1, 0, 0, true), catalog.Test());
        AssertFamily(catalog, size: 4, tested: 4, counts: default);
    }

    [Fact]
    public void Several_are_withdrawn_together_or_not_at_all()
    {
        using TestCatalog catalog = Tested("bh");
        string before = catalog.Dump;
        foreach ((string[] codes, bool takeBack, string reason) in new[]
        {
            (new[] { "E1", "X" }, false, "no experiment 'X'"), (["E1", "E1"], false, "named twice"), (["E1", "E2"], true, "is not withdrawn"),
        })
        {
            RefusedException refused = Assert.Throws<RefusedException>(() => Decide(catalog, codes, takeBack));
            Assert.Contains(reason, refused.Message, StringComparison.Ordinal);
            Assert.Equal(before, catalog.Dump);
        }

        Assert.Equal(["E1", "E4"], Decide(catalog, ["E1", "E4"], takeBack: false).Select(d => d.Experiment));
        Assert.Contains("is withdrawn already", Assert.Throws<RefusedException>(() => Decide(catalog, ["E2", "E4"], takeBack: false)).Message, StringComparison.Ordinal);
        AssertFamily(catalog, size: 3, tested: 2, counts: new WithdrawnCounts(1, 1, 1));
    }

    [Fact]
    public void A_position_of_the_record_tells_who_was_withdrawn_then()
    {
        using TestCatalog catalog = Tested("bh");
        long id = catalog.Campaigns.Get(TestCatalog.Code).Id;
        var positions = new List<RecordPosition> { RecordPosition.Of(catalog.Catalog, id) };
        foreach ((string code, bool takeBack) in new[] { ("E4", false), ("E1", false), ("E4", true) })
        {
            Withdraw(catalog, code, takeBack);
            positions.Add(RecordPosition.Of(catalog.Catalog, id));
        }

        StandingWithdrawals[] then = [.. positions.Select(p => new StandingWithdrawals(catalog.Catalog, id, p))];
        Assert.Equal([false, false, true, true], then.Select(w => w.IsWithdrawn(1)));
        Assert.Equal([false, true, true, false], then.Select(w => w.LeavesFamily(4)));
        Assert.Equal([null, 1, 2, 3], then.Select(w => w.LastId));
        Assert.Equal(3, new StandingWithdrawals(catalog.Catalog, id).LastId);
    }

    [Fact]
    public void In_several_families_levels_stay_and_the_family_of_the_one_that_left_shrinks()
    {
        using var catalog = new TestCatalog();
        catalog.Campaigns.Open(new Campaign { Code = TestCatalog.Code, ErrorRate = ErrorRate.Familywise, Level = new SignificanceLevel(0.06), Correction = "holm", OpenedAt = catalog.Clock.GetUtcNow() });
        catalog.Plan([.. Enumerable.Range(1, 5).Select(i => TestCatalog.Experiment(FormattableString.Invariant($"E{i}"), null, "A", "B") with { Family = i <= 3 ? "one" : "two" })]);
        new FamilyStore(catalog.Catalog).Register(TestCatalog.Code, [new Family("one"), new Family("two") { Level = new SignificanceLevel(0.02), OpensAfter = "one", Gate = FamilyGate.AllSurvive }]);
        catalog.Campaigns.Seal(TestCatalog.Code);
        catalog.Load(Rows("E1", Apart, Beside) + Rows("E2", Apart, Beside) + Rows("E4", Apart, Beside));
        catalog.Test();
        Assert.Equal(["one 0.06 3 2 2 True", "two 0.02 2 1 0 False"], catalog.Standing.Families.Select(Text));

        // The gate asks for all that are in the family: one that left it does not keep the gate closed, one that counts with p = 1 does.
        Withdraw(catalog, "E3");
        Assert.Equal(["one 0.06 2 2 2 True", "two 0.02 2 1 1 True"], catalog.Standing.Families.Select(Text));
        Withdraw(catalog, "E2");
        Assert.Equal(["one 0.06 2 1 1 True", "two 0.02 2 1 0 False"], catalog.Standing.Families.Select(Text));
        Assert.Equal(catalog.Standing.Families, new OverviewReader(catalog.Catalog).Read(catalog.Campaigns.Get(TestCatalog.Code)).Families);
    }

    [Fact]
    public void A_family_all_of_whose_experiments_left_it_is_empty_and_harms_nobody()
    {
        using var catalog = new TestCatalog();
        catalog.Campaigns.Open(new Campaign { Code = TestCatalog.Code, ErrorRate = ErrorRate.Familywise, Level = new SignificanceLevel(0.05), Correction = "weighted-holm", OpenedAt = catalog.Clock.GetUtcNow() });
        catalog.Plan([.. Enumerable.Range(1, 3).Select(i => TestCatalog.Experiment(FormattableString.Invariant($"E{i}"), null, "A", "B") with { Family = i <= 2 ? "one" : "two" })]);
        catalog.Campaigns.Seal(TestCatalog.Code);
        Decide(catalog, ["E1", "E2"], takeBack: false);
        catalog.Load(Rows("E3", Apart, Beside));
        catalog.Test();
        Assert.Equal(["one 0.025 0 0 0 True", "two 0.025 1 1 1 True"], catalog.Standing.Families.Select(Text));
        Assert.Equal(1, catalog.Review().Review.FamilySize);
    }

    [Fact]
    public void Weights_of_those_that_left_are_not_counted_and_weights_of_those_that_count_as_one_are()
    {
        using var catalog = new TestCatalog();
        catalog.Start("weighted-bh");
        catalog.Plan([.. new[] { 1.0, 2, 3, 4 }.Select((w, i) => TestCatalog.Experiment(FormattableString.Invariant($"E{i + 1}"), null, "A", "B") with { Weight = w })]);
        catalog.Campaigns.Seal(TestCatalog.Code);
        catalog.Load(Rows("E1", Apart, Beside) + Rows("E2", Apart, Alike));
        catalog.Test();
        Assert.Equal(10, catalog.Standing.Families[0].WeightTotal);
        Withdraw(catalog, "E4");
        Assert.Equal((6.0, 3), (catalog.Standing.Families[0].WeightTotal, catalog.Standing.FamilySize));
        Withdraw(catalog, "E2");
        Assert.Equal((6.0, 3), (catalog.Standing.Families[0].WeightTotal, catalog.Standing.FamilySize));
        Assert.Equal(catalog.Standing.Families, new OverviewReader(catalog.Catalog).Read(catalog.Campaigns.Get(TestCatalog.Code)).Families);
    }

    [Fact]
    public void A_standing_decision_stays_in_its_stream_and_the_withdrawn_experiment_is_no_survivor()
    {
        using var catalog = new TestCatalog();
        catalog.Start("lord");
        catalog.Plan([.. Enumerable.Range(1, 4).Select(i => TestCatalog.Experiment(FormattableString.Invariant($"E{i}"), null, "A", "B"))]);
        catalog.Campaigns.Seal(TestCatalog.Code);
        var streams = new StreamStore(catalog.Catalog);
        streams.Register(TestCatalog.Code, ["E1", "E2"]);
        catalog.Load(Rows("E1", Apart, Beside));
        catalog.Test();
        Assert.Equal(1, catalog.Standing.SurvivorCount);
        string decisions = string.Join('\n', streams.Decisions(TestCatalog.Code));
        Decide(catalog, ["E1", "E2", "E3"], takeBack: false);
        Assert.Equal(decisions, string.Join('\n', streams.Decisions(TestCatalog.Code)));
        Assert.Equal((0, ExperimentStatus.Withdrawn, null), (catalog.Standing.SurvivorCount, catalog.Result("E1").Status, catalog.Result("E1").Survives));
        Assert.Contains(catalog.Result("E1").Amendments, a => a.Contains("its decision (survives) stays", StringComparison.Ordinal));
        (CampaignOverview overview, IReadOnlyList<ExperimentResult> survivors) = new OverviewReader(catalog.Catalog).ReadSurvivors(TestCatalog.Code, 9);
        Assert.Equal((0, 0, 2), (overview.SurvivorCount, survivors.Count, overview.FamilySize));
        Assert.Contains("is withdrawn", Assert.Throws<RefusedException>(() => streams.Register(TestCatalog.Code, ["E3"])).Message, StringComparison.Ordinal);
        Decide(catalog, ["E1"], takeBack: true);
        catalog.Test();
        Assert.Equal((1, decisions), (catalog.Standing.SurvivorCount, string.Join('\n', streams.Decisions(TestCatalog.Code))));
    }

    [Fact]
    public void A_confirmation_of_a_withdrawn_experiment_says_nothing_and_one_that_left_is_none()
    {
        using var catalog = new TestCatalog();
        catalog.Seal(TestCatalog.Experiment("E1", null, "A", "B"), TestCatalog.Experiment("E2", null, "A", "B") with { Confirms = "E1" }, TestCatalog.Experiment("E3", null, "A", "B") with { Confirms = "E1" });
        catalog.Load(Rows("E1", Apart, Beside) + Rows("E2", "1.0 1.1 1.2 1.35", "5.0 5.1 5.2 5.35"));
        catalog.Test();
        Assert.Equal((true, 2), (catalog.Result("E2").Confirmation!.IsReplicated, catalog.Result("E2").Confirmation!.FamilySize));
        Withdraw(catalog, "E3");
        Assert.Null(catalog.Result("E3").Confirmation);
        Assert.Equal((true, 1), (catalog.Result("E2").Confirmation!.IsReplicated, catalog.Result("E2").Confirmation!.FamilySize));
        Withdraw(catalog, "E1");
        Assert.Null(catalog.Result("E2").Confirmation!.IsReplicated);
    }

    [Fact]
    public void A_bound_speaks_of_the_family_alone()
    {
        using TestCatalog catalog = Tested("bh");
        Decide(catalog, ["E1", "E4"], takeBack: false);
        var bounds = CampaignBounds.Of(catalog.Standing.Experiments, new SignificanceLevel(0.05));
        Assert.Equal(3, bounds.Testing.FamilySize);
        Assert.Equal(new MarkedBound(3, bounds.Testing.RealAtLeast([0, 1, 2]), 1), bounds.Mark([0, 1, 2, 3]));
    }

    /// <summary>Four experiments: two with a difference, one without, one that has no data; tested.</summary>
    private static TestCatalog Tested(string correction)
    {
        var catalog = new TestCatalog();
        catalog.Start(correction);
        catalog.Plan([.. Enumerable.Range(1, 4).Select(i => TestCatalog.Experiment(FormattableString.Invariant($"E{i}"), null, "A", "B"))]);
        catalog.Campaigns.Seal(TestCatalog.Code);
        catalog.Load(Rows("E1", Apart, "5.0 5.1 5.2 5.31") + Rows("E2", Apart, "1.4 1.5 1.6 1.7") + Rows("E3", Apart, Alike));
        catalog.Test();
        return catalog;
    }

    private static string Rows(string code, string a, string b) => TestCatalog.Rows(code, "A", a) + TestCatalog.Rows(code, "B", b);

    private static void Withdraw(TestCatalog catalog, string code, bool takeBack = false) => Decide(catalog, [code], takeBack);

    private static IReadOnlyList<Withdrawal> Decide(TestCatalog catalog, string[] codes, bool takeBack) =>
        new WithdrawalStore(catalog.Catalog).Decide(TestCatalog.Code, codes, withdraw: !takeBack, "panel broke", "Ada");

    private static string Text(FamilyStanding f) => FormattableString.Invariant($"{f.Name} {f.Level} {f.Size} {f.Tested} {f.Survivors} {f.IsOpen}");

    /// <summary>The figures by every way of counting: all in memory, and set-wise in the file.</summary>
    private static void AssertFamily(TestCatalog catalog, int size, int tested, WithdrawnCounts counts)
    {
        CampaignStanding standing = catalog.Standing;
        CampaignOverview overview = new OverviewReader(catalog.Catalog).Read(catalog.Campaigns.Get(TestCatalog.Code));
        Assert.Equal((size, tested, counts), (standing.FamilySize, standing.TestedCount, standing.Withdrawn));
        Assert.Equal((size, tested, counts), (overview.FamilySize, overview.TestedCount, overview.Withdrawn));
        Assert.Equal(standing.Families, overview.Families);
        Assert.Equal(standing.SurvivorCount, overview.SurvivorCount);
        Assert.Equal((standing.Overview.AmendedCount, standing.AwaitingNewTest, standing.DecisionsSinceReview), (overview.AmendedCount, overview.AwaitingNewTest, overview.DecisionsSinceReview));
    }
}
