using Campaigns.App.Commands;
using Campaigns.App.Figures;
using Campaigns.App.Report.Document;

namespace Campaigns.App.Report.Sections;

/// <summary>The survivors with effect, and the comparisons claimed inside them.</summary>
internal sealed class SurvivorsSection : ReportSection
{
    public override string Anchor => "survivors";

    public override string Title => "Survivors";

    public override bool Concerns(ReportData data) => data.Overview.TestedCount > 0 || data.Survivors.Listed.Count > 0;

    public override IEnumerable<Block> Blocks(ReportData data)
    {
        IReadOnlyDictionary<string, string> links = Anchors.InFull(data);
        yield return new FigureBlock(SurvivorsFigure.Of(data.Standing));
        yield return TableBlock.Of("Survivors, the smallest p first", SurvivorTables.Rows(data.Survivors)).WithoutEmptyColumns() with { Links = links };
        if (data.Survivors.Listed.Count > 0)
        {
            yield return TableBlock.Of("Comparisons claimed inside the survivors", SurvivorTables.Claims(data.Survivors) with { Above = [] }).WithoutEmptyColumns() with { Links = links };
        }
    }
}
