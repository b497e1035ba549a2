namespace Campaigns.App.Report;

/// <summary>What is asked of a report.</summary>
/// <param name="Code">The campaign.</param>
/// <param name="Experiments">Codes of experiments to show in full besides the survivors; null where none are named, and then all are shown that have values, if there is room for all.</param>
/// <param name="MostInFull">Experiments to show in full with their figures; those that are named come on top of them.</param>
internal sealed record ReportQuestion(string Code, IReadOnlyList<string>? Experiments, int MostInFull)
{
    /// <summary>Experiments that are shown in full where nobody says how many: a page of some 4 MB.</summary>
    public const int UsualInFull = 100;
}
