using Campaigns.App.Commands;
using Campaigns.App.Figures;
using Campaigns.App.Output;
using Campaigns.App.Report.Document;
using Campaigns.App.Wording;

namespace Campaigns.App.Report.Sections;

/// <summary>What many tests at once risked, without and with the correction.</summary>
internal sealed class RiskSection : ReportSection
{
    public override string Anchor => "risk";

    public override string Title => "Risk of false positives";

    public override bool Concerns(ReportData data) => data.Overview.TestedCount > 0;

    public override IEnumerable<Block> Blocks(ReportData data)
    {
        foreach (string sentence in RiskTable.Sentences(data.Overview))
        {
            yield return new Paragraph(sentence);
        }

        yield return new FigureBlock(RiskFigure.Of(data.Standing, data.RiskCurve));
        RowTable risk = RiskTable.Of([data.Risk], withTotal: false);
        Cell[] values = risk.Rows.Single();
        yield return new FactList([.. risk.Columns.Select((c, i) => (Column: c, Value: values[i])).Where(f => f.Column.Heading is not null && f.Column.Name != "campaign").Select(f => new Fact(Sentence.Start(f.Column.Heading!), f.Value))]);
        foreach (string sentence in risk.Below)
        {
            yield return new Paragraph(sentence, Tone.Note);
        }
    }
}
