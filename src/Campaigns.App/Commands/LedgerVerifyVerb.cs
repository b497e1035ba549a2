using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Ledger.Verifying;

namespace Campaigns.App.Commands;

/// <summary>ledger verify: prove the record whole.</summary>
internal sealed class LedgerVerifyVerb : Verb
{
    private readonly Option<LedgerHead?> _head = SharedOptions.HeadOption("A head that was printed earlier; today's chain must hold it. Only so a cut tail or an older copy of the file is seen.");

    public override Command Build() => new("verify", Describe("Prove that the record is whole: every entry follows from the one before, and the catalog holds what the entries recorded and nothing else. Ends with 5 where it is not.",
        "ledger verify --head 41:6f2c0d9e5b7a48319c0e2d4f6a8b1c3d5e7f90123456789abcdef0123456789a"))
    {
        _head,
    };

    public override int Run(Session session)
    {
        using Catalog.Catalog catalog = session.OpenCatalog();
        LedgerProof proof = new LedgerVerifier(catalog).Verify(session.Typed.GetValue(_head));
        if (session.Format != RowFormat.Table)
        {
            session.Print(Rows(proof));
        }

        foreach (string remark in proof.Remarks)
        {
            session.Host.Notice($"Note: {remark}");
        }

        if (proof.IsWhole)
        {
            foreach (string sentence in ProofText.Whole(proof))
            {
                session.Say(sentence);
            }

            return ExitCode.Done;
        }

        session.Host.Notice(ProofText.Broken(proof));
        foreach (LedgerFinding finding in proof.Findings)
        {
            session.Host.Notice($"  {ProofText.Finding(finding)}");
        }

        return ExitCode.RecordBroken;
    }

    /// <summary>For scripts: a row a finding, or one row that says that there is none.</summary>
    private static RowTable Rows(LedgerProof proof)
    {
        Cell[] Row(LedgerFinding? finding) =>
        [
            Cell.Truth(proof.IsWhole), Cell.Whole(proof.Head.Sequence), Cell.Text(proof.Head.ToString()), Cell.Whole(finding?.Sequence), Cell.Text(finding?.Campaign), Cell.Text(finding?.What),
        ];
        return new RowTable(
            [new("whole", null), new("entries", null, true), new("head", null), new("sequence", null, true), new("campaign", null), new("finding", null)],
            proof.IsWhole ? [Row(null)] : proof.Findings.Select(Row));
    }
}
