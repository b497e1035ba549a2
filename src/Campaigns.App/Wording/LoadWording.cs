using Campaigns.Catalog.Loading;

namespace Campaigns.App.Wording;

/// <summary>What loading a file brings, in words.</summary>
internal static class LoadWording
{
    /// <summary>For example "30 rows for 5 experiments (2 of them new), 1 marked as missing and left out".</summary>
    public static string Content(LoadSummary load)
    {
        string missing = load.MissingCount > 0 ? FormattableString.Invariant($", {load.MissingCount} marked as missing and left out") : "";
        string fresh = load.NewExperimentCount > 0 ? FormattableString.Invariant($" ({load.NewExperimentCount} of them new)") : "";
        string rows = load.RowCount == 1 ? "row" : "rows";
        string experiments = load.ExperimentCount == 1 ? "experiment" : "experiments";
        return FormattableString.Invariant($"{load.RowCount} {rows} for {load.ExperimentCount} {experiments}{fresh}{missing}");
    }

    /// <summary>What was loaded, in a sentence.</summary>
    public static string Loaded(LoadSummary load) => $"Loaded {load.FileName}: {Content(load)}.";

    /// <summary>What should be known of the file and changes no result.</summary>
    public static IEnumerable<string> Notices(LoadSummary load)
    {
        if (IgnoredColumns(load.FileName, load.IgnoredColumns) is { } ignored)
        {
            yield return ignored;
        }

        if (load.RespelledNames.Count > 0)
        {
            yield return $"Note: names written with combining characters were stored in their composed form: {string.Join(", ", load.RespelledNames)}.";
        }
    }

    /// <summary>A sentence on columns that are not used; null where all are.</summary>
    public static string? IgnoredColumns(string file, IReadOnlyList<string> columns) =>
        columns.Count == 0 ? null : $"Note: columns of '{file}' that are not used: {string.Join(", ", columns)}.";

    /// <summary>A sentence on tested experiments that received values; null where none did.</summary>
    public static string? Amended(string code, LoadSummary load) => load.AmendedExperiments.Count == 0 ? null
        : $"Recorded as an amendment of tested experiments: {string.Join(", ", load.AmendedExperiments)}. Test them again with 'campaigns test {code}'.";
}
