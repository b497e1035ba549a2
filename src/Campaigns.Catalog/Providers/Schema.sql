CREATE TABLE IF NOT EXISTS "__EFMigrationsHistory" (
    "MigrationId" TEXT NOT NULL CONSTRAINT "PK___EFMigrationsHistory" PRIMARY KEY,
    "ProductVersion" TEXT NOT NULL
);

BEGIN TRANSACTION;
CREATE TABLE "campaigns" (
    "id" INTEGER NOT NULL CONSTRAINT "PK_campaigns" PRIMARY KEY,
    "code" TEXT NOT NULL,
    "title" TEXT NOT NULL,
    "purpose" TEXT NOT NULL,
    "error_rate" TEXT NOT NULL,
    "level" REAL NOT NULL,
    "correction" TEXT NOT NULL,
    "default_test" TEXT NOT NULL,
    "default_follow_up" TEXT NOT NULL,
    "is_exploratory" INTEGER NOT NULL,
    "opened_at" INTEGER NOT NULL,
    "sealed_at" INTEGER NULL,
    "plan_digest" TEXT NULL,
    CONSTRAINT "ck_campaigns_code" CHECK (length(code) > 0),
    CONSTRAINT "ck_campaigns_error_rate" CHECK (error_rate in ('familywise', 'false-discovery')),
    CONSTRAINT "ck_campaigns_exploratory" CHECK (is_exploratory in (0, 1)),
    CONSTRAINT "ck_campaigns_level" CHECK (level > 0 and level < 1),
    CONSTRAINT "ck_campaigns_sealed" CHECK ((sealed_at is null) = (plan_digest is null))
);

CREATE TABLE "group_sets" (
    "id" INTEGER NOT NULL CONSTRAINT "PK_group_sets" PRIMARY KEY,
    "campaign_id" INTEGER NOT NULL,
    CONSTRAINT "FK_group_sets_campaigns_campaign_id" FOREIGN KEY ("campaign_id") REFERENCES "campaigns" ("id") ON DELETE RESTRICT
);

CREATE TABLE "loads" (
    "id" INTEGER NOT NULL CONSTRAINT "PK_loads" PRIMARY KEY,
    "campaign_id" INTEGER NOT NULL,
    "file_name" TEXT NOT NULL,
    "sha256" TEXT NOT NULL,
    "byte_count" INTEGER NOT NULL,
    "row_count" INTEGER NOT NULL,
    "missing_count" INTEGER NOT NULL,
    "experiment_count" INTEGER NOT NULL,
    "loaded_at" INTEGER NOT NULL,
    "amendment_reason" TEXT NULL,
    CONSTRAINT "ck_loads_counts" CHECK (byte_count >= 0 and row_count > 0 and missing_count between 0 and row_count and experiment_count > 0),
    CONSTRAINT "ck_loads_reason" CHECK (amendment_reason is null or length(amendment_reason) > 0),
    CONSTRAINT "ck_loads_sha256" CHECK (length(sha256) = 64),
    CONSTRAINT "FK_loads_campaigns_campaign_id" FOREIGN KEY ("campaign_id") REFERENCES "campaigns" ("id") ON DELETE RESTRICT
);

CREATE TABLE "experiments" (
    "id" INTEGER NOT NULL CONSTRAINT "PK_experiments" PRIMARY KEY,
    "campaign_id" INTEGER NOT NULL,
    "code" TEXT NOT NULL,
    "title" TEXT NULL,
    "response" TEXT NULL,
    "unit" TEXT NULL,
    "group_set_id" INTEGER NULL,
    "groups_are_planned" INTEGER NOT NULL,
    "control" TEXT NULL,
    "test" TEXT NOT NULL,
    "follow_up" TEXT NOT NULL,
    "replicates" INTEGER NULL,
    "smallest_effect" REAL NULL,
    "assumed_sd" REAL NULL,
    "weight" REAL NULL,
    "family" TEXT NULL,
    CONSTRAINT "ck_experiments_assumed_sd" CHECK (assumed_sd is null or assumed_sd > 0),
    CONSTRAINT "ck_experiments_code" CHECK (length(code) > 0),
    CONSTRAINT "ck_experiments_groups_are_planned" CHECK (groups_are_planned in (0, 1) and (groups_are_planned = 0 or group_set_id is not null)),
    CONSTRAINT "ck_experiments_replicates" CHECK (replicates is null or replicates >= 2),
    CONSTRAINT "ck_experiments_smallest_effect" CHECK (smallest_effect is null or smallest_effect > 0),
    CONSTRAINT "ck_experiments_weight" CHECK (weight is null or weight >= 0),
    CONSTRAINT "FK_experiments_campaigns_campaign_id" FOREIGN KEY ("campaign_id") REFERENCES "campaigns" ("id") ON DELETE RESTRICT,
    CONSTRAINT "FK_experiments_group_sets_group_set_id" FOREIGN KEY ("group_set_id") REFERENCES "group_sets" ("id") ON DELETE RESTRICT
);

CREATE TABLE "groups" (
    "group_set_id" INTEGER NOT NULL,
    "position" INTEGER NOT NULL,
    "label" TEXT NOT NULL,
    CONSTRAINT "PK_groups" PRIMARY KEY ("group_set_id", "position"),
    CONSTRAINT "ck_groups_label" CHECK (length(label) > 0),
    CONSTRAINT "ck_groups_position" CHECK (position >= 0 and position < 65536),
    CONSTRAINT "FK_groups_group_sets_group_set_id" FOREIGN KEY ("group_set_id") REFERENCES "group_sets" ("id") ON DELETE RESTRICT
);

CREATE TABLE "test_runs" (
    "id" INTEGER NOT NULL CONSTRAINT "PK_test_runs" PRIMARY KEY,
    "campaign_id" INTEGER NOT NULL,
    "last_load_id" INTEGER NULL,
    "ran_at" INTEGER NOT NULL,
    "includes_incomplete" INTEGER NOT NULL,
    "program_version" TEXT NOT NULL,
    CONSTRAINT "ck_test_runs_includes_incomplete" CHECK (includes_incomplete in (0, 1)),
    CONSTRAINT "FK_test_runs_campaigns_campaign_id" FOREIGN KEY ("campaign_id") REFERENCES "campaigns" ("id") ON DELETE RESTRICT,
    CONSTRAINT "FK_test_runs_loads_last_load_id" FOREIGN KEY ("last_load_id") REFERENCES "loads" ("id") ON DELETE RESTRICT
);

CREATE TABLE measurements (
    experiment_id INTEGER NOT NULL,
    load_id INTEGER NOT NULL,
    value_count INTEGER NOT NULL,
    missing_count INTEGER NOT NULL,
    packed BLOB NOT NULL,
    CONSTRAINT "PK_measurements" PRIMARY KEY (experiment_id, load_id),
    CONSTRAINT ck_measurements_counts CHECK (value_count >= 0 and missing_count >= 0 and value_count + missing_count > 0),
    CONSTRAINT "FK_measurements_experiments_experiment_id" FOREIGN KEY (experiment_id) REFERENCES experiments (id) ON DELETE RESTRICT,
    CONSTRAINT "FK_measurements_loads_load_id" FOREIGN KEY (load_id) REFERENCES loads (id) ON DELETE RESTRICT
) STRICT, WITHOUT ROWID;

CREATE TABLE "reviews" (
    "id" INTEGER NOT NULL CONSTRAINT "PK_reviews" PRIMARY KEY,
    "campaign_id" INTEGER NOT NULL,
    "number" INTEGER NOT NULL,
    "taken_at" INTEGER NOT NULL,
    "correction" TEXT NOT NULL,
    "level" REAL NOT NULL,
    "family_size" INTEGER NOT NULL,
    "tested_count" INTEGER NOT NULL,
    "survivor_count" INTEGER NOT NULL,
    "is_interim" INTEGER NOT NULL,
    "last_test_run_id" INTEGER NULL,
    "program_version" TEXT NOT NULL,
    "lines" BLOB NOT NULL,
    CONSTRAINT "ck_reviews_counts" CHECK (tested_count between 0 and family_size and survivor_count between 0 and tested_count),
    CONSTRAINT "ck_reviews_interim" CHECK (is_interim in (0, 1)),
    CONSTRAINT "ck_reviews_level" CHECK (level > 0 and level < 1),
    CONSTRAINT "ck_reviews_number" CHECK (number > 0),
    CONSTRAINT "FK_reviews_campaigns_campaign_id" FOREIGN KEY ("campaign_id") REFERENCES "campaigns" ("id") ON DELETE RESTRICT,
    CONSTRAINT "FK_reviews_test_runs_last_test_run_id" FOREIGN KEY ("last_test_run_id") REFERENCES "test_runs" ("id") ON DELETE RESTRICT
);

CREATE TABLE test_results (
    experiment_id INTEGER NOT NULL,
    test_run_id INTEGER NOT NULL,
    status TEXT NOT NULL,
    group_count INTEGER NOT NULL,
    observation_count INTEGER NOT NULL,
    statistic REAL NULL,
    df1 REAL NULL,
    df2 REAL NULL,
    p REAL NULL,
    log_p REAL NULL,
    eta_squared REAL NULL,
    omega_squared REAL NULL,
    CONSTRAINT "PK_test_results" PRIMARY KEY (experiment_id, test_run_id),
    CONSTRAINT ck_test_results_status CHECK ((status = 'tested') = (p is not null) and (p is null) = (statistic is null)),
    CONSTRAINT ck_test_results_p CHECK (p is null or (p >= 0 and p <= 1 and (p > 0 or log_p is not null))),
    CONSTRAINT ck_test_results_log_p CHECK (log_p is null or (p is not null and log_p <= 0)),
    CONSTRAINT "FK_test_results_experiments_experiment_id" FOREIGN KEY (experiment_id) REFERENCES experiments (id) ON DELETE RESTRICT,
    CONSTRAINT "FK_test_results_test_runs_test_run_id" FOREIGN KEY (test_run_id) REFERENCES test_runs (id) ON DELETE RESTRICT
) STRICT, WITHOUT ROWID;

CREATE UNIQUE INDEX "ux_campaigns_code" ON "campaigns" ("code");

CREATE INDEX "ix_experiments_campaign" ON "experiments" ("campaign_id");

CREATE UNIQUE INDEX "ux_experiments_code" ON "experiments" ("campaign_id", "code");

CREATE INDEX "ix_group_sets_campaign" ON "group_sets" ("campaign_id");

CREATE UNIQUE INDEX "ux_groups_label" ON "groups" ("group_set_id", "label");

CREATE UNIQUE INDEX "ux_loads_sha256" ON "loads" ("campaign_id", "sha256");

CREATE INDEX "ix_measurements_load" ON "measurements" ("load_id");

CREATE UNIQUE INDEX "ux_reviews_number" ON "reviews" ("campaign_id", "number");

CREATE INDEX "ix_test_results_run" ON "test_results" ("test_run_id");

CREATE TRIGGER loads_are_kept BEFORE UPDATE ON loads BEGIN SELECT RAISE(ABORT, 'a load is never changed'); END;
CREATE TRIGGER loads_stay BEFORE DELETE ON loads BEGIN SELECT RAISE(ABORT, 'a load is never deleted'); END;
CREATE TRIGGER measurements_are_kept BEFORE UPDATE ON measurements BEGIN SELECT RAISE(ABORT, 'measurements are never changed'); END;
CREATE TRIGGER measurements_stay BEFORE DELETE ON measurements BEGIN SELECT RAISE(ABORT, 'measurements are never deleted'); END;
CREATE TRIGGER test_runs_are_kept BEFORE UPDATE ON test_runs BEGIN SELECT RAISE(ABORT, 'a test run is never changed'); END;
CREATE TRIGGER test_runs_stay BEFORE DELETE ON test_runs BEGIN SELECT RAISE(ABORT, 'a test run is never deleted'); END;
CREATE TRIGGER test_results_are_kept BEFORE UPDATE ON test_results BEGIN SELECT RAISE(ABORT, 'a test result is never changed'); END;
CREATE TRIGGER test_results_stay BEFORE DELETE ON test_results BEGIN SELECT RAISE(ABORT, 'a test result is never deleted'); END;
CREATE TRIGGER reviews_are_kept BEFORE UPDATE ON reviews BEGIN SELECT RAISE(ABORT, 'a review is never changed'); END;
CREATE TRIGGER reviews_stay BEFORE DELETE ON reviews BEGIN SELECT RAISE(ABORT, 'a review is never deleted'); END;
CREATE TRIGGER campaigns_stay BEFORE DELETE ON campaigns BEGIN SELECT RAISE(ABORT, 'a campaign is never deleted'); END;
CREATE TRIGGER campaigns_stay_sealed BEFORE UPDATE ON campaigns WHEN old.sealed_at IS NOT NULL
BEGIN SELECT RAISE(ABORT, 'a sealed campaign is never changed'); END;
CREATE TRIGGER experiments_stay_sealed BEFORE DELETE ON experiments
WHEN EXISTS (SELECT 1 FROM campaigns WHERE id = old.campaign_id AND sealed_at IS NOT NULL)
BEGIN SELECT RAISE(ABORT, 'an experiment of a sealed plan is never deleted'); END;
CREATE TRIGGER experiments_are_kept BEFORE UPDATE ON experiments
WHEN EXISTS (SELECT 1 FROM campaigns WHERE id = old.campaign_id AND sealed_at IS NOT NULL)
    AND (old.groups_are_planned = 1 OR new.id IS NOT old.id OR new.campaign_id IS NOT old.campaign_id OR new.code IS NOT old.code
        OR new.title IS NOT old.title OR new.response IS NOT old.response OR new.unit IS NOT old.unit
        OR new.groups_are_planned IS NOT old.groups_are_planned OR new.control IS NOT old.control OR new.test IS NOT old.test
        OR new.follow_up IS NOT old.follow_up OR new.replicates IS NOT old.replicates OR new.smallest_effect IS NOT old.smallest_effect
        OR new.assumed_sd IS NOT old.assumed_sd OR new.weight IS NOT old.weight OR new.family IS NOT old.family)
BEGIN SELECT RAISE(ABORT, 'an experiment of a sealed plan is never changed; only groups that come with the data may be added'); END;

INSERT INTO "__EFMigrationsHistory" ("MigrationId", "ProductVersion")
VALUES ('20261201000000_First', '10.0.15');

COMMIT;

BEGIN TRANSACTION;
ALTER TABLE "test_runs" ADD "last_exclusion_id" INTEGER NULL;

ALTER TABLE "test_results" ADD "arrangements" INTEGER NULL;

ALTER TABLE "test_results" ADD "as_extreme" INTEGER NULL;

ALTER TABLE "test_results" ADD "seed" INTEGER NULL;

ALTER TABLE "test_results" ADD "specimen_count" INTEGER NULL;

CREATE TABLE "exclusions" (
    "id" INTEGER NOT NULL CONSTRAINT "PK_exclusions" PRIMARY KEY,
    "experiment_id" INTEGER NOT NULL,
    "load_id" INTEGER NOT NULL,
    "line" INTEGER NOT NULL,
    "is_excluded" INTEGER NOT NULL,
    "group_label" TEXT NOT NULL,
    "value" TEXT NOT NULL,
    "reason" TEXT NOT NULL,
    "named_by" TEXT NOT NULL,
    "made_at" INTEGER NOT NULL,
    "program_version" TEXT NOT NULL,
    CONSTRAINT "ck_exclusions_is_excluded" CHECK (is_excluded in (0, 1)),
    CONSTRAINT "ck_exclusions_line" CHECK (line > 0),
    CONSTRAINT "ck_exclusions_words" CHECK (length(reason) > 0 and length(named_by) > 0),
    CONSTRAINT "FK_exclusions_measurements_experiment_id_load_id" FOREIGN KEY ("experiment_id", "load_id") REFERENCES "measurements" ("experiment_id", "load_id") ON DELETE RESTRICT
);

CREATE INDEX "ix_exclusions_measurement" ON "exclusions" ("experiment_id", "load_id");

CREATE TRIGGER exclusions_are_kept BEFORE UPDATE ON exclusions BEGIN SELECT RAISE(ABORT, 'an exclusion is never changed; another one takes it back'); END;
CREATE TRIGGER exclusions_stay BEFORE DELETE ON exclusions BEGIN SELECT RAISE(ABORT, 'an exclusion is never deleted; another one takes it back'); END;

INSERT INTO "__EFMigrationsHistory" ("MigrationId", "ProductVersion")
VALUES ('20261201000001_Exclusions', '10.0.15');

COMMIT;

BEGIN TRANSACTION;
ALTER TABLE "experiments" ADD "confirms" TEXT NULL;

ALTER TABLE "experiments" ADD "shared_control" TEXT NULL;

CREATE TABLE "families" (
    "campaign_id" INTEGER NOT NULL,
    "position" INTEGER NOT NULL,
    "name" TEXT NOT NULL,
    "correction" TEXT NULL,
    "level" REAL NULL,
    "opens_after" TEXT NULL,
    "opens_when" TEXT NOT NULL,
    CONSTRAINT "PK_families" PRIMARY KEY ("campaign_id", "position"),
    CONSTRAINT "ck_families_level" CHECK (level is null or (level > 0 and level < 1)),
    CONSTRAINT "ck_families_name" CHECK (length(name) > 0),
    CONSTRAINT "ck_families_opens" CHECK (opens_when in ('any', 'all') and opens_after is not name),
    CONSTRAINT "ck_families_position" CHECK (position > 0),
    CONSTRAINT "FK_families_campaigns_campaign_id" FOREIGN KEY ("campaign_id") REFERENCES "campaigns" ("id") ON DELETE RESTRICT
);

CREATE TABLE "online_settings" (
    "campaign_id" INTEGER NOT NULL CONSTRAINT "PK_online_settings" PRIMARY KEY,
    "horizon" INTEGER NULL,
    "shape" TEXT NULL,
    "initial_wealth" REAL NULL,
    "lambda" REAL NULL,
    "tau" REAL NULL,
    CONSTRAINT "ck_online_settings_horizon" CHECK (horizon is null or horizon >= 0),
    CONSTRAINT "FK_online_settings_campaigns_campaign_id" FOREIGN KEY ("campaign_id") REFERENCES "campaigns" ("id") ON DELETE RESTRICT
);

CREATE TABLE "review_families" (
    "review_id" INTEGER NOT NULL,
    "position" INTEGER NOT NULL,
    "name" TEXT NOT NULL,
    "correction" TEXT NOT NULL,
    "level" REAL NOT NULL,
    "family_size" INTEGER NOT NULL,
    "planned_count" INTEGER NOT NULL,
    "tested_count" INTEGER NOT NULL,
    "survivor_count" INTEGER NOT NULL,
    "is_open" INTEGER NOT NULL,
    CONSTRAINT "PK_review_families" PRIMARY KEY ("review_id", "position"),
    CONSTRAINT "ck_review_families_counts" CHECK (tested_count between 0 and family_size and family_size <= planned_count and survivor_count between 0 and tested_count),
    CONSTRAINT "ck_review_families_level" CHECK (level > 0 and level < 1),
    CONSTRAINT "ck_review_families_open" CHECK (is_open in (0, 1) and (is_open = 1 or survivor_count = 0)),
    CONSTRAINT "FK_review_families_reviews_review_id" FOREIGN KEY ("review_id") REFERENCES "reviews" ("id") ON DELETE RESTRICT
);

CREATE TABLE "streams" (
    "id" INTEGER NOT NULL CONSTRAINT "PK_streams" PRIMARY KEY,
    "campaign_id" INTEGER NOT NULL,
    "number" INTEGER NOT NULL,
    "procedure" TEXT NOT NULL,
    "level" REAL NOT NULL,
    "horizon" INTEGER NULL,
    "shape" TEXT NOT NULL,
    "initial_wealth" REAL NULL,
    "lambda" REAL NULL,
    "tau" REAL NULL,
    "reason" TEXT NULL,
    "started_at" INTEGER NOT NULL,
    "program_version" TEXT NOT NULL,
    CONSTRAINT "ck_streams_horizon" CHECK (horizon is null or horizon > 0),
    CONSTRAINT "ck_streams_level" CHECK (level > 0 and level < 1),
    CONSTRAINT "ck_streams_number" CHECK (number > 0),
    CONSTRAINT "ck_streams_reason" CHECK ((reason is null) = (number = 1) and (reason is null or length(reason) > 0)),
    CONSTRAINT "FK_streams_campaigns_campaign_id" FOREIGN KEY ("campaign_id") REFERENCES "campaigns" ("id") ON DELETE RESTRICT
);

CREATE TABLE "stream_entries" (
    "stream_id" INTEGER NOT NULL,
    "position" INTEGER NOT NULL,
    "experiment_id" INTEGER NOT NULL,
    "level" REAL NOT NULL,
    "known_count" INTEGER NOT NULL,
    "registered_at" INTEGER NOT NULL,
    CONSTRAINT "PK_stream_entries" PRIMARY KEY ("stream_id", "position"),
    CONSTRAINT "ck_stream_entries_level" CHECK (level >= 0 and level < 1),
    CONSTRAINT "ck_stream_entries_position" CHECK (position > 0 and known_count between 0 and position - 1),
    CONSTRAINT "FK_stream_entries_experiments_experiment_id" FOREIGN KEY ("experiment_id") REFERENCES "experiments" ("id") ON DELETE RESTRICT,
    CONSTRAINT "FK_stream_entries_streams_stream_id" FOREIGN KEY ("stream_id") REFERENCES "streams" ("id") ON DELETE RESTRICT
);

CREATE TABLE "standing_decisions" (
    "stream_id" INTEGER NOT NULL,
    "position" INTEGER NOT NULL,
    "known_order" INTEGER NOT NULL,
    "test_run_id" INTEGER NOT NULL,
    "p" REAL NULL,
    "log_p" REAL NULL,
    "survives" INTEGER NOT NULL,
    "decided_at" INTEGER NOT NULL,
    CONSTRAINT "PK_standing_decisions" PRIMARY KEY ("stream_id", "position"),
    CONSTRAINT "ck_standing_decisions_order" CHECK (known_order > 0),
    CONSTRAINT "ck_standing_decisions_p" CHECK ((p is null or (p >= 0 and p <= 1 and (p > 0 or log_p is not null))) and (log_p is null or (p is not null and log_p <= 0))),
    CONSTRAINT "ck_standing_decisions_survives" CHECK (survives in (0, 1) and (survives = 0 or p is not null)),
    CONSTRAINT "FK_standing_decisions_stream_entries_stream_id_position" FOREIGN KEY ("stream_id", "position") REFERENCES "stream_entries" ("stream_id", "position") ON DELETE RESTRICT,
    CONSTRAINT "FK_standing_decisions_test_runs_test_run_id" FOREIGN KEY ("test_run_id") REFERENCES "test_runs" ("id") ON DELETE RESTRICT
);

CREATE INDEX "ix_experiments_confirms" ON "experiments" ("confirms") WHERE confirms is not null;

CREATE UNIQUE INDEX "ux_families_name" ON "families" ("campaign_id", "name");

CREATE UNIQUE INDEX "ux_standing_decisions_order" ON "standing_decisions" ("stream_id", "known_order");

CREATE UNIQUE INDEX "ux_stream_entries_experiment" ON "stream_entries" ("experiment_id");

CREATE UNIQUE INDEX "ux_streams_number" ON "streams" ("campaign_id", "number");

DROP TRIGGER experiments_are_kept;
CREATE TRIGGER experiments_are_kept BEFORE UPDATE ON experiments
WHEN EXISTS (SELECT 1 FROM campaigns WHERE id = old.campaign_id AND sealed_at IS NOT NULL)
    AND (old.groups_are_planned = 1 OR new.id IS NOT old.id OR new.campaign_id IS NOT old.campaign_id OR new.code IS NOT old.code
        OR new.title IS NOT old.title OR new.response IS NOT old.response OR new.unit IS NOT old.unit
        OR new.groups_are_planned IS NOT old.groups_are_planned OR new.control IS NOT old.control OR new.test IS NOT old.test
        OR new.follow_up IS NOT old.follow_up OR new.replicates IS NOT old.replicates OR new.smallest_effect IS NOT old.smallest_effect
        OR new.assumed_sd IS NOT old.assumed_sd OR new.weight IS NOT old.weight OR new.family IS NOT old.family
        OR new.confirms IS NOT old.confirms OR new.shared_control IS NOT old.shared_control)
BEGIN SELECT RAISE(ABORT, 'an experiment of a sealed plan is never changed; only groups that come with the data may be added'); END;
CREATE TRIGGER families_are_kept BEFORE UPDATE ON families
WHEN EXISTS (SELECT 1 FROM campaigns WHERE id = old.campaign_id AND sealed_at IS NOT NULL)
BEGIN SELECT RAISE(ABORT, 'a family of a sealed plan is never changed'); END;
CREATE TRIGGER families_stay BEFORE DELETE ON families
WHEN EXISTS (SELECT 1 FROM campaigns WHERE id = old.campaign_id AND sealed_at IS NOT NULL)
BEGIN SELECT RAISE(ABORT, 'a family of a sealed plan is never deleted'); END;
CREATE TRIGGER online_settings_are_kept BEFORE UPDATE ON online_settings
WHEN EXISTS (SELECT 1 FROM campaigns WHERE id = old.campaign_id AND sealed_at IS NOT NULL)
BEGIN SELECT RAISE(ABORT, 'the settings of a sealed plan are never changed; a new stream takes others'); END;
CREATE TRIGGER online_settings_stay BEFORE DELETE ON online_settings
WHEN EXISTS (SELECT 1 FROM campaigns WHERE id = old.campaign_id AND sealed_at IS NOT NULL)
BEGIN SELECT RAISE(ABORT, 'the settings of a sealed plan are never deleted'); END;
CREATE TRIGGER review_families_are_kept BEFORE UPDATE ON review_families BEGIN SELECT RAISE(ABORT, 'a review is never changed'); END;
CREATE TRIGGER review_families_stay BEFORE DELETE ON review_families BEGIN SELECT RAISE(ABORT, 'a review is never deleted'); END;
CREATE TRIGGER streams_are_kept BEFORE UPDATE ON streams BEGIN SELECT RAISE(ABORT, 'a stream is never changed; a new one takes other settings'); END;
CREATE TRIGGER streams_stay BEFORE DELETE ON streams BEGIN SELECT RAISE(ABORT, 'a stream is never deleted'); END;
CREATE TRIGGER stream_entries_are_kept BEFORE UPDATE ON stream_entries BEGIN SELECT RAISE(ABORT, 'a level once given is never changed'); END;
CREATE TRIGGER stream_entries_stay BEFORE DELETE ON stream_entries BEGIN SELECT RAISE(ABORT, 'a level once given is never taken back'); END;
CREATE TRIGGER standing_decisions_are_kept BEFORE UPDATE ON standing_decisions BEGIN SELECT RAISE(ABORT, 'a standing decision is never changed'); END;
CREATE TRIGGER standing_decisions_stay BEFORE DELETE ON standing_decisions BEGIN SELECT RAISE(ABORT, 'a standing decision is never revoked'); END;

INSERT INTO "__EFMigrationsHistory" ("MigrationId", "ProductVersion")
VALUES ('20261201000002_ErrorControl', '10.0.15');

COMMIT;

BEGIN TRANSACTION;
ALTER TABLE "test_runs" ADD "last_amendment_id" INTEGER NULL;

ALTER TABLE "test_runs" ADD "last_withdrawal_id" INTEGER NULL;

ALTER TABLE "reviews" ADD "last_amendment_id" INTEGER NULL;

ALTER TABLE "reviews" ADD "last_exclusion_id" INTEGER NULL;

ALTER TABLE "reviews" ADD "last_load_id" INTEGER NULL;

ALTER TABLE "reviews" ADD "last_withdrawal_id" INTEGER NULL;

ALTER TABLE "measurements" ADD "group_set_id" INTEGER NULL;

ALTER TABLE "experiments" ADD "amendment_id" INTEGER NULL;

ALTER TABLE "experiments" ADD "first_load_id" INTEGER NULL;

CREATE TABLE "ledger" (
    "sequence" INTEGER NOT NULL CONSTRAINT "PK_ledger" PRIMARY KEY,
    "at" INTEGER NOT NULL,
    "account" TEXT NOT NULL,
    "acting_as" TEXT NULL,
    "program_version" TEXT NOT NULL,
    "action" TEXT NOT NULL,
    "campaign" TEXT NULL,
    "subject" TEXT NULL,
    "reason" TEXT NULL,
    "hash" TEXT NOT NULL,
    CONSTRAINT "ck_ledger_hash" CHECK (length(hash) = 64),
    CONSTRAINT "ck_ledger_sequence" CHECK (sequence > 0),
    CONSTRAINT "ck_ledger_words" CHECK (length(account) > 0 and length(program_version) > 0 and length(action) > 0)
);

CREATE TABLE "original_pieces" (
    "load_id" INTEGER NOT NULL,
    "position" INTEGER NOT NULL,
    "byte_count" INTEGER NOT NULL,
    "content" BLOB NOT NULL,
    CONSTRAINT "PK_original_pieces" PRIMARY KEY ("load_id", "position"),
    CONSTRAINT "ck_original_pieces_counts" CHECK (position > 0 and byte_count > 0),
    CONSTRAINT "FK_original_pieces_loads_load_id" FOREIGN KEY ("load_id") REFERENCES "loads" ("id") ON DELETE RESTRICT
);

CREATE TABLE "originals" (
    "load_id" INTEGER NOT NULL CONSTRAINT "PK_originals" PRIMARY KEY,
    "encoding" TEXT NOT NULL,
    "separator" TEXT NOT NULL,
    "decimal_mark" TEXT NOT NULL,
    "columns" TEXT NOT NULL,
    "compression" TEXT NOT NULL,
    "piece_count" INTEGER NOT NULL,
    CONSTRAINT "ck_originals_pieces" CHECK (piece_count > 0),
    CONSTRAINT "FK_originals_loads_load_id" FOREIGN KEY ("load_id") REFERENCES "loads" ("id") ON DELETE RESTRICT
);

CREATE TABLE "plan_amendments" (
    "id" INTEGER NOT NULL CONSTRAINT "PK_plan_amendments" PRIMARY KEY,
    "campaign_id" INTEGER NOT NULL,
    "number" INTEGER NOT NULL,
    "reason" TEXT NOT NULL,
    "named_by" TEXT NOT NULL,
    "made_at" INTEGER NOT NULL,
    "program_version" TEXT NOT NULL,
    CONSTRAINT "ck_plan_amendments_number" CHECK (number > 0),
    CONSTRAINT "ck_plan_amendments_words" CHECK (length(reason) > 0 and length(named_by) > 0),
    CONSTRAINT "FK_plan_amendments_campaigns_campaign_id" FOREIGN KEY ("campaign_id") REFERENCES "campaigns" ("id") ON DELETE RESTRICT
);

CREATE TABLE "withdrawals" (
    "id" INTEGER NOT NULL CONSTRAINT "PK_withdrawals" PRIMARY KEY,
    "experiment_id" INTEGER NOT NULL,
    "is_withdrawn" INTEGER NOT NULL,
    "had_data" INTEGER NOT NULL,
    "reason" TEXT NOT NULL,
    "named_by" TEXT NOT NULL,
    "made_at" INTEGER NOT NULL,
    "program_version" TEXT NOT NULL,
    CONSTRAINT "ck_withdrawals_truths" CHECK (is_withdrawn in (0, 1) and had_data in (0, 1)),
    CONSTRAINT "ck_withdrawals_words" CHECK (length(reason) > 0 and length(named_by) > 0),
    CONSTRAINT "FK_withdrawals_experiments_experiment_id" FOREIGN KEY ("experiment_id") REFERENCES "experiments" ("id") ON DELETE RESTRICT
);

CREATE TABLE "ledger_changes" (
    "sequence" INTEGER NOT NULL,
    "position" INTEGER NOT NULL,
    "what" TEXT NOT NULL,
    "before" TEXT NULL,
    "after" TEXT NULL,
    CONSTRAINT "PK_ledger_changes" PRIMARY KEY ("sequence", "position"),
    CONSTRAINT "FK_ledger_changes_ledger_sequence" FOREIGN KEY ("sequence") REFERENCES "ledger" ("sequence") ON DELETE RESTRICT
);

CREATE TABLE "ledger_evidence" (
    "sequence" INTEGER NOT NULL,
    "position" INTEGER NOT NULL,
    "kind" TEXT NOT NULL,
    "owner" INTEGER NOT NULL,
    "first" INTEGER NOT NULL,
    "last" INTEGER NOT NULL,
    "digest" TEXT NOT NULL,
    CONSTRAINT "PK_ledger_evidence" PRIMARY KEY ("sequence", "position"),
    CONSTRAINT "ck_ledger_evidence_digest" CHECK (length(digest) = 64),
    CONSTRAINT "ck_ledger_evidence_range" CHECK (first between 0 and last),
    CONSTRAINT "FK_ledger_evidence_ledger_sequence" FOREIGN KEY ("sequence") REFERENCES "ledger" ("sequence") ON DELETE RESTRICT
);

CREATE TABLE "plan_amendment_changes" (
    "amendment_id" INTEGER NOT NULL,
    "experiment_id" INTEGER NOT NULL,
    "field" TEXT NOT NULL,
    "before" TEXT NULL,
    "after" TEXT NULL,
    CONSTRAINT "PK_plan_amendment_changes" PRIMARY KEY ("amendment_id", "experiment_id", "field"),
    CONSTRAINT "FK_plan_amendment_changes_experiments_experiment_id" FOREIGN KEY ("experiment_id") REFERENCES "experiments" ("id") ON DELETE RESTRICT,
    CONSTRAINT "FK_plan_amendment_changes_plan_amendments_amendment_id" FOREIGN KEY ("amendment_id") REFERENCES "plan_amendments" ("id") ON DELETE RESTRICT
);

CREATE UNIQUE INDEX "ux_plan_amendments_number" ON "plan_amendments" ("campaign_id", "number");

CREATE INDEX "ix_withdrawals_experiment" ON "withdrawals" ("experiment_id");

DROP TRIGGER measurements_are_kept;
UPDATE measurements SET group_set_id = (SELECT group_set_id FROM experiments e WHERE e.id = experiment_id);
CREATE TRIGGER measurements_are_kept BEFORE UPDATE ON measurements BEGIN SELECT RAISE(ABORT, 'measurements are never changed'); END;
DROP TRIGGER reviews_are_kept;
UPDATE reviews SET
    last_load_id = (SELECT max(id) FROM loads l WHERE l.campaign_id = reviews.campaign_id AND l.loaded_at <= taken_at),
    last_exclusion_id = (SELECT max(id) FROM exclusions x WHERE x.made_at <= taken_at);
CREATE TRIGGER reviews_are_kept BEFORE UPDATE ON reviews BEGIN SELECT RAISE(ABORT, 'a review is never changed'); END;

DROP TRIGGER experiments_are_kept;
CREATE TRIGGER experiments_are_kept BEFORE UPDATE ON experiments
WHEN EXISTS (SELECT 1 FROM campaigns WHERE id = old.campaign_id AND sealed_at IS NOT NULL)
    AND (new.id IS NOT old.id OR new.campaign_id IS NOT old.campaign_id OR new.code IS NOT old.code OR new.first_load_id IS NOT old.first_load_id
        OR ((new.group_set_id IS NOT old.group_set_id AND old.groups_are_planned = 1
                OR new.title IS NOT old.title OR new.response IS NOT old.response OR new.unit IS NOT old.unit
                OR new.groups_are_planned IS NOT old.groups_are_planned OR new.control IS NOT old.control OR new.test IS NOT old.test
                OR new.follow_up IS NOT old.follow_up OR new.replicates IS NOT old.replicates OR new.smallest_effect IS NOT old.smallest_effect
                OR new.assumed_sd IS NOT old.assumed_sd OR new.weight IS NOT old.weight OR new.family IS NOT old.family
                OR new.confirms IS NOT old.confirms OR new.shared_control IS NOT old.shared_control OR new.amendment_id IS NOT old.amendment_id)
            AND (new.amendment_id IS NULL OR new.amendment_id <= coalesce(old.amendment_id, 0) OR NOT EXISTS (
                SELECT 1 FROM plan_amendment_changes c WHERE c.amendment_id = new.amendment_id AND c.experiment_id = old.id))))
BEGIN SELECT RAISE(ABORT, 'an experiment of a sealed plan is changed by an amendment alone; only groups that come with the data may be added'); END;
CREATE TRIGGER plan_amendments_are_kept BEFORE UPDATE ON plan_amendments BEGIN SELECT RAISE(ABORT, 'an amendment is never changed; another one follows it'); END;
CREATE TRIGGER plan_amendments_stay BEFORE DELETE ON plan_amendments BEGIN SELECT RAISE(ABORT, 'an amendment is never deleted'); END;
CREATE TRIGGER plan_amendment_changes_are_kept BEFORE UPDATE ON plan_amendment_changes BEGIN SELECT RAISE(ABORT, 'an amendment is never changed; another one follows it'); END;
CREATE TRIGGER plan_amendment_changes_stay BEFORE DELETE ON plan_amendment_changes BEGIN SELECT RAISE(ABORT, 'an amendment is never deleted'); END;
CREATE TRIGGER withdrawals_are_kept BEFORE UPDATE ON withdrawals BEGIN SELECT RAISE(ABORT, 'a withdrawal is never changed; another one takes it back'); END;
CREATE TRIGGER withdrawals_stay BEFORE DELETE ON withdrawals BEGIN SELECT RAISE(ABORT, 'a withdrawal is never deleted; another one takes it back'); END;
CREATE TRIGGER originals_are_kept BEFORE UPDATE ON originals BEGIN SELECT RAISE(ABORT, 'an original is never changed'); END;
CREATE TRIGGER originals_stay BEFORE DELETE ON originals BEGIN SELECT RAISE(ABORT, 'an original is never deleted'); END;
CREATE TRIGGER original_pieces_are_kept BEFORE UPDATE ON original_pieces BEGIN SELECT RAISE(ABORT, 'an original is never changed'); END;
CREATE TRIGGER original_pieces_stay BEFORE DELETE ON original_pieces BEGIN SELECT RAISE(ABORT, 'an original is never deleted'); END;
CREATE TRIGGER ledger_is_kept BEFORE UPDATE ON ledger BEGIN SELECT RAISE(ABORT, 'the ledger is never changed'); END;
CREATE TRIGGER ledger_stays BEFORE DELETE ON ledger BEGIN SELECT RAISE(ABORT, 'the ledger is never shortened'); END;
CREATE TRIGGER ledger_changes_are_kept BEFORE UPDATE ON ledger_changes BEGIN SELECT RAISE(ABORT, 'the ledger is never changed'); END;
CREATE TRIGGER ledger_changes_stay BEFORE DELETE ON ledger_changes BEGIN SELECT RAISE(ABORT, 'the ledger is never shortened'); END;
CREATE TRIGGER ledger_evidence_is_kept BEFORE UPDATE ON ledger_evidence BEGIN SELECT RAISE(ABORT, 'the ledger is never changed'); END;
CREATE TRIGGER ledger_evidence_stays BEFORE DELETE ON ledger_evidence BEGIN SELECT RAISE(ABORT, 'the ledger is never shortened'); END;

INSERT INTO "__EFMigrationsHistory" ("MigrationId", "ProductVersion")
VALUES ('20261201000003_Record', '10.0.15');

COMMIT;

