using Campaigns.App.Output;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>The families of a campaign as rows.</summary>
internal static class FamilyTable
{
    private static IReadOnlyList<Column> Columns { get; } =
    [
        new("family", "family"), new("correction", "correction"), new("level", "level", true), new("opens_after", "opens after"), new("opens_when", "when"),
        new("planned", "planned", true), new("tested", "tested", true), new("survivors", "survivors", true), new("open", "open"),
    ];

    /// <summary>A row a family; one for a campaign of one family, which has no name.</summary>
    public static RowTable Of(Campaign campaign, IReadOnlyList<FamilyStanding> families)
    {
        var byName = campaign.Families.ToDictionary(f => f.Name, StringComparer.Ordinal);
        return new RowTable(Columns, families.Select(f => Row(byName.GetValueOrDefault(f.Name) ?? new Family(f.Name), f)));
    }

    /// <summary>The families as they are named, where they do not fit their plan yet: a level is the one that a family says for itself.</summary>
    public static RowTable AsNamed(Campaign campaign, IReadOnlyList<Family> families, IReadOnlyList<PlannedExperiment> plan) => new(Columns, families.Select(f => (Cell[])
    [
        Cell.Text(f.Name), Cell.Text(f.Correction ?? campaign.Correction), f.Level is { } level ? Cell.Setting(level.Value) : Cell.Empty, Cell.Text(f.OpensAfter), Gate(f),
        Cell.Whole(plan.Count(e => e.Family == f.Name)), Cell.Whole(0), Cell.Whole(0), Cell.Empty,
    ]));

    private static Cell[] Row(Family family, FamilyStanding f) =>
    [
        Cell.Text(f.Name), Cell.Text(f.Correction), Cell.Setting(f.Level.Value), Cell.Text(family.OpensAfter), Gate(family),
        Cell.Whole(f.Planned), Cell.Whole(f.Tested), Cell.Whole(f.Survivors), Cell.Truth(f.IsOpen),
    ];

    private static Cell Gate(Family family) => Cell.Text(family.OpensAfter is null ? null : family.Gate == FamilyGate.AllSurvive ? "all" : "any");
}
