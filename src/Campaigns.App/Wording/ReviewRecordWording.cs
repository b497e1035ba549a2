using Campaigns.App.Output;
using Campaigns.Domain;

namespace Campaigns.App.Wording;

/// <summary>What stood behind a review on its day, in words.</summary>
internal static class ReviewRecordWording
{
    /// <summary>A sentence on each thing that the review rested on.</summary>
    public static IEnumerable<string> Behind(ReviewRecord record)
    {
        ArgumentNullException.ThrowIfNull(record);
        ReviewHead head = record.Head;
        yield return $"{ReviewWording.Line(head)}.";
        string level = NumberText.RoundTrip(head.Level.Value);
        yield return record.Families.Count == 0
            ? $"Corrected by {ReviewWording.ProcedureName(head.Correction)} at {level}."
            : $"Corrected in {Counted.Of(record.Families.Count, "family", "families")}, level of the campaign {level}.";
        foreach (FamilyStanding family in record.Families)
        {
            yield return ReviewWording.Family(head, family);
        }

        string plan = record.PlanVersion == 0 ? "the plan as it was sealed" : FormattableString.Invariant($"the plan after amendment {record.PlanVersion}");
        yield return FormattableString.Invariant($"It rests on {plan}, and on {Counted.Of(record.Rows, "row")} of measurements from {Counted.Of(record.Files, "file")}.");
        string entry = record.LedgerSequence is { } sequence ? FormattableString.Invariant($"entry {sequence} of the ledger speaks for it") : "no entry of the ledger speaks for it";
        yield return $"Taken by version {head.ProgramVersion} of the program; {entry}.";
    }
}
