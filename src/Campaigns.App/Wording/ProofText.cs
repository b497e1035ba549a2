using Campaigns.Catalog.Ledger.Verifying;

namespace Campaigns.App.Wording;

/// <summary>What came of proving a record, in words.</summary>
internal static class ProofText
{
    /// <summary>For a record that is whole: what was proved, and what was not.</summary>
    public static IEnumerable<string> Whole(LedgerProof proof)
    {
        ArgumentNullException.ThrowIfNull(proof);
        yield return FormattableString.Invariant($"The record is whole: {proof.Entries} {Counted.Word(proof.Entries, "entry", "entries")}. Its head: {proof.Head}");
        yield return FormattableString.Invariant($"Proved: every entry follows from the one before it, from 1 to {proof.Head.Sequence} without a gap; {proof.Digests} digests of what the entries recorded (plans, loaded files, measurements, results, reviews, decisions) recompute from the tables; no row stands in the tables without an entry; the sealed plans are those that were sealed; the file, its keys and its triggers are sound.");
        if (proof.ClockSteps > 0)
        {
            yield return FormattableString.Invariant($"The computer's clock went back before {proof.ClockSteps} of the entries; 'campaigns ledger' shows where. The order is that of the numbers.");
        }

        yield return proof.Known is { } known
            ? FormattableString.Invariant($"Since the head given was printed the record was only continued: {Counted.Of(proof.Head.Sequence - known.Sequence, "entry", "entries")} came after it. The head given: {known}")
            : LedgerText.NotSeenWithoutHead;
    }

    /// <summary>For a record that is not whole: the sentence that says so, and where it first shows.</summary>
    public static string Broken(LedgerProof proof)
    {
        ArgumentNullException.ThrowIfNull(proof);
        LedgerFinding first = proof.Findings[0];
        string where = first.Sequence is { } sequence ? FormattableString.Invariant($"the first entry that shows it is {sequence}") : "no entry of the ledger shows where";
        return FormattableString.Invariant($"The record is not whole; {where}. Findings: {proof.Findings.Count}. Restore the catalog from a copy that proves whole; the ledger's head in reports and exports tells how far a copy reaches.");
    }

    /// <summary>A finding as a sentence.</summary>
    public static string Finding(LedgerFinding finding)
    {
        ArgumentNullException.ThrowIfNull(finding);
        string entry = finding.Sequence is { } sequence ? FormattableString.Invariant($"Entry {sequence}{(finding.Campaign is null ? "" : $" ({finding.Campaign})")}: ") : "";
        return entry + finding.What;
    }
}
