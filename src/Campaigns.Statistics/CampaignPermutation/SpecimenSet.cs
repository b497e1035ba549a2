using Campaigns.Statistics.GroupTests;

namespace Campaigns.Statistics.CampaignPermutation;

/// <summary>Responses measured on the same specimens, whose groups are therefore permuted together: one arrangement serves all of them, and keeps how the responses depend on each other.</summary>
public sealed class SpecimenSet
{
    private readonly List<ExactResponse> _responses = [];
    private readonly ushort[] _groups;
    private readonly ShareForm _oneWay;
    private ShareForm? _withinBlocks;

    /// <summary>Makes a set without responses.</summary>
    /// <param name="groups">For each specimen its group; at least two groups.</param>
    /// <param name="blocks">For each specimen its block, numbered from 0 without gaps, within which specimens change places; empty where they do so freely.</param>
    /// <exception cref="ArgumentException">Fewer than two groups, a specimen without a block, or the spans differ in length.</exception>
    public SpecimenSet(ReadOnlySpan<ushort> groups, ReadOnlySpan<int> blocks)
    {
        int[] numbers = [.. blocks.ToArray().Distinct().Order()];
        if (!blocks.IsEmpty && (blocks.Length != groups.Length || numbers[0] != 0 || numbers[^1] != numbers.Length - 1))
        {
            throw new ArgumentException("Every specimen needs its block, numbered from 0 without gaps, or none has one.", nameof(blocks));
        }

        _groups = groups.ToArray();
        if (_groups.Distinct().Count() < 2)
        {
            throw new ArgumentException("A set has at least two groups.", nameof(groups));
        }

        Design = new ArrangedDesign(groups, blocks);
        HasBlocks = !blocks.IsEmpty;
        _oneWay = ShareForm.OneWay(Design.Sizes);
    }

    /// <summary>Specimens.</summary>
    public int Count => _groups.Length;

    /// <summary>Responses added so far.</summary>
    public int ResponseCount => _responses.Count;

    /// <summary>Whether specimens change places within blocks only.</summary>
    public bool HasBlocks { get; }

    /// <summary>Arrangements of the specimens over the groups; null above 2^63 - 1.</summary>
    public long? Arrangements => Design.Arrangements;

    /// <summary>Whether all arrangements can be looked at: up to 1,000,000, those that only exchange whole groups counted once.</summary>
    public bool IsEnumerable => Design.IsEnumerable;

    internal ArrangedDesign Design { get; }

    internal IReadOnlyList<ExactResponse> Responses => _responses;

    /// <summary>Adds a response.</summary>
    /// <param name="sample">Its values, one for each specimen in the order of the set; copied.</param>
    /// <param name="statistic">What is computed from it.</param>
    /// <exception cref="ArgumentException">The sample has other specimens, the response does not vary (within blocks, for a statistic within them), or the set has no blocks while the statistic needs them.</exception>
    public void Add(GroupedSample sample, PermutedStatistic statistic)
    {
        if (!sample.Groups.SequenceEqual(_groups))
        {
            throw new ArgumentException("A response has one value for each specimen of its set, in the set's order.", nameof(sample));
        }

        if (statistic == PermutedStatistic.WithinBlocks && !HasBlocks)
        {
            throw new ArgumentException("A statistic within blocks needs a set with blocks.", nameof(statistic));
        }

        ShareForm form = statistic == PermutedStatistic.WithinBlocks ? _withinBlocks ??= ShareForm.WithinBlocks(Design.Cells) : _oneWay;
        var response = new ExactResponse(sample, statistic, Design, form);
        _responses.Add(response.Total.Sign > 0 ? response : throw new ArgumentException("A response without variation has no share between groups.", nameof(sample)));
    }
}
