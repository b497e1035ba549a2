using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Results;

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

    /// <summary>What a loaded file means to the plan: which experiments it holds, how complete they are with it, which are still without data.</summary>
    /// <param name="outlook">The file held against the plan.</param>
    /// <param name="isPlanned">Whether there was a plan before the data; where not, an experiment is one because a file names it, and none can be missing.</param>
    public static IEnumerable<string> Outlook(LoadOutlook outlook, bool isPlanned)
    {
        IReadOnlyList<LoadedExperiment> inFile = outlook.InFile;
        string of = isPlanned ? FormattableString.Invariant($"{inFile.Count} of {Counted.Of(inFile.Count + outlook.NotInFile.Count, "planned experiment")}") : Counted.Of(inFile.Count, "experiment");
        yield return $"In the file: {of}: {TestWording.Named([.. inFile.Select(e => e.Code)])}.";
        LoadedExperiment[] complete = [.. inFile.Where(e => e.IsComplete)], lacking = [.. inFile.Where(e => !e.IsComplete)];
        if (complete.Length > 0)
        {
            yield return FormattableString.Invariant($"Complete with it: {complete.Length} ({TestWording.Named([.. complete.Select(e => e.Code)])}).");
        }

        if (lacking.Length > 0)
        {
            yield return FormattableString.Invariant($"Short of planned values even with it: {lacking.Length} ({TestWording.Named([.. lacking.Select(Lack)], "; ")}).");
        }

        if (isPlanned && outlook.WithoutData.Count > 0)
        {
            yield return FormattableString.Invariant($"Planned and without any value from any file: {outlook.WithoutData.Count} ({TestWording.Named(outlook.WithoutData)}).");
        }
    }

    private static string Lack(LoadedExperiment e)
    {
        string groups = e.GroupsInFile < e.Groups ? FormattableString.Invariant($", {e.GroupsInFile} of {Counted.Of(e.Groups, "group")} in the file") : "";
        return FormattableString.Invariant($"{e.Code}: {e.Present} of {Counted.Of(e.Needed ?? 0, "planned replicate")}{groups}");
    }

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
    /// <param name="code">The campaign.</param>
    /// <param name="load">What was loaded.</param>
    /// <param name="steps">How what tests them is named; null for commands.</param>
    public static string? Amended(string code, LoadSummary load, StepNames? steps = null) => load.AmendedExperiments.Count == 0 ? null
        : $"Recorded as an amendment of tested experiments: {string.Join(", ", load.AmendedExperiments)}. {Sentence.Start((steps ?? StepNames.Commands).Test(code))} tests them again.";
}
