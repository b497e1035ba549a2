using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.Numerics;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.FollowUps;

public sealed class CompactLettersTests
{
    private static readonly SignificanceLevel Level = new(0.05);

    /// <summary>R's PlantGrowth: trt2 above trt1, the control like both; published many times as "a", "b", "ab".</summary>
    [Fact]
    public void The_letters_of_PlantGrowth_are_the_published_ones()
    {
        GroupEstimates estimates = TypedSample.OfText(FollowUpReferenceTests.Values("worked_examples_data.csv")["PlantGrowth"]).Estimates()!;
        Assert.Equal(["ab", "b", "a"], CompactLetters.Of(estimates, new TukeyKramer().Compare(estimates, null, 0.95), Level));
    }

    /// <summary>The pairs of R's chickwts that a Wilcoxon test with Holm's correction calls different, with the letters that the documentation of an R package for letters (GegznaV/cld, interpretation guide) shows for them: casein a, horsebean b, linseed bc, meatmeal ac, soybean c, sunflower a.</summary>
    [Fact]
    public void A_published_pattern_gets_the_published_number_of_letters()
    {
        (int, int)[] different = [(0, 1), (0, 2), (0, 4), (1, 3), (1, 4), (1, 5), (2, 5), (4, 5)];
        IReadOnlyList<string> letters = Letters([323.6, 160.2, 218.8, 276.9, 246.4, 328.9], different)!;
        AssertShared(letters, different);
        Assert.Equal(["a", "c", "bc", "ab", "b", "a"], letters);
    }

    [Fact]
    public void No_difference_gives_one_letter_and_all_differences_give_one_each()
    {
        Assert.Equal(["a", "a", "a"], Letters([1, 2, 3], []));
        Assert.Equal(["c", "b", "a"], Letters([1, 2, 3], [(0, 1), (0, 2), (1, 2)]));
        Assert.Equal(["a"], Letters([1], []));
    }

    [Fact]
    public void Two_groups_share_a_letter_if_and_only_if_they_are_not_called_different()
    {
        var random = new Random(20261208);
        for (int i = 0; i < 400; i++)
        {
            int k = random.Next(2, 14);
            double density = random.NextDouble();
            (int, int)[] different = [.. Pairs(k).Where(_ => random.NextDouble() < density)];
            IReadOnlyList<string> letters = Letters([.. Enumerable.Range(0, k).Select(_ => random.NextDouble())], different)!;
            AssertShared(letters, different);
            AssertNoneToSpare(letters, different);
        }
    }

    [Fact]
    public void Sixty_groups_get_letters_for_ordered_and_for_hostile_patterns()
    {
        double[] means = [.. Enumerable.Range(0, 60).Select(i => (double)-i)];
        (int, int)[] ordered = [.. Pairs(60).Where(p => p.B - p.A > 7)];
        IReadOnlyList<string> letters = Letters(means, ordered)!;
        AssertShared(letters, ordered);
        Assert.Equal("a", letters[0]);

        // Twenty triples whose members differ from each other alone: 3^20 largest sets without a difference.
        (int, int)[] hostile = [.. Pairs(60).Where(p => p.A / 3 == p.B / 3)];
        AssertShared(Letters(means, hostile)!, hostile);
    }

    [Fact]
    public void More_letters_than_the_alphabet_stay_readable()
    {
        IReadOnlyList<string> letters = Letters([.. Enumerable.Range(0, 60).Select(i => (double)-i)], [.. Pairs(60)])!;
        Assert.Equal(["a", "z", "A", "Z", "a2", "h2"], new[] { 0, 25, 26, 51, 52, 59 }.Select(i => letters[i]));
    }

    [Fact]
    public void A_pair_that_cannot_be_compared_counts_as_not_different_and_a_missing_pair_gives_no_letters()
    {
        GroupEstimates estimates = Estimates([3, 2, 1]);
        GroupComparison[] lines = [Line(0, 1, 0.01), new GroupComparison(0, 2, -2) { Obstacle = "reason" }, Line(1, 2, 0.2)];
        Assert.Equal(["a", "b", "ab"], CompactLetters.Of(estimates, lines, Level)!);
        Assert.Null(CompactLetters.Of(estimates, lines[..2], Level));
    }

    private static IEnumerable<(int A, int B)> Pairs(int k) => Enumerable.Range(0, k).SelectMany(a => Enumerable.Range(a + 1, k - a - 1).Select(b => (a, b)));

    private static IReadOnlyList<string>? Letters(double[] means, (int, int)[] different) =>
        CompactLetters.Of(Estimates(means), [.. Pairs(means.Length).Select(p => Line(p.A, p.B, different.Contains(p) ? 0.05 : 0.0501))], Level);

    private static GroupComparison Line(int a, int b, double p) => new(a, b, 1) { P = PValue.FromValue(p) };

    private static GroupEstimates Estimates(double[] means) =>
        new([.. means.Select(WideReal.From)], [.. means.Select(_ => 3)], [.. means.Select(_ => 1.0)], new double[means.Length, means.Length], 1, 10, withinBlocks: false);

    private static string[] Split(string letters) => [.. System.Text.RegularExpressions.Regex.Matches(letters, "[a-zA-Z][0-9]*").Select(m => m.Value)];

    private static void AssertShared(IReadOnlyList<string> letters, (int, int)[] different)
    {
        string[][] split = [.. letters.Select(Split)];
        Assert.All(split, marks => Assert.NotEmpty(marks));
        Assert.All(Pairs(letters.Count), p => Assert.NotEqual(different.Contains(p), split[p.A].Intersect(split[p.B]).Any()));
    }

    /// <summary>After the sweep no letter can be taken from a group without parting a pair that is not different, or leaving the group without any.</summary>
    private static void AssertNoneToSpare(IReadOnlyList<string> letters, (int, int)[] different)
    {
        string[][] split = [.. letters.Select(Split)];
        for (int g = 0; g < split.Length; g++)
        {
            foreach (string letter in split[g])
            {
                string[] rest = [.. split[g].Where(l => l != letter)];
                bool parts = rest.Length == 0 || Enumerable.Range(0, split.Length).Any(o => o != g && !different.Contains((Math.Min(o, g), Math.Max(o, g))) && !rest.Intersect(split[o]).Any());
                Assert.True(parts, $"{letter} of group {g} is to spare in {string.Join(' ', letters)}");
            }
        }
    }
}
