using Campaigns.App.Commands;
using Campaigns.App.Report.Document;
using Campaigns.App.Wording;

namespace Campaigns.App.Report.Sections;

/// <summary>The families of a campaign that has several, with their levels and gates.</summary>
internal sealed class FamiliesSection : ReportSection
{
    public override string Anchor => "families";

    public override string Title => "Families";

    public override bool Concerns(ReportData data) => data.Standing.Campaign.JudgedFamilies.Count > 0;

    public override IEnumerable<Block> Blocks(ReportData data)
    {
        yield return TableBlock.Of("Families, each corrected on its own", FamilyTable.Of(data.Standing.Campaign, data.Standing.Families)).WithoutEmptyColumns();
        yield return new BulletList([.. FamilyText.Lines(data.Overview)]);
    }
}
