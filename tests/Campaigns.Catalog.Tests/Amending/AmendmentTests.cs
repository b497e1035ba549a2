using Campaigns.Catalog.Amending;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;
using Microsoft.Data.Sqlite;

namespace Campaigns.Catalog.Tests.Amending;

/// <summary>A sealed plan changes by amendments with a reason alone, and stays as it was sealed for whoever asks.</summary>
public sealed class AmendmentTests
{
    private const string Apart = "1.0 1.1 1.2 1.3", Beside = "5.0 5.1 5.2 5.3";

    [Fact]
    public void Without_a_reason_a_sealed_plan_takes_no_changes_and_an_exploratory_campaign_has_none_to_amend()
    {
        using TestCatalog catalog = Sealed();
        string before = catalog.Dump;
        Assert.Contains("--reason TEXT", Assert.Throws<RefusedException>(() => catalog.Plan(Plan("E9"))).Message, StringComparison.Ordinal);
        Assert.Equal(before, catalog.Dump);
        using var exploring = new TestCatalog();
        exploring.Start();
        exploring.Load(Rows("E1"));
        exploring.Campaigns.Seal(TestCatalog.Code);
        Assert.Contains("come from measurements", Assert.Throws<RefusedException>(() => Amend(exploring, Plan("E9"))).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void What_describes_an_experiment_may_change_at_any_time_and_both_texts_are_kept()
    {
        using TestCatalog catalog = Sealed();
        catalog.Load(Rows("E1"));
        catalog.Test();
        PValue p = catalog.Result("E1").P!.Value;
        PlannedExperiment after = Plan("E1") with { Title = "Gloss | after a day", Response = "gloss", Unit = "GU", SmallestEffect = 0.1, AssumedStandardDeviation = 1e-3, Replicates = 7 };
        Assert.Equal(new PlanChange(0, 1, 1), Amend(catalog, after, Plan("E2")));
        Assert.Equal((p, after.Title, 7, 0.1), (catalog.Result("E1").P!.Value, catalog.Result("E1").Plan.Title, catalog.Result("E1").Plan.Replicates, catalog.Result("E1").Plan.SmallestEffect));
        PlanAmendment amendment = Assert.Single(new PlanAmendmentReader(catalog.Catalog).All(TestCatalog.Code));
        Assert.Equal((1, "new meter"), (amendment.Number, amendment.Reason));
        Assert.Equal(
            ["assumed_sd:|0.001", "replicates:4|7", "response:|gloss", "smallest_effect:|0.1", "title:|Gloss | after a day", "unit:|GU"],
            amendment.Changes.Select(c => $"{c.Field}:{c.Before}|{c.After}"));
        Assert.Contains(catalog.Result("E1").Amendments, a => a.StartsWith("replicates of the sealed plan changed from '4' to '7' (amendment 1), by ", StringComparison.Ordinal));
        Assert.Empty(catalog.Result("E2").Amendments);
        AssertSealedPlanIsWhole(catalog);
        Assert.Equal(new AmendedPlan(1, 0, 1), catalog.Standing.AmendedPlan);
        Assert.Equal(catalog.Standing.Overview with { Families = [] }, new OverviewReader(catalog.Catalog).Read(catalog.Campaigns.Get(TestCatalog.Code)) with { Families = [] });

        // Asked for again, it stands as it is asked for.
        string dump = catalog.Dump;
        Assert.Equal(new PlanChange(0, 0, 1), Amend(catalog, after));
        Assert.Equal(dump, catalog.Dump);
    }

    [Fact]
    public void What_decides_over_others_stays_whatever_the_reason()
    {
        using TestCatalog catalog = Sealed();
        string before = catalog.Dump;
        PlannedExperiment e = Plan("E2");
        foreach ((PlannedExperiment after, string field) in new[]
        {
            (e with { Weight = 2 }, "weight"), (e with { Family = "x" }, "family"), (e with { Confirms = "E1" }, "confirms"), (e with { SharedControl = "oven" }, "shared_control"),
        })
        {
            RefusedException refused = Assert.Throws<RefusedException>(() => Amend(catalog, Plan("E1") with { Title = "also changed" }, after));
            Assert.Contains(refused.Details, d => d.StartsWith($"E2: {field} stays empty", StringComparison.Ordinal));
            Assert.Equal(before, catalog.Dump);
        }
    }

    [Fact]
    public void A_test_changes_until_it_was_run_and_groups_until_there_is_data()
    {
        using TestCatalog catalog = Sealed();
        PlannedExperiment other = Plan("E1") with { Groups = ["A", "B", "C"], Control = "C", Test = "welch", FollowUp = "games-howell" };
        Amend(catalog, other);
        Assert.Equal(["A", "B", "C"], catalog.Result("E1").Plan.Groups);
        Amend(catalog, Plan("E1"));
        catalog.Load(Rows("E1"));
        Assert.Contains("the experiment has data", Assert.Single(Assert.Throws<RefusedException>(() => Amend(catalog, Plan("E1") with { Groups = ["A", "B", "C"] })).Details), StringComparison.Ordinal);
        Amend(catalog, Plan("E1") with { Test = "welch" });
        catalog.Test();
        Assert.Equal("welch", catalog.Result("E1").Plan.Test);
        RefusedException late = Assert.Throws<RefusedException>(() => Amend(catalog, Plan("E1") with { Test = "kruskal-wallis", FollowUp = "scheffe", Control = "A" }));
        Assert.Equal(3, late.Details.Count);
        Assert.All(late.Details, d => Assert.Contains("was tested", d, StringComparison.Ordinal));
        AssertSealedPlanIsWhole(catalog);
    }

    [Fact]
    public void An_added_experiment_joins_the_family_and_the_others_are_corrected_over_more()
    {
        using TestCatalog catalog = Sealed();
        catalog.Load(Rows("E1"));
        catalog.Test();
        catalog.Review();
        double p = catalog.Result("E1").P!.Value.Value;
        Assert.Equal(new PlanChange(2, 0, 0), Amend(catalog, Plan("E3"), Plan("E4")));
        Assert.Equal((4, new AmendedPlan(1, 2, 0), 1), (catalog.Standing.FamilySize, catalog.Standing.AmendedPlan, catalog.Standing.DecisionsSinceReview));
        Assert.Equal(4 * p, catalog.Result("E1").AdjustedP!.Value.Value, 4 * p * 1e-15);
        catalog.Load(Rows("E4"));
        Assert.Equal(1, catalog.Test().Tested);
        Assert.Equal((true, 4, 2), (catalog.Review().IsNew, catalog.Standing.LastReview!.FamilySize, catalog.Standing.LastReview.TestedCount));
        Assert.False(catalog.Review().IsNew);

        // Added ones are amended and withdrawn like any other.
        Amend(catalog, Plan("E3") with { Title = "third" });
        new WithdrawalStore(catalog.Catalog).Decide(TestCatalog.Code, ["E3"], withdraw: true, "r", "n");
        Assert.Equal(3, catalog.Standing.FamilySize);
        Assert.Equal(["E1", "E2"], SealedPlan.Read(catalog.Catalog, catalog.Campaigns.Get(TestCatalog.Code).Id).Select(e => e.Code));
        AssertSealedPlanIsWhole(catalog);
    }

    [Fact]
    public void In_a_campaign_of_several_families_an_added_experiment_joins_one_that_was_sealed()
    {
        using var catalog = new TestCatalog();
        catalog.Start("holm");
        catalog.Plan(Plan("E1") with { Family = "one" }, Plan("E2") with { Family = "two" });
        catalog.Campaigns.Seal(TestCatalog.Code);
        foreach (string? family in new[] { null, "three" })
        {
            Assert.Contains("one that was sealed: one, two", Assert.Single(Assert.Throws<RefusedException>(() => Amend(catalog, Plan("E3") with { Family = family })).Details), StringComparison.Ordinal);
        }

        Amend(catalog, Plan("E3") with { Family = "two", Weight = 2 });
        Assert.Equal([1, 2], catalog.Standing.Families.Select(f => f.Size));
        using TestCatalog single = Sealed();
        Assert.Contains("one family without a name", Assert.Single(Assert.Throws<RefusedException>(() => Amend(single, Plan("E3") with { Family = "x" })).Details), StringComparison.Ordinal);
        AssertSealedPlanIsWhole(catalog);
    }

    [Fact]
    public void Fewer_replicates_make_an_experiment_complete_in_the_next_test_and_a_result_is_not_run_again()
    {
        using TestCatalog catalog = Sealed();
        catalog.Load(Rows("E1") + TestCatalog.Rows("E2", "A", "1 2 3") + TestCatalog.Rows("E2", "B", "4 5 6"));
        Assert.Equal(new TestRunSummary(1, 0, 1, true), catalog.Test());
        Amend(catalog, Plan("E2") with { Replicates = 3 }, Plan("E1") with { Replicates = 3 });
        Assert.Equal(ExperimentStatus.Ready, catalog.Result("E2").Status);
        Assert.Equal(new TestRunSummary(1, 0, 0, true), catalog.Test());
        Assert.Equal(new TestRunSummary(0, 0, 0, false), catalog.Test());
        Assert.Equal(2, Raw.Integer(catalog.Catalog.Connection, "SELECT count(*) FROM test_results"));
    }

    [Fact]
    public void A_confirmation_that_was_added_when_the_first_result_was_known_pays_for_the_choice()
    {
        using TestCatalog catalog = Sealed();
        Amend(catalog, Plan("C1") with { Confirms = "E1" });
        Assert.Equal(1, catalog.Result("C1").Confirmation!.FamilySize);
        catalog.Clock.Advance(TimeSpan.FromDays(1));
        catalog.Load(Rows("E1"));
        catalog.Test();
        catalog.Clock.Advance(TimeSpan.FromDays(1));
        Amend(catalog, Plan("C2") with { Confirms = "E1" });

        // Two confirmations, and of the first one's family of four the three that nobody confirms.
        Assert.Equal(5, catalog.Result("C2").Confirmation!.FamilySize);
        Assert.Contains("no experiment 'E7' to confirm", Assert.Throws<RefusedException>(() => Amend(catalog, Plan("C3") with { Confirms = "E7" })).Details[0], StringComparison.Ordinal);
    }

    [Fact]
    public void An_experiment_added_to_a_stream_takes_a_later_position()
    {
        using var catalog = new TestCatalog();
        catalog.Start("lord");
        catalog.Plan(Plan("E1"), Plan("E2"));
        catalog.Campaigns.Seal(TestCatalog.Code);
        catalog.Load(Rows("E1"));
        catalog.Test();
        Amend(catalog, Plan("E3"));
        Assert.Contains("one stream", Assert.Throws<RefusedException>(() => Amend(catalog, Plan("E4") with { Family = "x" })).Message, StringComparison.Ordinal);
        catalog.Load(Rows("E3", "1.0 1.1 1.2 1.5"));
        catalog.Test();
        Assert.Equal((2, 3), (catalog.Result("E3").Entry!.Position, catalog.Standing.FamilySize));
        AssertSealedPlanIsWhole(catalog);
    }

    [Fact]
    public void An_amendment_speaks_for_its_rows_in_the_ledger()
    {
        using TestCatalog catalog = Sealed();
        Amend(catalog, Plan("E1") with { Title = "new" }, Plan("E3") with { Groups = ["X", "Y"] });
        LedgerEntry entry = new LedgerReader(catalog.Catalog).Entries(new LedgerFilter()).Last();
        Assert.Equal((LedgerAction.Amend, "amendment 1: 1 added, 1 changed", "new meter"), (entry.Action, entry.Subject, entry.Reason));
        Assert.Equal(["E1: title: -> new", "E3: experiment: -> added"], entry.Changes.Select(c => $"{c.What}: {c.Before}-> {c.After}"));
        Assert.Equal(["amendment", "plan", "group-sets"], entry.Evidence.Select(e => e.Kind));
    }

    [Fact]
    public void The_catalog_itself_refuses_a_change_that_no_amendment_tells()
    {
        using TestCatalog catalog = Sealed();
        Amend(catalog, Plan("E1") with { Title = "new" });
        foreach (string sql in new[]
        {
            "UPDATE experiments SET replicates = 2 WHERE code = 'E1'", "UPDATE experiments SET replicates = 2, amendment_id = 1 WHERE code = 'E2'", "UPDATE experiments SET replicates = 2, amendment_id = 2 WHERE code = 'E1'",
            "DELETE FROM plan_amendments", "DELETE FROM plan_amendment_changes", "UPDATE plan_amendments SET reason = 'x'", "DELETE FROM experiments WHERE code = 'E2'",
        })
        {
            Assert.ThrowsAny<SqliteException>(() => Raw.Execute(catalog.Catalog.Connection, sql));
        }
    }

    [Fact]
    public void Before_the_seal_a_withdrawn_experiment_can_be_planned_otherwise()
    {
        using var catalog = new TestCatalog();
        catalog.Start();
        catalog.Plan(Plan("E1"), Plan("E2"));
        new WithdrawalStore(catalog.Catalog).Decide(TestCatalog.Code, ["E2"], withdraw: true, "r", "n");
        Assert.Equal(new PlanChange(0, 1, 0), catalog.Plan(Plan("E2") with { Replicates = 9 }));
        catalog.Campaigns.Seal(TestCatalog.Code);
        Assert.Equal((1, 9), (catalog.Standing.FamilySize, catalog.Result("E2").Plan.Replicates));
        AssertSealedPlanIsWhole(catalog);
    }

    [Fact]
    public void Any_number_of_amendments_is_undone_to_the_plan_that_was_sealed()
    {
        var random = new Random(20261201);
        using var catalog = new TestCatalog();
        catalog.Start();
        catalog.Plan([.. Enumerable.Range(1, 20).Select(i => Random(random, FormattableString.Invariant($"E{i}")))]);
        catalog.Campaigns.Seal(TestCatalog.Code);
        for (int round = 0; round < 30; round++)
        {
            string[] codes = [.. Enumerable.Range(1, 30).Where(_ => random.Next(8) == 0).Select(i => FormattableString.Invariant($"E{i}"))];
            Amend(catalog, [.. codes.Select(c => Random(random, c))]);
            AssertSealedPlanIsWhole(catalog);
        }

        Assert.True(catalog.Standing.AmendedPlan.Amendments > 20);
    }

    private static PlannedExperiment Random(Random random, string code) => Plan(code) with
    {
        Title = random.Next(3) == 0 ? "" : FormattableString.Invariant($"t{random.Next(4)}"),
        Response = random.Next(2) == 0 ? "" : "r",
        Groups = random.Next(3) switch { 0 => [], 1 => ["A", "B"], _ => ["A", "B", "C"] },
        Test = random.Next(2) == 0 ? "f" : "welch",
        Replicates = random.Next(3) == 0 ? null : random.Next(2, 9),
        SmallestEffect = random.Next(2) == 0 ? null : random.NextDouble(),
    };

    private static void AssertSealedPlanIsWhole(TestCatalog catalog)
    {
        StoredCampaign stored = catalog.Campaigns.Get(TestCatalog.Code);
        Assert.Equal(stored.Campaign.PlanDigest, SealedPlan.Digest(catalog.Catalog, stored));
    }

    private static PlannedExperiment Plan(string code) => TestCatalog.Experiment(code, 4, "A", "B");

    private static PlanChange Amend(TestCatalog catalog, params PlannedExperiment[] experiments) => new PlanStore(catalog.Catalog).Register(TestCatalog.Code, experiments, "new meter");

    private static string Rows(string code, string a = Apart) => TestCatalog.Rows(code, "A", a) + TestCatalog.Rows(code, "B", Beside);

    private static TestCatalog Sealed()
    {
        var catalog = new TestCatalog();
        catalog.Seal(Plan("E1"), Plan("E2"));
        return catalog;
    }
}
