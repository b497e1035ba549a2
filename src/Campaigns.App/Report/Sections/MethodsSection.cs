using Campaigns.App.Report.Document;
using Campaigns.App.Wording;
using Campaigns.Domain;
using Campaigns.Statistics.Checks;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.GroupTests;

namespace Campaigns.App.Report.Sections;

/// <summary>The procedures behind the numbers of this report, what each holds and assumes, and where it was published.</summary>
internal sealed class MethodsSection : ReportSection
{
    public override string Anchor => "methods";

    public override string Title => "Methods and their sources";

    public override IEnumerable<Block> Blocks(ReportData data)
    {
        IReadOnlyList<ExperimentResult> experiments = data.Standing.Experiments;
        string[] tests = [.. experiments.Select(e => e.Plan.Test).Append(data.Standing.Campaign.DefaultTest).Distinct()];
        string[] followUps = [.. experiments.Select(e => e.Plan.FollowUp).Distinct()];
        yield return new Heading(1, "methods-tests", "Tests of an experiment");
        yield return new BulletList([.. GroupTestRegistry.All.Where(t => tests.Contains(t.Key)).Select(t => $"{ExperimentWording.Assumptions(t)}"), .. Beside(data, tests)]);
        FollowUp[] used = [.. FollowUpRegistry.All.Where(f => followUps.Contains(f.Key) && f.Key != FollowUpRegistry.None)];
        if (used.Length > 0)
        {
            yield return new Heading(1, "methods-comparisons", "Comparisons inside an experiment");
            yield return new BulletList([.. used.Select(f => $"{f.Name}: {f.Holds} Assumes: {f.Assumes} Source: {Ended(f.Source)}"), .. Claims(data)]);
        }

        yield return new Heading(1, "methods-corrections", "Corrections");
        yield return new BulletList([.. Corrections(data).Select(c => $"{c.Name}: {c.Guarantee} Source: {Ended(c.Source)}")]);
        foreach (Block block in Details(data))
        {
            yield return block;
        }
    }

    private static IEnumerable<Block> Details(ReportData data)
    {
        if (data.InFull.Any(e => e.Detail.Analysis.Checks.Count > 0))
        {
            yield return new Heading(1, "methods-checks", "Checks of the assumptions");
            yield return new BulletList([.. CheckRegistry.All.Select(c => $"{c.Name}: {c.CannotSee} Source: {Ended(c.Source)}")]);
        }

        if (data.Overview.TestedCount > 0)
        {
            yield return new Heading(1, "methods-estimates", "Bounds, estimates and effects");
            yield return new BulletList(
            [
                $"How many of the survivors may be false: {BoundWording.SimesAlone} {BoundWording.NoEstimate}",
                "Share of true nulls, and false survivors by estimate: J. D. Storey (2002), Journal of the Royal Statistical Society B 64:479-498.",
                "Eta, omega and epsilon squared and Cohen's f: shares of the variation of the response that lies between the groups; intervals from the noncentral F law.",
                "A p-value is never shown as 0: tails are computed to the smallest double, and below that by their logarithm.",
            ]);
        }
    }

    private static IEnumerable<string> Beside(ReportData data, string[] tests) =>
        !tests.Contains("welch") && data.InFull.Any(e => e.Detail.Analysis.Beside is not null) ? [$"{ExperimentWording.Assumptions(GroupTestRegistry.Find("welch")!)} {ExperimentWording.Beside}"] : [];

    private static IEnumerable<string> Claims(ReportData data)
    {
        var verdict = new ComparisonVerdict(data.Standing.Campaign, data.Standing.Families);
        return new[] { verdict.Guarantee, verdict.SelectedGuarantee }.Where(s => s.Length > 0);
    }

    /// <summary>Those by which the campaign is judged, and those that stand beside them.</summary>
    private static IEnumerable<ErrorProcedure> Corrections(ReportData data)
    {
        Campaign campaign = data.Standing.Campaign;
        IEnumerable<ErrorProcedure> own = campaign.JudgedFamilies.Count == 0
            ? [FamilyVerdict.ProcedureOf(campaign), .. campaign.Streams.Select(s => (ErrorProcedure)s.Procedure)]
            : campaign.JudgedFamilies.Select(f => FamilyVerdict.ProcedureOf(campaign, f));
        IEnumerable<ErrorProcedure> beside = data.Overview.TestedCount > 0 ? CorrectionsBeside.Of(data.Standing).Where(o => !o.IsMixed).Select(o => o.Procedure) : [];
        return own.Concat(beside).DistinctBy(c => c.Key);
    }

    private static string Ended(string source) => source.EndsWith('.') ? source : source + ".";
}
