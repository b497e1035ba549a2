using Campaigns.App.Commands;
using Campaigns.App.Output;
using Campaigns.App.Report.Document;
using Campaigns.Domain;

namespace Campaigns.App.Report.Sections;

/// <summary>A row an experiment, those without a result included.</summary>
internal sealed class ResultsSection : ReportSection
{
    public override string Anchor => "results";

    public override string Title => "Every experiment";

    /// <summary>What is said where a table leaves rows out.</summary>
    /// <param name="all">How many rows there are.</param>
    /// <param name="which">Which of them are shown: "first in the plan".</param>
    public static string Cut(int all, string which) =>
        FormattableString.Invariant($"{TableBlock.MostRows} of {all} rows are shown, those {which}; 'campaigns export' writes all of them.");

    public override IEnumerable<Block> Blocks(ReportData data)
    {
        IReadOnlyList<ExperimentResult> all = data.Standing.Experiments;
        bool isCut = all.Count > TableBlock.MostRows;
        RowTable rows = ResultsVerb.Table(data.Standing, isCut ? Foremost(all) : all);
        rows = rows with
        {
            Above = [],
            Below = [.. isCut ? [Cut(all.Count, "that survive, then those with the smallest p, in the plan's order")] : (string[])[], "Adjusted p: over the whole family, to be held against the level. Status: where an experiment without a result stands.", .. rows.Below],
            WhenEmpty = "The campaign has no experiments yet.",
        };
        yield return TableBlock.Of("Results", rows).WithoutEmptyColumns() with { Links = Anchors.InFull(data) };
    }

    /// <summary>As many experiments as a table takes: survivors, then the smallest p; in the plan's order.</summary>
    private static IEnumerable<ExperimentResult> Foremost(IReadOnlyList<ExperimentResult> all) => all
        .OrderByDescending(e => e.Survives == true).ThenByDescending(e => e.P is not null).ThenBy(e => e.P).ThenBy(e => e.Position)
        .Take(TableBlock.MostRows).OrderBy(e => e.Position);
}
