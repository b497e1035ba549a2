using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.Corrections;

/// <summary>The adaptive procedures as they were published, run in exact fractions at given levels, against "adjusted p-value at most the level".</summary>
public sealed class AdaptiveOracleTests
{
    private const int Seed = 20260501;
    private const int Vectors = 2000;

    /// <summary>A procedure at one level: the largest p-value that it rejects, or -1.</summary>
    private delegate double Procedure(double[] sorted, int familySize, double level);

    [Fact]
    public void The_two_stages_of_Benjamini_Krieger_and_Yekutieli_reject_just_what_the_adjusted_p_values_say() => Check("bky", TwoStages);

    [Fact]
    public void The_thresholds_of_Storey_Taylor_and_Siegmund_reject_just_what_the_adjusted_p_values_say() => Check("storey", Threshold);

    [Fact]
    public void The_two_stages_reject_as_many_as_in_the_table()
    {
        ILookup<string, double> vectors = ReferenceTable.Read("campaign/pvectors.csv").Rows.ToLookup(r => r.Text("set"), r => r.Number("p"));
        foreach (ReferenceRow row in ReferenceTable.Read("campaign/bky_stages.csv").Rows)
        {
            double[] p = [.. vectors[row.Text("set")]];
            Assert.Equal(row.Integer("rejected"), Families.Adjust("bky", p, p.Length).Count(a => a <= row.Number("q")));
        }
    }

    [Fact]
    public void Decisions_at_a_level_of_5_percent_are_those_of_statsmodels()
    {
        foreach (IGrouping<string, ReferenceRow> set in ReferenceTable.Read("campaign/bky_statsmodels.csv").Rows.GroupBy(r => r.Text("set")))
        {
            double[] p = [.. set.Select(r => r.Number("p"))];
            Assert.Equal(set.Select(r => r.Number("fdr_tsbky") <= 0.05), Families.Adjust("bky", p, p.Length).Select(a => a <= 0.05));
        }
    }

    [Fact]
    public void The_published_fifteen_give_eight_with_two_stages()
    {
        // Benjamini, Krieger and Yekutieli (2006) come back to the fifteen of Benjamini and Hochberg (1995); eight rejections, as statsmodels' own tests quote the paper.
        double[] p = [0.0001, 0.0004, 0.0019, 0.0095, 0.0201, 0.0278, 0.0298, 0.0344, 0.0459, 0.3240, 0.4262, 0.5719, 0.6528, 0.7590, 1.0000];
        Assert.Equal(8, Families.Adjust("bky", p, p.Length).Count(a => a <= 0.05));
    }

    [Fact]
    public void Two_stages_can_reject_a_p_value_above_the_level()
    {
        // Four of five are rejected at 0.05/1.05, so one null is counted as true and the last is compared with 5 * 0.05/1.05 = 0.238.
        double adjusted = Families.Adjust("bky", [0.011, 0.021, 0.024, 0.030, 0.2], 5)[4];
        Assert.True(adjusted <= 0.05, $"{adjusted}");
    }

    [Fact]
    public void P_values_above_lambda_take_no_part_in_Storeys_step_up()
    {
        // Two of ten lie above 1/2: (2 + 1)/(1 - 1/2) = 6. At t = 0.45, 6 * 0.45/8 = 0.3375. At t = 0.51 it would be 6 * 0.51/10 = 0.306, but the paper's thresholds end at lambda:
        // at level 0.32 nothing is rejected, though a step-up over all ten p-values reaches the last and p = 0.45 is below lambda.
        double[] p = [.. Enumerable.Repeat(0.45, 8), 0.51, 0.51];
        double[] adjusted = Families.Adjust("storey", p, 10);
        Assert.Equal(0.3375, adjusted[0], 1e-16);
        Assert.Equal([1, 1], adjusted[8..]);
        double[] sorted = [.. p.Order()];
        Assert.Equal(-1, Threshold(sorted, 10, 0.32));
        Assert.Equal(0.45, Threshold(sorted, 10, 0.338));
    }

    [Fact]
    public void Storeys_values_are_those_of_the_table_where_nothing_above_lambda_interferes()
    {
        int compared = 0;
        foreach (IGrouping<string, ReferenceRow> set in ReferenceTable.Read("campaign/storey_q.csv").Rows.GroupBy(r => r.Text("set")))
        {
            double[] p = [.. set.Select(r => r.Number("p"))];
            double[] adjusted = Families.Adjust("storey", p, p.Length);
            double[] table = [.. set.Select(r => r.Number("q_plus1_lambda0.5"))];
            double leastAbove = p.Zip(table).Where(pair => pair.First > 0.5).Select(pair => pair.Second).DefaultIfEmpty(2).Min();
            for (int i = 0; i < p.Length; i++)
            {
                if (p[i] > 0.5)
                {
                    Assert.Equal(1, adjusted[i]);
                }
                else if (table[i] < leastAbove)
                {
                    Assert.Equal(table[i], adjusted[i]);
                    compared++;
                }
            }
        }

        Assert.InRange(compared, 500, 2000);
    }

    private static void Check(string key, Procedure rejectsUpTo)
    {
        var random = new Random(Seed);
        for (int trial = 0; trial < Vectors; trial++)
        {
            double[] p = Draw(random);
            int familySize = p.Length + (random.Next(3) == 0 ? random.Next(1, 8) : 0);
            double[] sorted = [.. p.Order()];
            double[] adjusted = Families.Adjust(key, p, familySize);
            double[] levels = [.. Enumerable.Range(1, 9).Select(k => k / 10.0), 0.01, 0.05, .. adjusted.Distinct().SelectMany(a => new[] { Math.BitDecrement(a), Math.BitIncrement(a) })];
            foreach (double level in levels.Where(l => l is > 0 and < 1))
            {
                double reach = rejectsUpTo(sorted, familySize, level);
                for (int i = 0; i < p.Length; i++)
                {
                    // At the adjusted p-value itself its rounding decides; the levels next to it do not leave more.
                    if (adjusted[i] != level)
                    {
                        Assert.True(p[i] <= reach == adjusted[i] <= level, $"{key}, trial {trial}, m = {familySize}, p = {p[i]:R}, adjusted {adjusted[i]:R}, level {level:R}: {string.Join(" ", sorted)}");
                    }
                }
            }
        }
    }

    private static double[] Draw(Random random)
    {
        double[] p = Families.Draw(random, random.Next(1, 13));

        // Many false nulls, so that the estimates bite, with ties.
        double shrink = random.Next(3) == 0 ? 1 : Math.Pow(10, -2 * random.NextDouble());
        return [.. p.Select(x => random.Next(5) == 0 ? x : Math.Round(x * shrink, random.Next(2, 5)))];
    }

    /// <summary>Benjamini, Krieger and Yekutieli (2006), definition 6; every comparison multiplied out.</summary>
    private static double TwoStages(double[] sorted, int familySize, double level)
    {
        var q = Rational.Of(level);
        Rational onePlusQ = Rational.One + q;
        int first = LargestRank(sorted, (p, k) => (familySize * p * onePlusQ).CompareTo(k * q) <= 0);
        if (first == 0 || first == familySize)
        {
            return first == 0 ? -1 : 2;
        }

        int second = LargestRank(sorted, (p, k) => ((familySize - first) * p * onePlusQ).CompareTo(k * q) <= 0);

        // With untested hypotheses, p = 1, at the last ranks too.
        bool all = familySize > sorted.Length && ((familySize - first) * onePlusQ).CompareTo(familySize * q) <= 0;
        return all ? 2 : second == 0 ? -1 : sorted[second - 1];
    }

    /// <summary>Storey, Taylor and Siegmund (2004): the largest t up to lambda whose estimated rate (W + 1) t / ((1 - lambda) R(t)) is at most the level.</summary>
    private static double Threshold(double[] sorted, int familySize, double level)
    {
        int above = familySize - sorted.Count(p => p <= 0.5);
        return sorted.Where(t => t <= 0.5 && (2 * (above + 1) * Rational.Of(t)).CompareTo(sorted.Count(p => p <= t) * Rational.Of(level)) <= 0).DefaultIfEmpty(-1).Max();
    }

    private static int LargestRank(double[] sorted, Func<Rational, int, bool> passes)
    {
        int rank = sorted.Length;
        while (rank > 0 && !passes(Rational.Of(sorted[rank - 1]), rank))
        {
            rank--;
        }

        return rank;
    }
}
