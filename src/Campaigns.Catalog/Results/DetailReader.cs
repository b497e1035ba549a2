using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Measurements;
using Campaigns.Catalog.Plans;
using Campaigns.Domain;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Units;

namespace Campaigns.Catalog.Results;

/// <summary>Reads one experiment in full.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class DetailReader(Catalog catalog)
{
    /// <summary>Confidence of the intervals in the group table.</summary>
    public const double Confidence = 0.95;

    /// <summary>One experiment with its values, its tables, checks and comparisons; the test is run anew on the values at hand.</summary>
    /// <param name="standing">The campaign as it stands.</param>
    /// <param name="code">The experiment.</param>
    /// <exception cref="RefusedException">The campaign has no such experiment.</exception>
    public ExperimentDetail Read(CampaignStanding standing, string code)
    {
        ArgumentNullException.ThrowIfNull(standing);
        ExperimentResult result = standing.Experiments.FirstOrDefault(e => e.Plan.Code == code)
            ?? throw new RefusedException($"The campaign '{standing.Campaign.Code}' has no experiment '{code}'; {Hint(standing, code)}.");
        return Read(standing, [result]).Single();
    }

    /// <summary>Some experiments in full, one after the other, in the order in which they were registered; one look-up for the values of all.</summary>
    /// <param name="standing">The campaign as it stands.</param>
    /// <param name="experiments">Experiments of the campaign, each once; one without any value comes after the others.</param>
    public IEnumerable<ExperimentDetail> Read(CampaignStanding standing, IReadOnlyCollection<ExperimentResult> experiments)
    {
        ArgumentNullException.ThrowIfNull(standing);
        ArgumentNullException.ThrowIfNull(experiments);
        return Walk(standing, experiments);
    }

    private IEnumerable<ExperimentDetail> Walk(CampaignStanding standing, IReadOnlyCollection<ExperimentResult> experiments)
    {
        long campaignId = new CampaignStore(catalog).Get(standing.Campaign.Code).Id;
        var exclusions = new StandingExclusions(catalog, campaignId);
        var amended = new Lazy<AmendedExperiments>(() => new AmendedExperiments(catalog, campaignId));
        Dictionary<string, ExperimentResult> left = experiments.ToDictionary(e => e.Plan.Code, StringComparer.Ordinal);
        using (var rows = new ValueRows(catalog, campaignId, exclusions, left.Keys.ToArray()))
        {
            while (rows.Next())
            {
                if (left.Remove(rows.Code, out ExperimentResult? result))
                {
                    yield return Describe(standing, result, rows, exclusions, amended);
                }
            }
        }

        foreach (ExperimentResult result in experiments.Where(e => left.ContainsKey(e.Plan.Code)))
        {
            yield return Empty(result);
        }
    }

    private static ExperimentDetail Empty(ExperimentResult result)
    {
        var none = new GroupSummary(0, null, null, null, null, null);
        return new ExperimentDetail(result, [.. result.Plan.Groups.Select(label => new GroupDetail(label, label == result.Plan.Control, [], none))], Confidence, null, 0);
    }

    private ExperimentDetail Describe(CampaignStanding standing, ExperimentResult result, ValueRows rows, StandingExclusions exclusions, Lazy<AmendedExperiments> amended)
    {
        string[] labels = rows.Labels;
        GroupedSample readings = rows.Values.Sample(labels.Length);
        GroupSummary[] summaries = GroupSummaries.Of(SpecimenMeans.Of(readings) is { } means ? means.Sample : readings, Confidence);
        // What was never tested shows no p: looking comes after sealing and testing.
        bool wasTested = result.Status.WasTested() || amended.Value.AwaitsTest(rows.Id);
        TestOutcome? outcome = !wasTested ? null : result is { P: { } p, Resampling: not null } ? Stored(result, p, readings) : OutcomeOf(standing, result, readings);
        var groups = new List<GroupDetail>();
        for (int group = 0; group < labels.Length; group++)
        {
            groups.Add(new GroupDetail(labels[group], labels[group] == result.Plan.Control, ValuesOf(rows.Values, group), summaries[group]));
        }

        FamilyStanding family = standing.FamilyOf(result);
        var analysis = ExperimentAnalysis.Of(result.Plan, labels, readings, standing.Campaign, family.Size, result.P is null ? null : outcome as Tested, rows.Places(), family.Level);
        var verdict = new ComparisonVerdict(standing.Campaign, standing.Families);
        return new ExperimentDetail(result, groups, Confidence, (outcome as Tested)?.Variation, rows.MissingCount)
        {
            Analysis = analysis,
            Comparisons = verdict.Judge(result, labels, analysis.FollowUp),
            ComparisonGuarantee = verdict.Guarantee,
            Exclusions = exclusions.Decisions(rows.Id),
            Outcome = outcome,
            OutcomeWithExcluded = rows.ExcludedCount > 0 && wasTested ? WithExcluded(standing, result, exclusions) : null,
        };
    }

    private TestOutcome? WithExcluded(CampaignStanding standing, ExperimentResult result, StandingExclusions exclusions)
    {
        using var rows = new ValueRows(catalog, new CampaignStore(catalog).Get(standing.Campaign.Code).Id, exclusions, [result.Plan.Code]);
        rows.Next(withExcluded: true);
        return OutcomeOf(standing, result, rows.Values.Sample(rows.Labels.Length));
    }

    private static TestOutcome? OutcomeOf(CampaignStanding standing, ExperimentResult result, GroupedSample readings)
    {
        if (readings.Count == 0 || GroupTestRegistry.Find(result.Plan.Test) is not { } test)
        {
            return null;
        }

        var draws = new RandomDraws(
            PermutationDraws.Seed(standing.Campaign.Code, result.Plan.Code),
            result.Resampling is { IsExact: false } drawn ? (int)drawn.Arrangements : PermutationDraws.Count(standing.Families));
        return ExperimentalUnits.Test(test, readings, draws);
    }

    /// <summary>A permutation test as it was stored: drawing its arrangements again would cost up to a second and give the same.</summary>
    private static Tested Stored(ExperimentResult result, PValue p, GroupedSample readings)
    {
        var layout = OneWayLayout.Of(SpecimenMeans.Of(readings) is { } means ? means.Sample : readings);
        return new Tested(result.GroupCount, result.ObservationCount, result.Statistic!.Value, result.Df1, result.Df2, p, layout.Obstacle is null ? layout.Table() : null)
        {
            SpecimenCount = result.SpecimenCount,
            Resampling = result.Resampling,
        };
    }

    private static List<double> ValuesOf(ObservationColumns values, int group)
    {
        var inGroup = new List<double>();
        for (int i = 0; i < values.Count; i++)
        {
            if (values.Groups[i] == group)
            {
                inGroup.Add(values.NearestDouble(i));
            }
        }

        return inGroup;
    }

    private static string Hint(CampaignStanding standing, string code) =>
        Nearest.Of(code, standing.Experiments.Select(e => e.Plan.Code)) is { } near
            ? $"'{near}' may be meant"
            : $"'campaigns results {standing.Campaign.Code}' lists those it has";
}
