using System.Globalization;
using Campaigns.App.Output;

namespace Campaigns.App.Tests.Output;

public sealed class SafeTextTests
{
    public static TheoryData<int> Controls => [.. Enumerable.Range(0, 0x20).Append(0x7F).Concat(Enumerable.Range(0x80, 0x20))];

    [Fact]
    public void There_are_65_controls() => Assert.Equal(65, Controls.Count);

    [Theory]
    [MemberData(nameof(Controls))]
    public void A_control_is_shown_as_its_code(int code)
    {
        string shown = "\\u{" + code.ToString("X2", CultureInfo.InvariantCulture) + "}";
        Assert.Equal("a" + shown + "b", SafeText.Escape("a" + (char)code + "b"));
    }

    [Theory]
    [InlineData('\u2028', "\\u{2028}")]
    [InlineData('\u2029', "\\u{2029}")]
    [InlineData('\u061C', "\\u{61C}")]
    [InlineData('\u200E', "\\u{200E}")]
    [InlineData('\u200F', "\\u{200F}")]
    [InlineData('\u202A', "\\u{202A}")]
    [InlineData('\u202B', "\\u{202B}")]
    [InlineData('\u202C', "\\u{202C}")]
    [InlineData('\u202D', "\\u{202D}")]
    [InlineData('\u202E', "\\u{202E}")]
    [InlineData('\u2066', "\\u{2066}")]
    [InlineData('\u2067', "\\u{2067}")]
    [InlineData('\u2068', "\\u{2068}")]
    [InlineData('\u2069', "\\u{2069}")]
    [InlineData('\uD800', "\\u{D800}")]
    [InlineData('\uDFFF', "\\u{DFFF}")]
    public void Separators_bidirectional_marks_and_lone_surrogates_are_shown_as_their_codes(char c, string shown) =>
        Assert.Equal(shown + "x", SafeText.Escape(c + "x"));

    [Fact]
    public void Surrogates_in_the_wrong_order_are_both_lone() => Assert.Equal("\\u{DE00}\\u{D83D}", SafeText.Escape("\uDE00\uD83D"));

    [Theory]
    [InlineData("")]
    [InlineData("Blend A_1, wet: 100 %")]
    [InlineData("粘度 é \U0001F600 a\u0301")]
    public void Harmless_text_stays_the_same_object(string text) => Assert.Same(text, SafeText.Escape(text));

    [Fact]
    public void A_pair_before_a_control_is_kept() => Assert.Equal("\U0001F600\\u{07}", SafeText.Escape("\U0001F600\a"));
}
