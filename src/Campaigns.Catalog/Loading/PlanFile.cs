using Campaigns.Domain;

namespace Campaigns.Catalog.Loading;

/// <summary>Reads a plan: one row an experiment.</summary>
public static class PlanFile
{
    /// <summary>Our names of the columns; only the first is required.</summary>
    public static IReadOnlyList<string> ColumnNames { get; } =
    [
        "experiment", "title", "response", "unit", "groups", "control", "test", "follow_up",
        "replicates", "smallest_effect", "assumed_sd", "weight", "family", "confirms", "shared_control",
    ];

    /// <summary>Reads a whole plan, and collects everything that is wrong with it.</summary>
    /// <param name="path">The file.</param>
    /// <param name="options">How to read it.</param>
    /// <param name="defaults">For experiments that name no test or follow-up.</param>
    /// <param name="known">The keys that may be named.</param>
    /// <exception cref="LoadingException">The file is not there or cannot be read.</exception>
    public static PlanFileResult Read(string path, DelimitedFileOptions options, PlanDefaults defaults, KnownKeys known)
    {
        ArgumentNullException.ThrowIfNull(defaults);
        ArgumentNullException.ThrowIfNull(known);
        using DelimitedFile file = DelimitedFile.Open(path, options, ColumnNames);
        List<PlannedExperiment> experiments = [];
        if (file.Headers.Count == 0)
        {
            return new PlanFileResult(experiments, file.Problems, []);
        }

        ColumnFinder finder = new(file, options.Columns);
        Dictionary<string, int> places = ColumnNames.ToDictionary(name => name, name => finder.Find(name, isRequired: name == ColumnNames[0]));
        PlanRow row = new(file, places, options.DecimalMark);
        Dictionary<string, long> lines = new(StringComparer.Ordinal);
        while (file.Read())
        {
            PlannedExperiment? experiment = row.Make(defaults, known);
            string code = row.Code;
            if (code.Length > 0 && !lines.TryAdd(code, file.Line))
            {
                row.Refuse("experiment", "duplicate-experiment", FormattableString.Invariant($"{ShownText.Quote(code)} is planned on line {lines[code]} already: give each experiment one row."));
                experiment = null;
            }

            if (experiment is not null)
            {
                experiments.Add(experiment);
            }
        }

        return new PlanFileResult(experiments, file.Problems, finder.Ignored);
    }
}
