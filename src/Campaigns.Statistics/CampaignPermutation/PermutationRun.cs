using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.CampaignPermutation;

/// <summary>How a campaign is to be permuted.</summary>
/// <param name="Draws">Random arrangements where not all can be looked at, the seed, and what ends the work.</param>
public readonly record struct PermutationRun(RandomDraws Draws)
{
    /// <summary>Most random arrangements: one column of shares then takes 80 MB.</summary>
    public const int MostDraws = 9_999_999;

    private readonly int _threads;

    /// <summary>Most threads to work on it; changes nothing in the result. 1 unless given.</summary>
    /// <exception cref="ArgumentOutOfRangeException">Fewer than 1.</exception>
    public int Threads
    {
        get => Math.Max(1, _threads);
        init => _threads = value >= 1 ? value : throw new ArgumentOutOfRangeException(nameof(value), value, "At least one thread works.");
    }

    /// <summary>Hypotheses of the family that are not permuted: each may reject falsely with a probability of up to p wherever an experiment is rejected at p, and is granted that share, whatever its dependence on the others.</summary>
    public int Others { get; init; }

    /// <summary>Told now and then how much of the work is done, and how much there is; possibly from another thread, one at a time.</summary>
    public Action<long, long>? Progress { get; init; }
}
