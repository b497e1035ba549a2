using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Streams;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>Standing decisions as rows.</summary>
internal static class DecisionRows
{
    private const int MostNamed = 10;

    /// <summary>A row an experiment that was given a level, stream by stream in the order of starting.</summary>
    /// <remarks>Instants are set like numbers: a cut one could be another's.</remarks>
    public static RowTable Of(IReadOnlyList<StreamStore.Line> lines) => new(
        [
            new("stream", "stream", true), new("position", "position", true), new("experiment", "experiment"), new("level", "level given", true), new("p", "p", true), new("survives", "survives"),
            new("registered_at", "registered", true, 3), new("decided_at", "decided", true, 2), new("overlaps", "overlaps", GivesWay: 1), new("withdrawn", null),
        ],
        lines.Select(l => (Cell[])
        [
            Cell.Whole(l.Entry.Stream), Cell.Whole(l.Entry.Position), Cell.Text(l.Experiment), Cell.Number(l.Entry.Level), Cell.P(l.Entry.P), Cell.Truth(l.Entry.Survives),
            Cell.Text(Words.Instant(l.Entry.RegisteredAt)), Cell.Text(l.Entry.DecidedAt is { } at ? Words.Instant(at) : null), Cell.Truth(l.Entry.Overlaps), Cell.Truth(l.IsWithdrawn),
        ]))
    {
        WhenEmpty = "No experiment was given a level yet.",
    };

    /// <summary>What goes below such rows.</summary>
    public static IReadOnlyList<string> Below(CampaignOverview overview, IReadOnlyList<StreamStore.Line> lines)
    {
        List<string> below = [.. CampaignText.Footnotes(overview, [])];
        if (OnlineText.WithoutLevel(lines.Select(l => l.Entry)) is { } late)
        {
            below.Insert(0, late);
        }

        if (lines.Where(l => l.IsWithdrawn).Select(l => l.Experiment).ToArray() is { Length: > 0 } gone)
        {
            below.Insert(0, $"Withdrawn: {string.Join(", ", gone.Take(MostNamed))}{(gone.Length > MostNamed ? FormattableString.Invariant($" and {gone.Length - MostNamed} more") : "")}. A decision that was made stays in the stream, but such an experiment is no survivor.");
        }

        if (lines.Any(l => l.Entry.Overlaps))
        {
            below.Insert(0, OnlineText.Overlaps);
        }

        return below;
    }
}
