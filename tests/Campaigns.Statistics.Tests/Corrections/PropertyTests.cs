using Campaigns.Statistics.Corrections;
using FsCheck.Xunit;

namespace Campaigns.Statistics.Tests.Corrections;

[Properties(Arbitrary = [typeof(Families)], Replay = "20260402,7", MaxTest = 300)]
public sealed class PropertyTests
{
    [Property]
    public void Adjusting_never_lowers_a_p_value_and_stays_within_one(Drawn family)
    {
        foreach (Correction correction in CorrectionRegistry.All)
        {
            double[] adjusted = Families.Adjust(correction.Key, family.P, family.FamilySize);
            bool mayGoBelow = correction.MayGoBelowP && !correction.NeedsWeights;
            Assert.All(family.P.Zip(adjusted), pair => Assert.InRange(pair.Second, mayGoBelow ? 0 : pair.First, 1));
            Assert.All(family.P.Zip(adjusted), pair => Assert.True(pair.First == 0 || pair.Second > 0, correction.Key));
        }
    }

    [Property]
    public void Smaller_p_values_never_get_larger_adjusted_ones_and_ties_get_the_same(Drawn family)
    {
        foreach (Correction correction in CorrectionRegistry.All)
        {
            double[] adjusted = Families.Adjust(correction.Key, family.P, family.FamilySize);
            (double Raw, double Adjusted)[] pairs = [.. family.P.Zip(adjusted).OrderBy(pair => pair.First)];
            foreach (((double Raw, double Adjusted) lower, (double Raw, double Adjusted) upper) in pairs.Zip(pairs.Skip(1)))
            {
                Assert.True(lower.Adjusted <= upper.Adjusted, correction.Key);
                Assert.True(lower.Raw < upper.Raw || lower.Adjusted == upper.Adjusted, correction.Key);
            }
        }
    }

    [Property]
    public void The_order_of_the_input_does_not_matter(Drawn family, int seed)
    {
        int[] places = [.. Enumerable.Range(0, family.P.Length)];
        new Random(seed).Shuffle(places);
        double[] shuffled = [.. places.Select(i => family.P[i])];
        foreach (Correction correction in CorrectionRegistry.All)
        {
            double[] adjusted = Families.Adjust(correction.Key, family.P, family.FamilySize);
            Assert.Equal(places.Select(i => adjusted[i]), Families.Adjust(correction.Key, shuffled, family.FamilySize));
        }
    }

    [Property]
    public void The_procedures_keep_their_published_order(Drawn family)
    {
        (string Lower, string Upper)[] pairs =
            [("hommel", "hochberg"), ("hochberg", "holm"), ("holm", "bonferroni"), ("holm-sidak", "holm"), ("holm-sidak", "sidak"), ("sidak", "bonferroni"), ("bh", "by"), ("bh", "hommel"), ("none", "bh"), ("hommel", "hommel-any")];
        foreach ((string lower, string upper) in pairs)
        {
            double[] smaller = Families.Adjust(lower, family.P, family.FamilySize);
            double[] larger = Families.Adjust(upper, family.P, family.FamilySize);
            Assert.All(smaller.Zip(larger), pair => Assert.True(pair.First <= pair.Second, $"{lower} {pair.First:R} > {upper} {pair.Second:R}"));
        }
    }

    [Property]
    public void Untested_hypotheses_count_as_p_equal_to_one(Drawn family)
    {
        int untested = Math.Min(family.FamilySize - family.P.Length, 300);
        int size = family.P.Length + untested;
        double[] filled = [.. family.P, .. Enumerable.Repeat(1.0, untested)];
        foreach (Correction correction in CorrectionRegistry.All)
        {
            Assert.Equal(Families.Adjust(correction.Key, filled, size).Take(family.P.Length), Families.Adjust(correction.Key, family.P, size));
        }
    }
}
