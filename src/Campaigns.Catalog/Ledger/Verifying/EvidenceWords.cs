using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Ledger.Verifying;

/// <summary>Names rows that an entry speaks for, as people know them: by campaign, experiment, file and line, as far as the rows still tell.</summary>
internal static class EvidenceWords
{
    private const string Campaign = "SELECT 'campaign ' || id || ' (''' || code || ''')' FROM campaigns WHERE id = ?1";

    private const string Load = "SELECT 'load ' || id || ' (''' || file_name || ''')' FROM loads WHERE id = ?1";

    private const string TestRun =
        """
        SELECT 'the test run of campaign ''' || c.code || ''' at ' || strftime('%Y-%m-%d %H:%M:%S', t.ran_at / 1000000, 'unixepoch') || ' UTC'
        FROM test_runs t JOIN campaigns c ON c.id = t.campaign_id WHERE t.id = ?1
        """;

    private const string Review = "SELECT 'review ' || r.number || ' of campaign ''' || c.code || '''' FROM reviews r JOIN campaigns c ON c.id = r.campaign_id WHERE r.id = ?1";

    private const string Stream = "SELECT 'stream ' || s.number || ' of campaign ''' || c.code || '''' FROM streams s JOIN campaigns c ON c.id = s.campaign_id WHERE s.id = ?1";

    private const string Exclusion =
        """
        SELECT iif(x.is_excluded, 'the exclusion', 'the taking in again') || ' of line ' || x.line || ' of ''' || l.file_name || ''', experiment ''' || e.code || ''' of campaign ''' || c.code || ''''
        FROM exclusions x JOIN loads l ON l.id = x.load_id JOIN experiments e ON e.id = x.experiment_id JOIN campaigns c ON c.id = e.campaign_id WHERE x.id = ?1
        """;

    private const string Withdrawal =
        """
        SELECT iif(w.is_withdrawn, 'the withdrawal', 'the taking in again') || ' of experiment ''' || e.code || ''' of campaign ''' || c.code || ''''
        FROM withdrawals w JOIN experiments e ON e.id = w.experiment_id JOIN campaigns c ON c.id = e.campaign_id WHERE w.id = ?1
        """;

    private const string Amendment =
        "SELECT 'amendment ' || a.number || ' of the plan of campaign ''' || c.code || '''' FROM plan_amendments a JOIN campaigns c ON c.id = a.campaign_id WHERE a.id = ?1";

    private const string GroupSet =
        """
        SELECT iif(count(g.label), 'the groups ' || group_concat('''' || g.label || '''', ', '), 'groups without labels') || ' of campaign ''' || (SELECT code FROM campaigns WHERE id = ?1) || ''''
        FROM groups g WHERE g.group_set_id = ?2
        """;

    private const string Level =
        """
        SELECT 'the level given to experiment ''' || e.code || ''' in stream ' || s.number || ' of campaign ''' || c.code || '''' FROM stream_entries t
        JOIN experiments e ON e.id = t.experiment_id JOIN streams s ON s.id = t.stream_id JOIN campaigns c ON c.id = s.campaign_id WHERE t.stream_id = ?1 AND t.position = ?2
        """;

    private const string Decision =
        """
        SELECT 'the decision on experiment ''' || e.code || ''' in stream ' || s.number || ' of campaign ''' || c.code || '''' FROM standing_decisions d
        JOIN stream_entries t ON t.stream_id = d.stream_id AND t.position = d.position JOIN experiments e ON e.id = t.experiment_id
        JOIN streams s ON s.id = t.stream_id JOIN campaigns c ON c.id = s.campaign_id WHERE d.stream_id = ?1 AND d.known_order = ?2
        """;

    /// <summary>For example "load 3 ('week-01.csv') with its measurements", or "the withdrawal of experiment 'E1' of campaign 'C'".</summary>
    public static string Of(Catalog catalog, EvidenceKind kind, long owner) => kind.Word switch
    {
        "campaign" => $"the settings of {Told(catalog, Campaign, owner) ?? Numbered("campaign", owner)}",
        "plan" => $"the plan of {Told(catalog, Campaign, owner) ?? Numbered("campaign", owner)}",
        "group-sets" => $"the groups of {Told(catalog, Campaign, owner) ?? Numbered("campaign", owner)}",
        "load" => $"{Told(catalog, Load, owner) ?? Numbered("load", owner)} with its measurements",
        "original" => $"the kept file of {Told(catalog, Load, owner) ?? Numbered("load", owner)}",
        "test-run" => $"{Told(catalog, TestRun, owner) ?? Numbered("test run", owner)} with its results",
        "review" => $"{Told(catalog, Review, owner) ?? Numbered("review", owner)} with its lines",
        "exclusion" => Told(catalog, Exclusion, owner) ?? Numbered("exclusion", owner),
        "withdrawal" => Told(catalog, Withdrawal, owner) ?? Numbered("withdrawal", owner),
        "amendment" => Told(catalog, Amendment, owner) ?? Numbered("amendment", owner),
        "stream" => Told(catalog, Stream, owner) ?? Numbered("stream", owner),
        "levels" => $"levels given in {Told(catalog, Stream, owner) ?? Numbered("stream", owner)}",
        "decisions" => $"standing decisions of {Told(catalog, Stream, owner) ?? Numbered("stream", owner)}",
        _ => Numbered(kind.Word, owner),
    };

    /// <summary>One row within an owner whose rows are divided into ranges, for example "the level given to experiment 'E1' in stream 1 of campaign 'C'".</summary>
    public static string Of(Catalog catalog, EvidenceKind kind, long owner, long key)
    {
        string? told = kind.Word switch
        {
            "group-sets" => Told(catalog, GroupSet, owner, key),
            "levels" => Told(catalog, Level, owner, key),
            "decisions" => Told(catalog, Decision, owner, key),
            _ => null,
        };
        return told ?? FormattableString.Invariant($"row {key} among {Of(catalog, kind, owner)}");
    }

    private static string Numbered(string what, long key) => FormattableString.Invariant($"{what} {key} (its key in the catalog; its row does not tell more)");

    /// <summary>What a row tells of itself; null where it is not there, or refers to what is not there.</summary>
    private static string? Told(Catalog catalog, string sql, params ReadOnlySpan<long> keys)
    {
        using SqliteStatement name = catalog.PrepareAsItIs(sql);
        for (int i = 0; i < keys.Length; i++)
        {
            name.Bind(i + 1, keys[i]);
        }

        return name.Read() ? name.NullableText(0) : null;
    }
}
