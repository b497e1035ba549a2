using System.CommandLine;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Output;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>risk: the cumulative false-positive risk.</summary>
internal sealed class RiskVerb : Verb
{
    private readonly Argument<string?> _code = new("CODE") { Description = "The campaign; without it, all campaigns of the catalog.", Arity = ArgumentArity.ZeroOrOne };
    private readonly Option<bool> _curve = new("--curve") { Description = "A row for each test of the campaign in the order of testing, with a picture for people." };
    private readonly Option<bool> _ascii = new("--ascii") { Description = "Draw the picture with ASCII signs alone." };
    private readonly Option<bool> _pooled = new("--pooled") { Description = "Correct the experiments of all campaigns as one family: an exploration beside the sealed choices." };
    private readonly Option<string?> _correction = TypedOptions.Word("--correction", "The pooled correction (else that of the campaigns where they share one, else bh).", "KEY", [.. CorrectionRegistry.FromPAlone.Select(c => c.Key)]);
    private readonly Option<double?> _level = TypedOptions.LevelOrNone("The pooled level (else that of the campaigns where they share one, else 0.05).");

    public override Command Build() => new("risk", Describe("What many tests at once risk: false positives without correction if nothing is real, what the correction holds, and how many survivors may be false.",
        "risk PRIMERS --curve"))
    {
        _code, _curve, _ascii, _pooled, _correction, _level,
    };

    public override int Run(Session session)
    {
        string? code = session.Typed.GetValue(_code);
        CheckUsage(session, code);
        using Catalog.Catalog catalog = session.OpenCatalog();
        var campaigns = new CampaignStore(catalog);
        var standings = new StandingReader(catalog);
        if (session.Get(_curve))
        {
            PrintCurve(session, catalog, standings.Read(code!));
            return ExitCode.Done;
        }

        string[] codes = code is null ? [.. campaigns.All().Select(c => c.Campaign.Code)] : [campaigns.Get(code).Campaign.Code];
        CampaignStanding[] chosen = [.. codes.Select(standings.Read)];
        session.Print(session.Get(_pooled) ? Pooled(session, chosen) : RiskTable.Of([.. chosen.Select(CampaignRisk.Of)], withTotal: code is null));
        return ExitCode.Done;
    }

    private void CheckUsage(Session session, string? code)
    {
        bool pooled = session.Get(_pooled);
        if (session.Get(_curve) && (code is null || pooled))
        {
            throw new UsageException("--curve shows the tests of one campaign: name it, and leave out --pooled.");
        }

        if (pooled && code is not null)
        {
            throw new UsageException("--pooled takes the experiments of all campaigns as one family; leave out the campaign.");
        }

        if (!pooled && (session.Typed.GetValue(_correction) is not null || session.Typed.GetValue(_level) is not null))
        {
            throw new UsageException("--correction and --level belong to --pooled; the correction and level of a campaign are fixed in its plan.");
        }
    }

    private void PrintCurve(Session session, Catalog.Catalog catalog, CampaignStanding standing)
    {
        IReadOnlyList<RiskPoint> points = RiskCurve.Of(standing, new TestOrderReader(catalog).LatestRuns(standing.Campaign.Code));
        if (session.Format == RowFormat.Table && points.Count > 0)
        {
            session.Host.Out.Write(RiskPicture.Paint(points, session.Host.Width, session.Get(_ascii) ? GlyphSet.Ascii : GlyphSet.Full));
            session.Host.Out.WriteLine();
        }

        session.Print(RiskCurveTable.Of(standing, points));
    }

    private RowTable Pooled(Session session, CampaignStanding[] standings)
    {
        string[] keys = [.. standings.Select(s => s.Campaign.Correction).Distinct()];
        SignificanceLevel[] levels = [.. standings.Select(s => s.Campaign.Level).Distinct()];
        Correction correction = Named(session.Typed.GetValue(_correction) ?? (keys is [string shared] ? shared : "bh"));
        SignificanceLevel level = session.Typed.GetValue(_level) is { } typed ? new SignificanceLevel(typed) : levels is [SignificanceLevel same] ? same : new SignificanceLevel(0.05);
        return PooledTable.Of(standings, correction, level);
    }

    // A shared procedure that needs weights, or an order of arrival, says nothing of pooled p-values alone.
    private static Correction Named(string key) => CorrectionRegistry.FromPAlone.FirstOrDefault(c => c.Key == key) ?? new BenjaminiHochberg();
}
