using Campaigns.App.Output;
using Campaigns.Catalog.Results;

namespace Campaigns.App.Commands;

/// <summary>The observations of an experiment, each traced to file and line.</summary>
internal static class ObservationsTable
{
    public static void Print(Session session, Catalog.Catalog catalog, string code, string experiment)
    {
        IReadOnlyList<TracedObservation> observations = new ObservationReader(catalog).Read(code, experiment);
        session.Print(new RowTable(Columns, observations.Select(Row))
        {
            Above = [$"{code} / {experiment}: every observation, as it was loaded"],
            WhenEmpty = "The experiment has no observation yet.",
            Below = [$"The files as they were loaded: 'campaigns export {code} --originals --out FOLDER'."],
        });
    }

    private static IReadOnlyList<Column> Columns { get; } =
    [
        new("group", "group"), new("value", "value", true), new("file", "file"), new("line", "line", true), new("specimen", "specimen", GivesWay: 2), new("block", "block", GivesWay: 2),
        new("order", "order", true, 3), new("excluded", "excluded", GivesWay: 1),
    ];

    private static Cell[] Row(TracedObservation o) =>
    [
        Cell.Text(o.Group), Cell.Text(o.Value), Cell.Text(o.File), Cell.Whole(o.Line), Cell.Text(o.Specimen), Cell.Text(o.Block), Cell.Whole(o.Order), Cell.Truth(o.IsExcluded),
    ];
}
