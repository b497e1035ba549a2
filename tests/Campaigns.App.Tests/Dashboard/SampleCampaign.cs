using System.Globalization;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Units;

namespace Campaigns.App.Tests.Dashboard;

/// <summary>Invented campaigns put together by hand: the results in the list are plausible, not computed by the product; the analysis in the detail is computed from invented values.</summary>
internal static class SampleCampaign
{
    public const string Code = "PRIMER-26";

    public const string Hostile = "evil\u001b[31m\u202egpj_name\r\n";

    /// <summary>Experiments of the campaign that the details belong to.</summary>
    public const int Family = 48;

    private const int Survivors = 8;

    private static readonly ExperimentStatus[] NoResults =
        [ExperimentStatus.Planned, ExperimentStatus.Incomplete, ExperimentStatus.Ready, ExperimentStatus.TooFewGroups, ExperimentStatus.NoReplication, ExperimentStatus.ConstantResponse, ExperimentStatus.ZeroWithinVariation];

    /// <summary>A campaign in which about every sixth experiment has no result.</summary>
    public static CampaignStanding Standing(int planned, string correction = "rising", int withoutResult = 6, Func<int, ExperimentStatus>? status = null)
    {
        Random random = new(20_260_501);
        List<ExperimentResult> experiments = [];
        for (int i = 0; i < planned; i++)
        {
            ExperimentStatus state = status?.Invoke(i) ?? (withoutResult > 0 && i % withoutResult == withoutResult - 1 ? NoResults[i / withoutResult % NoResults.Length] : ExperimentStatus.Tested);
            experiments.Add(Experiment(i, state, random));
        }

        Adjust(experiments, planned);
        return new CampaignStanding(Campaign(correction), experiments, planned, Review(experiments, planned, correction), 0)
        {
            Families = [Figures(Campaign(correction)) with { Size = planned, Planned = planned, Tested = experiments.Count(e => e.P is not null), Survivors = experiments.Count(e => e.Survives == true) }],
        };
    }

    public static Campaign Campaign(string correction) => new()
    {
        Code = Code,
        Title = "Adhesion of spring primers",
        ErrorRate = ErrorRate.FalseDiscovery,
        Level = new SignificanceLevel(0.05),
        Correction = correction,
        OpenedAt = new DateTimeOffset(2026, 4, 1, 8, 0, 0, TimeSpan.Zero),
        SealedAt = new DateTimeOffset(2026, 4, 3, 8, 0, 0, TimeSpan.Zero),
    };

    private static FamilyStanding Figures(Campaign campaign) => new("", campaign.Correction, campaign.Level, Family, Family, Family, Survivors);

    public static SampleSource Source(CampaignStanding standing) => new(standing);

    public static ErrorProcedure? Find(string key) => key switch
    {
        "rising" => new RisingCorrection(),
        "unbounded" => new UnboundedCorrection(),
        _ => (ErrorProcedure?)CorrectionRegistry.Find(key) ?? OnlineRegistry.Find(key),
    };

    public static ExperimentDetail Detail(ExperimentResult result)
    {
        Random random = new(result.Position);
        List<GroupDetail> groups = [];
        for (int g = 0; g < result.Plan.Groups.Count; g++)
        {
            int n = result.Status is ExperimentStatus.Planned || (result.Status is ExperimentStatus.TooFewGroups && g > 0) ? 0
                : result.Status is ExperimentStatus.NoReplication ? 1
                : 8;
            double[] values = [.. Enumerable.Range(0, n).Select(_ => Value(result.Status, g, random))];
            groups.Add(new GroupDetail(result.Plan.Groups[g], result.Plan.Groups[g] == result.Plan.Control, values, Summary(values)));
        }

        GroupedSample sample = Sample(groups);
        Tested? tested = result.P is null ? null : new FTest().Test(sample) as Tested;
        Campaign campaign = Campaign("rising");
        ExperimentAnalysis analysis = ExperimentAnalysis.Of(result.Plan, result.Plan.Groups, sample, campaign, Family, tested);
        var verdict = new ComparisonVerdict(campaign, [Figures(campaign)]);
        return new ExperimentDetail(result, groups, 0.95, tested?.Variation, result.Position % 4 == 0 ? 2 : 0)
        {
            Analysis = analysis,
            Comparisons = verdict.Judge(result, result.Plan.Groups, analysis.FollowUp),
            ComparisonGuarantee = verdict.Guarantee,
            Outcome = tested,
        };
    }

    /// <summary>A surviving experiment of which there is something to say in every section: readings of specimens, spreads that differ, blocks, a permutation, exclusions.</summary>
    public static ExperimentDetail Eventful()
    {
        ExperimentResult result = Standing(Family).Experiments[10];
        ExperimentDetail plain = Detail(result with { Resampling = new Resampling(999, 4, 20_260_501) });
        GroupDetail[] groups = [.. plain.Groups.Select((g, i) => g with { Values = [.. g.Values.Select((v, k) => Math.Round(i == 3 ? v + (k % 4 * 6) : v, 1))] })];
        GroupedSample sample = Sample(groups, perSpecimen: 2);
        var tested = (Tested)ExperimentalUnits.Test(new FTest(), sample, RandomDraws.Usual);
        Campaign campaign = Campaign("rising");
        ExperimentAnalysis analysis = ExperimentAnalysis.Of(result.Plan, result.Plan.Groups, sample, campaign, Family, tested);
        return plain with
        {
            Groups = [.. groups.Select(g => g with { Summary = Summary([.. g.Values]) })],
            Variation = tested.Variation! with { Blocks = new VariationLine(2.5, 3, 2.5 / 3) },
            Analysis = analysis,
            Comparisons = new ComparisonVerdict(campaign, [Figures(campaign)]).Judge(result, result.Plan.Groups, analysis.FollowUp),
            Outcome = tested,
            OutcomeWithExcluded = tested with { Statistic = 1.25, P = PValue.FromValue(0.3125) },
            Exclusions =
            [
                new ExcludedObservation("E11", "oven-7.csv", 14, "zinc", "91.0", true, "the film had blistered", "M. Ferrer", new DateTimeOffset(2026, 4, 20, 10, 0, 0, TimeSpan.Zero)),
                new ExcludedObservation("E11", "oven-7.csv", 15, "zinc", "13.1", false, "the film was sound after all", "M. Ferrer", new DateTimeOffset(2026, 4, 21, 10, 0, 0, TimeSpan.Zero)),
            ],
        };
    }

    private static GroupedSample Sample(IReadOnlyList<GroupDetail> groups, int perSpecimen = 1)
    {
        long[] mantissas = [.. groups.SelectMany(g => g.Values).Select(v => (long)Math.Round(v * 10))];
        ushort[] numbers = [.. groups.SelectMany((g, i) => Enumerable.Repeat((ushort)i, g.Values.Count))];
        int[] specimens = perSpecimen == 1 ? [] : [.. Enumerable.Range(0, mantissas.Length).Select(i => i / perSpecimen)];
        return new GroupedSample(mantissas, 1, numbers, groups.Count)
        {
            Specimens = specimens,
        };
    }

    private static double Value(ExperimentStatus status, int group, Random random) => status switch
    {
        ExperimentStatus.ConstantResponse => 12.5,
        ExperimentStatus.ZeroWithinVariation => 12 + group,
        _ => Math.Round(12 + (group * 0.7) + (random.NextDouble() * 4), 1),
    };

    private static GroupSummary Summary(double[] values)
    {
        if (values.Length < 2)
        {
            return new GroupSummary(values.Length, values.Length == 0 ? null : values[0], null, null, null, null);
        }

        double mean = values.Average(), deviation = Math.Sqrt(values.Sum(v => (v - mean) * (v - mean)) / (values.Length - 1)), error = deviation / Math.Sqrt(values.Length);

        // 2.3646: t(0.975; 7), from memory; only the picture depends on it.
        return new GroupSummary(values.Length, mean, deviation, error, mean - (2.3646 * error), mean + (2.3646 * error));
    }

    private static ExperimentResult Experiment(int i, ExperimentStatus status, Random random)
    {
        double u = random.NextDouble();
        double log = i % 5 == 0 ? -5 - (30 * u) : Math.Log(u);
        if (i == 0)
        {
            log = -11_513.5;
        }

        bool has = status == ExperimentStatus.Tested;
        double statistic = Math.Round(Math.Sqrt(-log) * 2.25, 3);
        return new ExperimentResult
        {
            Plan = new PlannedExperiment
            {
                Code = "E" + (i + 1).ToString(CultureInfo.InvariantCulture),
                Title = i == 3 ? Hostile : i == 4 ? "粘度 of the clear coat" : "Blend " + (char)('A' + (i % 26)) + " on steel, wet adhesion",
                Response = "adhesion",
                Unit = "MPa",
                Groups = ["base", "zinc", "resin 2", "resin 3"],
                Control = "base",
                Test = "f",
                FollowUp = (i % 3) switch { 1 => "tukey-kramer", 2 => "dunnett", _ => "none" },
                Replicates = 8,
            },
            Position = i + 1,
            Status = status,
            GroupCount = status == ExperimentStatus.Planned ? 0 : status == ExperimentStatus.TooFewGroups ? 1 : 4,
            ObservationCount = status == ExperimentStatus.Planned ? 0 : status == ExperimentStatus.NoReplication ? 4 : 32,
            Statistic = has ? statistic : null,
            Df1 = has ? 3 : null,
            Df2 = has ? 28 : null,
            P = has ? PValue.FromLog(log) : null,
            EtaSquared = has ? 3 * statistic / ((3 * statistic) + 28) : null,
            OmegaSquared = has ? 3 * (statistic - 1) / ((3 * statistic) + 29) : null,
            Amendments = i == 10 ? ["values came in after the test: oven run 7 was repeated after a power cut"] : [],
        };
    }

    // The smallest family size * p / rank from a rank on, as logarithms: enough for a picture with survivors.
    private static void Adjust(List<ExperimentResult> experiments, int familySize)
    {
        int[] order = [.. Enumerable.Range(0, experiments.Count).Where(i => experiments[i].P is not null).OrderBy(i => experiments[i].P!.Value.Log)];
        double smallest = 0;
        for (int k = order.Length; k >= 1; k--)
        {
            ExperimentResult e = experiments[order[k - 1]];
            smallest = Math.Min(smallest, e.P!.Value.Log + Math.Log((double)familySize / k));
            PValue adjusted = PValue.FromLog(smallest);
            experiments[order[k - 1]] = e with { AdjustedP = adjusted, Survives = adjusted.Value <= 0.05 };
        }
    }

    private static ReviewHead Review(List<ExperimentResult> experiments, int familySize, string correction) => new()
    {
        Number = 3,
        At = new DateTimeOffset(2026, 5, 1, 9, 30, 0, TimeSpan.Zero),
        Correction = correction,
        Level = new SignificanceLevel(0.05),
        FamilySize = familySize,
        TestedCount = experiments.Count(e => e.P is not null),
        SurvivorCount = experiments.Count(e => e.Survives == true),
        IsInterim = false,
        ProgramVersion = "0.1.0",
    };
}

/// <summary>Has a boundary that rises with the rank.</summary>
internal sealed class RisingCorrection : Correction
{
    public override string Key => "rising";

    public override string Name => "Rising test correction";

    public override ErrorRate Controls => ErrorRate.FalseDiscovery;

    public override Dependence ValidUnder => Dependence.Independent;

    public override string Guarantee => "On average at most 5% of the survivors are false, over all campaigns run like this one.";

    public override string Source => "invented for these tests";

    public override double? BoundaryAt(int rank, int familySize, double level) => level * rank / familySize;

    protected override void AdjustSorted(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted) => sorted.CopyTo(adjusted);
}

/// <summary>Has no simple boundary.</summary>
internal sealed class UnboundedCorrection : Correction
{
    public override string Key => "unbounded";

    public override string Name => "Unbounded test correction";

    public override ErrorRate Controls => ErrorRate.Familywise;

    public override Dependence ValidUnder => Dependence.Any;

    public override string Guarantee => "The probability of any false survivor is at most the level.";

    public override string Source => "invented for these tests";

    protected override void AdjustSorted(ReadOnlySpan<double> sorted, int familySize, Span<double> adjusted) => sorted.CopyTo(adjusted);
}
