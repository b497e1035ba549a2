using System.CommandLine;
using System.Globalization;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Reviewing;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>reviews: those that were taken, their lines, and what lies between two of them.</summary>
internal sealed class ReviewsVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Option<int?> _lines = TypedOptions.WholeOrNone("--lines", 1, "Every line of a review, as it was stored.");
    private readonly Option<bool> _families = new("--families") { Description = "A row a family of each review." };
    private readonly Option<string[]> _compare = new("--compare")
    {
        Description = "Which experiments were gained and lost between two reviews, and why.",
        HelpName = "EARLIER LATER",
        Arity = new ArgumentArity(2, 2),
        AllowMultipleArgumentsPerToken = true,
    };

    private readonly Option<string?> _rerun = new("--rerun")
    {
        Description = "Take a review again from the measurements as they stood then, and hold it against the stored one; all takes every one.",
        HelpName = "N|all",
    };

    public override Command Build() => new("reviews", Describe("The reviews of a campaign, each as it was on its day; what changed between two.", "reviews PRIMERS --compare 1 2"))
    {
        _code, _lines, _families, _compare, _rerun,
    };

    public override int Run(Session session)
    {
        string code = session.Get(_code);
        string[] compared = session.Get(_compare) ?? [];
        int asked = (session.Typed.GetValue(_lines) is null ? 0 : 1) + (session.Get(_families) ? 1 : 0) + (compared.Length > 0 ? 1 : 0) + (session.Get(_rerun) is null ? 0 : 1);
        if (asked > 1)
        {
            throw new UsageException("--lines, --families, --compare and --rerun are different questions; ask one at a time.");
        }

        using Catalog.Catalog catalog = session.OpenCatalog();
        var reader = new ReviewReader(catalog);
        if (session.Get(_rerun) is { } again)
        {
            return Rerun(session, catalog, code, again);
        }

        if (compared.Length > 0)
        {
            Compare(session, catalog, code, compared);
        }
        else if (session.Typed.GetValue(_lines) is { } number)
        {
            (ReviewHead head, IReadOnlyList<ReviewReader.NamedLine> lines) = reader.Lines(code, number);
            session.Print(ReviewTables.Lines(head, lines));
        }
        else
        {
            IReadOnlyList<ReviewRecord> records = reader.Records(code);
            session.Print(session.Get(_families) ? ReviewTables.Families(code, records) : ReviewTables.Of(code, records));
        }

        return ExitCode.Done;
    }

    private static void Compare(Session session, Catalog.Catalog catalog, string code, string[] compared)
    {
        (int earlier, int later) = (Number(compared[0]), Number(compared[1]));
        if (earlier > later)
        {
            throw new UsageException(FormattableString.Invariant($"--compare takes the earlier review first: --compare {later} {earlier}."));
        }

        (ReviewComparison comparison, IReadOnlyDictionary<long, string> codes) = new ReviewComparer(catalog).Compare(code, earlier, later);
        if (session.Format != RowFormat.Table)
        {
            session.Say(ReviewWording.Summary(comparison));
        }

        session.Print(ReviewTables.Compared(comparison, codes));
    }

    private static int Rerun(Session session, Catalog.Catalog catalog, string code, string which)
    {
        int? number = which == "all" ? null
            : int.TryParse(which, NumberStyles.None, CultureInfo.InvariantCulture, out int one) && one > 0 ? one
            : throw new UsageException($"--rerun takes the number of a review, or all, not '{which}'; 'campaigns reviews CODE' lists them.");
        IReadOnlyList<ReviewRerun.Outcome> outcomes;
        using (var line = new ProgressLine(session.Host))
        {
            outcomes = new ReviewRerun(catalog).Run(code, number, line.Report, session.Host.Cancel);
        }

        foreach (ReviewRerun.Outcome outcome in outcomes)
        {
            session.Say(ReviewWording.Again(outcome));
        }

        if (session.Format != RowFormat.Table || outcomes.Any(o => o.Lines.Count > 0))
        {
            session.Print(ReviewTables.Again(outcomes));
        }

        return outcomes.All(o => o.IsSame) ? ExitCode.Done : ExitCode.RecordBroken;
    }

    private static int Number(string word) => int.TryParse(word, NumberStyles.None, CultureInfo.InvariantCulture, out int number) && number > 0
        ? number
        : throw new UsageException($"--compare takes the numbers of two reviews, not '{word}'; 'campaigns reviews CODE' lists them.");
}
