using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Tests.Dashboard;

/// <summary>Invented campaigns that the product judges: in families with gates, and as a stream.</summary>
internal static class SampleCampaigns
{
    public static readonly SignificanceLevel Level = new(0.05);

    /// <summary>One family under a correction of the program.</summary>
    public static CampaignStanding By(string correction, int planned = 48) => Judged(SampleCampaign.Standing(planned).Campaign with { Correction = correction }, Bare(planned, _ => null));

    /// <summary>Three families in turn: the first at 0.03, the second by Hommel at 0.02, the last closed until all of the first survive.</summary>
    public static CampaignStanding InFamilies(int planned = 36)
    {
        string[] names = ["films", "inks", "late"];
        Campaign campaign = SampleCampaign.Standing(1).Campaign with
        {
            ErrorRate = ErrorRate.Familywise,
            Correction = "holm",
            Families =
            [
                new Family("films") { Level = new SignificanceLevel(0.03) },
                new Family("inks") { Correction = "hommel", Level = new SignificanceLevel(0.02) },
                new Family("late") { OpensAfter = "films", Gate = FamilyGate.AllSurvive },
            ],
        };
        return Judged(campaign, Bare(planned, i => names[i % names.Length]));
    }

    /// <summary>A stream: every sixth experiment still runs, and the levels given fall with the place.</summary>
    public static CampaignStanding InStream(int planned = 24)
    {
        OnlineProcedure procedure = OnlineRegistry.Find("lord")!;
        DateTimeOffset start = new(2026, 4, 3, 8, 0, 0, TimeSpan.Zero);
        Campaign campaign = SampleCampaign.Standing(1).Campaign with
        {
            Correction = "lord",
            Streams = [new StreamHead(1, procedure, OnlineSettings.For(procedure, Level, planned, null, null, null, null), null, start)],
        };
        return Judged(campaign, [.. Bare(planned, _ => null).Select((e, i) => e with { Entry = Entry(e, i, start) })]);
    }

    /// <summary>A source of a campaign whose experiments were tested in three runs.</summary>
    public static SampleSource Source(CampaignStanding standing) => new(standing)
    {
        Risk = RiskCurve.Of(standing, standing.Experiments.ToDictionary(e => e.Plan.Code, e => 1L + ((e.Position * 7) % 3))),
    };

    private static StreamEntry Entry(ExperimentResult e, int place, DateTimeOffset start)
    {
        double level = Math.Round(0.025 / (place + 1), 6);
        StreamEntry entry = new(1, place + 1, level, start.AddDays(place)) { Overlaps = place == 3 };
        return e.P is not { } p ? entry : entry with { DecidedAt = start.AddDays(place + 2), P = p, Survives = p.Value <= level };
    }

    private static List<ExperimentResult> Bare(int planned, Func<int, string?> family) =>
        [.. SampleCampaign.Standing(planned).Experiments.Select((e, i) => e with { Plan = e.Plan with { Family = family(i) }, AdjustedP = null, Survives = null })];

    private static CampaignStanding Judged(Campaign campaign, List<ExperimentResult> experiments)
    {
        CampaignVerdict verdict = FamilyVerdict.Judge(campaign, FamilyMembers.Of(campaign, experiments));
        return new CampaignStanding(campaign, FamilyVerdict.Apply(experiments, verdict), experiments.Count, null, 0) { Families = verdict.Families };
    }
}
