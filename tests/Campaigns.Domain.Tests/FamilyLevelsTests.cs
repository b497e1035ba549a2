using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;

namespace Campaigns.Domain.Tests;

public sealed class FamilyLevelsTests
{
    // By hand, from the recursion in FamilyLevels. A family is written name[=level][<other|<<other], with < for a gate "any" and << for "all".
    [Theory]
    [InlineData("a", "0.05")]
    [InlineData("a b", "0.025 0.025")]
    [InlineData("a b c", "0.016666666666666666 0.016666666666666666 0.016666666666666666")]
    [InlineData("a=0.03 b", "0.03 0.02")]
    [InlineData("a=0.03 b c", "0.03 0.01 0.01")]
    [InlineData("a=0.03 b=0.02", "0.03 0.02")]
    [InlineData("a=0.01 b=0.02", "0.01 0.02")]
    [InlineData("a b<a", "0.025 0.025")]
    [InlineData("a=0.04 b<a", "0.04 0.01")]
    [InlineData("a b<<a", "0.05 0.05")]
    [InlineData("a b<<a c<<b", "0.05 0.05 0.05")]
    [InlineData("a b<<a c<<a", "0.05 0.025 0.025")]
    [InlineData("a b=0.04<<a c<<a", "0.05 0.04 0.01")]
    [InlineData("a b<<a c<b", "0.05 0.025 0.025")]
    [InlineData("a b<a c<<b", "0.025 0.025 0.025")]
    [InlineData("a=0.02 b=0.03<<a c", "0.02 0.03 0.02")]
    [InlineData("c<<b b<<a a=0.03 d", "0.03 0.03 0.03 0.02")]
    public void Under_familywise_control_costs_add_up_to_the_level(string families, string levels) =>
        Assert.Equal(levels, string.Join(' ', FamilyLevels.Of(Campaign(ErrorRate.Familywise), Parse(families))));

    [Theory]
    [InlineData("a=0.03 b=0.03", "ask for 0.06 together, more than the campaign's level 0.05")]
    [InlineData("a=0.03 b=0.03<a", "ask for 0.06")]
    [InlineData("a b=0.04<<a c=0.02<<a", "ask for 0.06")]
    [InlineData("a=0.02 b=0.03<<a c=0.03", "ask for 0.06")]
    [InlineData("a=0.05 b", "nothing is left for 'b'")]
    [InlineData("a b=0.05<<a c<<a", "The level 0.05 of the family 'a', on which others wait, is used up")]
    public void Under_familywise_control_more_than_the_level_is_refused(string families, string words) =>
        Assert.Contains(words, Assert.Throws<RefusedException>(() => FamilyLevels.Of(Campaign(ErrorRate.Familywise), Parse(families))).Message, StringComparison.Ordinal);

    [Theory]
    [InlineData("a b", "0.05 0.05")]
    [InlineData("a=0.01 b<<a c=0.05<a", "0.01 0.05 0.05")]
    public void Under_false_discovery_control_each_family_has_a_rate_of_its_own(string families, string levels) =>
        Assert.Equal(levels, string.Join(' ', FamilyLevels.Of(Campaign(ErrorRate.FalseDiscovery), Parse(families))));

    [Fact]
    public void A_false_discovery_rate_above_the_campaigns_is_refused() =>
        Assert.Contains("above the campaign's 0.05", Assert.Throws<RefusedException>(() => FamilyLevels.Of(Campaign(ErrorRate.FalseDiscovery), Parse("a b=0.06"))).Message, StringComparison.Ordinal);

    private static Campaign Campaign(ErrorRate rate) => new() { Code = "C", ErrorRate = rate, Level = new SignificanceLevel(0.05), Correction = "holm", OpenedAt = DateTimeOffset.UnixEpoch };

    internal static Family[] Parse(string families) => [.. families.Split(' ').Select(text =>
    {
        string[] gate = text.Split('<', StringSplitOptions.RemoveEmptyEntries);
        string[] named = gate[0].Split('=');
        return new Family(named[0])
        {
            Level = named.Length == 1 ? null : new SignificanceLevel(Convert.ToDouble(named[1], System.Globalization.CultureInfo.InvariantCulture)),
            OpensAfter = gate.Length == 1 ? null : gate[1],
            Gate = text.Contains("<<", StringComparison.Ordinal) ? FamilyGate.AllSurvive : FamilyGate.AnySurvives,
        };
    })];
}
