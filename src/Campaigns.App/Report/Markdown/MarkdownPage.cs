using Campaigns.App.Output;
using Campaigns.App.Report.Document;

namespace Campaigns.App.Report.Markdown;

/// <summary>Writes a report as Markdown for a laboratory notebook: headings, lists, tables with bars between the columns; figures by their words.</summary>
internal sealed class MarkdownPage
{
    private readonly TextWriter _writer;

    private MarkdownPage(TextWriter writer) => _writer = writer;

    /// <summary>Writes the document.</summary>
    /// <param name="report">The report.</param>
    /// <param name="writer">Where to; lines end with a line feed.</param>
    public static void Write(ReportDocument report, TextWriter writer)
    {
        var page = new MarkdownPage(writer);
        writer.Write($"# {MarkdownText.Escape(report.Title)}\n\nCampaign {MarkdownText.Escape(report.Code)}. {MarkdownText.Escape(report.AsOf)}\n");
        foreach (DocumentSection section in report.Sections)
        {
            writer.Write($"\n## {MarkdownText.Escape(section.Title)}\n");
            foreach (Block block in section.Blocks)
            {
                page.Write(block);
            }
        }

        writer.Write($"\n---\n\n{MarkdownText.Escape(report.Writer)}. {MarkdownText.Escape(report.AsOf)}\n");
    }

    private void Write(Block block)
    {
        switch (block)
        {
            case Heading heading:
                _writer.Write($"\n{new string('#', heading.Level + 2)} {MarkdownText.Escape(heading.Text)}\n");
                break;
            case Paragraph paragraph:
                _writer.Write(paragraph.Tone == Tone.Lead ? $"\n**{MarkdownText.Escape(paragraph.Text)}**\n" : $"\n{MarkdownText.Escape(paragraph.Text)}\n");
                break;
            case Panel panel:
                foreach (Block inside in panel.Blocks)
                {
                    Write(inside);
                }

                break;
            case BulletList list:
                Items(list.Items.Select(MarkdownText.Escape));
                break;
            case Caution caution:
                _writer.Write($"\n> **Caution.** {MarkdownText.Escape(caution.Text)}\n");
                break;
            case FactList facts:
                Items(facts.Facts.Where(f => f.Value.Kind != CellKind.Empty).Select(f => $"{MarkdownText.Escape(f.Name)}: {MarkdownText.Escape(TextTable.Text(f.Value))}"));
                break;
            case TableBlock table:
                Write(table);
                break;
            case FigureBlock { Figure: { } figure }:
                _writer.Write($"\n*{MarkdownText.Escape(figure.Title)}.* {MarkdownText.Escape(figure.Alternative)}\n");
                break;
            default:
                throw new InvalidOperationException($"Markdown has no way to write {block.GetType().Name}.");
        }
    }

    private void Items(IEnumerable<string> items)
    {
        _writer.Write('\n');
        foreach (string item in items)
        {
            _writer.Write($"- {item}\n");
        }
    }

    private void Write(TableBlock table)
    {
        _writer.Write($"\n**{MarkdownText.Escape(table.Caption)}**\n");
        Sentences(table.Above);
        if (table.Rows.Count == 0)
        {
            Sentences([table.WhenEmpty]);
        }
        else
        {
            _writer.Write('\n');
            Line(table.Columns.Select(c => MarkdownText.Escape(c.Heading ?? "")));
            Line(table.Columns.Select(c => c.IsNumeric ? "---:" : "---"));
            foreach (Cell[] row in table.Rows)
            {
                Line(row.Select(cell => MarkdownText.Escape(TextTable.Text(cell))));
            }
        }

        Sentences(table.Below);
    }

    private void Line(IEnumerable<string> cells) => _writer.Write($"| {string.Join(" | ", cells)} |\n");

    private void Sentences(IEnumerable<string> sentences)
    {
        foreach (string sentence in sentences)
        {
            _writer.Write($"\n{MarkdownText.Escape(sentence)}\n");
        }
    }
}
