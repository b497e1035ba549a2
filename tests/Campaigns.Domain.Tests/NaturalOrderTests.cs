namespace Campaigns.Domain.Tests;

public sealed class NaturalOrderTests
{
    [Theory]
    [InlineData("F2", "F10")]
    [InlineData("F9", "F10")]
    [InlineData("F2a", "F2b")]
    [InlineData("F", "F1")]
    [InlineData("", "0")]
    [InlineData("1", "a")]
    [InlineData("A", "a")]
    [InlineData("x1y2", "x1y10")]
    [InlineData("99999999999999999999999999998", "99999999999999999999999999999")]
    [InlineData("9", "10000000000000000000000000000000")]
    [InlineData("a007", "a7")]
    [InlineData("a007", "a8")]
    [InlineData("a7", "a008")]
    [InlineData("2 %", "10 %")]
    [InlineData(null, "a")]
    public void Numbers_inside_names_go_by_their_value(string? first, string? second)
    {
        Assert.True(NaturalOrder.Instance.Compare(first, second) < 0);
        Assert.True(NaturalOrder.Instance.Compare(second, first) > 0);
        Assert.Equal(0, NaturalOrder.Instance.Compare(first, first));
    }

    [Fact]
    public void It_is_a_total_order_that_tells_all_different_names_apart()
    {
        var random = new Random(20261201);
        string[] names = [.. Enumerable.Range(0, 60).Select(_ => string.Concat(Enumerable.Range(0, random.Next(6)).Select(_ => "01a9Bµ"[random.Next(6)]))).Distinct()];
        foreach (string a in names)
        {
            foreach (string b in names)
            {
                int ab = NaturalOrder.Instance.Compare(a, b);
                Assert.Equal(a == b, ab == 0);
                Assert.Equal(-Math.Sign(ab), Math.Sign(NaturalOrder.Instance.Compare(b, a)));
                Assert.All(names, c => Assert.True(ab > 0 || NaturalOrder.Instance.Compare(b, c) > 0 || NaturalOrder.Instance.Compare(a, c) <= 0));
            }
        }
    }
}
