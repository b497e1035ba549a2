namespace Campaigns.Migrations.Sqlite;

/// <summary>What the migration of families and streams says in SQLite's own words: what is sealed stays, and a level or a decision once given is never changed.</summary>
internal static class ErrorControlByHand
{
    public const string Rules =
        """
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
        """;
}
