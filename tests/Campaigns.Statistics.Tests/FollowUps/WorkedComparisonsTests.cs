using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.FollowUps;

/// <summary>Published comparisons inside worked examples. Figures of R's data sets as its TukeyHSD prints them, with further digits from tails in quadruple precision (Games-Howell: from R's ptukey, good to 1e-8).</summary>
public sealed class WorkedComparisonsTests
{
    private static readonly ILookup<string, (string Group, string Value)> Data = FollowUpReferenceTests.Values("worked_examples_data.csv");

    [Theory]
    [InlineData("PlantGrowth", "tukey-kramer", "ctrl", "trt1", .390871144, 1e-9)]
    [InlineData("PlantGrowth", "tukey-kramer", "ctrl", "trt2", .197995991, 1e-9)]
    [InlineData("PlantGrowth", "tukey-kramer", "trt1", "trt2", .0120064240, 1e-10)]
    [InlineData("PlantGrowth", "holm-pairs", "ctrl", "trt1", .194387880, 1e-9)]
    [InlineData("PlantGrowth", "holm-pairs", "ctrl", "trt2", .175363350, 1e-9)]
    [InlineData("PlantGrowth", "holm-pairs", "trt1", "trt2", .0133777078, 1e-10)]
    [InlineData("PlantGrowth", "scheffe", "ctrl", "trt1", .424148611, 1e-9)]
    [InlineData("PlantGrowth", "scheffe", "ctrl", "trt2", .226455347, 1e-9)]
    [InlineData("PlantGrowth", "scheffe", "trt1", "trt2", .0162947037, 1e-10)]
    [InlineData("PlantGrowth", "games-howell", "ctrl", "trt1", .474554917, 1e-8)]
    [InlineData("PlantGrowth", "games-howell", "ctrl", "trt2", .112889178, 1e-8)]
    [InlineData("PlantGrowth", "games-howell", "trt1", "trt2", .0237034534, 1e-8)]
    [InlineData("PlantGrowth", "dunnett", "ctrl", "trt1", .32269569, 1e-8)]
    [InlineData("PlantGrowth", "dunnett", "ctrl", "trt2", .15348586, 1e-8)]
    [InlineData("InsectSprays", "tukey-kramer", "A", "C", 1.08370553e-9, 1e-17)]
    [InlineData("InsectSprays", "tukey-kramer", "C", "F", 4.18043278e-12, 1e-20)]
    [InlineData("InsectSprays", "tukey-kramer", "D", "E", .948866910, 1e-9)]
    [InlineData("chickwts", "tukey-kramer", "casein", "horsebean", 3.070042e-8, 1e-14)]
    [InlineData("warpbreaksTension", "tukey-kramer", "L", "M", .038460, 1e-6)]
    [InlineData("warpbreaksTension", "tukey-kramer", "L", "H", .001432, 1e-6)]
    [InlineData("warpbreaksTension", "tukey-kramer", "M", "H", .463083, 1e-6)]
    public void The_published_p_values_come_out(string data, string key, string a, string b, double p, double rounding) =>
        Assert.Equal(p, Line(data, key, a, b).P!.Value.Value, rounding);

    [Theory]
    [InlineData("PlantGrowth", "trt1", "trt2", .17378395, 1.55621605, 1e-8)]
    [InlineData("chickwts", "horsebean", "casein", 94.41979, 232.346876, 5e-6)]
    [InlineData("warpbreaksTension", "L", "M", -19.559824, -.440176, 5e-6)]
    public void The_published_intervals_come_out(string data, string a, string b, double lower, double upper, double rounding)
    {
        GroupComparison line = Line(data, "tukey-kramer", a, b);
        bool turned = line.GroupA != Number(data, a);
        Assert.Equal(lower, turned ? -line.Upper!.Value : line.Lower!.Value, rounding);
        Assert.Equal(upper, turned ? -line.Lower!.Value : line.Upper!.Value, rounding);
    }

    /// <summary>NIST/SEMATECH e-Handbook of Statistical Methods, 7.4.7.1: pairs 1-4 and 2-3 are not significant, the other four are.</summary>
    [Fact]
    public void The_pairs_of_the_NIST_handbook_example_fall_as_the_handbook_says()
    {
        foreach ((string a, string b, bool differs) in new[] { ("1", "2", true), ("1", "3", true), ("1", "4", false), ("2", "3", false), ("2", "4", true), ("3", "4", true) })
        {
            string[] names = Names("NIST747");
            Assert.Equal(differs, Line("NIST747", "tukey-kramer", names[int.Parse(a, System.Globalization.CultureInfo.InvariantCulture) - 1], names[int.Parse(b, System.Globalization.CultureInfo.InvariantCulture) - 1]).P!.Value.Value <= 0.05);
        }
    }

    private static GroupComparison Line(string data, string key, string a, string b)
    {
        int x = Number(data, a);
        int y = Number(data, b);
        return FollowUpRegistry.Find(key)!.Compare(TypedSample.OfText(Data[data]).Estimates()!, x, 0.95)
            .Single(c => (c.GroupA, c.GroupB) == (x, y) || (c.GroupA, c.GroupB) == (y, x));
    }

    private static int Number(string data, string group)
    {
        int at = Array.IndexOf(Names(data), group);
        Assert.True(at >= 0, $"no group {group} in {data}");
        return at;
    }

    private static string[] Names(string data) => [.. Data[data].Select(r => r.Group).Distinct()];
}
