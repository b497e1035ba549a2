using Campaigns.App.Output;

namespace Campaigns.App.Report.Document;

/// <summary>A piece of a report that knows neither HTML nor Markdown: what is to be read, not how it looks.</summary>
internal abstract record Block;

/// <summary>A heading inside a section.</summary>
/// <param name="Level">1 under the section's own heading, 2 under that.</param>
/// <param name="Anchor">Where links lead; letters, digits and hyphens, unique in the report.</param>
/// <param name="Text">What it says.</param>
internal sealed record Heading(int Level, string Anchor, string Text) : Block;

/// <summary>How loudly a paragraph speaks.</summary>
internal enum Tone
{
    /// <summary>As the text around it.</summary>
    Plain,

    /// <summary>The sentence that must be read, if only one is.</summary>
    Lead,

    /// <summary>What stands below a table or figure: assumptions, procedures, meanings of columns.</summary>
    Note,
}

/// <summary>A paragraph.</summary>
/// <param name="Text">One or more sentences.</param>
/// <param name="Tone">How loudly it speaks.</param>
internal sealed record Paragraph(string Text, Tone Tone = Tone.Plain) : Block;

/// <summary>Sentences that stand beside each other.</summary>
/// <param name="Items">A sentence or more each.</param>
internal sealed record BulletList(IReadOnlyList<string> Items) : Block;

/// <summary>Blocks about one thing, which may stand beside each other where there is room.</summary>
/// <param name="Blocks">What it holds, in the order in which it is read.</param>
internal sealed record Panel(IReadOnlyList<Block> Blocks) : Block;

/// <summary>What the reader has to be warned of, set apart from the text.</summary>
/// <param name="Text">One or more sentences.</param>
internal sealed record Caution(string Text) : Block;

/// <summary>One thing and its value.</summary>
/// <param name="Name">The thing.</param>
/// <param name="Value">Its value.</param>
internal sealed record Fact(string Name, Cell Value);

/// <summary>Things and their values.</summary>
/// <param name="Facts">In the order in which they are read; those without a value are left out.</param>
internal sealed record FactList(IReadOnlyList<Fact> Facts) : Block;
