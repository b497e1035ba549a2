using Campaigns.App.Commands;
using Campaigns.App.Figures;
using Campaigns.App.Output;
using Campaigns.App.Report.Document;

namespace Campaigns.App.Report.Sections;

/// <summary>Every correction side by side, and what hangs on the choice.</summary>
internal sealed class CorrectionsSection : ReportSection
{
    public override string Anchor => "corrections";

    public override string Title => "Corrections side by side";

    public override bool Concerns(ReportData data) => data.Overview.TestedCount > 0;

    public override IEnumerable<Block> Blocks(ReportData data)
    {
        yield return new FigureBlock(CorrectionsFigure.Of(data.Standing));
        yield return TableBlock.Of("Survivors under every correction", CorrectionsVerb.ByCorrection(data.Standing));
        RowTable hanging = CorrectionsVerb.ByExperiment(data.Standing, hangingOnly: true);
        yield return TableBlock.Of("Experiments that hang on the choice", hanging).Only("experiment", "p", hanging.Columns[2].Name, "survives_under") with { Links = Anchors.InFull(data) };
    }
}
