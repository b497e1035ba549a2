using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Ledger.Verifying;

namespace Campaigns.Catalog.Tests.Ledger;

public sealed class LedgerVerifierTests : IDisposable
{
    private readonly TestCatalog _catalog = new();

    public LedgerVerifierTests() => LedgerWriterTests.Live(_catalog);

    private LedgerHead Head => new LedgerReader(_catalog.Catalog).Head;

    public void Dispose() => _catalog.Dispose();

    [Fact]
    public void A_record_that_nobody_touched_is_whole()
    {
        LedgerProof proof = Prove();
        Assert.Empty(proof.Findings);
        Assert.Empty(proof.Remarks);
        Assert.True(proof.IsWhole);
        Assert.Equal((9, Head), (proof.Entries, proof.Head));
        Assert.True(proof.Digests >= 9);
    }

    [Theory]
    [InlineData("UPDATE ledger SET at = 9223372036854775807 WHERE sequence = 3", 3)]
    [InlineData("UPDATE ledger SET at = 'yesterday' WHERE sequence = 3", 3)]
    [InlineData("UPDATE ledger SET at = at + 0.5 WHERE sequence = 3", 3)]
    [InlineData("UPDATE ledger SET account = CAST(account AS BLOB) WHERE sequence = 4", 4)]
    [InlineData("UPDATE ledger SET account = account || char(0) WHERE sequence = 4", 4)]
    [InlineData("UPDATE ledger SET action = CAST(x'ff' AS TEXT) WHERE sequence = 4", 4)]
    [InlineData("UPDATE ledger SET subject = '' WHERE sequence = 1", 1)]
    [InlineData("UPDATE ledger SET reason = 'another' WHERE sequence = 7", 7)]
    [InlineData("UPDATE ledger SET hash = upper(hash) WHERE sequence = 2", 2)]
    [InlineData("UPDATE ledger SET sequence = 100 WHERE sequence = 9", 9)]
    [InlineData("UPDATE ledger SET sequence = -1 WHERE sequence = 9", -1)]
    [InlineData("DELETE FROM ledger WHERE sequence = 5", 5)]
    [InlineData("UPDATE ledger_changes SET position = 7 WHERE sequence = 7", 7)]
    [InlineData("UPDATE ledger_changes SET sequence = 8, position = 2 WHERE sequence = 7", 7)]
    [InlineData("UPDATE ledger_changes SET sequence = 50 WHERE sequence = 6", 6)]
    [InlineData("UPDATE ledger_changes SET before = NULL WHERE sequence = 7", 7)]
    [InlineData("UPDATE ledger_evidence SET kind = 'loads' WHERE sequence = 4 AND position = 1", 4)]
    [InlineData("UPDATE ledger_evidence SET owner = 2 WHERE sequence = 4 AND position = 1", 4)]
    public void What_was_changed_in_the_ledger_is_found_and_the_first_bad_entry_named(string tampering, long first)
    {
        Tamper(tampering);
        LedgerProof proof = Prove();
        Assert.False(proof.IsWhole);
        Assert.Equal(first, proof.Findings[0].Sequence);
        Assert.Equal(proof.Findings.OrderBy(f => f.Sequence ?? long.MaxValue), proof.Findings);
    }

    [Theory]
    [InlineData("UPDATE campaigns SET title = 'other'", 3)]
    [InlineData("UPDATE experiments SET weight = 2", 2)]
    [InlineData("DELETE FROM groups WHERE position = 1", 2)]
    [InlineData("UPDATE groups SET label = 'Ä' WHERE position = 1", 2)]
    [InlineData("UPDATE loads SET file_name = 'other.csv'", 4)]
    [InlineData("UPDATE measurements SET packed = zeroblob(length(packed)) WHERE experiment_id = 2", 4)]
    [InlineData("DELETE FROM test_results WHERE test_run_id = 1", 5)]
    [InlineData("UPDATE test_results SET p = p / 2 WHERE test_run_id = 2", 9)]
    [InlineData("UPDATE reviews SET survivor_count = 2", 6)]
    [InlineData("UPDATE exclusions SET reason = 'a better one' WHERE id = 1", 7)]
    [InlineData("DELETE FROM exclusions", 7)]
    public void What_was_changed_in_the_tables_is_found_at_the_entry_that_recorded_it(string tampering, long first)
    {
        Tamper(tampering);
        LedgerProof proof = Prove();
        Assert.Equal(first, proof.Findings[0].Sequence);
        Assert.Equal(TestCatalog.Code, proof.Findings[0].Campaign);
    }

    [Theory]
    [InlineData("INSERT INTO loads SELECT 9, campaign_id, 'x.csv', replace(sha256, substr(sha256, 1, 1), 'x'), byte_count, row_count, missing_count, experiment_count, loaded_at, NULL FROM loads", "load 9 ('x.csv')")]
    [InlineData("INSERT INTO exclusions SELECT 9, experiment_id, load_id, line, is_excluded, group_label, value, reason, named_by, made_at, program_version FROM exclusions WHERE id = 1", "speaks for the exclusion of line 2 of 'data-1.csv', experiment 'E1' of campaign 'C'.")]
    [InlineData("INSERT INTO group_sets VALUES (9, 1)", "speaks for groups without labels of campaign 'C'.")]
    [InlineData("INSERT INTO group_sets VALUES (9, 1); INSERT INTO groups VALUES (9, 0, 'X'); INSERT INTO groups VALUES (9, 1, 'Y'); INSERT INTO group_sets VALUES (10, 1)", "speaks for the groups 'X', 'Y' of campaign 'C', nor for 1 more beside it.")]
    [InlineData("INSERT INTO withdrawals VALUES (1, 1, 1, 0, 'r', 'n', 0, 'v')", "speaks for the withdrawal of experiment 'E1' of campaign 'C'.")]
    [InlineData("INSERT INTO withdrawals VALUES (1, 99, 1, 0, 'r', 'n', 0, 'v')", "speaks for withdrawal 1 (its key in the catalog; its row does not tell more).")]
    [InlineData("INSERT INTO test_runs (id, campaign_id, last_load_id, ran_at, includes_incomplete, program_version) SELECT 9, campaign_id, last_load_id, ran_at, includes_incomplete, program_version FROM test_runs WHERE id = 1", "speaks for the test run of campaign 'C' at 2026-12-01 08:00:00 UTC with its results.")]
    [InlineData("INSERT INTO plan_amendments VALUES (1, 1, 1, 'r', 'n', 0, 'v')", "speaks for amendment 1 of the plan of campaign 'C'.")]
    [InlineData("INSERT INTO original_pieces VALUES (1, 9, 1, x'00')", "the kept file of load 1")]
    [InlineData("UPDATE experiments SET first_load_id = 2 WHERE id = 1", "The experiment 'E1' is said to have come with a load")]
    [InlineData("UPDATE experiments SET groups_are_planned = 0, group_set_id = NULL WHERE id = 1", "over other groups")]
    public void A_row_beside_the_record_is_found(string tampering, string words)
    {
        Tamper(tampering);
        Assert.Contains(Prove().Findings, f => f.What.Contains(words, StringComparison.Ordinal));
    }

    [Fact]
    public void A_chain_made_anew_over_other_rows_is_found_by_a_head_alone()
    {
        LedgerHead before = Head;
        using var other = new TestCatalog();
        LedgerWriterTests.Live(other);
        other.Review();
        LedgerProof proof = new LedgerVerifier(other.Catalog).Verify(before);

        // The same life under the same clock is the same chain; a review more only continues it.
        Assert.True(proof.IsWhole);
        other.Clock.Advance(TimeSpan.FromSeconds(1));
        using var later = new TestCatalog();
        later.Clock.Advance(TimeSpan.FromSeconds(1));
        LedgerWriterTests.Live(later);
        Assert.True(new LedgerVerifier(later.Catalog).Verify().IsWhole);
        LedgerFinding finding = Assert.Single(new LedgerVerifier(later.Catalog).Verify(before).Findings);
        Assert.Equal(before.Sequence, finding.Sequence);
        Assert.Contains("written anew", finding.What, StringComparison.Ordinal);
    }

    [Fact]
    public void A_cut_tail_is_found_with_a_head_and_only_with_one()
    {
        LedgerHead head = Head;
        Tamper("DELETE FROM test_results WHERE test_run_id = 2; DELETE FROM test_runs WHERE id = 2; DELETE FROM ledger_evidence WHERE sequence = 9; DELETE FROM ledger_changes WHERE sequence = 9; DELETE FROM ledger WHERE sequence = 9");
        Assert.True(Prove().IsWhole);
        LedgerFinding finding = Assert.Single(Prove(head).Findings);
        Assert.Equal(9, finding.Sequence);
        Assert.Contains("was cut, or this is an older copy", finding.What, StringComparison.Ordinal);
    }

    [Fact]
    public void An_earlier_head_is_held_and_one_with_another_hash_is_not()
    {
        LedgerEntry third = LedgerWriterTests.Entries(_catalog)[2];
        Assert.True(Prove(new LedgerHead(3, third.Hash)).IsWhole);
        Assert.True(Prove(LedgerHead.Empty).IsWhole);
        Assert.Equal(3, Assert.Single(Prove(new LedgerHead(3, new string('0', 64))).Findings).Sequence);
        Assert.Equal(0, Assert.Single(Prove(new LedgerHead(0, third.Hash)).Findings).Sequence);
    }

    [Theory]
    [InlineData("DROP TRIGGER ledger_stays", "The trigger ledger_stays is missing.")]
    [InlineData("DROP INDEX ix_exclusions_measurement", "The index ix_exclusions_measurement is missing.")]
    [InlineData("CREATE TRIGGER mine AFTER INSERT ON reviews BEGIN SELECT 1; END", "The trigger mine hangs on the table reviews and is none of this program's.")]
    [InlineData("ALTER TABLE campaigns ADD COLUMN note TEXT", "The table campaigns is not as this program makes it.")]
    [InlineData("DELETE FROM \"__EFMigrationsHistory\" WHERE MigrationId LIKE '%First'", "The list of schema steps is not the one of this program.")]
    public void A_schema_that_is_not_the_programs_is_found(string tampering, string words)
    {
        Raw.Execute(_catalog.Catalog.Connection, tampering);
        Assert.Equal([words], Prove().Findings.Select(f => f.What));
    }

    [Fact]
    public void A_table_of_somebody_else_is_told_and_is_no_fault()
    {
        Raw.Execute(_catalog.Catalog.Connection, "CREATE TABLE notes (text TEXT)");
        LedgerProof proof = Prove();
        Assert.True(proof.IsWhole);
        Assert.Contains("notes", Assert.Single(proof.Remarks), StringComparison.Ordinal);
    }

    [Fact]
    public void A_plan_is_held_against_the_digest_it_was_sealed_with()
    {
        // The entry of the seal is made to fit the changed plan, which only the digest inside the campaign still contradicts.
        Tamper("UPDATE experiments SET weight = 2 WHERE id = 1");
        Tamper($"UPDATE ledger_evidence SET digest = '{Digest(EvidenceRegistry.Plan)}' WHERE kind = 'plan'");
        Assert.Contains(Prove().Findings, f => f.Sequence == 3 && f.What.Contains("with which the plan was sealed", StringComparison.Ordinal));
    }

    [Fact]
    public void An_upgraded_entry_speaks_for_everything_again_and_ranges_may_overlap()
    {
        _catalog.Catalog.Change(() => _catalog.Catalog.Record(new LedgerAct(LedgerAction.Upgrade, null) { Evidence = EvidenceRegistry.Everything(_catalog.Catalog) }));
        Assert.Empty(Prove().Findings);
    }

    [Fact]
    public void Proving_changes_nothing()
    {
        string before = _catalog.Dump;
        Prove();
        Assert.Equal(before, _catalog.Dump);
    }

    [Fact]
    public void Each_part_of_the_proof_is_told_before_it_begins()
    {
        var told = new List<WorkProgress>();
        new LedgerVerifier(_catalog.Catalog).Verify(progress: told.Add);
        Assert.Equal(Enumerable.Range(0, told.Count).Select(i => (long)i), told.Select(p => p.Done));
        Assert.All(told, p => Assert.Equal(told.Count, p.Total));
        Assert.Equal(("proving the file", "proving the sealed plans"), (told[0].What, told[^1].What));
    }

    [Theory]
    [InlineData(0)]
    [InlineData(2)]
    [InlineData(5)]
    public void A_proof_that_is_stopped_finds_no_fault_with_the_record(int part)
    {
        using var stop = new CancellationTokenSource();
        using Catalog own = Catalog.OpenForProof(_catalog.Catalog.Path, _catalog.Clock, isReadOnly: false);
        own.StopOn(stop.Token);
        Assert.ThrowsAny<OperationCanceledException>(() => new LedgerVerifier(own).Verify(progress: p =>
        {
            if (p.Done == part)
            {
                stop.Cancel();
            }
        }));
        Assert.True(Prove().IsWhole);
    }

    private LedgerProof Prove(LedgerHead? known = null) => new LedgerVerifier(_catalog.Catalog).Verify(known);

    private string Digest(EvidenceKind kind)
    {
        using var digester = new EvidenceDigester(_catalog.Catalog);
        return digester.Digest(kind, 1, 0, 0);
    }

    /// <summary>Changes rows behind the guards, and puts the guards back as they were.</summary>
    private void Tamper(string sql)
    {
        Microsoft.Data.Sqlite.SqliteConnection connection = _catalog.Catalog.Connection;
        List<string> names = Raw.Rows(connection, "SELECT name FROM sqlite_schema WHERE type = 'trigger' ORDER BY name");
        List<string> texts = Raw.Rows(connection, "SELECT sql FROM sqlite_schema WHERE type = 'trigger' ORDER BY name");
        Raw.Execute(connection, "PRAGMA foreign_keys = OFF; PRAGMA ignore_check_constraints = ON;");
        names.ForEach(name => Raw.Execute(connection, $"DROP TRIGGER {name}"));
        Raw.Execute(connection, sql);
        texts.ForEach(text => Raw.Execute(connection, text));
        Raw.Execute(connection, "PRAGMA foreign_keys = ON; PRAGMA ignore_check_constraints = OFF;");
    }
}
