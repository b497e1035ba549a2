using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.Catalog.Tests.Results;

/// <summary>From data to results and reviews, as the stores do it for every command.</summary>
public sealed class LifeCycleTests
{
    [Fact]
    public void Nothing_is_tested_or_reviewed_before_the_plan_is_sealed()
    {
        using var catalog = new TestCatalog();
        catalog.Start();
        catalog.Load(Two("E", 0));
        Assert.Contains("is not sealed", Assert.Throws<RefusedException>(() => catalog.Test()).Message, StringComparison.Ordinal);
        Assert.Contains("is not sealed", Assert.Throws<RefusedException>(() => catalog.Review()).Message, StringComparison.Ordinal);
        catalog.Campaigns.Seal(TestCatalog.Code);
        Assert.Contains("Nothing of the campaign", Assert.Throws<RefusedException>(() => catalog.Review()).Message, StringComparison.Ordinal);
        Assert.Equal(new TestRunSummary(1, 0, 0, true), catalog.Test());
        Assert.Equal(new TestRunSummary(0, 0, 0, false), catalog.Test());
        Assert.True(catalog.Review().IsNew);
    }

    [Fact]
    public void Planned_replicates_are_demanded_in_every_planned_group()
    {
        using var catalog = new TestCatalog();
        catalog.Seal(TestCatalog.Experiment("planned", 3, "A", "B", "C"), TestCatalog.Experiment("open", 3), TestCatalog.Experiment("free"), TestCatalog.Experiment("none", 3, "A", "B"));
        catalog.Load(TestCatalog.Rows("planned", "A", "1 2 3") + TestCatalog.Rows("planned", "B", "1 2 4 NA") + TestCatalog.Rows("open", "x", "1 2 3") + TestCatalog.Rows("free", "y", "1 2") + "free,z,9\n");
        Assert.Equal(
            [ExperimentStatus.Incomplete, ExperimentStatus.Incomplete, ExperimentStatus.Ready, ExperimentStatus.Planned],
            catalog.Standing.Experiments.Select(e => e.Status));
        Assert.Equal(new TestRunSummary(1, 0, 2, true), catalog.Test());

        // The third planned group and a second group of the other arrive; one value of the third group is still missing.
        catalog.Load(TestCatalog.Rows("planned", "C", "5 6 NA") + TestCatalog.Rows("open", "w", "7 8 9"));
        Assert.Equal(ExperimentStatus.Incomplete, catalog.Result("planned").Status);
        Assert.Equal(ExperimentStatus.Ready, catalog.Result("open").Status);
        Assert.Equal(new TestRunSummary(1, 0, 1, true), catalog.Test());
        catalog.Load("planned,C,7\n");
        Assert.Equal(new TestRunSummary(1, 0, 0, true), catalog.Test());
        Assert.Equal((3, 9), (catalog.Result("planned").GroupCount, catalog.Result("planned").ObservationCount));
        Assert.Equal(ExperimentStatus.Planned, catalog.Result("none").Status);
    }

    [Fact]
    public void Incomplete_experiments_are_tested_when_asked_and_that_is_recorded()
    {
        using var catalog = new TestCatalog();
        catalog.Seal(TestCatalog.Experiment("E", 5, "A", "B"), TestCatalog.Experiment("F", 5, "A", "B"));
        catalog.Load(Two("E", 0));
        Assert.Equal(new TestRunSummary(0, 0, 1, false), catalog.Test());
        Assert.Equal(new TestRunSummary(1, 0, 0, true), catalog.Test(includeIncomplete: true));
        Assert.Equal(new TestRunSummary(0, 0, 0, false), catalog.Test(includeIncomplete: true));
        Assert.Equal(["1"], Raw.Rows(catalog.Catalog.Connection, "SELECT includes_incomplete FROM test_runs"));

        // One left incomplete by an ordinary run is still there for a later one that takes it.
        catalog.Load(Two("F", 1));
        Assert.Equal(new TestRunSummary(0, 0, 1, false), catalog.Test());
        Assert.Equal(new TestRunSummary(1, 0, 0, true), catalog.Test(includeIncomplete: true));
    }

    [Fact]
    public void What_cannot_be_tested_is_stored_with_its_reason_and_counts_as_one()
    {
        using var catalog = new TestCatalog();
        string[] codes = ["one-group", "single", "constant", "zero-within", "missing", "sound"];
        catalog.Seal([.. codes.Select(c => TestCatalog.Experiment(c))]);
        catalog.Load(
            TestCatalog.Rows("one-group", "A", "1 2 3") + "single,A,1\nsingle,B,2\n"
            + TestCatalog.Rows("constant", "A", "1.0 1 1.00") + TestCatalog.Rows("constant", "B", "1 1")
            + TestCatalog.Rows("zero-within", "A", "1 1") + TestCatalog.Rows("zero-within", "B", "2 2.0")
            + "missing,A,NA\nmissing,B,\n" + Two("sound", 0));
        Assert.Equal(new TestRunSummary(1, 4, 1, true), catalog.Test());
        Assert.Equal(new TestRunSummary(0, 1, 0, true), catalog.Test(includeIncomplete: true));
        Assert.Equal(
            ["too-few-groups", "no-replication", "constant-response", "zero-within-variance", "too-few-groups", "tested"],
            Raw.Rows(catalog.Catalog.Connection, "SELECT status FROM test_results ORDER BY experiment_id"));
        CampaignStanding standing = catalog.Standing;
        Assert.Equal((6, 1), (standing.FamilySize, standing.TestedCount));

        // Bonferroni, Holm and BH agree when one of six has a p-value: six times that, the others counting as 1.
        ExperimentResult sound = catalog.Result("sound");
        Assert.Equal(6 * sound.P!.Value.Value, sound.AdjustedP!.Value.Value, 1e-15);
        Assert.Null(catalog.Result("constant").P);
        Assert.Contains("was tested already", catalog.Refused("constant,A,2\n").Details[0], StringComparison.Ordinal);
    }

    [Fact]
    public void A_review_counts_the_whole_plan_and_an_interim_one_says_that_it_does_not()
    {
        using var catalog = new TestCatalog();
        catalog.Seal([.. Enumerable.Range(1, 10).Select(i => TestCatalog.Experiment(FormattableString.Invariant($"E{i}")))]);
        catalog.Load(Two("E1", 0) + Two("E2", 2));
        catalog.Test();
        catalog.Clock.Advance(TimeSpan.FromHours(1));
        ReviewTaken first = catalog.Review();
        Assert.True(first.IsNew);
        Assert.Equal((1, 10, 2, false), (first.Review.Number, first.Review.FamilySize, first.Review.TestedCount, first.Review.IsInterim));
        Assert.Equal(catalog.Clock.GetUtcNow(), first.Review.At);
        catalog.Clock.Advance(TimeSpan.FromHours(1));
        Assert.Equal(new ReviewTaken(first.Review, false), catalog.Review());
        ReviewTaken interim = catalog.Review(testedOnly: true);
        Assert.Equal((2, 2, 2, true), (interim.Review.Number, interim.Review.FamilySize, interim.Review.TestedCount, interim.Review.IsInterim));
        Assert.False(catalog.Review(testedOnly: true).IsNew);
        catalog.Load(Two("E3", 1));
        Assert.False(catalog.Review(testedOnly: true).IsNew);
        catalog.Test();
        Assert.Equal(1, catalog.Standing.ResultsSinceReview);
        Assert.Equal((3, 10, 3), (catalog.Review().Review.Number, catalog.Standing.LastReview!.FamilySize, catalog.Standing.LastReview.TestedCount));
        Assert.Equal(0, catalog.Standing.ResultsSinceReview);
        Assert.Equal([1, 2, 3], new ReviewStore(catalog.Catalog).All(1).Select(r => r.Number));
    }

    [Fact]
    public void A_family_without_any_p_value_can_be_reviewed()
    {
        using var catalog = new TestCatalog();
        catalog.Seal(TestCatalog.Experiment("E"));
        catalog.Load(TestCatalog.Rows("E", "A", "1 2 3"));
        catalog.Test();
        Assert.Equal((1, 0, 0), (catalog.Review().Review.FamilySize, catalog.Standing.LastReview!.TestedCount, catalog.Standing.LastReview.SurvivorCount));
        Assert.Equal(0, catalog.Review(testedOnly: true).Review.FamilySize);
        Assert.Equal(0, new OverviewReader(catalog.Catalog).Read(catalog.Campaigns.Get(TestCatalog.Code)).SurvivorCount);
    }

    [Fact]
    public void Going_on_from_the_latest_review_gives_the_family_that_reading_all_results_gives()
    {
        var random = new Random(20261201);
        using var catalog = new TestCatalog();
        catalog.Seal([.. Enumerable.Range(1, 60).Select(i => TestCatalog.Experiment(FormattableString.Invariant($"E{i:D2}")))]);
        int[] order = [.. Enumerable.Range(1, 60)];
        random.Shuffle(order);
        for (int step = 0; step < 12; step++)
        {
            catalog.Load(string.Concat(order.Skip(step * 5).Take(5).Select(i => i % 9 == 0
                ? FormattableString.Invariant($"E{i:D2},A,1\n")
                : Two(FormattableString.Invariant($"E{i:D2}"), random.Next(4)))));
            catalog.Test();
            FamilyColumns bySteps = new FamilyReader(catalog.Catalog).Read(1);
            FamilyColumns all = ReadWithoutReview(catalog);
            Assert.Equal(all.ExperimentIds, bySteps.ExperimentIds);
            Assert.Equal(all.P, bySteps.P);
            ReviewHead review = catalog.Review(testedOnly: step % 4 == 3).Review;
            CampaignStanding standing = catalog.Standing;
            Assert.Equal(all.Count, review.TestedCount);
            if (!review.IsInterim)
            {
                Assert.Equal(standing.SurvivorCount, review.SurvivorCount);
                Assert.Equal(standing.Experiments.Where(e => e.P is not null).Select(e => e.AdjustedP!.Value), Lines(catalog).Adjusted);
            }
        }

        Assert.Equal(12, catalog.Standing.LastReview!.Number);
    }

    [Fact]
    public void An_amended_experiment_awaits_a_new_test_and_then_tells_why()
    {
        using var catalog = new TestCatalog();
        catalog.Seal(TestCatalog.Experiment("E", 3, "A", "B"), TestCatalog.Experiment("F", 3, "A", "B"));
        catalog.Load(Two("E", 0) + Two("F", 1));
        catalog.Test();
        catalog.Review();
        ExperimentResult before = catalog.Result("E");
        Assert.Equal((6, ExperimentStatus.Tested), (before.ObservationCount, before.Status));
        catalog.Load("E,A,1.15\n", "panel found later");

        ExperimentResult awaiting = catalog.Result("E");
        Assert.Equal((7, 2, ExperimentStatus.Ready), (awaiting.ObservationCount, awaiting.GroupCount, awaiting.Status));
        Assert.Equal(["panel found later"], awaiting.Amendments);
        Assert.Null(awaiting.P);
        ReviewTaken without = catalog.Review();
        Assert.Equal((true, 2, 1), (without.IsNew, without.Review.FamilySize, without.Review.TestedCount));
        Assert.False(catalog.Review().IsNew);

        Assert.Equal(new TestRunSummary(1, 0, 0, true), catalog.Test());
        ExperimentResult after = catalog.Result("E");
        Assert.Equal((7, ExperimentStatus.Tested), (after.ObservationCount, after.Status));
        Assert.NotEqual(before.P, after.P);
        Assert.Equal(["panel found later"], after.Amendments);
        Assert.Empty(catalog.Result("F").Amendments);
        Assert.Equal((true, 2), (catalog.Review().IsNew, catalog.Standing.LastReview!.TestedCount));
        Assert.False(catalog.Review().IsNew);
        Assert.Equal(new TestRunSummary(0, 0, 0, false), catalog.Test());
    }

    [Fact]
    public void An_amended_experiment_that_is_still_incomplete_can_be_tested_after_other_runs()
    {
        using var catalog = new TestCatalog();
        catalog.Seal(TestCatalog.Experiment("E", 5, "A", "B"), TestCatalog.Experiment("F"));
        catalog.Load(Two("E", 0));
        catalog.Test(includeIncomplete: true);
        catalog.Load("E,A,1.15\n", "late");
        catalog.Load(Two("F", 1));
        Assert.Equal(new TestRunSummary(1, 0, 1, true), catalog.Test());
        Assert.Equal((7, ExperimentStatus.Incomplete), (catalog.Result("E").ObservationCount, catalog.Result("E").Status));
        Assert.Equal(new TestRunSummary(1, 0, 0, true), catalog.Test(includeIncomplete: true));
        Assert.Equal((7, ExperimentStatus.Tested), (catalog.Result("E").ObservationCount, catalog.Result("E").Status));
    }

    [Fact]
    public void The_order_of_rows_and_of_files_changes_no_bit_of_a_result()
    {
        var random = new Random(20261202);
        string[] rows = [.. Enumerable.Range(0, 400).Select(i => FormattableString.Invariant($"E{i % 4},g{random.Next(6)},{random.Next(100_000, 100_900) / 10_000m}\n"))];
        string expected = Results(rows);
        for (int round = 0; round < 6; round++)
        {
            random.Shuffle(rows);
            Assert.Equal(expected, Results(rows));
            Assert.Equal(expected, Results(rows[..150], rows[150..]));
            Assert.Equal(expected, Results(rows[150..], rows[..150]));
        }

        static string Results(params string[][] files)
        {
            using var catalog = new TestCatalog();
            catalog.Start();
            foreach (string[] rows in files)
            {
                catalog.Load(string.Concat(rows));
            }

            catalog.Campaigns.Seal(TestCatalog.Code);
            catalog.Test();
            return string.Join('\n', Raw.Rows(catalog.Catalog.Connection,
                "SELECT e.code, r.status, r.group_count, r.observation_count, r.statistic, r.df1, r.df2, r.p, r.eta_squared, r.omega_squared FROM test_results r JOIN experiments e ON e.id = r.experiment_id ORDER BY e.code"));
        }
    }

    [Fact]
    public void Testing_that_is_stopped_in_the_middle_leaves_nothing()
    {
        using var catalog = new TestCatalog();
        catalog.Start();
        catalog.Load(string.Concat(Enumerable.Range(0, 600).Select(i => Two(FormattableString.Invariant($"E{i:D3}"), i % 3))));
        catalog.Campaigns.Seal(TestCatalog.Code);
        string before = catalog.Dump;
        using var stop = new CancellationTokenSource();
        Assert.Throws<OperationCanceledException>(() => new TestRunner(catalog.Catalog).Run(TestCatalog.Code, false, _ => stop.Cancel(), stop.Token));
        Assert.Equal(before, catalog.Dump);
        Assert.Equal(600, catalog.Test().Tested);
    }

    [Fact]
    public void P_below_the_range_of_doubles_is_stored_and_read_with_its_logarithm()
    {
        using var catalog = new TestCatalog();
        catalog.Seal(TestCatalog.Experiment("E"), TestCatalog.Experiment("F"));
        catalog.Load(Far("E", 1000) + Far("F", 1001));
        catalog.Test();
        catalog.Review();
        Assert.Equal(["0|1", "0|1"], Raw.Rows(catalog.Catalog.Connection, "SELECT CAST(p AS INTEGER), log_p < -1000 FROM test_results"));
        ExperimentResult e = catalog.Result("E"), f = catalog.Result("F");
        Assert.True(e.P!.Value.IsBelowDoubleRange && e.AdjustedP!.Value.IsBelowDoubleRange);
        Assert.True(f.P < e.P);
        Assert.Equal((IEnumerable<double>)[e.P.Value.Log, f.P!.Value.Log], Lines(catalog).Family.P.ToArray().Select(p => p.Log));
        Assert.Equal((IEnumerable<double>)[e.AdjustedP.Value.Log, f.AdjustedP!.Value.Log], Lines(catalog).Adjusted.Select(p => p.Log));

        static string Far(string code, int step) => string.Concat(Enumerable.Range(0, 400).Select(i =>
            FormattableString.Invariant($"{code},{(i % 2 == 0 ? "A" : "B")},{(i % 2 == 0 ? 0 : step) + (i % 5)}\n")));
    }

    private static (FamilyColumns Family, Statistics.Probability.PValue[] Adjusted) Lines(TestCatalog catalog) =>
        PackedReviewLines.Unpack(Convert.FromHexString(Raw.Rows(catalog.Catalog.Connection, "SELECT lines FROM reviews ORDER BY number DESC LIMIT 1").Single()));

    /// <summary>The family as it is read where there is no review: a copy of the catalog has none.</summary>
    private static FamilyColumns ReadWithoutReview(TestCatalog catalog)
    {
        string copy = catalog.Folder["copy.db"];
        File.Copy(catalog.Catalog.Path, copy, overwrite: true);
        Raw.Execute(copy, "DROP TRIGGER reviews_stay; DELETE FROM reviews;");
        using Catalog without = Catalog.Open(copy, catalog.Clock);
        return new FamilyReader(without).Read(1);
    }

    /// <summary>Three values in each of two groups; the larger the number, the further apart.</summary>
    private static string Two(string experiment, int apart) =>
        TestCatalog.Rows(experiment, "A", "1.0 1.1 1.3")
        + TestCatalog.Rows(experiment, "B", FormattableString.Invariant($"{1.2 + apart:F1} {1.5 + apart:F1} {1.4 + apart:F1}"));
}
