using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Output;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using OxyPlot;
using OxyPlot.Axes;

namespace Campaigns.App.Figures;

/// <summary>The p-values of a campaign from the smallest to the largest on a logarithmic scale, with the boundary of the sealed correction and of a few others.</summary>
internal static class RankingFigure
{
    /// <summary>Its key.</summary>
    public const string Key = "ranking";

    // Beyond as many ranks the first ones, about which one asks, would stand on one another.
    private const int MostEvenRanks = 200;
    private const int BoundaryPoints = 160;
    private const int PowersBelowBoundary = 12;
    private const double Room = 0.35;

    private static readonly (string Key, OxyColor Colour, LineStyle Dash)[] Others =
    [
        ("none", FigureStyle.Axis, LineStyle.Dot), ("bh", FigureStyle.Second, LineStyle.DashDot), ("holm", FigureStyle.Third, LineStyle.LongDash),
    ];

    /// <summary>Makes the figure.</summary>
    /// <param name="standing">The campaign.</param>
    public static Figure Of(CampaignStanding standing)
    {
        var figure = new Figure(Key, $"{standing.Campaign.Code}: p-values in order of their size", "");
        if (standing.TestedCount == 0)
        {
            return figure with { Alternative = FigureWords.NothingTested(standing) };
        }

        ErrorProcedure sealedOne = FamilyVerdict.ProcedureOf(standing.Campaign);
        var ranking = new Ranking(standing, sealedOne);
        return figure with
        {
            Alternative = Say(standing, ranking),
            Plot = Draw(standing, ranking, sealedOne),
            PlotHeight = 360,
            Notes = [.. NotesOf(standing, ranking)],
        };
    }

    private static PlotModel Draw(CampaignStanding standing, Ranking ranking, ErrorProcedure sealedOne)
    {
        bool isEven = ranking.FamilySize <= MostEvenRanks;
        double floor = Floor(ranking), last = isEven ? ranking.FamilySize : Math.Log10(ranking.FamilySize);
        PlotModel plot = FigureStyle.NewPlot();
        plot.Axes.Add(isEven
            ? FigureAxes.Counts(AxisPosition.Bottom, "rank", Math.Min(0, 1 - (0.03 * last)), 1 + (last * 1.03))
            : FigureAxes.Powers(AxisPosition.Bottom, "rank, logarithmic", 0, last, last * 0.02));
        plot.Axes.Add(FigureAxes.Powers(AxisPosition.Left, "p-value", floor, 0, Room));
        double At(int rank) => isEven ? rank : Math.Log10(rank);

        var survivors = new Marks("survives", MarkerType.Diamond, FigureStyle.Survivor, size: 4);
        var others = new Marks("does not survive", MarkerType.Circle, FigureStyle.Other, isHollow: true, size: 3);
        var open = new Marks("no result, counted as p = 1", MarkerType.Cross, FigureStyle.Other, size: 2.6);
        var below = new Marks("survives, below the scale", MarkerType.Triangle, FigureStyle.Survivor, size: 4.5);
        double width = At(ranking.FamilySize) - At(1) + 1e-9, height = -floor;
        bool thins = ranking.FamilySize > Thinning.FewMarks;
        var kept = new Dictionary<Marks, Thinning> { [survivors] = new(width, height), [others] = new(width, height), [open] = new(width, height), [below] = new(width, height) };
        for (int rank = 1; rank <= ranking.FamilySize; rank++)
        {
            bool hasResult = rank <= ranking.Count;
            double log = hasResult ? ranking.Log10At(rank) : 0;
            Marks marks = !hasResult ? open : log < floor ? below : ranking.At(rank).Survives == true ? survivors : others;
            double x = At(rank), y = Math.Max(log, floor);
            if (!thins || kept[marks].Keeps(x, y))
            {
                marks.Add(x, y);
            }
        }

        FigureStyle.Draw(plot, [.. Lines(standing, ranking, sealedOne, At, floor), open, others, survivors, below]);
        return plot;
    }

    private static IEnumerable<Strokes> Lines(CampaignStanding standing, Ranking ranking, ErrorProcedure sealedOne, Func<int, double> at, double floor)
    {
        int[] ranks = [.. Enumerable.Range(0, BoundaryPoints + 1).Select(i => (int)Math.Round(Math.Pow(ranking.FamilySize, i / (double)BoundaryPoints)))
            .Concat(Enumerable.Range(0, BoundaryPoints + 1).Select(i => 1 + (int)((ranking.FamilySize - 1L) * i / BoundaryPoints))).Distinct().Order()];
        if (!ranking.HasBoundary)
        {
            if (ranking.LargestSurvivor is { Log: > double.NegativeInfinity } largest)
            {
                var edge = new Strokes("largest p that survives", FigureStyle.Boundary, 1.8);
                edge.Add(at(1), Math.Max(floor, largest.Log / Math.Log(10)));
                edge.Add(at(ranking.FamilySize), Math.Max(floor, largest.Log / Math.Log(10)));
                yield return edge;
            }
        }
        else
        {
            yield return Line($"{sealedOne.Name}, sealed", FigureStyle.Boundary, 1.8, LineStyle.Solid, rank => ranking.BoundaryAt(rank));
        }

        if (standing.Families.Count > 1)
        {
            yield break;
        }

        foreach ((string key, OxyColor colour, LineStyle dash) in Others.Where(o => o.Key != sealedOne.Key))
        {
            Correction correction = CorrectionRegistry.Find(key)!;
            yield return Line(correction.Name, colour, 1.3, dash, rank => correction.BoundaryAt(rank, ranking.FamilySize, standing.Campaign.Level.Value));
        }

        Strokes Line(string name, OxyColor colour, double thickness, LineStyle dash, Func<int, double?> boundary)
        {
            var line = new Strokes(name, colour, thickness, dash);
            foreach (int rank in ranks)
            {
                if (boundary(rank) is { } p)
                {
                    line.Add(at(rank), Math.Log10(p));
                }
            }

            // A family of one has its boundary at one rank.
            if (line.Points.Count == 1)
            {
                line.Add(at(1) + 1, line.Points[0].Y);
            }

            return line;
        }
    }

    private static double Floor(Ranking ranking)
    {
        double boundary = Math.Log10((ranking.HasBoundary ? ranking.BoundaryAt(1) : ranking.LargestSurvivor?.Value is > 0 and var p ? p : null) ?? 0.05);
        double smallest = Enumerable.Range(1, ranking.Count).Select(ranking.Log10At).FirstOrDefault(double.IsFinite);
        return Math.Min(-1, Math.Floor(Math.Max(Math.Min(smallest, boundary), boundary - PowersBelowBoundary)));
    }

    private static IEnumerable<string> NotesOf(CampaignStanding standing, Ranking ranking)
    {
        yield return RankingPlot.BoundaryText(ranking);
        // Without a boundary of its own (families, decisions on arrival) the figure has no line of another correction either.
        if (ranking.HasBoundary)
        {
            yield return "Step-down corrections stop at the first p above their line; step-up ones take the last p below it and all smaller ones. The sealed correction alone decides; the other lines are for comparison.";
        }

        yield return FigureWords.Procedure(standing);
        if (ranking.FamilySize > Thinning.FewMarks)
        {
            yield return "Marks that would hide each other are drawn once.";
        }
    }

    private static string Say(CampaignStanding standing, Ranking ranking)
    {
        string smallest = $"The smallest p is {NumberText.P(ranking.At(1).P!.Value)} ({ranking.At(1).Plan.Code})";
        string largest = ranking.LargestSurvivor is { } p ? $", the largest that survives {NumberText.P(p)}" : "";
        return $"{FigureWords.Survivors(standing)} {smallest}{largest}. {RankingPlot.BoundaryText(ranking)}";
    }
}
