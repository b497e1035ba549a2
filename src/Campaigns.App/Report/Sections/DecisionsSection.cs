using Campaigns.App.Commands;
using Campaigns.App.Report.Document;

namespace Campaigns.App.Report.Sections;

/// <summary>The levels given and the decisions made as experiments arrived.</summary>
internal sealed class DecisionsSection : ReportSection
{
    public override string Anchor => "decisions";

    public override string Title => "Decisions on arrival";

    public override bool Concerns(ReportData data) => data.Standing.Campaign.Streams.Count > 0;

    public override IEnumerable<Block> Blocks(ReportData data)
    {
        yield return TableBlock.Of("Levels given and decisions that stand, in the order of the stream", DecisionRows.Of(data.Decisions) with { Below = DecisionRows.Below(data.Overview, data.Decisions) }).Only("position", "stream", "experiment", "level", "p", "survives", "registered_at", "decided_at", "overlaps");
    }
}
