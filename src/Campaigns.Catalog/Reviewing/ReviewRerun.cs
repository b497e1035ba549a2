using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Reviewing;

/// <summary>Takes reviews again from the record: every test from the measurements as they stood then, then the correction over the family as it was counted then.</summary>
/// <remarks>What a review used: of each experiment the latest test run up to the review's, and of that run the values, exclusions and plan that it had. Levels that an online procedure gave are facts of the record and are not computed again.</remarks>
/// <param name="catalog">The open catalog.</param>
public sealed class ReviewRerun(Catalog catalog)
{
    /// <summary>What taking a review again gave.</summary>
    /// <param name="Review">The review as it is stored.</param>
    /// <param name="Figures">Counts that differ, each in a clause; empty where all agree.</param>
    /// <param name="Lines">Experiments whose lines differ, in the plan's order.</param>
    /// <param name="IsSame">Whether the lines are the stored ones to the byte, and every count agrees.</param>
    public sealed record Outcome(ReviewHead Review, IReadOnlyList<string> Figures, IReadOnlyList<Difference> Lines, bool IsSame);

    /// <summary>An experiment whose line differs.</summary>
    /// <param name="Experiment">Its code.</param>
    /// <param name="Stored">The line as it is stored; null where there is none.</param>
    /// <param name="Recomputed">The line as it comes out now; null where there is none.</param>
    public sealed record Difference(string Experiment, ReviewLine? Stored, ReviewLine? Recomputed);

    /// <summary>Takes one review again.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="number">The review; null for every one.</param>
    /// <param name="progress">Told now and then how far the work is.</param>
    /// <param name="cancel">Stops the work.</param>
    /// <returns>An outcome for each review, oldest first. Nothing is written.</returns>
    /// <exception cref="RefusedException">There is no such campaign or review.</exception>
    public IReadOnlyList<Outcome> Run(string code, int? number, Action<WorkProgress> progress, CancellationToken cancel)
    {
        ArgumentNullException.ThrowIfNull(progress);
        return catalog.Snapshot(() =>
        {
            StoredCampaign stored = new CampaignStore(catalog).Get(code);
            var reader = new ReviewReader(catalog);
            IReadOnlyList<StoredReview> reviews = number is { } one ? [reader.Get(stored, one)] : reader.All(stored);
            Dictionary<long, string> codes = new PlanStore(catalog).Codes(stored.Id);
            var tests = new PastTests(catalog, stored, progress, cancel);
            return (IReadOnlyList<Outcome>)[.. reviews.Select(r => Again(stored, r, tests, reader, codes))];
        });
    }

    private Outcome Again(StoredCampaign stored, StoredReview review, PastTests tests, ReviewReader reader, Dictionary<long, string> codes)
    {
        var amended = new AmendedExperiments(catalog, stored.Id, review.Position);
        var columns = new FamilyColumns();
        foreach ((long id, PValue? p) in tests.Latest(review.LastTestRunId))
        {
            if (p is { } given && !amended.AwaitsTest(id))
            {
                columns.Add(id, given);
            }
        }

        FamilyMembers members = new FamilyReader(catalog).Members(stored, columns, review.Head.IsInterim, review.Position);
        if (members.Entries.Count > 0)
        {
            members = Decided(members, columns, tests.Decisions(review.LastTestRunId));
        }

        CampaignVerdict verdict = FamilyVerdict.Judge(stored.Campaign, members);
        bool isSame = PackedReviewLines.Pack(columns.ExperimentIds, columns.P, [.. verdict.Adjusted]).Written.SequenceEqual(review.Packed);
        string[] figures = [.. Figures(review, columns, verdict, stored.Campaign.JudgedFamilies.Count > 0 ? new ReviewFamilies(catalog).Read(review.Id) : [])];
        return new Outcome(review.Head, figures, isSame ? [] : Compare(reader.Whole(stored, review), columns, verdict, codes), isSame && figures.Length == 0);
    }

    /// <summary>The decisions as their p-values come out of the measurements now, at the levels that were given.</summary>
    private static FamilyMembers Decided(FamilyMembers members, FamilyColumns columns, IReadOnlyList<(long Id, PValue? P)> decisions)
    {
        Dictionary<long, PValue?> byId = decisions.ToDictionary(d => d.Id, d => d.P);
        var entries = new StreamEntry?[columns.Count];
        for (int i = 0; i < entries.Length; i++)
        {
            entries[i] = members.Entries[i] is { DecidedAt: not null } entry && byId.TryGetValue(columns.ExperimentIds[i], out PValue? p)
                ? entry with { P = p, Survives = new Campaigns.Statistics.Online.OnlineLevel(entry.Position, entry.Level).Rejects(p ?? PValue.One) }
                : members.Entries[i];
        }

        return members with { Entries = entries };
    }

    private static IEnumerable<string> Figures(StoredReview review, FamilyColumns columns, CampaignVerdict verdict, IReadOnlyList<FamilyStanding> stored)
    {
        ReviewHead head = review.Head;
        (string What, int Stored, int Now)[] figures =
        [
            ("hypotheses", head.FamilySize, verdict.Size), ("tested", head.TestedCount, columns.Count), ("survivors", head.SurvivorCount, verdict.SurvivorLineCount),
            .. stored.Zip(verdict.Families).SelectMany(f => new[]
            {
                ($"hypotheses of {f.First.Name}", f.First.Size, f.Second.Size), ($"tested of {f.First.Name}", f.First.Tested, f.Second.Tested), ($"survivors of {f.First.Name}", f.First.Survivors, f.Second.Survivors),
            }),
        ];
        return figures.Where(f => f.Stored != f.Now).Select(f => FormattableString.Invariant($"{f.What}: stored {f.Stored}, now {f.Now}"));
    }

    private static List<Difference> Compare(ReviewedFamily stored, FamilyColumns columns, CampaignVerdict verdict, Dictionary<long, string> codes)
    {
        var differences = new List<Difference>();
        int s = 0;
        int n = 0;
        while (s < stored.Lines.Count || n < columns.Count)
        {
            long key = Math.Min(s < stored.Lines.Count ? stored.Keys.Span[s] : long.MaxValue, n < columns.Count ? columns.ExperimentIds[n] : long.MaxValue);
            ReviewLine? before = s < stored.Lines.Count && stored.Keys.Span[s] == key ? stored.Lines[s++] : null;
            ReviewLine? now = n < columns.Count && columns.ExperimentIds[n] == key ? new ReviewLine(columns.P[n], verdict.Adjusted[n], verdict.Survives[n++]) : null;
            if (before != now)
            {
                differences.Add(new Difference(codes.GetValueOrDefault(key, FormattableString.Invariant($"key {key}")), before, now));
            }
        }

        return differences;
    }
}
