using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Reviewing;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Tests.Results;

public sealed class ReviewRerunTests
{
    private const string Apart = "1.0 1.1 1.2 1.3", Beside = "5.0 5.1 5.2 5.3", Alike = "1.02 1.11 1.19 1.31";

    [Fact]
    public void Every_review_of_a_campaign_that_went_on_comes_out_of_the_record_to_the_byte()
    {
        using TestCatalog catalog = LongLife();
        IReadOnlyList<ReviewRerun.Outcome> outcomes = Again(catalog);
        Assert.Equal([1, 2, 3, 4, 5, 6], outcomes.Select(o => o.Review.Number));
        Assert.All(outcomes, o => Assert.True(o.IsSame, $"{o.Review.Number}: {string.Join("; ", o.Figures)} {string.Join(", ", o.Lines.Select(l => l.Experiment))}"));
        Assert.True(Assert.Single(new ReviewRerun(catalog.Catalog).Run(TestCatalog.Code, 2, _ => { }, TestContext.Current.CancellationToken)).IsSame);
    }

    [Fact]
    public void Taking_reviews_again_writes_nothing()
    {
        using TestCatalog catalog = LongLife();
        string before = catalog.Dump;
        Again(catalog);
        Assert.Equal(before, catalog.Dump);
    }

    [Fact]
    public void A_measurement_changed_from_outside_is_found_in_the_reviews_that_rest_on_it_and_in_no_other()
    {
        using TestCatalog catalog = LongLife();
        Raw.Execute(catalog.Catalog.Connection,
            """
            DROP TRIGGER measurements_are_kept;
            UPDATE measurements SET packed = (SELECT packed FROM measurements WHERE experiment_id = 2 AND load_id = 1) WHERE experiment_id = 3;
            """);
        IReadOnlyList<ReviewRerun.Outcome> outcomes = Again(catalog);
        Assert.Equal([true, false, false, false, false, false], outcomes.Select(o => o.IsSame));
        ReviewRerun.Difference found = Assert.Single(outcomes[1].Lines, l => l.Experiment == "E3");
        Assert.NotEqual(found.Stored!.Value.P, found.Recomputed!.Value.P);
        Assert.Contains("survivors: stored 2, now 1", outcomes[1].Figures);
    }

    [Fact]
    public void A_stored_line_changed_from_outside_is_named()
    {
        using TestCatalog catalog = LongLife();
        (FamilyColumns columns, PValue[] adjusted) = Stored(catalog, 2);
        adjusted[1] = PValue.FromValue(Math.BitDecrement(adjusted[1].Value));
        byte[] forged = PackedReviewLines.Pack(columns.ExperimentIds, columns.P, adjusted).Written.ToArray();
        Raw.Execute(catalog.Catalog.Connection, $"DROP TRIGGER reviews_are_kept; UPDATE reviews SET lines = x'{Convert.ToHexString(forged)}' WHERE number = 2");
        IReadOnlyList<ReviewRerun.Outcome> outcomes = Again(catalog);
        Assert.Equal([true, false, true, true, true, true], outcomes.Select(o => o.IsSame));
        Assert.Equal("E2", Assert.Single(outcomes[1].Lines).Experiment);
        Assert.Empty(outcomes[1].Figures);
    }

    [Fact]
    public void Drawn_arrangements_specimens_blocks_and_tests_on_ranks_come_out_the_same()
    {
        using var catalog = new TestCatalog();
        string[] tests = ["f", "welch", "brown-forsythe", "kruskal-wallis", "permutation", "block-f"];
        catalog.Seal([.. tests.Select(t => TestCatalog.Experiment(t, null, "A", "B", "C") with { Test = t })]);
        var random = new Random(5);
        for (int load = 0; load < 2; load++)
        {
            var rows = new System.Text.StringBuilder("experiment,group,value,specimen,block\n");
            foreach (string test in tests)
            {
                for (int i = 0; i < 24; i++)
                {
                    rows.Append(System.Globalization.CultureInfo.InvariantCulture, $"{test},{"ABC"[i % 3]},{10 + random.NextDouble():0.000},{(test == "welch" ? $"s{load}-{i / 2 * 2 % 3}-{i % 3}-{i / 6}" : "")},{(test == "block-f" ? $"day {(i / 6) + 1}" : "")}\n");
                }
            }

            catalog.LoadFile(catalog.Write(rows.ToString()), load == 0 ? null : "a second plate");
            Assert.Equal(6, catalog.Test().Tested);
            catalog.Review();
        }

        Assert.All(Again(catalog), o => Assert.True(o.IsSame));
        Assert.Equal(1, Raw.Integer(catalog.Catalog.Connection, "SELECT count(DISTINCT experiment_id) FROM test_results WHERE arrangements > 1000"));
    }

    [Fact]
    public void Standing_decisions_are_taken_as_they_were_known_then()
    {
        using var catalog = new TestCatalog();
        catalog.Start("lord");
        catalog.Plan([.. Enumerable.Range(1, 4).Select(i => TestCatalog.Experiment(FormattableString.Invariant($"E{i}")))]);
        catalog.Campaigns.Seal(TestCatalog.Code);
        for (int i = 1; i <= 4; i++)
        {
            catalog.Load(TestCatalog.Rows(FormattableString.Invariant($"E{i}"), "A", Apart) + TestCatalog.Rows(FormattableString.Invariant($"E{i}"), "B", i == 2 ? Alike : Beside.Replace("3", FormattableString.Invariant($"{i}"), StringComparison.Ordinal)));
            catalog.Test();
            catalog.Review();
        }

        // The values of E1 change after its decision: the decision stands, on the values that it was made on.
        catalog.Load(TestCatalog.Rows("E1", "B", "1.1 1.2"), "late panels");
        catalog.Test();
        catalog.Review();
        IReadOnlyList<ReviewRerun.Outcome> outcomes = Again(catalog);
        Assert.Equal(5, outcomes.Count);
        Assert.All(outcomes, o => Assert.True(o.IsSame, $"{o.Review.Number}: {string.Join("; ", o.Figures)} {string.Join(", ", o.Lines.Select(l => l.Experiment))}"));
    }

    [Fact]
    public void Families_with_weights_and_gates_come_out_the_same_and_so_does_an_exploratory_campaign_that_grew()
    {
        using var catalog = new TestCatalog();
        catalog.Campaigns.Open(new Campaign { Code = TestCatalog.Code, ErrorRate = ErrorRate.Familywise, Level = new SignificanceLevel(0.05), Correction = "holm", OpenedAt = catalog.Clock.GetUtcNow() });
        catalog.Plan([.. Enumerable.Range(1, 6).Select(i => TestCatalog.Experiment(FormattableString.Invariant($"E{i}")) with { Family = i <= 3 ? "one" : "two", Weight = i })]);
        new FamilyStore(catalog.Catalog).Register(TestCatalog.Code, [new Family("one"), new Family("two") { Correction = "weighted-holm", OpensAfter = "one" }]);
        catalog.Campaigns.Seal(TestCatalog.Code);
        foreach (int[] part in (int[][])[[2, 4], [1, 5, 6]])
        {
            catalog.Load(string.Concat(part.Select(i => TestCatalog.Rows(FormattableString.Invariant($"E{i}"), "A", Apart) + TestCatalog.Rows(FormattableString.Invariant($"E{i}"), "B", i % 2 == 1 ? Beside : Alike))));
            catalog.Test();
            catalog.Review();
            catalog.Review(testedOnly: true);
        }

        Assert.All(Again(catalog), o => Assert.True(o.IsSame));

        using var explored = new TestCatalog();
        explored.Start();
        explored.Load(TestCatalog.Rows("E1", "A", Apart) + TestCatalog.Rows("E1", "B", Beside));
        explored.Campaigns.Seal(TestCatalog.Code);
        explored.Test();
        explored.Review();
        Assert.Equal(1, explored.Standing.LastReview!.FamilySize);
        Assert.True(Assert.Single(Again(explored)).IsSame);
    }

    [Fact]
    public void A_test_that_was_amended_before_its_use_and_draws_for_a_smaller_family_are_those_of_the_day()
    {
        using var catalog = new TestCatalog();
        catalog.Seal(TestCatalog.Experiment("E1", null, "A", "B") with { Test = "permutation" }, TestCatalog.Experiment("E2", null, "A", "B"), TestCatalog.Experiment("E3", null, "A", "B") with { Test = "permutation" });
        var random = new Random(7);
        string Group() => string.Join(' ', Enumerable.Range(0, 14).Select(_ => FormattableString.Invariant($"{random.NextDouble():0.0000}")));
        foreach (string experiment in (string[])["E1", "E2", "E3"])
        {
            if (experiment == "E2")
            {
                new PlanStore(catalog.Catalog).Register(TestCatalog.Code, [TestCatalog.Experiment("E2", null, "A", "B") with { Test = "welch" }], "spreads differ");
            }
            else if (experiment == "E3")
            {
                // Draws follow from level and family size: 0.05 / 303 asks for more than 0.05 / 3.
                new PlanStore(catalog.Catalog).Register(TestCatalog.Code, [.. Enumerable.Range(0, 300).Select(i => TestCatalog.Experiment(FormattableString.Invariant($"late {i}")))], "many more");
            }

            catalog.Load(TestCatalog.Rows(experiment, "A", Group()) + TestCatalog.Rows(experiment, "B", Group()));
            catalog.Test();
            catalog.Review();
        }

        Assert.Equal(["99999", "999999"], Raw.Rows(catalog.Catalog.Connection, "SELECT arrangements FROM test_results WHERE arrangements IS NOT NULL ORDER BY test_run_id"));
        Assert.All(Again(catalog), o => Assert.True(o.IsSame, FormattableString.Invariant($"{o.Review.Number}: {string.Join("; ", o.Figures)} {string.Join(", ", o.Lines.Select(l => l.Experiment))}")));
    }

    [Fact]
    public void A_hundred_reviews_of_random_work_come_out_the_same()
    {
        const int seed = 20261201;
        var random = new Random(seed);
        for (int round = 0; round < 10; round++)
        {
            using var catalog = new TestCatalog();
            catalog.Seal([.. Enumerable.Range(1, 8).Select(i => TestCatalog.Experiment(FormattableString.Invariant($"E{i}")))]);
            var withdrawn = new HashSet<string>();
            var lines = new Dictionary<int, (string File, long Line)>();
            for (int step = 0; step < 10; step++)
            {
                int[] chosen = [.. Enumerable.Range(1, 8).Where(e => random.Next(3) == 0 && !withdrawn.Contains(FormattableString.Invariant($"E{e}")))];
                if (chosen.Length > 0)
                {
                    var rows = new System.Text.StringBuilder();
                    int line = 2;
                    string file = FormattableString.Invariant($"data-{step + 1}.csv");
                    foreach (int e in chosen)
                    {
                        lines[e] = (file, line);
                        line += 8;
                        rows.Append(TestCatalog.Rows(FormattableString.Invariant($"E{e}"), "A", Values(random, 0))).Append(TestCatalog.Rows(FormattableString.Invariant($"E{e}"), "B", Values(random, e * 0.2)));
                    }

                    catalog.LoadFile(catalog.Write("experiment,group,value\n" + rows, file), "more came");
                }

                if (lines.Count > 0 && random.Next(2) == 0)
                {
                    (int experiment, (string file, long at)) = lines.ElementAt(random.Next(lines.Count));
                    new ExclusionStore(catalog.Catalog).Decide(TestCatalog.Code, FormattableString.Invariant($"E{experiment}"), new ObservationPlace(at, file), true, "a slip", "the test");
                    lines.Remove(experiment);
                }

                if (random.Next(3) == 0)
                {
                    string experiment = FormattableString.Invariant($"E{random.Next(1, 9)}");
                    bool withdraw = !withdrawn.Remove(experiment);
                    new WithdrawalStore(catalog.Catalog).Decide(TestCatalog.Code, [experiment], withdraw, "a doubt", "the test");
                    _ = withdraw && withdrawn.Add(experiment);
                }

                if (random.Next(4) == 0)
                {
                    new PlanStore(catalog.Catalog).Register(TestCatalog.Code, [TestCatalog.Experiment(FormattableString.Invariant($"late {step}"))], "one more");
                }

                if (random.Next(4) > 0)
                {
                    catalog.Test();
                }

                if (new ReviewStore(catalog.Catalog).CanReview(TestCatalog.Code))
                {
                    catalog.Review(testedOnly: random.Next(3) == 0);
                }
            }

            Assert.All(Again(catalog), o => Assert.True(o.IsSame, FormattableString.Invariant($"seed {seed}, round {round}, review {o.Review.Number}: {string.Join("; ", o.Figures)} {string.Join(", ", o.Lines.Select(l => l.Experiment))}")));
        }
    }

    private static string Values(Random random, double shift) => string.Join(' ', Enumerable.Range(0, 4).Select(_ => FormattableString.Invariant($"{10 + shift + random.NextDouble():0.000}")));

    private static IReadOnlyList<ReviewRerun.Outcome> Again(TestCatalog catalog) => new ReviewRerun(catalog.Catalog).Run(TestCatalog.Code, null, _ => { }, TestContext.Current.CancellationToken);

    private static (FamilyColumns Columns, PValue[] Adjusted) Stored(TestCatalog catalog, int number)
    {
        using SqliteStatement select = catalog.Catalog.Prepare("SELECT lines FROM reviews WHERE number = ?1");
        select.Bind(1, (long)number).Read();
        return PackedReviewLines.Unpack(select.Blob(0));
    }

    /// <summary>Six reviews: two of three tested; all three, once interim; after an amendment of data; while an exclusion awaits its test; after that test.</summary>
    private static TestCatalog LongLife()
    {
        var catalog = new TestCatalog();
        catalog.Seal(TestCatalog.Experiment("E1"), TestCatalog.Experiment("E2"), TestCatalog.Experiment("E3"), TestCatalog.Experiment("E4"));
        catalog.Load(TestCatalog.Rows("E1", "A", Apart) + TestCatalog.Rows("E1", "B", Beside) + TestCatalog.Rows("E2", "A", Apart) + TestCatalog.Rows("E2", "B", Alike));
        catalog.Test();
        catalog.Review();
        catalog.Load(TestCatalog.Rows("E3", "A", Apart) + TestCatalog.Rows("E3", "B", "5.0 5.1 5.2 5.4"));
        catalog.Test();
        catalog.Review();
        catalog.Review(testedOnly: true);
        catalog.Load(TestCatalog.Rows("E2", "B", "40 41 42 43"), "a second plate");
        catalog.Test();
        catalog.Review();
        new ExclusionStore(catalog.Catalog).Decide(TestCatalog.Code, "E1", new ObservationPlace(2, "data-1.csv"), true, "a scratch", "the test");
        catalog.Review();
        catalog.Test();
        catalog.Review();
        return catalog;
    }
}
