using System.Globalization;
using System.Text.RegularExpressions;
using System.Xml.Linq;

namespace Campaigns.App.Tests.Figures;

/// <summary>A figure read back from its SVG: texts, and the numbers that its marks stand for, by the ticks of its axes.</summary>
internal sealed partial class Drawing
{
    private static readonly XNamespace Svg = "http://www.w3.org/2000/svg";
    private readonly XElement _root;

    public Drawing(string svg) => _root = XDocument.Parse(svg).Root!;

    public XElement Root => _root;

    public string Title => _root.Element(Svg + "title")!.Value;

    public string Description => _root.Element(Svg + "desc")!.Value;

    public IEnumerable<string> Texts => _root.Descendants(Svg + "text").Select(t => t.Value);

    public IEnumerable<string> Ids => _root.DescendantsAndSelf().Select(e => (string?)e.Attribute("id")).OfType<string>();

    public IEnumerable<string> SeriesNames => _root.Descendants(Svg + "g").Select(g => (string?)g.Attribute("data-series")).OfType<string>();

    /// <summary>Middles of the marks of a series, in the units of the drawing.</summary>
    public IReadOnlyList<(double X, double Y)> Marks(string series) =>
        [.. Paths(series).SelectMany(d => d.Split('M', StringSplitOptions.RemoveEmptyEntries)).Select(Middle)];

    /// <summary>The points of the lines of a series, line by line.</summary>
    public IReadOnlyList<(double X, double Y)[]> Lines(string series) =>
        [.. Paths(series).SelectMany(d => d.Split('M', StringSplitOptions.RemoveEmptyEntries)).Select(Points)];

    /// <summary>What stands at a place along the horizontal axis, by its ticks.</summary>
    public double ValueAtX(double x) => Along([.. Ticks().GroupBy(t => t.Y).MaxBy(row => row.Count())!.Select(t => (t.X, t.Value))], x);

    /// <summary>What stands at a height, by the ticks of the vertical axis.</summary>
    public double ValueAtY(double y) => Along([.. Ticks().GroupBy(t => t.X).MaxBy(column => column.Count())!.Select(t => (t.Y, t.Value))], y);

    /// <summary>What stands at a place along a horizontal axis of powers.</summary>
    public double LogAtX(double x) => Along([.. Ticks().GroupBy(t => t.Y).MaxBy(row => row.Count())!.Select(t => (t.X, Math.Log10(t.Value)))], x);

    /// <summary>The decimal logarithm at a height, by the ticks of a vertical axis of powers.</summary>
    public double LogAtY(double y) => Along([.. Ticks().GroupBy(t => t.X).MaxBy(column => column.Count())!.Select(t => (t.Y, t.Text.StartsWith("1e", StringComparison.Ordinal) ? double.Parse(t.Text.AsSpan(2), NumberStyles.Float, CultureInfo.InvariantCulture) : Math.Log10(t.Value)))], y);

    /// <summary>The bars of a series: left, right and upper edge.</summary>
    public IReadOnlyList<(double Left, double Right, double Top, double Bottom)> Bars(string series) =>
        [.. Paths(series).SelectMany(d => d.Split('M', StringSplitOptions.RemoveEmptyEntries)).Select(Numbers).Select(n => (n[0], n[0] + n[2], n[1], n[1] + n[3]))];

    /// <summary>The names along the left side with the heights of their middles.</summary>
    public IReadOnlyDictionary<string, double> Names() =>
        _root.Descendants(Svg + "text").Where(t => (string?)t.Attribute("text-anchor") == "end").GroupBy(t => t.Value)
            .ToDictionary(g => g.Key, g => Number(g.First(), "y") - (0.35 * Number(g.First(), "font-size")));

    private static double Along((double At, double Value)[] ticks, double at)
    {
        Assert.True(ticks.Length >= 2, "too few ticks to read a value by");
        (double At, double Value) first = ticks.MinBy(t => t.At), last = ticks.MaxBy(t => t.At);
        return first.Value + ((at - first.At) / (last.At - first.At) * (last.Value - first.Value));
    }

    private static (double, double) Middle(string path)
    {
        double[] n = Numbers(path);
        if (path.Contains('a', StringComparison.Ordinal))
        {
            return (n[0] + n[2], n[1]);
        }

        if (path.Contains('h', StringComparison.Ordinal))
        {
            return (n[0] + (n[2] / 2), n[1] + (n[3] / 2));
        }

        (double X, double Y)[] corners = Points(path);
        return ((corners.Min(c => c.X) + corners.Max(c => c.X)) / 2, (corners.Min(c => c.Y) + corners.Max(c => c.Y)) / 2);
    }

    private static (double X, double Y)[] Points(string path)
    {
        double[] n = Numbers(path);
        return [.. Enumerable.Range(0, n.Length / 2).Select(i => (n[2 * i], n[(2 * i) + 1]))];
    }

    private static double[] Numbers(string path) => [.. NumberPattern().Matches(path).Select(m => double.Parse(m.ValueSpan, NumberStyles.Float, CultureInfo.InvariantCulture))];

    private static double Number(XElement e, string attribute) => double.Parse((string)e.Attribute(attribute)!, NumberStyles.Float, CultureInfo.InvariantCulture);

    private IEnumerable<string> Paths(string series) => _root.Descendants(Svg + "g").Where(g => (string?)g.Attribute("data-series") == series)
        .SelectMany(g => g.Elements(Svg + "path")).Select(p => (string)p.Attribute("d")!);

    private IEnumerable<(double X, double Y, double Value, string Text)> Ticks()
    {
        foreach (XElement text in _root.Descendants(Svg + "text"))
        {
            // The letter size of the axes: notes have a smaller one.
            if (Number(text, "font-size") == 12 && double.TryParse(text.Value, NumberStyles.Float, CultureInfo.InvariantCulture, out double value))
            {
                yield return (Number(text, "x"), Number(text, "y") - (0.35 * 12), value, text.Value);
            }
        }
    }

    [GeneratedRegex("-?[0-9]+(\\.[0-9]+)?")]
    private static partial Regex NumberPattern();
}
