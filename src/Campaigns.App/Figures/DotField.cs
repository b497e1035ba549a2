using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Figures;

/// <summary>Where the dots of observations stand: beside their value in height, spread so that equal values do not hide each other, the same way every time; where very many lie close, one for all at its place.</summary>
internal sealed class DotField
{
    /// <summary>How far below the middle of a group's row its mean stands, in rows.</summary>
    public const double MeanBelow = 0.3;

    private const double DotsAbove = -0.12;
    private const double Spread = 0.5;
    private const int MostDots = 3000;
    private const int Places = 220;
    private const int Lanes = 9;
    private const double GoldenShare = 0.6180339887498949;

    private readonly List<(int Group, double Value, double Lane, bool IsExcluded)> _dots = [];
    private readonly List<(int Group, double Low, double High, double Lane)> _specimens = [];

    private DotField(int total) => Total = total;

    /// <summary>Observations that the dots stand for.</summary>
    public int Total { get; }

    /// <summary>Dots drawn.</summary>
    public int Drawn => _dots.Count;

    /// <summary>Whether a dot may stand for several observations.</summary>
    public bool IsThinned => Drawn < Total;

    /// <summary>Whether some specimen was read several times.</summary>
    public bool HasReadings { get; private set; }

    /// <summary>Places the dots.</summary>
    /// <param name="groups">The groups drawn.</param>
    /// <param name="observations">Their observations, in the order in which they were loaded.</param>
    public static DotField Of(IReadOnlyList<GroupDetail> groups, IReadOnlyList<TracedObservation> observations)
    {
        var field = new DotField(observations.Count);
        Dictionary<string, int> rows = groups.Select((g, i) => (g.Label, i)).ToDictionary(g => g.Label, g => g.i, StringComparer.Ordinal);
        bool isThinned = observations.Count > MostDots;
        double low = observations.Min(o => o.Number), step = Math.Max((observations.Max(o => o.Number) - low) / Places, double.Epsilon);
        var taken = new HashSet<(int Group, bool IsExcluded, int Place, int Lane)>();
        foreach (IGrouping<string, TracedObservation> group in observations.GroupBy(o => o.Group, StringComparer.Ordinal))
        {
            int row = rows[group.Key], count = 0;
            var specimens = new Dictionary<string, (double Low, double High, double Lane, int Count)>(StringComparer.Ordinal);
            foreach (TracedObservation o in group)
            {
                // Multiples of the golden share, less their whole part, fill an interval evenly however many there are.
                (double Low, double High, double Lane, int Count) specimen = default;
                bool isKnown = o.Specimen is not null && specimens.TryGetValue(o.Specimen, out specimen);
                double lane = isKnown ? specimen.Lane : ((count++ + 0.5) * GoldenShare) % 1;
                if (o.Specimen is not null)
                {
                    field.HasReadings |= isKnown;
                    specimens[o.Specimen] = isKnown ? (Math.Min(specimen.Low, o.Number), Math.Max(specimen.High, o.Number), lane, specimen.Count + 1) : (o.Number, o.Number, lane, 1);
                }

                if (!isThinned || taken.Add((row, o.IsExcluded, (int)((o.Number - low) / step), (int)(lane * Lanes))))
                {
                    field._dots.Add((row, o.Number, lane, o.IsExcluded));
                }
            }

            field._specimens.AddRange(specimens.Values.Where(s => s.Count > 1 && !isThinned).Select(s => (row, s.Low, s.High, s.Lane)));
        }

        return field;
    }

    /// <summary>Adds the dots to their series.</summary>
    /// <param name="values">Of values that count.</param>
    /// <param name="excluded">Of excluded values.</param>
    /// <param name="readings">Of lines that join the readings of a specimen.</param>
    public void Fill(Marks values, Marks excluded, Strokes readings)
    {
        foreach ((int group, double value, double lane, bool isExcluded) in _dots)
        {
            (isExcluded ? excluded : values).Add(value, Height(group, lane));
        }

        foreach ((int group, double low, double high, double lane) in _specimens)
        {
            readings.Add(low, Height(group, lane), high, Height(group, lane));
        }
    }

    private static double Height(int group, double lane) => group + DotsAbove + ((lane - 0.5) * Spread);
}
