using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Ledger;

/// <summary>The kinds of rows that entries of the ledger speak for: together they are every row that a reader of the catalog sees.</summary>
/// <remarks>
/// A new table is a new kind, or a statement more in one, and then the kind takes a new word: what was digested under the old word must stay as it was.
/// Columns are named one by one for the same reason. Parameters: ?1 the owner, ?2 and ?3 the range.
/// </remarks>
internal static class EvidenceRegistry
{
    private const string PlanColumns =
        """
        e.id, e.campaign_id, e.code, e.title, e.response, e.unit, CASE WHEN e.groups_are_planned = 1 THEN e.group_set_id END, e.groups_are_planned, e.control, e.test, e.follow_up,
        e.replicates, e.smallest_effect, e.assumed_sd, e.weight, e.family, e.confirms, e.shared_control, e.first_load_id, e.amendment_id
        """;

    /// <summary>A campaign with its families and settings, as the latest entry about it left it.</summary>
    public static EvidenceKind Campaign { get; } = new(
        "campaign",
        IsLatestOnly: true,
        "SELECT id, 0, 0 FROM campaigns ORDER BY id",
        [
            """
            SELECT id, code, title, purpose, error_rate, level, correction, default_test, default_follow_up, is_exploratory, opened_at, sealed_at, plan_digest
            FROM campaigns WHERE id = ?1
            """,
            "SELECT position, name, correction, level, opens_after, opens_when FROM families WHERE campaign_id = ?1 ORDER BY position",
            "SELECT horizon, shape, initial_wealth, lambda, tau FROM online_settings WHERE campaign_id = ?1",
        ]);

    /// <summary>The planned experiments of a campaign, as the latest entry about them left them.</summary>
    public static EvidenceKind Plan { get; } = new(
        "plan",
        IsLatestOnly: true,
        "SELECT DISTINCT campaign_id, 0, 0 FROM experiments WHERE first_load_id IS NULL ORDER BY campaign_id",
        [$"SELECT {PlanColumns} FROM experiments e WHERE e.campaign_id = ?1 AND e.first_load_id IS NULL ORDER BY e.id"]);

    /// <summary>Group sets of a campaign, a range of keys.</summary>
    public static EvidenceKind GroupSets { get; } = new(
        "group-sets",
        IsLatestOnly: false,
        "SELECT campaign_id, min(id), max(id) FROM group_sets GROUP BY campaign_id ORDER BY campaign_id",
        [
            """
            SELECT s.id, s.campaign_id, g.position, g.label FROM group_sets s LEFT JOIN groups g ON g.group_set_id = s.id
            WHERE s.id BETWEEN ?2 AND ?3 AND s.campaign_id = ?1 ORDER BY s.id, g.position
            """,
        ]);

    /// <summary>A load with the experiments that it brought and all its values.</summary>
    public static EvidenceKind Load { get; } = new(
        "load",
        IsLatestOnly: false,
        "SELECT id, 0, 0 FROM loads ORDER BY id",
        [
            """
            SELECT id, campaign_id, file_name, sha256, byte_count, row_count, missing_count, experiment_count, loaded_at, amendment_reason FROM loads WHERE id = ?1
            """,
            $"SELECT {PlanColumns} FROM measurements m JOIN experiments e ON e.id = m.experiment_id WHERE m.load_id = ?1 AND e.first_load_id = ?1 ORDER BY m.experiment_id",
            "SELECT experiment_id, value_count, missing_count, group_set_id, packed FROM measurements WHERE load_id = ?1 ORDER BY experiment_id",
        ]);

    /// <summary>The bytes of a loaded file, as they are kept.</summary>
    public static EvidenceKind Original { get; } = new(
        "original",
        IsLatestOnly: false,
        "SELECT load_id, 0, 0 FROM originals UNION SELECT load_id, 0, 0 FROM original_pieces ORDER BY 1",
        [
            "SELECT load_id, encoding, separator, decimal_mark, columns, compression, piece_count FROM originals WHERE load_id = ?1",
            "SELECT position, byte_count, content FROM original_pieces WHERE load_id = ?1 ORDER BY position",
        ]);

    /// <summary>A test run with its results.</summary>
    /// <remarks>The results are walked through from the run's first experiment to its last: all of them for a run over a whole campaign, one for an experiment that arrived alone. Plus keeps SQLite from seeking each by the index of runs.</remarks>
    public static EvidenceKind TestRun { get; } = new(
        "test-run",
        IsLatestOnly: false,
        "SELECT id, 0, 0 FROM test_runs ORDER BY id",
        [
            """
            SELECT id, campaign_id, last_load_id, last_exclusion_id, last_amendment_id, last_withdrawal_id, ran_at, includes_incomplete, program_version FROM test_runs WHERE id = ?1
            """,
            """
            SELECT experiment_id, status, group_count, observation_count, statistic, df1, df2, p, log_p, eta_squared, omega_squared, specimen_count, arrangements, as_extreme, seed
            FROM test_results WHERE +test_run_id = ?1
                AND experiment_id BETWEEN (SELECT min(experiment_id) FROM test_results WHERE test_run_id = ?1) AND (SELECT max(experiment_id) FROM test_results WHERE test_run_id = ?1)
            ORDER BY experiment_id
            """,
        ]);

    /// <summary>A review with every line.</summary>
    public static EvidenceKind Review { get; } = new(
        "review",
        IsLatestOnly: false,
        "SELECT id, 0, 0 FROM reviews ORDER BY id",
        [
            """
            SELECT id, campaign_id, number, taken_at, correction, level, family_size, tested_count, survivor_count, is_interim, last_test_run_id, last_load_id, last_exclusion_id,
                last_amendment_id, last_withdrawal_id, program_version, lines FROM reviews WHERE id = ?1
            """,
            """
            SELECT position, name, correction, level, family_size, planned_count, tested_count, survivor_count, is_open FROM review_families WHERE review_id = ?1 ORDER BY position
            """,
        ]);

    /// <summary>One decision about an observation.</summary>
    public static EvidenceKind Exclusion { get; } = new(
        "exclusion",
        IsLatestOnly: false,
        "SELECT id, 0, 0 FROM exclusions ORDER BY id",
        ["SELECT id, experiment_id, load_id, line, is_excluded, group_label, value, reason, named_by, made_at, program_version FROM exclusions WHERE id = ?1"]);

    /// <summary>One decision about an experiment.</summary>
    public static EvidenceKind Withdrawal { get; } = new(
        "withdrawal",
        IsLatestOnly: false,
        "SELECT id, 0, 0 FROM withdrawals ORDER BY id",
        ["SELECT id, experiment_id, is_withdrawn, had_data, reason, named_by, made_at, program_version FROM withdrawals WHERE id = ?1"]);

    /// <summary>One amendment of a sealed plan.</summary>
    public static EvidenceKind Amendment { get; } = new(
        "amendment",
        IsLatestOnly: false,
        "SELECT id, 0, 0 FROM plan_amendments ORDER BY id",
        [
            "SELECT id, campaign_id, number, reason, named_by, made_at, program_version FROM plan_amendments WHERE id = ?1",
            "SELECT experiment_id, field, before, after FROM plan_amendment_changes WHERE amendment_id = ?1 ORDER BY experiment_id, field",
        ]);

    /// <summary>A stream's settings.</summary>
    public static EvidenceKind Stream { get; } = new(
        "stream",
        IsLatestOnly: false,
        "SELECT id, 0, 0 FROM streams ORDER BY id",
        ["SELECT id, campaign_id, number, procedure, level, horizon, shape, initial_wealth, lambda, tau, reason, started_at, program_version FROM streams WHERE id = ?1"]);

    /// <summary>Levels given in a stream, a range of positions.</summary>
    public static EvidenceKind Levels { get; } = new(
        "levels",
        IsLatestOnly: false,
        "SELECT stream_id, min(position), max(position) FROM stream_entries GROUP BY stream_id ORDER BY stream_id",
        ["SELECT position, experiment_id, level, known_count, registered_at FROM stream_entries WHERE stream_id = ?1 AND position BETWEEN ?2 AND ?3 ORDER BY position"]);

    /// <summary>Standing decisions of a stream, a range in the order in which they became known.</summary>
    public static EvidenceKind Decisions { get; } = new(
        "decisions",
        IsLatestOnly: false,
        "SELECT stream_id, min(known_order), max(known_order) FROM standing_decisions GROUP BY stream_id ORDER BY stream_id",
        ["SELECT known_order, position, test_run_id, p, log_p, survives, decided_at FROM standing_decisions WHERE stream_id = ?1 AND known_order BETWEEN ?2 AND ?3 ORDER BY known_order"]);

    /// <summary>Every kind.</summary>
    public static IReadOnlyList<EvidenceKind> All { get; } =
        [Campaign, Plan, GroupSets, Load, Original, TestRun, Review, Exclusion, Withdrawal, Amendment, Stream, Levels, Decisions];

    /// <summary>All rows of a catalog, kind by kind.</summary>
    public static IReadOnlyList<EvidenceRequest> Everything(Catalog catalog)
    {
        var requests = new List<EvidenceRequest>();
        foreach (EvidenceKind kind in All)
        {
            using SqliteStatement owners = catalog.Prepare(kind.Owners);
            while (owners.Read())
            {
                requests.Add(kind.Of(owners.Integer(0), owners.Integer(1), owners.Integer(2)));
            }
        }

        return requests;
    }

    /// <summary>The kind with a word; null where there is none.</summary>
    public static EvidenceKind? Find(string word) => All.FirstOrDefault(k => k.Word == word);
}
