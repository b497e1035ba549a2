namespace Campaigns.Migrations.Sqlite;

/// <summary>What the first migration says in SQLite's own words, because the migration builder has none for it: the two large tables are stored in the order of their keys and typed strictly, and triggers keep the record append-only.</summary>
internal static class FirstByHand
{
    public const string Measurements =
        """
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
        """;

    public const string TestResults =
        """
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
        """;

    public const string Rules =
        """
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
        """;
}
