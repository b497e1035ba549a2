using Campaigns.App.Commands;
using Campaigns.App.Report.Document;
using Campaigns.Catalog.Amending;
using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Reviewing;
using Campaigns.Catalog.Streams;
using Campaigns.Catalog.Withdrawing;
using Campaigns.Domain;
using Campaigns.Statistics.Checks;

namespace Campaigns.App.Report;

/// <summary>Reads all that a report shows in one reading transaction, so that every number of it is of one moment.</summary>
/// <param name="catalog">The open catalog.</param>
internal sealed class ReportReader(Catalog.Catalog catalog)
{
    /// <summary>Pairs of reviews that are compared.</summary>
    public const int MostComparedReviews = 12;

    /// <summary>Entries of the ledger that are told.</summary>
    public const int MostEntries = 500;

    /// <summary>Reads it.</summary>
    /// <param name="question">What is asked.</param>
    /// <exception cref="RefusedException">There is no such campaign, or no such experiment in it.</exception>
    public ReportData Read(ReportQuestion question) => catalog.Snapshot(() =>
    {
        LedgerHead head = new LedgerReader(catalog).Head;
        CampaignStanding standing = new StandingReader(catalog).Read(question.Code);
        SurvivorData survivors = SurvivorData.Read(catalog, question.Code, TableBlock.MostRows);
        (IReadOnlyList<ReportExperiment> inFull, SurvivorChecks checks) = Details(standing, survivors.Listed, question);
        (IReadOnlyList<LedgerEntry> entries, long count) = Entries(question.Code);
        return new ReportData
        {
            Head = head,
            HeadAt = head.Sequence == 0 ? null : new LedgerReader(catalog).Entries(new LedgerFilter { From = head.Sequence }).Single().At,
            Standing = standing,
            Overview = standing.Overview,
            Survivors = survivors,
            Risk = CampaignRisk.Of(standing),
            RiskCurve = RiskCurve.Of(standing, new TestOrderReader(catalog).LatestRuns(question.Code)),
            Plan = Plan(question.Code),
            Files = new LoadedFileReader(catalog).All(question.Code),
            Reviews = Reviews(question.Code),
            Decisions = standing.Campaign.Streams.Count > 0 ? new StreamStore(catalog).Decisions(question.Code) : [],
            InFull = inFull,
            Checks = checks,
            Entries = entries,
            EntryCount = count,
        };
    });

    private ReportPlan Plan(string code)
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        return new ReportPlan(
            SealedPlan.Standing(catalog, stored.Id), SealedPlan.Digest(catalog, stored), new PlanAmendmentReader(catalog).All(code), new WithdrawalStore(catalog).All(code), new ExclusionStore(catalog).All(code));
    }

    private ReportReviews Reviews(string code)
    {
        IReadOnlyList<ReviewRecord> records = new ReviewReader(catalog).Records(code);
        var comparer = new ReviewComparer(catalog);
        var changes = new List<ReviewChange>();
        for (int later = Math.Max(1, records.Count - MostComparedReviews); later < records.Count; later++)
        {
            (ReviewComparison comparison, IReadOnlyDictionary<long, string> codes) = comparer.Compare(code, records[later - 1].Head.Number, records[later].Head.Number);
            changes.Add(new ReviewChange(comparison, codes));
        }

        return new ReportReviews(records, changes);
    }

    /// <summary>Experiments in full, and the checks of all survivors that are listed: a warning on one of them belongs to what is said of it, wherever its figure stands.</summary>
    private (IReadOnlyList<ReportExperiment> InFull, SurvivorChecks Checks) Details(CampaignStanding standing, IReadOnlyList<ExperimentResult> survivors, ReportQuestion question)
    {
        Dictionary<string, ExperimentResult> byCode = standing.Experiments.ToDictionary(e => e.Plan.Code, StringComparer.Ordinal);
        HashSet<string> chosen = Chosen(standing, survivors, byCode, question);
        string[] surviving = [.. survivors.Select(s => s.Plan.Code)];
        HashSet<string> looked = [.. surviving];
        var warned = new Dictionary<string, string[]>(StringComparer.Ordinal);
        var inFull = new List<ReportExperiment>();
        var observations = new ObservationReader(catalog);
        foreach (ExperimentDetail detail in new DetailReader(catalog).Read(standing, [.. chosen.Concat(surviving).Distinct(StringComparer.Ordinal).Select(c => byCode[c])]))
        {
            string code = detail.Result.Plan.Code;
            if (looked.Contains(code) && detail.Analysis.Checks.Where(c => c.Finding.Verdict == CheckVerdict.Warns).Select(c => c.Name).ToArray() is { Length: > 0 } names)
            {
                warned[code] = names;
            }

            if (chosen.Contains(code))
            {
                inFull.Add(new ReportExperiment(detail, observations.Read(question.Code, code)));
            }
        }

        inFull.Sort((a, b) => a.Detail.Result.Position.CompareTo(b.Detail.Result.Position));
        return (inFull, new SurvivorChecks(surviving.Length, [.. surviving.Where(warned.ContainsKey).Select(s => (s, (IReadOnlyList<string>)warned[s]))]));
    }

    /// <summary>Survivors, the smallest p first, as far as there is room, and those that are named; where none are named, every experiment with values, if there is room for all.</summary>
    private static HashSet<string> Chosen(CampaignStanding standing, IReadOnlyList<ExperimentResult> survivors, Dictionary<string, ExperimentResult> byCode, ReportQuestion question)
    {
        HashSet<string> chosen = [.. survivors.Take(question.MostInFull).Select(s => s.Plan.Code)];
        foreach (string code in question.Experiments ?? [])
        {
            if (!byCode.ContainsKey(code))
            {
                string near = Nearest.Of(code, byCode.Keys) is { } nearest ? $"'{nearest}' may be meant" : $"'campaigns results {question.Code}' lists those it has";
                throw new RefusedException($"The campaign '{question.Code}' has no experiment '{code}'; {near}. Nothing was written.");
            }

            chosen.Add(code);
        }

        ExperimentResult[] withData = question.Experiments is null ? [.. standing.Experiments.Where(e => e.ObservationCount > 0)] : [];
        if (withData.Length <= question.MostInFull)
        {
            chosen.UnionWith(withData.Select(e => e.Plan.Code));
        }

        return chosen;
    }

    private (IReadOnlyList<LedgerEntry> Entries, long Count) Entries(string code)
    {
        var latest = new Queue<LedgerEntry>();
        long count = 0;
        foreach (LedgerEntry entry in new LedgerReader(catalog).Entries(new LedgerFilter { Campaign = code }))
        {
            count++;
            latest.Enqueue(entry);
            if (latest.Count > MostEntries)
            {
                latest.Dequeue();
            }
        }

        return ([.. latest], count);
    }
}
