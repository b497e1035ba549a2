namespace Campaigns.App.Dashboard.Model;

/// <summary>Levels that can be looked at: eight in every power of ten, as they would be typed, and the sealed one.</summary>
public sealed class LevelLadder
{
    private static readonly decimal[] Steps = [1m, 1.5m, 2m, 3m, 4m, 5m, 6m, 8m];
    private readonly double[] _levels;

    /// <summary>Makes the ladder around a sealed level.</summary>
    /// <param name="sealedLevel">In (0, 1).</param>
    public LevelLadder(double sealedLevel)
    {
        int lowest = Math.Clamp((int)Math.Floor(Math.Log10(sealedLevel)) - 2, -20, -4);
        SortedSet<double> levels = [sealedLevel];
        decimal power = 0.1m;
        for (int i = -1; i >= lowest; i--, power /= 10)
        {
            levels.UnionWith(Steps.Select(step => (double)(step * power)));
        }

        _levels = [.. levels];
    }

    /// <summary>The lowest level.</summary>
    public double Lowest => _levels[0];

    /// <summary>The highest level.</summary>
    public double Highest => _levels[^1];

    /// <summary>The level so many steps from another, not beyond the ends.</summary>
    /// <param name="level">A level.</param>
    /// <param name="steps">Up, or down where negative.</param>
    public double From(double level, int steps)
    {
        int at = Array.BinarySearch(_levels, level);
        int next = at >= 0 ? at + steps : ~at + steps - (steps > 0 ? 1 : 0);
        return _levels[Math.Clamp(next, 0, _levels.Length - 1)];
    }

    /// <summary>The level of the ladder that is nearest on a logarithmic scale.</summary>
    /// <param name="level">Above 0.</param>
    public double Nearest(double level) => _levels.MinBy(l => Math.Abs(Math.Log(l / level)));
}
