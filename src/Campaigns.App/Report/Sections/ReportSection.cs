using Campaigns.App.Report.Document;

namespace Campaigns.App.Report.Sections;

/// <summary>One section of a report. A new one is a file, and a line in <see cref="SectionList"/>.</summary>
internal abstract class ReportSection
{
    /// <summary>Where links lead; a word of lower-case letters and hyphens.</summary>
    public abstract string Anchor { get; }

    /// <summary>Its heading.</summary>
    public abstract string Title { get; }

    /// <summary>Whether it is the one page for those who read no more.</summary>
    public virtual bool IsPage => false;

    /// <summary>Whether there is anything to say in it.</summary>
    public virtual bool Concerns(ReportData data) => true;

    /// <summary>What it says, in order; each block is made when it is written.</summary>
    public abstract IEnumerable<Block> Blocks(ReportData data);
}
