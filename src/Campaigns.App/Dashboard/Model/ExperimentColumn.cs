using System.Globalization;
using Campaigns.App.Output;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Model;

/// <summary>A column of the list of experiments: its name, its text and its order.</summary>
public sealed class ExperimentColumn
{
    private ExperimentColumn(string name, Func<ExperimentResult, string?> text)
    {
        Name = name;
        TextOf = text;
    }

    /// <summary>The columns, in the order in which people see them.</summary>
    public static IReadOnlyList<ExperimentColumn> All { get; } =
    [
        new("experiment", e => e.Plan.Code),
        new("title", e => e.Plan.Title),
        new("groups", e => Count(e.GroupCount)) { Number = e => e.GroupCount },
        new("n", e => Count(e.ObservationCount)) { Number = e => e.ObservationCount },
        new("statistic", e => e.Statistic is { } s ? NumberText.Screen(s, 4) : null) { Number = e => e.Statistic },
        new("p", e => e.P is { } p ? NumberText.P(p) : null) { Number = e => e.P?.Log },
        new("adjusted", e => e.AdjustedP is { } p ? NumberText.P(p) : null) { Number = e => e.AdjustedP?.Log },
        new("survives", e => e.Survives is { } yes ? yes ? "yes" : "no" : null) { Number = e => e.Survives is { } yes ? yes ? 0 : 1 : null, IsRightAligned = false },
        new("status", e => e.Amendments.Count > 0 ? e.Status.Word() + ", amended" : e.Status.Word()) { ShortTextOf = Short, Number = e => (int)e.Status, IsRightAligned = false },
    ];

    /// <summary>The column's name.</summary>
    public string Name { get; }

    /// <summary>The text of a cell; null where there is no value.</summary>
    public Func<ExperimentResult, string?> TextOf { get; }

    /// <summary>The same in fewer letters, for lists that have no room for all; null where there is no such way.</summary>
    public Func<ExperimentResult, string>? ShortTextOf { get; private init; }

    /// <summary>The number by which the column is sorted, null where there is no value; null itself for a column sorted by its text.</summary>
    public Func<ExperimentResult, double?>? Number
    {
        get;
        private init
        {
            field = value;
            IsRightAligned = true;
        }
    }

    /// <summary>Whether the cells end at the right.</summary>
    public bool IsRightAligned { get; private init; }

    /// <summary>The column with a name.</summary>
    /// <param name="name">Exact.</param>
    public static ExperimentColumn Named(string name) => All.First(c => c.Name == name);

    // What came after the test is told by the sign of a warning; the words in full stand below the list and in the detail.
    private static string Short(ExperimentResult e)
    {
        string word = e.Status switch
        {
            ExperimentStatus.Planned or ExperimentStatus.Incomplete or ExperimentStatus.Ready or ExperimentStatus.Tested or ExperimentStatus.Withdrawn => e.Status.Word(),
            _ => "no test",
        };
        return e.Amendments.Count > 0 ? word + " !" : word;
    }

    private static string Count(int n) => n.ToString(CultureInfo.InvariantCulture);
}
