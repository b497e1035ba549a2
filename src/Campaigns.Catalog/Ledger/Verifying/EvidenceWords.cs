using Campaigns.Catalog.Providers;

namespace Campaigns.Catalog.Ledger.Verifying;

/// <summary>Names rows that an entry speaks for, as people know them.</summary>
internal static class EvidenceWords
{
    /// <summary>For example "load 3 ('week-01.csv') with its measurements".</summary>
    public static string Of(Catalog catalog, EvidenceKind kind, long owner) => kind.Word switch
    {
        "campaign" => $"the settings of campaign {Named(catalog, "SELECT code FROM campaigns WHERE id = ?1", owner)}",
        "plan" => $"the plan of campaign {Named(catalog, "SELECT code FROM campaigns WHERE id = ?1", owner)}",
        "group-sets" => $"the groups of campaign {Named(catalog, "SELECT code FROM campaigns WHERE id = ?1", owner)}",
        "load" => $"load {Named(catalog, "SELECT file_name FROM loads WHERE id = ?1", owner)} with its measurements",
        "original" => $"the kept file of load {Named(catalog, "SELECT file_name FROM loads WHERE id = ?1", owner)}",
        "test-run" => $"{Numbered("test run", owner)} with its results",
        "review" => $"{Numbered("review", owner)} with its lines",
        "levels" => $"a level given in {Numbered("stream", owner)}",
        "decisions" => $"a standing decision of {Numbered("stream", owner)}",
        _ => Numbered(kind.Word, owner),
    };

    private static string Numbered(string what, long key) => FormattableString.Invariant($"{what} {key} (its key in the catalog)");

    private static string Named(Catalog catalog, string sql, long owner)
    {
        using SqliteStatement name = catalog.Prepare(sql);
        return name.Bind(1, owner).Read() ? FormattableString.Invariant($"{owner} ('{name.Text(0)}')") : FormattableString.Invariant($"{owner}, which is not there,");
    }
}
