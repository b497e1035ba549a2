using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.Corrections;

public sealed class ReferenceTableTests
{
    private static readonly ReferenceTable Exact = ReferenceTable.Read("campaign/adjust_exact.csv");

    public static TheoryData<string> Keys => [.. CorrectionRegistry.FromPAlone.Select(c => c.Key)];

    [Theory]
    [MemberData(nameof(Keys))]
    public void Every_adjusted_p_value_is_the_exact_one_rounded_once(string key)
    {
        // Hommel's for any dependence is a rounded value times a sum: rounded twice.
        long units = key == "hommel-any" ? 1 : 0;
        string column = key == "none" ? "p" : key.Replace('-', '_');
        foreach (IGrouping<string, ReferenceRow> set in Exact.Rows.GroupBy(r => r.Text("set")))
        {
            double[] p = [.. set.Select(r => r.Number("p"))];
            double[] expected = [.. set.Select(r => r.Number(column))];
            Assert.Equal(expected, Families.Adjust(key, p, p.Length), (a, b) => Families.UlpsApart(a, b) <= units);
        }
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void P_values_with_logarithms_give_the_same_doubles(string key)
    {
        Correction correction = CorrectionRegistry.Find(key)!;
        foreach (IGrouping<string, ReferenceRow> set in Exact.Rows.GroupBy(r => r.Text("set")))
        {
            PValue[] p = [.. set.Select(r => PValue.FromValue(r.Number("p")))];
            double[] expected = Families.Adjust(key, [.. set.Select(r => r.Number("p"))], p.Length);
            PValue[] adjusted = correction.Adjust(RankedFamily.Of(p, p.Length));
            Assert.Equal(expected, adjusted.Select(a => a.Value));

            // Further down the double has lost digits that the logarithm keeps.
            Assert.All(adjusted.Where(a => a.Value >= 1e-307), a => Assert.Equal(Math.Log(a.Value), a.Log, 1e-10));
        }
    }

    [Fact]
    public void Sidak_is_rounded_once_from_the_far_tail_to_one_in_families_of_any_size()
    {
        foreach (ReferenceRow row in ReferenceTable.Read("campaign/sidak_wide.csv").Rows)
        {
            Assert.Equal([row.Number("sidak")], Families.Adjust("sidak", [row.Number("p")], row.Integer("m")));
        }
    }

    [Fact]
    public void A_planned_family_larger_than_the_p_values_agrees_with_R()
    {
        (string Key, string Column)[] methods = [("bonferroni", "bonferroni"), ("holm", "holm"), ("hochberg", "hochberg"), ("hommel", "hommel"), ("bh", "BH"), ("by", "BY")];
        ReferenceTable table = ReferenceTable.Read("campaign/adjust_r_planned_and_missing.csv");
        foreach (IGrouping<string, ReferenceRow> set in table.Rows.Where(r => r.Text("p") != "NaN").GroupBy(r => r.Text("set")))
        {
            double[] p = [.. set.Select(r => r.Number("p"))];
            foreach ((string key, string column) in methods)
            {
                double[] adjusted = Families.Adjust(key, p, set.First().Integer("n"));
                Assert.All(adjusted.Zip(set.Select(r => r.Number(column))), pair => Assert.True(Families.UlpsApart(pair.First, pair.Second) <= 2, $"{set.Key} {key}: {pair}"));
            }
        }
    }

    [Fact]
    public void The_fifteen_p_values_of_Benjamini_and_Hochberg_1995_give_the_published_decisions()
    {
        // Benjamini and Hochberg (1995), section 4.1: at 0.05 Bonferroni rejects three hypotheses, their procedure four.
        double[] p = [0.0001, 0.0004, 0.0019, 0.0095, 0.0201, 0.0278, 0.0298, 0.0344, 0.0459, 0.3240, 0.4262, 0.5719, 0.6528, 0.7590, 1.0000];
        var level = new SignificanceLevel(0.05);
        int Rejected(string key) => CorrectionRegistry.Find(key)!.Adjust(RankedFamily.Of(p, p.Length)).Count(level.Rejects);

        Assert.Equal(3, Rejected("bonferroni"));
        Assert.Equal(4, Rejected("bh"));
    }

    [Fact]
    public void A_tie_at_the_level_stays_at_the_level()
    {
        Assert.Equal([0.05, 0.05, 0.05], Families.Adjust("hommel", [0.05, 0.05, 0.05], 3));
        Assert.Equal([0.05, 0.05, 0.05], Families.Adjust("bh", [0.05, 0.05, 0.05], 3));

        // On paper 0.05 <= 5 * 0.08 / 8; doubles formed in two steps give 0.080000000000000016.
        Assert.Equal(0.08, Families.Adjust("bh", [0.01, 0.02, 0.03, 0.04, 0.05], 8)[4]);
    }
}
