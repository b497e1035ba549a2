namespace Campaigns.Domain.Tests;

public sealed class NearestTests
{
    private static readonly string[] Words = ["bonferroni", "holm", "hochberg", "hommel", "bh", "by"];

    [Theory]
    [InlineData("bonferoni", "bonferroni")]
    [InlineData("BONFERRONI", "bonferroni")]
    [InlineData("hlom", "holm")]
    [InlineData("holmm", "holm")]
    [InlineData("hochbreg", "hochberg")]
    [InlineData("bj", "bh")]
    [InlineData(" holm ", "holm")]
    [InlineData("holm", "holm")]
    public void A_mistyped_word_finds_its_own(string word, string expected) => Assert.Equal(expected, Nearest.Of(word, Words));

    [Theory]
    [InlineData("")]
    [InlineData("tukey")]
    [InlineData("xx")]
    [InlineData("bonf")]
    public void A_word_far_from_all_finds_none(string word) => Assert.Null(Nearest.Of(word, Words));

    [Fact]
    public void The_first_of_several_equally_near_words_is_named() => Assert.Equal("ab", Nearest.Of("a", ["ab", "ac", "abc"]));

    [Fact]
    public void Of_several_equally_near_words_the_one_with_swapped_letters_is_named() => Assert.Equal("export", Nearest.Of("xeport", ["report", "export"]));

    [Fact]
    public void A_word_without_bounds_is_not_compared() => Assert.Null(Nearest.Of(new string('x', 1_000_000), [new string('x', 1_000_000)]));
}
