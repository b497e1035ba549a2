using Microsoft.Data.Sqlite;

namespace Campaigns.Catalog.Tests.Providers;

/// <summary>What the file itself refuses, whoever writes to it. That a sealed plan takes no more experiments is a rule of the program alone (see PlanStoreTests and MeasurementLoaderTests).</summary>
public sealed class DatabaseRulesTests(SealedCatalog catalog) : IClassFixture<SealedCatalog>
{
    private const string NewExperiment = "INSERT INTO experiments (id, campaign_id, code, groups_are_planned, test, follow_up, replicates, smallest_effect, assumed_sd, weight, group_set_id) VALUES ";
    private const string NewLoad = "INSERT INTO loads (id, campaign_id, file_name, sha256, byte_count, row_count, missing_count, experiment_count, loaded_at, amendment_reason) VALUES ";
    private const string NewResult = "INSERT INTO test_results (experiment_id, test_run_id, status, group_count, observation_count, statistic, p, log_p) VALUES ";
    private const string NewExclusion = "INSERT INTO exclusions (id, experiment_id, load_id, line, is_excluded, group_label, value, reason, named_by, made_at, program_version) VALUES ";
    private const string NewReview = "INSERT INTO reviews (id, campaign_id, number, taken_at, correction, level, family_size, tested_count, survivor_count, is_interim, program_version, lines) VALUES ";
    private const string NewCampaign = "INSERT INTO campaigns (id, code, title, purpose, error_rate, level, correction, default_test, default_follow_up, is_exploratory, opened_at, sealed_at, plan_digest) VALUES ";
    private const string NewFamily = "INSERT INTO families (campaign_id, position, name, correction, level, opens_after, opens_when) VALUES ";
    private const string NewReviewFamily = "INSERT INTO review_families (review_id, position, name, correction, level, family_size, planned_count, tested_count, survivor_count, is_open) VALUES ";
    private const string Hash = "'0000000000000000000000000000000000000000000000000000000000000000'";

    [Theory]
    [InlineData("UPDATE loads SET file_name = 'x'", "a load is never changed")]
    [InlineData("DELETE FROM loads", "a load is never deleted")]
    [InlineData("UPDATE measurements SET value_count = 1", "measurements are never changed")]
    [InlineData("DELETE FROM measurements", "measurements are never deleted")]
    [InlineData("UPDATE test_runs SET ran_at = 1", "a test run is never changed")]
    [InlineData("DELETE FROM test_runs", "a test run is never deleted")]
    [InlineData("UPDATE test_results SET p = 0.5", "a test result is never changed")]
    [InlineData("DELETE FROM test_results", "a test result is never deleted")]
    [InlineData("UPDATE exclusions SET is_excluded = 0", "an exclusion is never changed")]
    [InlineData("DELETE FROM exclusions", "an exclusion is never deleted")]
    [InlineData("UPDATE reviews SET survivor_count = 0", "a review is never changed")]
    [InlineData("DELETE FROM reviews", "a review is never deleted")]
    [InlineData("DELETE FROM campaigns WHERE code = 'O'", "a campaign is never deleted")]
    [InlineData("UPDATE campaigns SET level = 0.1 WHERE code = 'C'", "a sealed campaign is never changed")]
    [InlineData("UPDATE campaigns SET sealed_at = NULL, plan_digest = NULL WHERE code = 'C'", "a sealed campaign is never changed")]
    [InlineData("DELETE FROM experiments WHERE code = 'E1'", "an experiment of a sealed plan is never deleted")]
    [InlineData("UPDATE experiments SET group_set_id = 2 WHERE code = 'E1'", "an experiment of a sealed plan is changed by an amendment alone")]
    [InlineData("UPDATE experiments SET title = 'x' WHERE code = 'E2'", "an experiment of a sealed plan is changed by an amendment alone")]
    [InlineData("UPDATE experiments SET test = 'welch' WHERE code = 'E2'", "an experiment of a sealed plan is changed by an amendment alone")]
    [InlineData("UPDATE experiments SET campaign_id = 2 WHERE code = 'E2'", "an experiment of a sealed plan is changed by an amendment alone")]
    [InlineData("UPDATE experiments SET replicates = 2 WHERE code = 'E2'", "an experiment of a sealed plan is changed by an amendment alone")]
    [InlineData("UPDATE experiments SET groups_are_planned = 1 WHERE code = 'E2'", "an experiment of a sealed plan is changed by an amendment alone")]
    [InlineData("UPDATE experiments SET family = 'a' WHERE code = 'E2'", "an experiment of a sealed plan is changed by an amendment alone")]
    [InlineData("UPDATE experiments SET weight = 2 WHERE code = 'E2'", "an experiment of a sealed plan is changed by an amendment alone")]
    [InlineData("UPDATE experiments SET confirms = 'E1' WHERE code = 'E2'", "an experiment of a sealed plan is changed by an amendment alone")]
    [InlineData("UPDATE experiments SET shared_control = 'oven' WHERE code = 'E2'", "an experiment of a sealed plan is changed by an amendment alone")]
    [InlineData("UPDATE families SET level = 0.04 WHERE campaign_id = 1", "a family of a sealed plan is never changed")]
    [InlineData("UPDATE families SET opens_after = 'b' WHERE campaign_id = 1", "a family of a sealed plan is never changed")]
    [InlineData("DELETE FROM families WHERE campaign_id = 1", "a family of a sealed plan is never deleted")]
    [InlineData("UPDATE review_families SET survivor_count = 0", "a review is never changed")]
    [InlineData("DELETE FROM review_families", "a review is never deleted")]
    [InlineData("UPDATE experiments SET title = 'x', amendment_id = 1 WHERE code = 'E2'", "an experiment of a sealed plan is changed by an amendment alone")]
    [InlineData("UPDATE experiments SET first_load_id = 1 WHERE code = 'E2'", "an experiment of a sealed plan is changed by an amendment alone")]
    [InlineData("UPDATE ledger SET reason = 'x'", "the ledger is never changed")]
    [InlineData("DELETE FROM ledger WHERE sequence = 1", "the ledger is never shortened")]
    [InlineData("UPDATE ledger_changes SET after = 'x'", "the ledger is never changed")]
    [InlineData("DELETE FROM ledger_changes", "the ledger is never shortened")]
    [InlineData("UPDATE ledger_evidence SET owner = 9", "the ledger is never changed")]
    [InlineData("DELETE FROM ledger_evidence", "the ledger is never shortened")]
    public void The_record_is_only_added_to(string sql, string message) => Refused(sql, message);

    [Theory]
    [InlineData(NewCampaign + "(9, 'C', '', '', 'familywise', 0.05, 'holm', 'f', 'none', 0, 1, NULL, NULL)", "campaigns.code")]
    [InlineData(NewExperiment + "(90, 2, 'P', 0, 'f', 'none', NULL, NULL, NULL, NULL, NULL)", "experiments.code")]
    [InlineData("INSERT INTO groups VALUES (1, 7, 'A')", "groups.label")]
    [InlineData("INSERT INTO groups VALUES (1, 0, 'Z')", "groups.position")]
    [InlineData("INSERT INTO loads SELECT 99, campaign_id, file_name, sha256, byte_count, row_count, missing_count, experiment_count, loaded_at, amendment_reason FROM loads", "loads.sha256")]
    [InlineData("INSERT INTO measurements SELECT * FROM measurements", "measurements.experiment_id")]
    [InlineData("INSERT INTO test_results SELECT * FROM test_results", "test_results.experiment_id")]
    [InlineData("INSERT INTO reviews SELECT 99, campaign_id, number, taken_at, correction, level, family_size, tested_count, survivor_count, is_interim, last_test_run_id, program_version, lines, last_amendment_id, last_exclusion_id, last_load_id, last_withdrawal_id FROM reviews", "reviews.number")]
    [InlineData(NewFamily + "(2, 2, 'a', NULL, NULL, NULL, 'any')", "families.campaign_id, families.name")]
    [InlineData(NewFamily + "(2, 1, 'b', NULL, NULL, NULL, 'any')", "families.campaign_id, families.position")]
    [InlineData(NewReviewFamily + "(1, 1, 'b', 'bh', 0.03, 2, 2, 1, 1, 1)", "review_families.review_id")]
    public void What_is_unique_stays_so(string sql, string message) => Refused(sql, "UNIQUE constraint failed: " + message[..message.IndexOf('.', StringComparison.Ordinal)], message);

    [Theory]
    [InlineData(NewCampaign + "(9, '', '', '', 'familywise', 0.05, 'holm', 'f', 'none', 0, 1, NULL, NULL)", "ck_campaigns_code")]
    [InlineData(NewCampaign + "(9, 'n', '', '', 'family', 0.05, 'holm', 'f', 'none', 0, 1, NULL, NULL)", "ck_campaigns_error_rate")]
    [InlineData(NewCampaign + "(9, 'n', '', '', 'familywise', 1.0, 'holm', 'f', 'none', 0, 1, NULL, NULL)", "ck_campaigns_level")]
    [InlineData(NewCampaign + "(9, 'n', '', '', 'familywise', 0.05, 'holm', 'f', 'none', 2, 1, NULL, NULL)", "ck_campaigns_exploratory")]
    [InlineData(NewCampaign + "(9, 'n', '', '', 'familywise', 0.05, 'holm', 'f', 'none', 0, 1, 5, NULL)", "ck_campaigns_sealed")]
    [InlineData(NewExperiment + "(90, 2, '', 0, 'f', 'none', NULL, NULL, NULL, NULL, NULL)", "ck_experiments_code")]
    [InlineData(NewExperiment + "(90, 2, 'n', 0, 'f', 'none', 1, NULL, NULL, NULL, NULL)", "ck_experiments_replicates")]
    [InlineData(NewExperiment + "(90, 2, 'n', 0, 'f', 'none', NULL, 0, NULL, NULL, NULL)", "ck_experiments_smallest_effect")]
    [InlineData(NewExperiment + "(90, 2, 'n', 0, 'f', 'none', NULL, NULL, -1, NULL, NULL)", "ck_experiments_assumed_sd")]
    [InlineData(NewExperiment + "(90, 2, 'n', 0, 'f', 'none', NULL, NULL, NULL, -1, NULL)", "ck_experiments_weight")]
    [InlineData(NewExperiment + "(90, 2, 'n', 1, 'f', 'none', NULL, NULL, NULL, NULL, NULL)", "ck_experiments_groups_are_planned")]
    [InlineData("INSERT INTO groups VALUES (1, 65536, 'Z')", "ck_groups_position")]
    [InlineData("INSERT INTO groups VALUES (1, 9, '')", "ck_groups_label")]
    [InlineData(NewLoad + "(99, 1, 'f', 'short', 1, 1, 0, 1, 1, NULL)", "ck_loads_sha256")]
    [InlineData(NewLoad + "(99, 1, 'f', " + Hash + ", 1, 0, 0, 1, 1, NULL)", "ck_loads_counts")]
    [InlineData(NewLoad + "(99, 1, 'f', " + Hash + ", 1, 1, 2, 1, 1, NULL)", "ck_loads_counts")]
    [InlineData(NewLoad + "(99, 1, 'f', " + Hash + ", 1, 1, 0, 1, 1, '')", "ck_loads_reason")]
    [InlineData("INSERT INTO measurements VALUES (50, 1, 0, 0, x'01', NULL)", "ck_measurements_counts")]
    [InlineData("INSERT INTO test_runs VALUES (99, 1, 1, 1, 2, 'v', NULL, NULL, NULL)", "ck_test_runs_includes_incomplete")]
    [InlineData(NewResult + "(50, 1, 'tested', 2, 6, NULL, NULL, NULL)", "ck_test_results_status")]
    [InlineData(NewResult + "(50, 1, 'no-replication', 2, 6, 1.0, 0.5, NULL)", "ck_test_results_status")]
    [InlineData(NewResult + "(50, 1, 'tested', 2, 6, 1.0, 1.5, NULL)", "ck_test_results_p")]
    [InlineData(NewResult + "(50, 1, 'tested', 2, 6, 1.0, 0.0, NULL)", "ck_test_results_p")]
    [InlineData(NewResult + "(50, 1, 'tested', 2, 6, 1.0, 0.5, 0.1)", "ck_test_results_log_p")]
    [InlineData(NewExclusion + "(99, 50, 1, 0, 1, 'A', '1', 'why', 'who', 1, 'v')", "ck_exclusions_line")]
    [InlineData(NewExclusion + "(99, 50, 1, 2, 2, 'A', '1', 'why', 'who', 1, 'v')", "ck_exclusions_is_excluded")]
    [InlineData(NewExclusion + "(99, 50, 1, 2, 1, 'A', '1', '', 'who', 1, 'v')", "ck_exclusions_words")]
    [InlineData(NewExclusion + "(99, 50, 1, 2, 1, 'A', '1', 'why', '', 1, 'v')", "ck_exclusions_words")]
    [InlineData(NewReview + "(99, 1, 0, 1, 'bh', 0.05, 2, 1, 1, 0, 'v', x'')", "ck_reviews_number")]
    [InlineData(NewReview + "(99, 1, 9, 1, 'bh', 0.0, 2, 1, 1, 0, 'v', x'')", "ck_reviews_level")]
    [InlineData(NewReview + "(99, 1, 9, 1, 'bh', 0.05, 2, 3, 1, 0, 'v', x'')", "ck_reviews_counts")]
    [InlineData(NewReview + "(99, 1, 9, 1, 'bh', 0.05, 2, 1, 2, 0, 'v', x'')", "ck_reviews_counts")]
    [InlineData(NewReview + "(99, 1, 9, 1, 'bh', 0.05, 2, 1, 1, 3, 'v', x'')", "ck_reviews_interim")]
    [InlineData(NewFamily + "(2, 0, 'b', NULL, NULL, NULL, 'any')", "ck_families_position")]
    [InlineData(NewFamily + "(2, 2, '', NULL, NULL, NULL, 'any')", "ck_families_name")]
    [InlineData(NewFamily + "(2, 2, 'b', NULL, 0.0, NULL, 'any')", "ck_families_level")]
    [InlineData(NewFamily + "(2, 2, 'b', NULL, 1.0, NULL, 'any')", "ck_families_level")]
    [InlineData(NewFamily + "(2, 2, 'b', NULL, NULL, 'b', 'any')", "ck_families_opens")]
    [InlineData(NewFamily + "(2, 2, 'b', NULL, NULL, 'a', 'some')", "ck_families_opens")]
    [InlineData(NewReviewFamily + "(1, 2, 'b', 'bh', 1.0, 2, 2, 1, 1, 1)", "ck_review_families_level")]
    [InlineData(NewReviewFamily + "(1, 2, 'b', 'bh', 0.03, 1, 2, 2, 1, 1)", "ck_review_families_counts")]
    [InlineData(NewReviewFamily + "(1, 2, 'b', 'bh', 0.03, 3, 2, 1, 1, 1)", "ck_review_families_counts")]
    [InlineData(NewReviewFamily + "(1, 2, 'b', 'bh', 0.03, 2, 2, 1, 2, 1)", "ck_review_families_counts")]
    [InlineData(NewReviewFamily + "(1, 2, 'b', 'bh', 0.03, 2, 2, 1, 1, 0)", "ck_review_families_open")]
    [InlineData(NewReviewFamily + "(1, 2, 'b', 'bh', 0.03, 2, 2, 1, 1, 2)", "ck_review_families_open")]
    public void Values_out_of_range_are_refused(string sql, string check) => Refused(sql, "CHECK constraint failed: " + check);

    [Theory]
    [InlineData("INSERT INTO group_sets VALUES (99, 77)")]
    [InlineData("INSERT INTO groups VALUES (77, 0, 'A')")]
    [InlineData(NewExperiment + "(90, 77, 'n', 0, 'f', 'none', NULL, NULL, NULL, NULL, NULL)")]
    [InlineData(NewExperiment + "(90, 2, 'n', 0, 'f', 'none', NULL, NULL, NULL, NULL, 77)")]
    [InlineData(NewLoad + "(99, 77, 'f', " + Hash + ", 1, 1, 0, 1, 1, NULL)")]
    [InlineData("INSERT INTO measurements VALUES (50, 77, 1, 0, x'01', NULL)")]
    [InlineData("INSERT INTO measurements VALUES (77, 1, 1, 0, x'01', NULL)")]
    [InlineData("INSERT INTO test_runs VALUES (99, 77, 1, 1, 0, 'v', NULL, NULL, NULL)")]
    [InlineData("INSERT INTO test_runs VALUES (99, 1, 77, 1, 0, 'v', NULL, NULL, NULL)")]
    [InlineData(NewResult + "(77, 1, 'tested', 2, 6, 1.0, 0.5, NULL)")]
    [InlineData(NewResult + "(50, 77, 'tested', 2, 6, 1.0, 0.5, NULL)")]
    [InlineData(NewExclusion + "(99, 77, 1, 2, 1, 'A', '1', 'why', 'who', 1, 'v')")]
    [InlineData(NewExclusion + "(99, 50, 77, 2, 1, 'A', '1', 'why', 'who', 1, 'v')")]
    [InlineData(NewReview + "(99, 77, 9, 1, 'bh', 0.05, 2, 1, 1, 0, 'v', x'')")]
    [InlineData("DELETE FROM group_sets WHERE id = 1")]
    [InlineData("UPDATE group_sets SET id = 99 WHERE id = 1")]
    [InlineData(NewFamily + "(77, 1, 'b', NULL, NULL, NULL, 'any')")]
    [InlineData(NewReviewFamily + "(77, 1, 'b', 'bh', 0.03, 2, 2, 1, 1, 1)")]
    public void Keys_point_to_rows_that_exist(string sql) => Refused(sql, "FOREIGN KEY constraint failed");

    [Theory]
    [InlineData("INSERT INTO measurements VALUES (50, 1, 1, 0, 'text', NULL)")]
    [InlineData("INSERT INTO measurements VALUES (50, 1, 'many', 0, x'01', NULL)")]
    [InlineData(NewResult + "(50, 1, 'tested', 2, 6, 'large', 0.5, NULL)")]
    public void The_large_tables_take_no_value_of_another_type(string sql) => Refused(sql, "cannot store");

    [Theory]
    [InlineData("UPDATE experiments SET title = 'x' WHERE code = 'P'")]
    [InlineData("DELETE FROM experiments WHERE code = 'P'")]
    [InlineData("UPDATE campaigns SET title = 'x' WHERE code = 'O'")]
    [InlineData("UPDATE experiments SET group_set_id = 1 WHERE code = 'E2'")]
    [InlineData(NewExperiment + "(90, 3, 'new', 0, 'f', 'none', NULL, NULL, NULL, NULL, NULL)")]
    [InlineData("UPDATE families SET level = 0.04 WHERE campaign_id = 2")]
    [InlineData("DELETE FROM families WHERE campaign_id = 2")]
    public void What_is_open_can_be_changed(string sql)
    {
        using SqliteTransaction transaction = catalog.Connection.BeginTransaction();
        using SqliteCommand command = Raw.Command(catalog.Connection, sql);
        command.Transaction = transaction;
        Assert.Equal(1, command.ExecuteNonQuery());
        transaction.Rollback();
    }

    private void Refused(string sql, params string[] messages)
    {
        string before = Raw.Dump(catalog.Connection);
        SqliteException refused = Assert.Throws<SqliteException>(() => Raw.Execute(catalog.Connection, sql));
        Assert.All(messages, message => Assert.Contains(message, refused.Message, StringComparison.Ordinal));
        Assert.Equal(before, Raw.Dump(catalog.Connection));
    }
}
