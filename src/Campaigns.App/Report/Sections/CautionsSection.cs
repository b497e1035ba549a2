using Campaigns.App.Commands;
using Campaigns.App.Report.Document;
using Campaigns.App.Wording;

namespace Campaigns.App.Report.Sections;

/// <summary>Everything that the reader has to be careful about.</summary>
internal sealed class CautionsSection : ReportSection
{
    public override string Anchor => "cautions";

    public override string Title => "Cautions";

    /// <summary>What the record calls to be careful about; empty where it calls for nothing.</summary>
    public static IReadOnlyList<string> All(ReportData data) =>
        [.. CautionText.Of(data.Standing, data.Overview, Excluded(data), data.Checks.Looked, data.Checks.Warned)];

    public override IEnumerable<Block> Blocks(ReportData data)
    {
        yield return new Caution(CampaignText.Caution);
        IReadOnlyList<string> all = All(data);
        yield return all.Count > 0 ? new BulletList(all) : new Paragraph(CautionText.Nothing);
    }

    /// <summary>Of each observation the latest decision counts.</summary>
    private static (string Experiment, int Count)[] Excluded(ReportData data) =>
    [
        .. data.Plan.Exclusions.GroupBy(x => x.Experiment, StringComparer.Ordinal)
            .Select(g => (g.Key, g.GroupBy(x => (x.File, x.Line)).Count(d => d.Last().IsExcluded))).Where(e => e.Item2 > 0),
    ];
}
