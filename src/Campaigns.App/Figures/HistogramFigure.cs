using Campaigns.App.Output;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.TrueNulls;
using OxyPlot;
using OxyPlot.Axes;
using OxyPlot.Series;

namespace Campaigns.App.Figures;

/// <summary>How many p-values fall where, beside what the true nulls among them would give.</summary>
internal static class HistogramFigure
{
    /// <summary>Its key.</summary>
    public const string Key = "p-values";

    /// <summary>Bars from 0 to 1.</summary>
    public const int Bars = 20;

    /// <summary>Makes the figure.</summary>
    /// <param name="standing">The campaign.</param>
    public static Figure Of(CampaignStanding standing)
    {
        var figure = new Figure(Key, $"{standing.Campaign.Code}: how the p-values spread", "");
        PValue[] tested = [.. standing.Experiments.Where(e => e.P is not null).Select(e => e.P!.Value)];
        if (tested.Length == 0)
        {
            return figure with { Alternative = FigureWords.NothingTested(standing) };
        }

        int[] counts = Count(tested);
        var share = TrueNullShare.Estimate(tested);
        return figure with
        {
            Alternative = Say(tested.Length, counts, share),
            Plot = Draw(tested.Length, counts, share),
            Notes = [.. NotesOf(tested.Length, share)],
        };
    }

    /// <summary>The p-values in each twentieth; one at the edge of two counts with the smaller ones, so that the first bar holds all up to 0.05.</summary>
    public static int[] Count(IReadOnlyList<PValue> tested)
    {
        int[] counts = new int[Bars];
        foreach (PValue p in tested)
        {
            int bar = Math.Clamp((int)(p.Value * Bars), 0, Bars - 1);
            bar -= bar > 0 && p.Value <= bar / (double)Bars ? 1 : 0;
            bar += bar < Bars - 1 && p.Value > (bar + 1) / (double)Bars ? 1 : 0;
            counts[bar]++;
        }

        return counts;
    }

    private static PlotModel Draw(int tested, int[] counts, TrueNullShare share)
    {
        PlotModel plot = FigureStyle.NewPlot();
        plot.Axes.Add(FigureAxes.Numbers(AxisPosition.Bottom, "p-value", 0, 1));
        plot.Axes.Add(FigureAxes.Counts(AxisPosition.Left, "experiments", 0, Math.Max(1, Math.Max(counts.Max(), (double)tested / Bars)) * 1.08));
        var bars = new Columns("experiments");
        for (int bar = 0; bar < Bars; bar++)
        {
            bars.Add(bar / (double)Bars, (bar + 1) / (double)Bars, counts[bar]);
        }

        var expected = new Strokes("if nothing were real", FigureStyle.Axis, 1.2, LineStyle.Dot);
        expected.Add(0, (double)tested / Bars, 1, (double)tested / Bars);
        var nulls = new Strokes("true nulls, by the estimate", FigureStyle.Boundary, 1.8, LineStyle.Dash);
        if (share.Share is { } given)
        {
            nulls.Add(0, given * tested / Bars, 1, given * tested / Bars);
        }

        FigureStyle.Draw(plot, bars, expected, nulls);
        return plot;
    }

    private static IEnumerable<string> NotesOf(int tested, TrueNullShare share)
    {
        yield return "Each bar holds the p-values up to its right edge, the first those up to 0.05. True nulls give every bar about the same height.";
        yield return share is { Share: { } given, Lambda: { } lambda }
            ? FormattableString.Invariant($"Share of true nulls by the p-values above {lambda:0.##}: {NumberText.Screen(given, 2)} (Storey 2002); an estimate and no bound, for independent experiments.")
            : share.Reason!;
        if (tested < TrueNullShare.FewPValues)
        {
            yield return FormattableString.Invariant($"{tested} p-values are few for such an estimate; {TrueNullShare.FewPValues} or more tell something.");
        }
    }

    private static string Say(int tested, int[] counts, TrueNullShare share)
    {
        string estimate = share.Share is { } given
            ? $"The share of true nulls is estimated as {NumberText.Screen(given, 2)}, which would put about {NumberText.Screen(given * tested / Bars, 2)} into each bar."
            : share.Reason!;
        return FormattableString.Invariant($"{FigureWords.Count(tested, "p-value", "p-values")} in 20 bars: {counts[0]} up to 0.05, {counts[1..10].Sum()} above that up to 0.5, {counts[10..].Sum()} above 0.5. {estimate}");
    }

    /// <summary>Bars that stand on 0, in a group that bears their name.</summary>
    private sealed class Columns : RectangleBarSeries
    {
        private readonly string _name;

        public Columns(string name)
        {
            _name = name;
            Title = name;
            FillColor = FigureStyle.Area;
            StrokeColor = FigureStyle.Survivor;
            StrokeThickness = 1;
        }

        public void Add(double left, double right, double height) => Items.Add(new RectangleBarItem(left, 0, right, height));

        public override void Render(IRenderContext rc)
        {
            FigureCanvas.Open(rc, _name);
            base.Render(rc);
            FigureCanvas.Close(rc);
        }
    }
}
