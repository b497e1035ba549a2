namespace Campaigns.Migrations.Sqlite;

/// <summary>What the migration of exclusions says in SQLite's own words: an exclusion, like every other part of the record, is only ever followed by another.</summary>
internal static class ExclusionsByHand
{
    public const string Rules =
        """
        CREATE TRIGGER exclusions_are_kept BEFORE UPDATE ON exclusions BEGIN SELECT RAISE(ABORT, 'an exclusion is never changed; another one takes it back'); END;
        CREATE TRIGGER exclusions_stay BEFORE DELETE ON exclusions BEGIN SELECT RAISE(ABORT, 'an exclusion is never deleted; another one takes it back'); END;
        """;
}
