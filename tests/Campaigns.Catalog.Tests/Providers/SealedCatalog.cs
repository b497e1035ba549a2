namespace Campaigns.Catalog.Tests.Providers;

/// <summary>One catalog with a sealed, loaded, tested and reviewed campaign C, with an exclusion, an open one O with a plan, and a sealed exploratory one X.</summary>
public sealed class SealedCatalog : IDisposable
{
    private readonly TestCatalog _catalog = new();

    public SealedCatalog()
    {
        _catalog.Seal(TestCatalog.Experiment("E1", null, "A", "B"), TestCatalog.Experiment("E2"));
        _catalog.Load(TestCatalog.Rows("E1", "A", "1.0 1.1 1.2") + TestCatalog.Rows("E1", "B", "2.0 2.1 2.2") + TestCatalog.Rows("E2", "u", "3 4 5"));
        _catalog.Test();
        _catalog.Review();
        Raw.Execute(_catalog.Catalog.Connection,
            """
            INSERT INTO campaigns SELECT 2, 'O', title, purpose, error_rate, level, correction, default_test, default_follow_up, 0, opened_at, NULL, NULL FROM campaigns;
            INSERT INTO campaigns SELECT 3, 'X', title, purpose, error_rate, level, correction, default_test, default_follow_up, 1, opened_at, 5, 'd' FROM campaigns WHERE id = 1;
            INSERT INTO experiments (id, campaign_id, code, groups_are_planned, test, follow_up) VALUES (50, 2, 'P', 0, 'f', 'none');
            INSERT INTO exclusions SELECT 1, experiment_id, load_id, 2, 1, 'A', '1.0', 'spilled', 'Ada', 6, 'v' FROM measurements LIMIT 1;
            INSERT INTO families (campaign_id, position, name, correction, level, opens_after, opens_when) VALUES (1, 1, 'a', NULL, 0.03, NULL, 'any'), (2, 1, 'a', 'holm', NULL, NULL, 'any');
            INSERT INTO review_families (review_id, position, name, correction, level, family_size, planned_count, tested_count, survivor_count, is_open) VALUES (1, 1, 'a', 'bh', 0.03, 2, 2, 1, 1, 1);
            """);
    }

    public Microsoft.Data.Sqlite.SqliteConnection Connection => _catalog.Catalog.Connection;

    public void Dispose() => _catalog.Dispose();
}
