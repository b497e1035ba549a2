using System.Globalization;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Output;

namespace Campaigns.App.Dashboard.Paint;

/// <summary>The ranked p-values on a logarithmic scale with the boundary of the correction.</summary>
public sealed class RankingPlot
{
    private const int Left = 9;
    private const int FewestRanks = 20;
    private const int LetterGap = 8;
    private const int PowersBelowBoundary = 12;
    private const int PowersBelowBoundaryNear = 2;
    private readonly Ranking _ranking;
    private readonly GlyphSet _glyphs;
    private readonly TextCanvas _canvas;
    private readonly int _columns;
    private readonly int _rows;
    private readonly int _shown;
    private readonly int _floor;
    private readonly RankingOverlay _overlay;

    private RankingPlot(Ranking ranking, bool isNear, int width, int height, GlyphSet glyphs, RankingOverlay overlay)
    {
        _ranking = ranking;
        _overlay = overlay;
        _glyphs = glyphs;
        _canvas = new TextCanvas(width, height);
        _columns = width - Left - 1;
        _rows = height - 2;
        _shown = ShownOf(ranking, isNear);
        _floor = FloorOf(ranking, isNear);
    }

    /// <summary>Paints the plot.</summary>
    /// <param name="ranking">The ranked p-values.</param>
    /// <param name="selectedRank">The rank that is pointed at; 0 for none.</param>
    /// <param name="isNear">Whether only the surroundings of the boundary are shown: twice the survivors across, and two powers of ten below the boundary instead of twelve; what lies lower is marked at the edge.</param>
    /// <param name="width">Cells across, at least 30.</param>
    /// <param name="height">Rows, at least 6.</param>
    /// <param name="glyphs">The signs.</param>
    /// <param name="overlay">What else is drawn; null for nothing.</param>
    public static TextCanvas Paint(Ranking ranking, int selectedRank, bool isNear, int width, int height, GlyphSet glyphs, RankingOverlay? overlay = null)
    {
        ArgumentNullException.ThrowIfNull(ranking);
        if (ranking.Count == 0 || width < 30 || height < 6)
        {
            TextCanvas words = new(width, height);
            words.Write(1, 0, ranking.Count == 0 ? "Nothing is tested yet: there is no p-value to rank." : "too small to draw", Ink.Open);
            return words;
        }

        RankingPlot plot = new(ranking, isNear, width, height, glyphs, overlay ?? RankingOverlay.None);
        plot.Axes(selectedRank);
        plot.Beside();
        plot.Boundary();
        plot.Points();
        return plot._canvas;
    }

    /// <summary>The rank that stands nearest to a column; 0 where nothing is ranked.</summary>
    /// <param name="ranking">The ranked p-values.</param>
    /// <param name="isNear">As it was painted.</param>
    /// <param name="width">As it was painted.</param>
    /// <param name="x">Column from 0.</param>
    public static int RankAt(Ranking ranking, bool isNear, int width, int x)
    {
        ArgumentNullException.ThrowIfNull(ranking);
        int shown = ShownOf(ranking, isNear), columns = width - Left - 1;
        int rank = columns < 2 || shown < 2 ? 1 : 1 + (int)Math.Round((double)(x - Left) * (shown - 1) / (columns - 1));
        return Math.Clamp(rank, Math.Min(1, ranking.Count), ranking.Count);
    }

    /// <summary>What the boundary is, in one line.</summary>
    /// <param name="ranking">The ranked p-values.</param>
    public static string BoundaryText(Ranking ranking)
    {
        if (ranking.Count == 0)
        {
            return "";
        }

        if (ranking is { IsOnline: true })
        {
            return "Each p was held against the level that its experiment was given when it started.";
        }

        if (ranking is { HasBoundary: false })
        {
            string why = ranking.HasFamilies ? "Each family has a boundary of its own" : "This correction has no simple boundary";
            return ranking.LargestSurvivor is { } largest
                ? $"{why}; the line stands at the largest p that survives, {NumberText.P(largest)}."
                : $"{why}, and no p-value survives.";
        }

        double first = ranking.BoundaryAt(1)!.Value, last = ranking.BoundaryAt(ranking.FamilySize)!.Value;
        string family = ranking.FamilySize.ToString(CultureInfo.InvariantCulture);
        return first == last
            ? $"Boundary: p up to {NumberText.Screen(first, 3)} at every rank of {family}."
            : $"Boundary: from {NumberText.Screen(first, 3)} at rank 1 to {NumberText.Screen(last, 3)} at rank {family}.";
    }

    /// <summary>What the signs mean.</summary>
    /// <param name="ranking">The ranked p-values.</param>
    /// <param name="glyphs">The signs.</param>
    /// <param name="overlay">What else is drawn; null for nothing.</param>
    /// <returns>The ways to say it, the fullest first.</returns>
    public static IReadOnlyList<string> Key(Ranking ranking, GlyphSet glyphs, RankingOverlay? overlay = null)
    {
        ArgumentNullException.ThrowIfNull(ranking);
        ArgumentNullException.ThrowIfNull(glyphs);
        List<string> parts = [glyphs.Survivor + " survives", glyphs.Other + " does not"];
        parts.Add(glyphs.Boundary + (ranking.IsOnline ? " level given" : ranking.HasBoundary ? " boundary" : " largest survivor"));
        if (overlay?.Explored is not null)
        {
            parts.Add(glyphs.Explored + " explored");
        }

        bool hasOpen = ranking.FamilySize > ranking.Count;
        string lower = glyphs.BelowScale + " lower";
        string full = string.Join("  ", [.. parts, .. hasOpen ? [glyphs.Open + " no result (p = 1)"] : (string[])[], lower]);
        string brief = string.Join("  ", [.. parts, .. hasOpen ? [glyphs.Open + " no result"] : (string[])[], lower]);
        return [full, brief, brief.Replace("  ", " ", StringComparison.Ordinal)];
    }

    private static int ShownOf(Ranking ranking, bool isNear) =>
        isNear ? Math.Clamp(2 * ranking.SurvivorCount, Math.Min(FewestRanks, ranking.FamilySize), ranking.FamilySize) : ranking.FamilySize;

    private static int FloorOf(Ranking ranking, bool isNear)
    {
        double boundary = Math.Log10((ranking.HasBoundary ? ranking.BoundaryAt(1) : ranking.LargestSurvivor?.Value is > 0 and var p ? p : null) ?? 0.05);
        double smallest = 0;
        for (int rank = 1; rank <= ranking.Count; rank++)
        {
            double log = ranking.Log10At(rank);
            if (double.IsFinite(log))
            {
                smallest = log;
                break;
            }
        }

        double lowest = Math.Min(smallest, boundary);
        return Math.Min(-1, (int)Math.Floor(Math.Max(lowest, boundary - (isNear ? PowersBelowBoundaryNear : PowersBelowBoundary))));
    }

    private int ColumnOf(int rank) => Left + (_shown == 1 ? 0 : (int)Math.Round((rank - 1.0) * (_columns - 1) / (_shown - 1)));

    private int RowOf(double log10) => (int)Math.Round(Math.Clamp(log10 / _floor, 0, 1) * (_rows - 1));

    private void Axes(int selectedRank)
    {
        for (int y = 0; y < _rows; y++)
        {
            _canvas.Put(Left - 1, y, _glyphs.Upright, Ink.Axis);
        }

        int step = StepOf((double)-_floor / Math.Max(1, _rows / 2));
        for (int power = 0; power >= _floor; power -= step)
        {
            int y = RowOf(power);
            _canvas.Put(Left - 1, y, _glyphs.TickLeft, Ink.Axis);
            _canvas.WriteRight(Left - 2, y, PowerText(power), Ink.Axis);
        }

        _canvas.Put(Left - 1, _rows, _glyphs.Corner, Ink.Axis);
        _canvas.Repeat(Left, _rows, _columns, _glyphs.Across, Ink.Axis);
        string last = _shown.ToString(CultureInfo.InvariantCulture) + (_shown < _ranking.FamilySize ? " of " + _ranking.FamilySize.ToString(CultureInfo.InvariantCulture) : "");
        _canvas.Write(Left, _rows + 1, "1", Ink.Axis);
        _canvas.WriteRight(Left + _columns - 1, _rows + 1, last, Ink.Axis);
        _canvas.Write(Left + (_columns / 2) - 4, _rows + 1, "rank of p", Ink.Axis);
        if (selectedRank >= 1 && selectedRank <= _shown)
        {
            _canvas.Put(ColumnOf(selectedRank), _rows, _glyphs.Here, Ink.Selected);
        }
    }

    // Boundaries beside the sealed one are dotted with their letters, each begun at another column, so that those that run together can be told apart.
    private void Beside()
    {
        for (int i = 0; i < _overlay.Beside.Count; i++)
        {
            (string sign, BoundaryLine line) = _overlay.Beside[i];
            Trace(rank => line.At(rank), sign, Ink.Axis, 1 + (2 * i) % LetterGap, LetterGap);
        }
    }

    private void Boundary()
    {
        if (_overlay.Explored is { } explored)
        {
            Trace(rank => explored.At(rank), _glyphs.Explored, Ink.Mean, 0, 1);
        }

        if (_ranking.IsOnline)
        {
            // Each point has a level of its own, which no line joins.
            for (int rank = Math.Min(_ranking.Count, _shown); rank >= 1; rank--)
            {
                if (_ranking.At(rank).GivenLevel is > 0 and var given && Math.Log10(given) >= _floor)
                {
                    _canvas.Put(ColumnOf(rank), RowOf(Math.Log10(given)), _glyphs.Boundary, Ink.Boundary);
                }
            }
        }
        else if (_ranking.HasBoundary || _ranking.LargestSurvivor is { Value: > 0 })
        {
            Trace(rank => _ranking.BoundaryAt(rank) ?? _ranking.LargestSurvivor!.Value.Value, _glyphs.Boundary, Ink.Boundary, 0, 1);
        }
    }

    private void Trace(Func<int, double?> boundaryAt, string sign, Ink ink, int first, int gap)
    {
        for (int column = first; column < _columns; column += gap)
        {
            int rank = _columns == 1 ? 1 : 1 + (int)Math.Round((double)column * (_shown - 1) / (_columns - 1));
            if (boundaryAt(rank) is > 0 and var boundary && Math.Log10(boundary) is var log && log >= _floor)
            {
                _canvas.Put(Left + column, RowOf(log), sign, ink);
            }
        }
    }

    // The rest of the family first, survivors last: where several share a cell, the survivor is seen, and above all what another level would change.
    private void Points()
    {
        for (int rank = Math.Max(1, _ranking.Count + 1); rank <= _shown; rank += Math.Max(1, _shown / (4 * _columns)))
        {
            _canvas.Put(ColumnOf(rank), 0, _glyphs.Open, Ink.Open);
        }

        for (int rank = Math.Min(_ranking.Count, _shown); rank >= 1; rank--)
        {
            bool survives = _ranking.At(rank).Survives == true;
            Point(rank, survives ? _glyphs.Survivor : _glyphs.Other, survives ? Ink.Survivor : Ink.Text);
        }

        foreach ((IReadOnlySet<int> changed, string sign) in new[] { (_overlay.Gained, _glyphs.Gained), (_overlay.Lost, _glyphs.Lost) })
        {
            foreach (int rank in changed.Select(_ranking.RankOf).Where(r => r >= 1 && r <= _shown))
            {
                Point(rank, sign, Ink.Mean);
            }
        }
    }

    private void Point(int rank, string sign, Ink ink)
    {
        double log = _ranking.Log10At(rank);
        _canvas.Put(ColumnOf(rank), RowOf(log), log < _floor ? _glyphs.BelowScale : sign, ink);
    }

    private static int StepOf(double least)
    {
        int step = 1;
        for (int i = 0; step < least; i++)
        {
            step = i % 3 == 1 ? step / 2 * 5 : step * 2;
        }

        return step;
    }

    private static string PowerText(int power) => power switch
    {
        0 => "1",
        -1 => "0.1",
        -2 => "0.01",
        _ => "1e" + power.ToString(CultureInfo.InvariantCulture),
    };
}
