using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Reviewing;

/// <summary>Reads the reviews of a campaign with every line: what was found on their days, not what would be found today.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class ReviewReader(Catalog catalog)
{
    private const string Columns =
        """
        r.id, r.number, r.taken_at, r.correction, r.level, r.family_size, r.tested_count, r.survivor_count, r.is_interim, r.program_version, r.last_test_run_id,
        r.last_load_id, r.last_exclusion_id, r.last_amendment_id, r.last_withdrawal_id, r.lines
        """;

    /// <summary>A line of a review with the names of its experiment and of its family.</summary>
    /// <param name="Experiment">Code of the experiment.</param>
    /// <param name="Line">The line.</param>
    /// <param name="Family">The family as the review found it.</param>
    public sealed record NamedLine(string Experiment, ReviewLine Line, FamilyStanding Family);

    /// <summary>Every review of a campaign with what stood behind it, oldest first. Four statements, whatever the number of reviews.</summary>
    /// <param name="code">The campaign.</param>
    /// <exception cref="RefusedException">There is no such campaign.</exception>
    public IReadOnlyList<ReviewRecord> Records(string code) => catalog.Snapshot(() =>
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        Dictionary<long, long> sequences = LedgerSequences();
        var families = new ReviewFamilies(catalog);
        using SqliteStatement select = catalog.Prepare(
            $"""
            SELECT {Columns},
                (SELECT coalesce(max(a.number), 0) FROM plan_amendments a WHERE a.campaign_id = r.campaign_id AND a.id <= coalesce(r.last_amendment_id, 0)),
                (SELECT count(*) FROM loads l WHERE l.campaign_id = r.campaign_id AND l.id <= coalesce(r.last_load_id, 0)),
                (SELECT coalesce(sum(l.row_count), 0) FROM loads l WHERE l.campaign_id = r.campaign_id AND l.id <= coalesce(r.last_load_id, 0))
            FROM reviews r WHERE r.campaign_id = ?1 ORDER BY r.number
            """);
        select.Bind(1, stored.Id);
        var records = new List<ReviewRecord>();
        while (select.Read())
        {
            StoredReview review = Row(select, withLines: false);
            records.Add(new ReviewRecord(
                review.Head, (int)select.Integer(16), (int)select.Integer(17), select.Integer(18),
                sequences.TryGetValue(review.Id, out long sequence) ? sequence : null, families.Read(review.Id)));
        }

        return (IReadOnlyList<ReviewRecord>)records;
    });

    /// <summary>Every line of a review, in the plan's order, as it was stored.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="number">The review.</param>
    /// <exception cref="RefusedException">There is no such campaign or review.</exception>
    public (ReviewHead Head, IReadOnlyList<NamedLine> Lines) Lines(string code, int number) => catalog.Snapshot(() =>
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        ReviewedFamily review = Whole(stored, Get(stored, number));
        Dictionary<long, string> codes = new PlanStore(catalog).Codes(stored.Id);
        return (review.Head, (IReadOnlyList<NamedLine>)[.. review.Lines.Select((l, i) => new NamedLine(codes[review.Keys.Span[i]], l, review.Families[review.FamilyAt(i)]))]);
    });

    /// <summary>Which experiment survived in which review. One statement for all reviews, one for the codes.</summary>
    /// <param name="code">The campaign.</param>
    /// <exception cref="RefusedException">There is no such campaign, or it has no review.</exception>
    public ReviewHistory History(string code) => catalog.Snapshot(() =>
    {
        StoredCampaign stored = new CampaignStore(catalog).Get(code);
        ReviewedFamily[] reviews = [.. All(stored).Select(r => Whole(stored, r))];
        if (reviews.Length == 0)
        {
            throw NoReview(code);
        }

        var next = new int[reviews.Length];
        var experiments = new List<ExperimentHistory>();
        foreach ((long key, string experiment) in new PlanStore(catalog).Codes(stored.Id).OrderBy(c => c.Key))
        {
            var lines = new ReviewLine?[reviews.Length];
            for (int r = 0; r < reviews.Length; r++)
            {
                if (next[r] < reviews[r].Lines.Count && reviews[r].Keys.Span[next[r]] == key)
                {
                    lines[r] = reviews[r].Lines[next[r]++];
                }
            }

            experiments.Add(new ExperimentHistory(experiment, lines));
        }

        return new ReviewHistory([.. reviews.Select(r => r.Head)], experiments);
    });

    /// <summary>Every review of a campaign with its lines, oldest first.</summary>
    internal IReadOnlyList<StoredReview> All(StoredCampaign stored)
    {
        using SqliteStatement select = catalog.Prepare($"SELECT {Columns} FROM reviews r WHERE r.campaign_id = ?1 ORDER BY r.number");
        select.Bind(1, stored.Id);
        var reviews = new List<StoredReview>();
        while (select.Read())
        {
            reviews.Add(Row(select, withLines: true));
        }

        return reviews;
    }

    /// <summary>The review with a number.</summary>
    /// <exception cref="RefusedException">There is none; the message says which there are.</exception>
    internal StoredReview Get(StoredCampaign stored, int number)
    {
        using SqliteStatement select = catalog.Prepare($"SELECT {Columns} FROM reviews r WHERE r.campaign_id = ?1 AND r.number = ?2");
        if (select.Bind(1, stored.Id).Bind(2, (long)number).Read())
        {
            return Row(select, withLines: true);
        }

        int last = new ReviewStore(catalog).Latest(stored.Id)?.Head.Number ?? throw NoReview(stored.Campaign.Code);
        throw new RefusedException(FormattableString.Invariant(
            $"The campaign '{stored.Campaign.Code}' has no review {number}; it has {(last == 1 ? "review 1 alone" : $"reviews 1 to {last}")}, which 'campaigns reviews {stored.Campaign.Code}' lists."));
    }

    /// <summary>Version of the plan at a review: the number of the latest amendment before it, 0 as it was sealed.</summary>
    internal int PlanVersion(StoredCampaign stored, StoredReview review)
    {
        using SqliteStatement select = catalog.Prepare("SELECT coalesce(max(number), 0) FROM plan_amendments WHERE campaign_id = ?1 AND id <= ?2");
        select.Bind(1, stored.Id).Bind(2, review.Position.LastAmendmentId ?? 0).Read();
        return (int)select.Integer(0);
    }

    /// <summary>A review with its lines and its family as it was counted on its day.</summary>
    internal ReviewedFamily Whole(StoredCampaign stored, StoredReview review)
    {
        (FamilyColumns columns, PValue[] adjusted) = review.Lines;
        FamilyMembers members = new FamilyReader(catalog).Members(stored, columns, review.Head.IsInterim, review.Position);
        IReadOnlyList<FamilyStanding> families = FamiliesOf(stored, review);
        var lines = new ReviewLine[columns.Count];
        for (int i = 0; i < lines.Length; i++)
        {
            FamilyStanding family = families[members.FamilyOf.IsEmpty ? 0 : members.FamilyOf.Span[i]];
            lines[i] = new ReviewLine(columns.P[i], adjusted[i], family.IsOpen && family.Level.Rejects(adjusted[i]));
        }

        return new ReviewedFamily(review.Head, columns.ExperimentIds.ToArray(), members, lines, families);
    }

    private static RefusedException NoReview(string code) => new($"The campaign '{code}' has no review yet; run 'campaigns review {code}'.");

    /// <summary>The families that a review stored; for a campaign of one family, that one from the review itself.</summary>
    private IReadOnlyList<FamilyStanding> FamiliesOf(StoredCampaign stored, StoredReview review)
    {
        ReviewHead head = review.Head;
        return stored.Campaign.JudgedFamilies.Count > 0
            ? new ReviewFamilies(catalog).Read(review.Id)
            : [new FamilyStanding("", head.Correction, head.Level, head.FamilySize, head.FamilySize, head.TestedCount, head.SurvivorCount)];
    }

    /// <summary>The first entry of the ledger that speaks for each review: the one written with it, or for a review of an older catalog the one that took that catalog over.</summary>
    private Dictionary<long, long> LedgerSequences()
    {
        using SqliteStatement select = catalog.Prepare("SELECT owner, min(sequence) FROM ledger_evidence WHERE kind = 'review' GROUP BY owner");
        var sequences = new Dictionary<long, long>();
        while (select.Read())
        {
            sequences.Add(select.Integer(0), select.Integer(1));
        }

        return sequences;
    }

    private static StoredReview Row(SqliteStatement row, bool withLines) => new(
        row.Integer(0),
        new ReviewHead
        {
            Number = (int)row.Integer(1),
            At = Instants.FromMicroseconds(row.Integer(2)),
            Correction = row.Text(3),
            Level = new SignificanceLevel(row.Real(4)),
            FamilySize = (int)row.Integer(5),
            TestedCount = (int)row.Integer(6),
            SurvivorCount = (int)row.Integer(7),
            IsInterim = row.Integer(8) != 0,
            ProgramVersion = row.Text(9),
        },
        row.NullableInteger(10) ?? 0,
        new RecordPosition(row.NullableInteger(11), row.NullableInteger(12), row.NullableInteger(13), row.NullableInteger(14)) { LastTestRunId = row.NullableInteger(10) ?? 0 },
        withLines ? row.Blob(15).ToArray() : []);
}
