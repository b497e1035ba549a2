namespace Campaigns.Migrations.Sqlite;

/// <summary>What the migration of the record says in SQLite's own words: the ledger, originals, amendments and withdrawals only grow, and a sealed plan changes through an amendment alone.</summary>
internal static class RecordByHand
{
    /// <summary>What earlier catalogs knew without saying it: to which groups the packed values refer, and which data a review had before it.</summary>
    public const string FromBefore =
        """
        DROP TRIGGER measurements_are_kept;
        UPDATE measurements SET group_set_id = (SELECT group_set_id FROM experiments e WHERE e.id = experiment_id);
        CREATE TRIGGER measurements_are_kept BEFORE UPDATE ON measurements BEGIN SELECT RAISE(ABORT, 'measurements are never changed'); END;
        DROP TRIGGER reviews_are_kept;
        UPDATE reviews SET
            last_load_id = (SELECT max(id) FROM loads l WHERE l.campaign_id = reviews.campaign_id AND l.loaded_at <= taken_at),
            last_exclusion_id = (SELECT max(id) FROM exclusions x WHERE x.made_at <= taken_at);
        CREATE TRIGGER reviews_are_kept BEFORE UPDATE ON reviews BEGIN SELECT RAISE(ABORT, 'a review is never changed'); END;
        """;

    public const string Rules =
        """
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
        """;
}
