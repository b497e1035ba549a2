using Campaigns.App.Commands;
using Campaigns.App.Output;
using Campaigns.Domain;
using OxyPlot;
using OxyPlot.Axes;

namespace Campaigns.App.Figures;

/// <summary>The risk of at least one false positive as experiments are tested one after the other, without and with the correction.</summary>
internal static class RiskFigure
{
    /// <summary>Its key.</summary>
    public const string Key = "risk";

    private const int MostEvenTests = 200;
    private const int MostPoints = 240;

    /// <summary>Makes the figure.</summary>
    /// <param name="standing">The campaign.</param>
    /// <param name="curve">Its risk, test by test.</param>
    public static Figure Of(CampaignStanding standing, IReadOnlyList<RiskPoint> curve)
    {
        var figure = new Figure(Key, $"{standing.Campaign.Code}: risk of a false positive as tests add up", "");
        if (curve.Count == 0)
        {
            return figure with { Alternative = FigureWords.NothingTested(standing) };
        }

        bool isEven = curve.Count <= MostEvenTests;
        PlotModel plot = FigureStyle.NewPlot();
        plot.Axes.Add(isEven
            ? FigureAxes.Counts(AxisPosition.Bottom, "experiments tested, in their order", 0, curve.Count * 1.03)
            : FigureAxes.Powers(AxisPosition.Bottom, "experiments tested, in their order, logarithmic", 0, Math.Log10(curve.Count), 0.05));
        plot.Axes.Add(FigureAxes.Numbers(AxisPosition.Left, "probability", 0, 1));
        var without = new Strokes("without correction, independent tests", FigureStyle.Boundary, 1.8, LineStyle.Dash);
        var most = new Strokes("without correction, at most", FigureStyle.Axis, 1.2, LineStyle.Dot);
        var with = new Strokes(curve[^1].Corrected is { IsExact: true } ? "with the correction" : "with the correction, at most", FigureStyle.Survivor, 2);
        foreach (RiskPoint point in Some(curve, isEven))
        {
            double x = isEven ? point.Tests : Math.Log10(point.Tests);
            without.Add(x, point.Independent);
            most.Add(x, point.AtMost);
            if (point.Corrected is { } corrected)
            {
                with.Add(x, corrected.AtLeastOne);
            }
        }

        FigureStyle.Draw(plot, most, without, with, Ends("after the last test", isEven, curve[^1]));
        return figure with { Alternative = Say(standing, curve[^1]), Plot = plot, Notes = [.. NotesOf(standing, curve)] };
    }

    /// <summary>One test is a point and no line, and the last points are those that are asked for: they get marks.</summary>
    private static Marks Ends(string name, bool isEven, RiskPoint last)
    {
        var ends = new Marks(name, MarkerType.Circle, FigureStyle.Text, size: 2.6);
        double x = isEven ? last.Tests : Math.Log10(last.Tests);
        ends.Add(x, last.Independent);
        if (last.Corrected is { } corrected)
        {
            ends.Add(x, corrected.AtLeastOne);
        }

        return ends;
    }

    /// <summary>All points where they are few; else some, evenly along the axis, the first and the last among them.</summary>
    private static IEnumerable<RiskPoint> Some(IReadOnlyList<RiskPoint> curve, bool isEven) => isEven || curve.Count <= MostPoints
        ? curve
        : Enumerable.Range(0, MostPoints + 1).Select(i => (int)Math.Round(Math.Pow(curve.Count, i / (double)MostPoints)) - 1).Distinct().Select(i => curve[i]);

    private static IEnumerable<string> NotesOf(CampaignStanding standing, IReadOnlyList<RiskPoint> curve)
    {
        yield return $"All lines: if nothing is real, each test at {standing.Campaign.Level} without correction. At most: whatever the dependence between experiments.";
        yield return RiskTable.CorrectedMeans([.. curve.Select(p => p.Corrected).OfType<CorrectedRisk>()]);
        yield return FigureWords.Procedure(standing);
    }

    private static string Say(CampaignStanding standing, RiskPoint last)
    {
        string with = last.Corrected is { } corrected ? $", with it {(corrected.IsExact ? "" : "at most ")}{Words.Percent(corrected.AtLeastOne)}" : "";
        return FormattableString.Invariant($"After {FigureWords.Count(last.Tests, "test", "tests")} at {standing.Campaign.Level} the risk of at least one false positive, if nothing is real and the tests are independent, is {Words.Percent(last.Independent)} without correction{with}; {NumberText.Screen(last.ExpectedFalse, 3)} false positives would be expected without. {last.Hits} p-values are at most {standing.Campaign.Level}, {last.Survivors} experiments survive.");
    }
}
