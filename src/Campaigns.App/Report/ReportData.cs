using Campaigns.App.Commands;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Results;
using Campaigns.Catalog.Streams;
using Campaigns.Domain;

namespace Campaigns.App.Report;

/// <summary>Everything that a report shows, as it stood in the catalog at one moment.</summary>
internal sealed record ReportData
{
    /// <summary>The end of the ledger at that moment.</summary>
    public required LedgerHead Head { get; init; }

    /// <summary>When its last entry was written; null where the ledger has none.</summary>
    public required DateTimeOffset? HeadAt { get; init; }

    /// <summary>The campaign with every experiment.</summary>
    public required CampaignStanding Standing { get; init; }

    /// <summary>The campaign in figures.</summary>
    public required CampaignOverview Overview { get; init; }

    /// <summary>The survivors with their gaps and comparisons; the first <see cref="Document.TableBlock.MostRows"/> of them.</summary>
    public required SurvivorData Survivors { get; init; }

    /// <summary>What was risked.</summary>
    public required CampaignRisk Risk { get; init; }

    /// <summary>The risk test by test.</summary>
    public required IReadOnlyList<RiskPoint> RiskCurve { get; init; }

    /// <summary>The plan and what became of it.</summary>
    public required ReportPlan Plan { get; init; }

    /// <summary>The loaded files.</summary>
    public required IReadOnlyList<LoadedFile> Files { get; init; }

    /// <summary>The reviews.</summary>
    public required ReportReviews Reviews { get; init; }

    /// <summary>The levels given and the decisions made as experiments arrived; empty in other campaigns.</summary>
    public required IReadOnlyList<StreamStore.Line> Decisions { get; init; }

    /// <summary>Experiments shown in full, in the plan's order.</summary>
    public required IReadOnlyList<ReportExperiment> InFull { get; init; }

    /// <summary>What the checks say of survivors.</summary>
    public required SurvivorChecks Checks { get; init; }

    /// <summary>Entries of the ledger about the campaign, oldest first; the latest <see cref="ReportReader.MostEntries"/> of them.</summary>
    public required IReadOnlyList<LedgerEntry> Entries { get; init; }

    /// <summary>How many there are.</summary>
    public required long EntryCount { get; init; }
}

/// <summary>One experiment in full.</summary>
/// <param name="Detail">Its tables, checks and comparisons.</param>
/// <param name="Observations">Its observations, the excluded ones among them.</param>
internal sealed record ReportExperiment(ExperimentDetail Detail, IReadOnlyList<TracedObservation> Observations);

/// <summary>The plan of a campaign and what became of it.</summary>
/// <param name="Experiments">The plan as it stands.</param>
/// <param name="DigestOfSealed">SHA-256 of the sealed plan, computed anew; null where the plan is not sealed.</param>
/// <param name="Amendments">Changes of the sealed plan, oldest first.</param>
/// <param name="Withdrawals">Decisions to withdraw experiments or take them in again.</param>
/// <param name="Exclusions">Decisions to leave observations out or take them in again.</param>
internal sealed record ReportPlan(
    IReadOnlyList<PlannedExperiment> Experiments, string? DigestOfSealed, IReadOnlyList<PlanAmendment> Amendments, IReadOnlyList<Withdrawal> Withdrawals, IReadOnlyList<ExcludedObservation> Exclusions);

/// <summary>The reviews of a campaign.</summary>
/// <param name="Records">Every review, oldest first.</param>
/// <param name="Changes">What lies between a review and the next, for the latest <see cref="ReportReader.MostComparedReviews"/> of them, oldest first.</param>
internal sealed record ReportReviews(IReadOnlyList<ReviewRecord> Records, IReadOnlyList<ReviewChange> Changes);

/// <summary>What lies between two reviews.</summary>
/// <param name="Comparison">The two, held side by side.</param>
/// <param name="Codes">Codes of the experiments by their keys.</param>
internal sealed record ReviewChange(ReviewComparison Comparison, IReadOnlyDictionary<long, string> Codes);

/// <summary>What the checks of the assumptions say of survivors.</summary>
/// <param name="Looked">Survivors that were looked at.</param>
/// <param name="Warned">Those of them on which a check warns, in the order of their p-values, each with the names of these checks.</param>
internal sealed record SurvivorChecks(int Looked, IReadOnlyList<(string Experiment, IReadOnlyList<string> Checks)> Warned);
