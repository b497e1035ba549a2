using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Output;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>Where the columns of the list stand. The widths come from the whole campaign, so that they do not jump while rows pass; numbers are never cut.</summary>
public sealed class ListLayout
{
    private const int LongestCode = 16;
    private const int ShortestTitle = 6;
    private readonly int _code;
    private readonly int _title;
    private readonly int _status;
    private readonly int _shortStatus;
    private readonly Dictionary<string, int> _fixed;

    /// <summary>Measures a campaign.</summary>
    /// <param name="experiments">Its experiments.</param>
    public ListLayout(IReadOnlyList<ExperimentResult> experiments)
    {
        int code = 0, title = 0, values = 0;
        PValue smallest = PValue.One, smallestAdjusted = PValue.One;
        List<ExperimentResult> statuses = [];
        (ExperimentStatus?, bool) before = (null, false);

        // Once through all of them: in a large campaign every look at an experiment is a look at far memory.
        for (int i = 0; i < experiments.Count; i++)
        {
            ExperimentResult e = experiments[i];
            code = Math.Max(code, CellText.Width(e.Plan.Code));
            title = Math.Max(title, e.Plan.Title.Length);
            values = Math.Max(values, e.ObservationCount);
            smallest = Smaller(smallest, e.P);
            smallestAdjusted = Smaller(smallestAdjusted, e.AdjustedP);
            if (before != (e.Status, e.Amendments.Count > 0))
            {
                before = (e.Status, e.Amendments.Count > 0);
                statuses.Add(e);
            }
        }

        _code = Math.Clamp(code, "experiment".Length, LongestCode);
        _title = Math.Max("title".Length, title);
        ExperimentColumn status = ExperimentColumn.Named("status");
        _status = statuses.Select(e => status.TextOf(e)!.Length).Append("status".Length).Max();
        _shortStatus = statuses.Select(e => status.ShortTextOf!(e).Length).Append("status".Length).Max();
        _fixed = new()
        {
            ["groups"] = "groups".Length,
            ["n"] = Math.Max(3, values.ToString(CultureInfo.InvariantCulture).Length),
            ["statistic"] = "statistic".Length,
            ["p"] = Math.Max(6, NumberText.P(smallest).Length),
            ["adjusted"] = Math.Max("adjusted".Length, NumberText.P(smallestAdjusted).Length),
            ["survives"] = "survives".Length,
        };
    }

    /// <summary>The columns that a width has room for, with their first cells and widths.</summary>
    /// <param name="width">Cells across.</param>
    /// <returns>Where there is too little room, the title goes first, then groups and n; what is still too wide ends at the right edge. A status column without room for all words takes the short ones.</returns>
    public IReadOnlyList<(ExperimentColumn Column, int X, int Width)> Place(int width)
    {
        HashSet<string> left = [];
        int spare = width - _code - _fixed.Values.Sum() - (ExperimentColumn.All.Count - 1);
        int title = Math.Min(_title, spare - Math.Min(_status, Math.Max(_shortStatus, spare / 2)));
        if (title < ShortestTitle)
        {
            title = -1;
            foreach (string name in new[] { "groups", "n" })
            {
                if (spare - title < _shortStatus && left.Add(name))
                {
                    spare += _fixed[name] + 1;
                }
            }
        }

        int status = Math.Clamp(spare - title, _shortStatus, _status);
        List<(ExperimentColumn Column, int X, int Width)> placed = [];
        int x = 0;
        foreach (ExperimentColumn column in ExperimentColumn.All)
        {
            int w = column.Name switch { "experiment" => _code, "title" => title, "status" => status, _ => left.Contains(column.Name) ? 0 : _fixed[column.Name] };
            if (w > 0)
            {
                placed.Add((column, x, w));
                x += w + 1;
            }
        }

        return placed;
    }

    /// <summary>Whether every status is written in full where its column has a width.</summary>
    /// <param name="width">Cells of the column.</param>
    public bool IsStatusInFull(int width) => width >= _status;

    // The text of a p-value is longest where its exponent is, that is at the smallest.
    private static PValue Smaller(PValue smallest, PValue? p) => p is { } value && value < smallest ? value : smallest;
}
