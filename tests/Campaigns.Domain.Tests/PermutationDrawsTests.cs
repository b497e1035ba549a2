using Campaigns.Statistics.Probability;

namespace Campaigns.Domain.Tests;

public sealed class PermutationDrawsTests
{
    // 20 arrangements beyond level/m are wanted: (draws + 1) level/m >= 20.
    [Theory]
    [InlineData(0.05, 0, 99_999)]
    [InlineData(0.05, 1, 99_999)]
    [InlineData(0.05, 250, 99_999)]
    [InlineData(0.05, 251, 999_999)]
    [InlineData(0.05, 2_500, 999_999)]
    [InlineData(0.05, 2_501, 9_999_999)]
    [InlineData(0.05, 1_000_000, 9_999_999)]
    [InlineData(1e-9, 1, 9_999_999)]
    [InlineData(0.5, 2_500, 99_999)]
    public void Draws_follow_the_strictest_threshold_of_the_campaign(double level, int familySize, int draws) =>
        Assert.Equal(draws, PermutationDraws.Count(new SignificanceLevel(level), familySize));

    // Python 3.11: int.from_bytes(hashlib.sha256("X\nE1".encode()).digest()[:8], "big").
    [Theory]
    [InlineData("X", "E1", 6214160860015726808UL)]
    [InlineData("Ü", "é", 17106617159635561573UL)]
    public void The_seed_is_the_hash_of_both_names(string campaign, string experiment, ulong seed) =>
        Assert.Equal(seed, PermutationDraws.Seed(campaign, experiment));

    // As above, of "X\n".
    [Fact]
    public void A_whole_campaign_has_a_seed_of_its_own() => Assert.Equal(8095266055078174663UL, PermutationDraws.Seed("X"));

    [Fact]
    public void Names_that_run_together_alike_have_seeds_of_their_own() =>
        Assert.NotEqual(PermutationDraws.Seed("AB", "C"), PermutationDraws.Seed("A", "BC"));
}
