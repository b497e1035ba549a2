using System.Globalization;
using System.Security.Cryptography;
using System.Text;
using Campaigns.Catalog.Ledger;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Tests.Dashboard;

/// <summary>An invented past: reviews whose p-values are set here and judged by the product, and entries of a ledger.</summary>
internal static class SamplePast
{
    public const string Why = "film blistered; run again\u001b[31m\u202e";

    private const int Planned = 12;

    private static readonly DateTimeOffset Start = new(2026, 4, 10, 8, 0, 0, TimeSpan.Zero);

    public static CampaignStanding Standing { get; } = SampleCampaign.Standing(Planned, "holm", withoutResult: 0);

    /// <summary>A source whose campaign has so many reviews, each a week after the one before.</summary>
    public static SampleSource Source(int reviews, IReadOnlyList<LedgerEntry>? entries = null, int planned = Planned)
    {
        ReviewedFamily[] all = [.. Enumerable.Range(1, reviews).Select(n => Review(n, planned))];
        string[] codes = [.. Enumerable.Range(1, planned).Select(Code)];
        return new SampleSource(planned == Planned ? Standing : SampleCampaign.Standing(planned, "holm", withoutResult: 0))
        {
            Records = [.. all.Select(r => new ReviewRecord(r.Head, r.Head.Number / 3, r.Head.Number + 1, 100L * r.Head.Number, r.Head.Number * 4, []))],
            Past = new ReviewHistory([.. all.Select(r => r.Head)], [.. codes.Select((c, i) => new ExperimentHistory(c, [.. all.Select(r => r.LineOf(i + 1))]))]),
            Between = (earlier, later) => (
                ReviewComparison.Of(Standing.Campaign, all[earlier - 1], all[later - 1], Events, (_, _) => ReviewReason.FirstTested),
                codes.Select((c, i) => (Key: (long)i + 1, c)).ToDictionary(x => x.Key, x => x.c)),
            Entries = entries ?? Entries(18),
        };
    }

    /// <summary>So many entries; every fifth gives a reason that a terminal should not obey, and every third belongs to another campaign.</summary>
    public static IReadOnlyList<LedgerEntry> Entries(int count) => [.. Enumerable.Range(1, count).Select(Entry)];

    private static string Code(int i) => "E" + i.ToString(CultureInfo.InvariantCulture);

    private static readonly IReadOnlyDictionary<long, IReadOnlyList<ReviewEvent>> Events = new Dictionary<long, IReadOnlyList<ReviewEvent>>
    {
        [4] = [new ReviewEvent(ReviewCause.Exclusion, Why)],
    };

    /// <summary>Four more experiments are tested in every review; the fourth is strong in odd ones and weak in even ones.</summary>
    private static ReviewedFamily Review(int number, int planned)
    {
        int tested = Math.Min(planned, 4 * number);
        PValue[] p = [.. Enumerable.Range(1, tested).Select(i => PValue.FromValue(i == 4 ? (number % 2 == 1 ? 0.0004 : 0.31) : i % 3 == 1 ? 0.0001 * i : Math.Min(1, 0.07 * i)))];
        FamilyMembers members = FamilyMembers.OneFamily(p, planned);
        CampaignVerdict verdict = FamilyVerdict.Judge(Standing.Campaign, members);
        ReviewLine[] lines = [.. p.Select((value, i) => new ReviewLine(value, verdict.Adjusted[i], verdict.Survives[i]))];
        ReviewHead head = new()
        {
            Number = number,
            At = Start.AddDays(7 * number),
            Correction = "holm",
            Level = Standing.Campaign.Level,
            FamilySize = planned,
            TestedCount = tested,
            SurvivorCount = lines.Count(l => l.Survives),
            IsInterim = false,
            ProgramVersion = "0.4.0",
        };
        return new ReviewedFamily(head, Enumerable.Range(1, tested).Select(i => (long)i).ToArray(), members, lines, verdict.Families);
    }

    private static LedgerEntry Entry(int n)
    {
        string[] actions = [LedgerAction.Plan, LedgerAction.Load, LedgerAction.Test, LedgerAction.Review, LedgerAction.Exclude];
        string action = actions[n % actions.Length];
        return new LedgerEntry
        {
            Sequence = n,
            At = Start.AddHours(5 * n),
            By = new Actor("lab", n % 2 == 0 ? "Ada" : null),
            ProgramVersion = "0.4.0",
            Action = action,
            Campaign = n % 3 == 0 ? "GLOSS-7" : SampleCampaign.Code,
            Subject = action == LedgerAction.Load ? $"week-{n:00}.csv" : action == LedgerAction.Exclude ? Code(4) : null,
            Reason = action == LedgerAction.Exclude ? Why : null,
            Changes = action == LedgerAction.Exclude ? [new LedgerChange($"{Code(4)}: oven-7.csv, line 14", "91.0", "left out")] : [new LedgerChange("rows", null, (12 * n).ToString(CultureInfo.InvariantCulture))],
            Evidence = [new LedgerEvidence(action == LedgerAction.Exclude ? "exclusion" : action, n, 0, 0, Hash("rows" + Code(n)))],
            Hash = Hash(Code(n)),
        };
    }

    private static string Hash(string of) => Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(of)));
}
