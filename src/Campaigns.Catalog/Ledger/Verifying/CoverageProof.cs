using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Ledger.Verifying;

/// <summary>Proves that nothing stands beside the record: every row of every table is spoken for by an entry.</summary>
/// <remarks>Rows of tables that hang on others (groups, families, results, lines of reviews) belong to the digest of what they hang on; one that hangs on nothing is found by the check of the foreign keys.</remarks>
/// <param name="catalog">The open catalog, in a snapshot.</param>
/// <param name="findings">Takes what is wrong.</param>
/// <param name="evidence">What the entries speak for.</param>
internal sealed class CoverageProof(Catalog catalog, Findings findings, EvidenceProof evidence)
{
    /// <summary>Looks at every row. O(rows).</summary>
    public void Run()
    {
        foreach (EvidenceKind kind in EvidenceRegistry.All)
        {
            LookAtOwners(kind);
        }

        LookAtKeys(EvidenceRegistry.GroupSets, "SELECT campaign_id, id FROM group_sets ORDER BY campaign_id, id");
        LookAtKeys(EvidenceRegistry.Levels, "SELECT stream_id, position FROM stream_entries ORDER BY stream_id, position");
        LookAtKeys(EvidenceRegistry.Decisions, "SELECT stream_id, known_order FROM standing_decisions ORDER BY stream_id, known_order");
        LookAtExperiments(
            """
            SELECT count(*), min(e.code) FROM experiments e
            WHERE e.first_load_id IS NOT NULL AND NOT EXISTS (SELECT 1 FROM measurements m WHERE m.experiment_id = e.id AND m.load_id = e.first_load_id)
            """,
            "said to have come with a load that brought nothing for it; no entry speaks for it");
        LookAtExperiments(
            """
            SELECT count(*), min(e.code) FROM experiments e
            WHERE e.groups_are_planned = 0
                AND e.group_set_id IS NOT (SELECT m.group_set_id FROM measurements m WHERE m.experiment_id = e.id ORDER BY m.load_id DESC LIMIT 1)
            """,
            "compared over other groups than those that came with its latest load");
    }

    private void LookAtOwners(EvidenceKind kind)
    {
        using SqliteStatement owners = catalog.PrepareAsItIs(kind.Owners);
        while (owners.Read())
        {
            if (!evidence.SpeaksFor(kind, owners.Integer(0)))
            {
                findings.Add(null, null, $"No entry of the ledger speaks for {EvidenceWords.Of(catalog, kind, owners.Integer(0))}.");
            }
        }
    }

    /// <summary>Keys within the owners of a kind that is divided into ranges; each must lie in one.</summary>
    private void LookAtKeys(EvidenceKind kind, string sql)
    {
        using SqliteStatement keys = catalog.PrepareAsItIs(sql);
        List<(long First, long Last)> ranges = [];
        long? owner = null;
        long covered = long.MinValue, missing = 0, firstMissing = 0;
        int next = 0;
        while (keys.Read())
        {
            if (owner != keys.Integer(0))
            {
                Tell(kind, owner, missing, firstMissing);
                owner = keys.Integer(0);
                ranges = evidence.RangesOf(kind, owner.Value);
                ranges.Sort();
                (covered, missing, next) = (long.MinValue, 0, 0);
            }

            for (; next < ranges.Count && ranges[next].First <= keys.Integer(1); next++)
            {
                covered = Math.Max(covered, ranges[next].Last);
            }

            if (covered < keys.Integer(1))
            {
                firstMissing = missing == 0 ? keys.Integer(1) : firstMissing;
                missing++;
            }
        }

        Tell(kind, owner, missing, firstMissing);
    }

    private void Tell(EvidenceKind kind, long? owner, long missing, long firstMissing)
    {
        // Where no entry speaks for the owner at all, that was told already.
        if (owner is { } key && missing > 0 && evidence.SpeaksFor(kind, key))
        {
            string others = missing > 1 ? FormattableString.Invariant($", nor for {missing - 1} more beside it") : "";
            findings.Add(null, null, $"No entry of the ledger speaks for {EvidenceWords.Of(catalog, kind, key, firstMissing)}{others}.");
        }
    }

    private void LookAtExperiments(string sql, string what)
    {
        using SqliteStatement rows = catalog.PrepareAsItIs(sql);
        rows.Read();
        if (rows.Integer(0) > 0)
        {
            string others = rows.Integer(0) > 1 ? FormattableString.Invariant($", and so are {rows.Integer(0) - 1} more") : "";
            findings.Add(null, null, $"The experiment '{rows.Text(1)}' is {what}{others}.");
        }
    }
}
