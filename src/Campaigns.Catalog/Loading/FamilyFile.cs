using Campaigns.Domain;

namespace Campaigns.Catalog.Loading;

/// <summary>Reads the families of a campaign: one row a family.</summary>
public static class FamilyFile
{
    /// <summary>Our names of the columns; only the first is required.</summary>
    public static IReadOnlyList<string> ColumnNames { get; } = ["family", "correction", "level", "opens_after", "opens_when"];

    /// <summary>Reads a whole file of families, and collects everything that is wrong with it.</summary>
    /// <param name="path">The file.</param>
    /// <param name="options">How to read it.</param>
    /// <param name="known">The keys that may be named.</param>
    /// <exception cref="LoadingException">The file is not there or cannot be read.</exception>
    public static FamilyFileResult Read(string path, DelimitedFileOptions options, KnownKeys known)
    {
        ArgumentNullException.ThrowIfNull(known);
        using DelimitedFile file = DelimitedFile.Open(path, options, ColumnNames);
        List<Family> families = [];
        if (file.Headers.Count == 0)
        {
            return new FamilyFileResult(families, file.Problems, []);
        }

        ColumnFinder finder = new(file, options.Columns);
        Dictionary<string, int> places = ColumnNames.ToDictionary(name => name, name => finder.Find(name, isRequired: name == ColumnNames[0]));
        FamilyFileRow row = new(file, places, options.DecimalMark);
        Dictionary<string, long> lines = new(StringComparer.Ordinal);
        while (file.Read())
        {
            Family? family = row.Make(known);
            if (row.Name.Length > 0 && !lines.TryAdd(row.Name, file.Line))
            {
                row.Refuse("family", "duplicate-family", FormattableString.Invariant($"{ShownText.Quote(row.Name)} stands on line {lines[row.Name]} already: give each family one row."));
                family = null;
            }

            if (family is not null)
            {
                families.Add(family);
            }
        }

        CheckGates(file, families, lines);
        return new FamilyFileResult(families, file.Problems, finder.Ignored);
    }

    /// <summary>A gate may name a family of a later row, so that gates are checked at the end.</summary>
    private static void CheckGates(DelimitedFile file, List<Family> families, Dictionary<string, long> lines)
    {
        var byName = families.ToDictionary(f => f.Name, StringComparer.Ordinal);
        foreach (Family family in families.Where(f => f.OpensAfter is not null))
        {
            string other = family.OpensAfter!;
            if (!lines.ContainsKey(other))
            {
                string near = Nearest.Of(other, lines.Keys) is string nearest ? $" (did you mean {ShownText.Quote(nearest)}?)" : "";
                file.ReportAt(lines[family.Name], "opens_after", "unknown-family", $"{ShownText.Quote(other)} is none of the families{near}: name one of them.");
            }
            else if (other == family.Name)
            {
                file.ReportAt(lines[family.Name], "opens_after", "waits-on-itself", $"{ShownText.Quote(other)} waits on itself: name another family, or leave the field empty.");
            }
            else if (FamilyPlan.WaitsOnItself(family, byName))
            {
                file.ReportAt(lines[family.Name], "opens_after", "waits-in-a-circle", $"{ShownText.Quote(family.Name)} waits on itself over others: let one of them be open from the start.");
            }
        }
    }
}
