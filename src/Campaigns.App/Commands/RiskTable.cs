using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Numerics;

namespace Campaigns.App.Commands;

/// <summary>The risk of false positives as rows.</summary>
internal static class RiskTable
{
    private static IReadOnlyList<Column> Columns { get; } =
    [
        new("campaign", "campaign"), new("tests", "tests", true), new("level", "level", true), new("expected_false_positives", "expected false", true),
        new("risk_independent", "risk", true), new("risk_at_least", "at least", true), new("risk_at_most", "at most", true),
        new("uncorrected_hits", "hits", true), new("survivors", "survive", true), new("correction", "correction"), new("guarantee", null),
        new("true_null_share", "nulls", true, 2), new("expected_false_survivors", "false est.", true, 2), new("false_survivors_at_most", "false at most", true, 1), new("confidence", null, true),
        new("corrected_risk", "corrected", true, 2), new("corrected_risk_is", null), new("corrected_expected_false", null, true), new("family_size", null, true),
    ];

    /// <summary>A row a campaign, and for several the programme as a whole.</summary>
    public static RowTable Of(IReadOnlyList<CampaignRisk> risks, bool withTotal)
    {
        List<Cell[]> rows = [.. risks.Select(Row)];
        CampaignOverview[] campaigns = [.. risks.Select(r => r.Overview)];
        if (withTotal && campaigns.Length > 1)
        {
            rows.Add(Total(risks));
        }

        List<string> below =
        [
            "Expected false: false positives to expect without any correction if nothing is real (tests times level), whatever the dependence. Risk: that there is at least one, for independent tests; at least, at most: its bounds whatever the dependence. Hits: experiments whose own p is at most the level; survive: those left by the correction.",
            "Nulls: the estimated share of true nulls among the tests, from the p-values above 0.5. False est.: how many survivors may be expected to be false, that share times the tests times the largest surviving p (Storey 2002). Estimates for independent tests, no bounds; fewer than about 20 tests tell little.",
            .. risks.Where(r => r.Overview.TestedCount > 0 && r.TrueNulls.Reason is not null).Select(r => $"{r.Overview.Campaign.Code}: {r.TrueNulls.Reason}"),
            "False at most: of the survivors, by closed testing over all planned experiments of the campaign, with the confidence of 1 - level, if Simes' inequality holds for the true nulls (Goeman and Solari 2011). " + BoundWording.NoEstimate,
            CorrectedMeans([.. risks.Select(r => r.Corrected).OfType<CorrectedRisk>()]),
        ];
        below.AddRange(risks.Select(r => $"{r.Overview.Campaign.Code}: {CampaignText.Goal(r.Overview.Campaign)}. {Held(r.Overview)}{Numbers(r)}"));
        below.AddRange(campaigns.SelectMany(c => CampaignText.Deviations(c).Select(d => $"{c.Campaign.Code}: {d}")));
        if (campaigns.Length > 1)
        {
            below.AddRange(AddingUp(campaigns));
        }

        return new RowTable(Columns, rows) { Below = below, WhenEmpty = "The catalog holds no campaigns yet." };
    }

    /// <summary>The risk of one campaign in sentences.</summary>
    public static IReadOnlyList<string> Sentences(CampaignOverview c)
    {
        int tests = c.TestedCount;
        if (tests == 0)
        {
            return ["Cumulative risk: nothing was tested yet."];
        }

        return
        [
            FormattableString.Invariant($"Cumulative risk: {Counted.Of(tests, "test")} at {c.Campaign.Level}{(tests == 1 ? "" : " each")}. Without a correction, if nothing is real, {NumberText.Screen(FamilyRisk.ExpectedFalsePositives(tests, c.Campaign.Level), 3)} false positives are to be expected, and the risk of at least one is {Words.Percent(FamilyRisk.AtLeastOneIfIndependent(tests, c.Campaign.Level))} for independent tests (between {Words.Percent(FamilyRisk.AtLeastOneLowerBound(tests, c.Campaign.Level))} and {Words.Percent(FamilyRisk.AtLeastOneUpperBound(tests, c.Campaign.Level))} whatever the dependence). {Counted.Of(c.UncorrectedCount, "experiment")} would count as {Counted.Word(c.UncorrectedCount, "a hit", "hits")}; {c.SurvivorCount} {Counted.Word(c.SurvivorCount, "survives", "survive")} the correction."),
            $"What the correction holds: {Held(c)}",
        ];
    }

    /// <summary>What the corrected risk is; whether it is exact depends on the procedures shown.</summary>
    /// <param name="shown">The corrected risks of the rows.</param>
    public static string CorrectedMeans(IReadOnlyCollection<CorrectedRisk> shown) =>
        "Corrected: the risk of at least one false survivor with the correction, if nothing is real and the tests are independent"
        + (shown.Count == 0 ? "; not given where a campaign is corrected in several families."
            : shown.All(r => r.IsExact) ? ", exactly."
            : shown.Any(r => r.IsExact) ? ", exactly or at most, as the column corrected_risk_is says." : ", at most.")
        + " With effects a familywise correction still holds it; one that holds the false discovery rate does not: some false survivors among many true ones are what it allows.";

    /// <summary>"exact" or "at most"; null for no risk.</summary>
    public static string? Exactness(CorrectedRisk? risk) => risk is { } given ? given.IsExact ? "exact" : "at most" : null;

    /// <summary>What the correction holds and what of the survivors may be false, in numbers, where a law gives them.</summary>
    private static string Numbers(CampaignRisk risk) => string.Concat(MayBeFalse(risk).Select(sentence => " " + sentence));

    /// <summary>What the correction risks if nothing is real, and how many of the survivors may be false, in sentences; none where nothing was tested.</summary>
    public static IReadOnlyList<string> MayBeFalse(CampaignRisk risk)
    {
        CampaignOverview c = risk.Overview;
        ErrorProcedure procedure = FamilyVerdict.ProcedureOf(c.Campaign);
        var sentences = new List<string>();
        if (c.TestedCount > 0 && risk.Corrected is { } corrected)
        {
            string expected = corrected.ExpectedFalse is { } number ? $", and {NumberText.Screen(number, 3)} false survivors are to be expected" : "";
            sentences.Add($"If nothing is real and the tests are independent, the risk of a false survivor is {(corrected.IsExact ? "" : "at most ")}{Words.Percent(corrected.AtLeastOne)}{expected}.");
        }

        if (c.SurvivorCount > 0)
        {
            string estimate = risk.ExpectedFalseSurvivors is { } number ? $", by estimate {NumberText.Screen(number, 2)} (share of true nulls {NumberText.Screen(risk.TrueNulls.Share ?? 0, 2)})" : "";
            sentences.Add($"{BoundWording.OfSurvivors(c.SurvivorCount, risk.SurvivorBound.FalseAtMost, risk.Confidence)}{estimate}.");
            if (procedure.Controls == ErrorRate.FalseDiscovery)
            {
                sentences.Add("With effects the number of false survivors grows with the survivors, about their number times the rate.");
            }
        }

        return sentences;
    }

    private static Cell[] Row(CampaignRisk risk)
    {
        CampaignOverview c = risk.Overview;
        int tests = c.TestedCount;
        return
        [
            Cell.Text(c.Campaign.Code), Cell.Whole(tests), Cell.Setting(c.Campaign.Level.Value),
            Cell.Number(FamilyRisk.ExpectedFalsePositives(tests, c.Campaign.Level)), Cell.Number(FamilyRisk.AtLeastOneIfIndependent(tests, c.Campaign.Level)),
            Cell.Number(FamilyRisk.AtLeastOneLowerBound(tests, c.Campaign.Level)), Cell.Number(FamilyRisk.AtLeastOneUpperBound(tests, c.Campaign.Level)),
            Cell.Whole(c.UncorrectedCount), Cell.Whole(c.SurvivorCount), Cell.Text(c.Campaign.Correction), Cell.Text(Held(c)),
            Cell.Number(risk.TrueNulls.Share), Cell.Number(risk.ExpectedFalseSurvivors), Cell.Whole(risk.SurvivorBound.FalseAtMost), Cell.Setting(risk.Confidence),
            Cell.Number(risk.Corrected?.AtLeastOne), Cell.Text(Exactness(risk.Corrected)), Cell.Number(risk.Corrected?.ExpectedFalse), Cell.Whole(c.FamilySize),
        ];
    }

    /// <summary>What the procedures of a campaign promise.</summary>
    public static string Held(CampaignOverview c) => c.Campaign.JudgedFamilies.Count == 0
        ? FamilyVerdict.ProcedureOf(c.Campaign).Guarantee
        : string.Join(" ", [.. FamilyText.Guarantees(c), FamilyText.Together(c)]);

    /// <summary>All campaigns together: expectations add up, and for independent tests the chances of no false positive multiply. Bounds with a confidence of their own do not add up.</summary>
    private static Cell[] Total(IReadOnlyList<CampaignRisk> risks)
    {
        CampaignOverview[] campaigns = [.. risks.Select(r => r.Overview)];
        (double expected, double any, double least) = Together(campaigns);
        bool allKnown = risks.All(r => r.Corrected is not null);
        double logNoneCorrected = risks.Sum(r => r.Corrected is { } corrected ? Accurate.Log1p(-corrected.AtLeastOne) : 0);
        return
        [
            Cell.Text("programme"), Cell.Whole(campaigns.Sum(c => (long)c.TestedCount)), Cell.Empty,
            Cell.Number(expected), Cell.Number(any), Cell.Number(least), Cell.Number(Math.Min(1, expected)),
            Cell.Whole(campaigns.Sum(c => (long)c.UncorrectedCount)), Cell.Whole(campaigns.Sum(c => (long)c.SurvivorCount)), Cell.Empty, Cell.Empty,
            Cell.Empty, risks.All(r => r.ExpectedFalseSurvivors is not null) ? Cell.Number(risks.Sum(r => r.ExpectedFalseSurvivors!.Value)) : Cell.Empty, Cell.Empty, Cell.Empty,
            allKnown ? Cell.Number(-Accurate.Expm1(logNoneCorrected)) : Cell.Empty,
            allKnown ? Cell.Text(risks.All(r => r.Corrected!.Value.IsExact) ? "exact" : "at most") : Cell.Empty,
            risks.All(r => r.Corrected?.ExpectedFalse is not null) ? Cell.Number(risks.Sum(r => r.Corrected!.Value.ExpectedFalse!.Value)) : Cell.Empty,
            Cell.Whole(campaigns.Sum(c => (long)c.FamilySize)),
        ];
    }

    /// <summary>The risk of all campaigns together in sentences: the figures, and what adds up and what does not.</summary>
    public static IReadOnlyList<string> Programme(IReadOnlyList<CampaignOverview> campaigns)
    {
        long tests = campaigns.Sum(c => (long)c.TestedCount);
        if (tests == 0)
        {
            return ["Cumulative risk of the programme: nothing was tested yet."];
        }

        (double expected, double any, double least) = Together(campaigns);
        return
        [
            FormattableString.Invariant($"Cumulative risk of the programme: {tests} tests in {campaigns.Count} campaign{(campaigns.Count == 1 ? "" : "s")}. Without a correction, if nothing is real, {NumberText.Screen(expected, 3)} false positives are to be expected, and the risk of at least one is {Words.Percent(any)} for independent tests (between {Words.Percent(least)} and {Words.Percent(Math.Min(1, expected))} whatever the dependence). {campaigns.Sum(c => (long)c.UncorrectedCount)} experiments would count as hits; {campaigns.Sum(c => (long)c.SurvivorCount)} survive the corrections of their campaigns."),
            .. AddingUp(campaigns),
        ];
    }

    /// <summary>Without correction: expected false positives of all campaigns, the risk of at least one for independent tests, and the least that it can be.</summary>
    private static (double Expected, double Any, double Least) Together(IReadOnlyList<CampaignOverview> campaigns) => (
        campaigns.Sum(c => FamilyRisk.ExpectedFalsePositives(c.TestedCount, c.Campaign.Level)),
        -Accurate.Expm1(campaigns.Sum(c => c.TestedCount * Accurate.Log1p(-c.Campaign.Level.Value))),
        campaigns.Max(c => FamilyRisk.AtLeastOneLowerBound(c.TestedCount, c.Campaign.Level)));

    /// <summary>What adds up over campaigns and what does not.</summary>
    private static IEnumerable<string> AddingUp(IReadOnlyList<CampaignOverview> campaigns)
    {
        yield return "What adds up: expected false positives, whatever the dependence; for independent tests the chances of none multiply.";
        CampaignOverview[] familywise = [.. campaigns.Where(c => c.TestedCount > 0 && FamilyVerdict.ProcedureOf(c.Campaign).Controls == ErrorRate.Familywise)];
        if (familywise.Length > 1)
        {
            double expected = familywise.Sum(c => c.Campaign.Level.Value);
            double any = -Accurate.Expm1(familywise.Sum(c => Accurate.Log1p(-c.Campaign.Level.Value)));
            yield return FormattableString.Invariant($"{familywise.Length} campaigns hold a familywise error rate: at most {NumberText.Screen(expected, 3)} of them are expected to have any false survivor, whatever the dependence between campaigns; that at least one has, is a risk of up to {Words.Percent(any)} for independent campaigns.");
        }

        yield return "What does not add up: a false discovery rate held in each campaign does not hold it for all their survivors together (only the mean over campaigns of the shares of false survivors is held), and bounds of single campaigns hold each with its own confidence. 'campaigns risk --pooled' looks at all experiments as one family.";
    }
}
