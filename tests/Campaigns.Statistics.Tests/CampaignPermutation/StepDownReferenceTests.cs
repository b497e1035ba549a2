using System.Globalization;
using System.Numerics;
using Campaigns.Statistics.CampaignPermutation;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.CampaignPermutation;

/// <summary>Against tables from exact rational arithmetic over all arrangements, tests/reference/campaign/generate/11_westfall_young.py.</summary>
public sealed class StepDownReferenceTests
{
    private static readonly PermutationRun Nothing = new(RandomDraws.Usual);

    [Fact]
    public void Random_designs_with_ties_and_blocks_agree_with_brute_force()
    {
        ILookup<string, ReferenceRow> data = ReferenceTable.Read("campaign/wy_random_data.csv").Rows.ToLookup(r => r.Text("design"));
        var results = ReferenceTable.Read("campaign/wy_random_results.csv").Rows.GroupBy(r => r.Text("design")).ToList();
        Assert.True(results.Count >= 24);
        foreach (IGrouping<string, ReferenceRow> design in results)
        {
            SpecimenSet set = SetOf([.. data[design.Key]], [.. design.Select(r => r.Text("statistic"))]);
            StepDownResult[] maxT = StepDownPermutation.MaxT([set], Nothing);
            StepDownResult[] minP = StepDownPermutation.MinP([set], Nothing);
            foreach (ReferenceRow row in design)
            {
                int j = row.Integer("response");
                Assert.Equal(row.Integer("arrangements"), set.Arrangements);
                Assert.Equal(row.Number("raw_p"), maxT[j].P.Value);
                Assert.Equal(row.Number("raw_p"), minP[j].P.Value);
                Assert.Equal(row.Number("maxT_stepdown"), maxT[j].AdjustedP.Value);
                Assert.Equal(row.Number("minP_stepdown"), minP[j].AdjustedP.Value);
            }
        }
    }

    [Fact]
    public void Four_responses_on_eight_units_agree_with_the_table()
    {
        SpecimenSet set = Units().Set;
        StepDownResult[] maxT = StepDownPermutation.MaxT([set], Nothing);
        StepDownResult[] minP = StepDownPermutation.MinP([set], Nothing);
        ReferenceRow[] rows = [.. ReferenceTable.Read("campaign/wy_A_results.csv").Rows.Where(r => r.Text("case") == "A_complete")];
        Assert.Equal(4, rows.Length);
        for (int j = 0; j < rows.Length; j++)
        {
            Assert.Equal(rows[j].Number("raw_p"), maxT[j].P.Value);
            Assert.Equal(rows[j].Number("maxT_stepdown"), maxT[j].AdjustedP.Value);
            Assert.Equal(rows[j].Number("minP_stepdown"), minP[j].AdjustedP.Value);
            Assert.Equal(70, maxT[j].Resampling!.Arrangements);
            Assert.True(maxT[j].Resampling!.IsExact);
        }
    }

    [Fact]
    public void The_oracle_of_drawn_arrangements_agrees_with_the_table()
    {
        // The listed arrangements are not those that the program draws; the oracle that is checked here is held against those in StepDownDrawsTests.
        BigInteger[][] values = Units().Values;
        int[][] listed = [.. ReferenceTable.Read("campaign/wy_A_permutations.csv").Rows.Select(r => Enumerable.Range(1, 8).Select(u => r.Integer($"unit{u}")).ToArray())];
        ReferenceRow[] rows = [.. ReferenceTable.Read("campaign/wy_A_results.csv").Rows.Where(r => r.Text("case") == "A_montecarlo_B99_plus1")];
        Assert.Equal(100, listed.Length);
        Assert.Equal(rows.Select(r => r.Number("maxT_stepdown")), StepDownOracle.Adjust(values, listed, byP: false).Select(c => c / 100.0));
        Assert.Equal(rows.Select(r => r.Number("minP_stepdown")), StepDownOracle.Adjust(values, listed, byP: true).Select(c => c / 100.0));
    }

    [Fact]
    public void Independent_experiments_agree_with_the_table_and_never_exceed_Holm_and_Sidak()
    {
        ILookup<string, ReferenceRow> data = ReferenceTable.Read("campaign/wy_C_data.csv").Rows.ToLookup(r => r.Text("experiment"));
        ReferenceRow[] rows = [.. ReferenceTable.Read("campaign/wy_C_results.csv").Rows];
        SpecimenSet[] sets = [.. rows.Select(r => SetBuilder.Set([.. data[r.Text("experiment")].Select(d => d.Integer("group"))], [.. data[r.Text("experiment")].Select(d => (BigInteger)d.Integer("y"))]))];
        StepDownResult[] exact = StepDownPermutation.ExactMinP(sets, [], Nothing);
        Assert.Equal(exact, StepDownPermutation.MinP(sets, Nothing));
        for (int e = 0; e < rows.Length; e++)
        {
            Assert.Equal(rows[e].Integer("allocations"), sets[e].Arrangements);
            Assert.Equal(rows[e].Number("perm_p"), exact[e].P.Value);
            Assert.Equal(rows[e].Number("minP_stepdown_exact"), exact[e].AdjustedP.Value, 1e-15);
            Assert.True(exact[e].AdjustedP.Value <= rows[e].Number("holm_sidak_for_comparison"));
        }
    }

    [Fact]
    public void Given_p_values_alone_are_adjusted_by_Holm_with_Sidaks_inequality()
    {
        double[] p = [0.04, 0.001, 0.012, 0.5];
        StepDownResult[] results = StepDownPermutation.ExactMinP([], [.. p.Select(v => (IReadOnlyList<PValue>)[PValue.FromValue(v)])], Nothing);

        // 1 - (1 - p)^(later ones), by hand: 4 for 0.001, 3 for 0.012, 2 for 0.04.
        double[] expected = [1 - (0.96 * 0.96), 1 - Math.Pow(0.999, 4), 1 - Math.Pow(0.988, 3), 0.5];
        for (int i = 0; i < p.Length; i++)
        {
            Assert.Equal(expected[i], results[i].AdjustedP.Value, 1e-15);
            Assert.Null(results[i].Resampling);
        }
    }

    private static (SpecimenSet Set, BigInteger[][] Values) Units()
    {
        ReferenceRow[] rows = [.. ReferenceTable.Read("campaign/wy_A_data.csv").Rows];
        BigInteger[][] values = [.. Enumerable.Range(1, 4).Select(j => rows.Select(r => (BigInteger)r.Integer($"y{j}")).ToArray())];
        return (SetBuilder.Set([.. rows.Select(r => r.Integer("group"))], values), values);
    }

    private static SpecimenSet SetOf(ReferenceRow[] rows, string[] statistics)
    {
        int[] blocks = rows[0].Has("block") ? [.. rows.Select(r => r.Integer("block"))] : [];
        return SetBuilder.Set(
            [.. rows.Select(r => r.Integer("group"))],
            blocks,
            [.. statistics.Select((s, j) => (
                rows.Select(r => BigInteger.Parse(r.Text($"y{j}"), CultureInfo.InvariantCulture)).ToArray(),
                s switch { "ranks" => PermutedStatistic.Ranks, "blocks" => PermutedStatistic.WithinBlocks, _ => PermutedStatistic.Values }))]);
    }
}
