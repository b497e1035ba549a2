using Campaigns.App.Figures;
using Campaigns.App.Output;
using Campaigns.App.Report.Document;

namespace Campaigns.App.Report.Html;

/// <summary>Writes the blocks of a page.</summary>
/// <param name="writer">Where to.</param>
internal sealed class HtmlBlocks(TextWriter writer)
{
    private readonly HtmlTables _tables = new(writer);
    private int _figures;

    /// <summary>Writes one block.</summary>
    public void Write(Block block)
    {
        switch (block)
        {
            case Heading heading:
                // Level 1 of the page is its title, level 2 the section's.
                writer.Write($"<h{heading.Level + 2} id=\"{heading.Anchor}\">{HtmlText.Escape(heading.Text)}</h{heading.Level + 2}>\n");
                break;
            case Paragraph paragraph:
                writer.Write($"<p{ClassOf(paragraph.Tone)}>{HtmlText.Escape(paragraph.Text)}</p>\n");
                break;
            case Panel panel:
                writer.Write("<div class=\"panel\">\n");
                foreach (Block inside in panel.Blocks)
                {
                    Write(inside);
                }

                writer.Write("</div>\n");
                break;
            case BulletList list:
                Write(list.Items);
                break;
            case Caution caution:
                writer.Write($"<p class=\"caution\"><strong>Caution.</strong> {HtmlText.Escape(caution.Text)}</p>\n");
                break;
            case FactList facts:
                Write(facts.Facts);
                break;
            case TableBlock table:
                _tables.Write(table);
                break;
            case FigureBlock figure:
                Write(figure);
                break;
            default:
                throw new InvalidOperationException($"A page has no way to write {block.GetType().Name}.");
        }
    }

    private static string ClassOf(Tone tone) => tone switch { Tone.Lead => " class=\"lead\"", Tone.Note => " class=\"note\"", _ => "" };

    private void Write(IReadOnlyList<string> items)
    {
        if (items.Count == 0)
        {
            return;
        }

        writer.Write("<ul>\n");
        foreach (string item in items)
        {
            writer.Write($"<li>{HtmlText.Escape(item)}</li>\n");
        }

        writer.Write("</ul>\n");
    }

    private void Write(IReadOnlyList<Fact> facts)
    {
        writer.Write("<dl>\n");
        foreach (Fact fact in facts.Where(f => f.Value.Kind != CellKind.Empty))
        {
            writer.Write($"<div><dt>{HtmlText.Escape(fact.Name)}</dt><dd{HtmlTables.ValueOf(fact.Value)}>{HtmlText.Escape(TextTable.Text(fact.Value))}</dd></div>\n");
        }

        writer.Write("</dl>\n");
    }

    private void Write(FigureBlock block)
    {
        if (block.Figure.HasPicture)
        {
            // Title and notes are text of the page, so that they keep their size where the picture shrinks.
            IEnumerable<string> notes = block.WithNotes ? block.Figure.Notes : [];
            writer.Write($"<figure>\n{FigureSvg.Write(block.Figure, $"figure-{HtmlText.Whole(++_figures)}", withWords: false)}<figcaption><strong>{HtmlText.Escape(block.Figure.Title)}.</strong>{string.Concat(notes.Select(n => " " + HtmlText.Escape(n)))}</figcaption>\n</figure>\n");
            return;
        }

        writer.Write($"<p class=\"empty\"><strong>{HtmlText.Escape(block.Figure.Title)}.</strong> {HtmlText.Escape(block.Figure.Alternative)}</p>\n");
    }
}
