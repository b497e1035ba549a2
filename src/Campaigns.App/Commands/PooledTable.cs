using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>All campaigns corrected as one family, beside their sealed corrections, as rows.</summary>
internal static class PooledTable
{
    private static IReadOnlyList<Column> Columns { get; } =
    [
        new("campaign", "campaign"), new("experiments", "experiments", true), new("tests", "tests", true), new("correction", "correction"), new("level", "level", true),
        new("survivors", "survive", true), new("pooled_correction", null), new("pooled_level", null, true), new("pooled_survivors", "pooled", true),
        new("gained", "gained", true), new("lost", "lost", true), new("false_survivors_at_most", "false at most", true), new("confidence", null, true),
    ];

    /// <summary>A row a campaign, and the programme.</summary>
    /// <param name="standings">Every campaign.</param>
    /// <param name="correction">The pooled correction.</param>
    /// <param name="level">Its level.</param>
    public static RowTable Of(IReadOnlyList<CampaignStanding> standings, Correction correction, SignificanceLevel level)
    {
        ExperimentResult[] all = [.. standings.SelectMany(s => s.Experiments)];
        PValue[] p = [.. all.Where(e => e.P is not null).Select(e => e.P!.Value)];
        int family = all.Count(e => !e.LeftFamily);
        bool[] pooled = [.. correction.Adjust(RankedFamily.Of(p, family)).Select(level.Rejects)];
        CampaignBounds bounds = CampaignBounds.Of(all, level);
        var rows = new List<Cell[]>();
        int first = 0;
        int tested = 0;
        foreach (CampaignStanding standing in standings)
        {
            rows.Add(Row(standing, bounds, first, pooled.AsSpan(tested, standing.TestedCount)));
            first += standing.Experiments.Count;
            tested += standing.TestedCount;
        }

        if (standings.Count > 1)
        {
            rows.Add(Total(rows, bounds.Mark(Survivors(all, 0))));
        }

        foreach (Cell[] row in rows)
        {
            (row[6], row[7], row[12]) = (Cell.Text(correction.Key), Cell.Setting(level.Value), Cell.Setting(bounds.Confidence));
        }

        return new RowTable(Columns, rows)
        {
            Above = standings.Count == 0 ? [] : [FormattableString.Invariant($"All campaigns as one family of {family} ({p.Length} with a result): {correction.Name} at {level}. An exploration: the sealed correction of each campaign alone decides what survives.")],
            Below =
            [
                $"Pooled: what would survive. {correction.Guarantee}",
                "Gained and lost: pooled survivors that the campaign's own correction does not let survive, and the reverse.",
                FormattableString.Invariant($"False at most: of the campaign's own survivors, by closed testing over the experiments of all campaigns, with {BoundWording.ConfidenceText(bounds.Confidence)} confidence for all rows together. ") + BoundWording.NoEstimate,
                BoundWording.SimesAlone,
                .. standings.SelectMany(s => CampaignText.Deviations(s.Overview).Select(d => $"{s.Campaign.Code}: {d}")),
                CampaignText.Caution,
            ],
            WhenEmpty = "The catalog holds no campaigns yet.",
        };
    }

    private static Cell[] Row(CampaignStanding standing, CampaignBounds bounds, int first, ReadOnlySpan<bool> pooled)
    {
        int gained = 0;
        int lost = 0;
        int survivors = 0;
        int next = 0;
        foreach (ExperimentResult experiment in standing.Experiments.Where(e => e.P is not null))
        {
            bool isPooled = pooled[next++];
            survivors += isPooled ? 1 : 0;
            gained += isPooled && experiment.Survives != true ? 1 : 0;
            lost += !isPooled && experiment.Survives == true ? 1 : 0;
        }

        return
        [
            Cell.Text(standing.Campaign.Code), Cell.Whole(standing.FamilySize), Cell.Whole(standing.TestedCount), Cell.Text(standing.Campaign.Correction), Cell.Setting(standing.Campaign.Level.Value),
            Cell.Whole(standing.SurvivorCount), Cell.Empty, Cell.Empty, Cell.Whole(survivors), Cell.Whole(gained), Cell.Whole(lost),
            Cell.Whole(bounds.Mark(Survivors(standing.Experiments, first)).FalseAtMost), Cell.Empty,
        ];
    }

    private static Cell[] Total(List<Cell[]> rows, MarkedBound bound)
    {
        Cell Sum(int column) => Cell.Whole(rows.Sum(r => r[column].AsWhole));
        return [Cell.Text("programme"), Sum(1), Sum(2), Cell.Empty, Cell.Empty, Sum(5), Cell.Empty, Cell.Empty, Sum(8), Sum(9), Sum(10), Cell.Whole(bound.FalseAtMost), Cell.Empty];
    }

    private static int[] Survivors(IReadOnlyList<ExperimentResult> experiments, int first) =>
        [.. Enumerable.Range(0, experiments.Count).Where(i => experiments[i].Survives == true).Select(i => first + i)];
}
