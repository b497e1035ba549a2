using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Units;

namespace Campaigns.Statistics.Checks;

/// <summary>What the checks of one experiment look at.</summary>
public readonly ref struct CheckSubject
{
    /// <summary>Independent values: of each specimen one.</summary>
    public required GroupedSample Units { get; init; }

    /// <summary>The layout fitted to them, of groups, or of groups and blocks where the test uses blocks; null where nothing can be fitted (fewer than two groups, or no residual degree of freedom).</summary>
    public FittedLayout? Fit { get; init; }

    /// <summary>Name of each group.</summary>
    public required IReadOnlyList<string> Labels { get; init; }

    /// <summary>Where each value came from, in words that name it to people, as "line 41 of week-1.csv"; null where that is not known, or values are means.</summary>
    public IReadOnlyList<string>? Places { get; init; }
}
