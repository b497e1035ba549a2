using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.GroupTests;

/// <summary>How a test that draws random arrangements is to draw them: recorded with its result, so that anyone can draw the same again.</summary>
/// <param name="Seed">Seed of the random numbers.</param>
/// <param name="Count">Arrangements to draw, at least 1; the smallest p-value that they can show is 1/(Count + 1).</param>
public readonly record struct RandomDraws(ulong Seed, int Count)
{
    /// <summary>99,999 draws from seed 1, for want of anything better.</summary>
    public static RandomDraws Usual { get; } = new(1, 99_999);

    /// <summary>Ends the drawing early; the test then throws <see cref="OperationCanceledException"/>.</summary>
    public CancellationToken Stop { get; init; }
}

/// <summary>The arrangements behind a permutation p-value.</summary>
/// <param name="Arrangements">Arrangements looked at: all there are, or the random draws.</param>
/// <param name="AsExtreme">How many of them gave a statistic at least as large as the one observed. A complete enumeration counts the observed arrangement, so p = AsExtreme/Arrangements; random draws do not, so p = (AsExtreme + 1)/(Arrangements + 1).</param>
/// <param name="Seed">Seed of the draws; null for a complete enumeration.</param>
public sealed record Resampling(long Arrangements, long AsExtreme, ulong? Seed)
{
    /// <summary>Whether every arrangement was looked at, so that the p-value is exact.</summary>
    public bool IsExact => Seed is null;

    /// <summary>The p-value: the share of arrangements as extreme as the observed one, which random draws are to be counted among.</summary>
    public PValue P => PValue.FromValue(IsExact ? AsExtreme / (double)Arrangements : (AsExtreme + 1.0) / (Arrangements + 1.0));
}
