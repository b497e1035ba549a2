using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Selection;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.Selection;

public sealed class SelectedFamiliesTests
{
    // Six experiments of which Benjamini and Hochberg's procedure selects three: 40-digit arithmetic (mpmath), tests/reference/campaign/generate/10_selective.py.
    [Fact]
    public void Comparisons_inside_selected_experiments_get_the_reference_p_values_and_claims()
    {
        IReadOnlyList<ReferenceRow> experiments = ReferenceTable.Read("campaign/selective_experiments.csv").Rows;
        (int m, int selected) = (experiments[0].Integer("m"), experiments[0].Integer("R"));
        Assert.Equal((m, selected), (experiments.Count, experiments.Count(e => e.Integer("selected") == 1)));
        SignificanceLevel level = new(0.05);
        int checkedPairs = 0;
        foreach (ReferenceRow pair in ReferenceTable.Read("campaign/selective_pairs.csv").Rows.Where(p => p.Integer("experiment_selected") == 1))
        {
            foreach (string within in (string[])["holm", "bh"])
            {
                PValue adjusted = SelectedFamilies.FalseDiscovery(PValue.FromValue(pair.Number($"{within}_within")), m, selected);
                Assert.Equal(pair.Number($"bb_{within}_adjusted"), adjusted.Value, 4e-16 * pair.Number($"bb_{within}_adjusted"));
                Assert.Equal(pair.Integer($"bb_{within}_reject_q0.05") == 1, level.Rejects(adjusted));
                checkedPairs++;
            }
        }

        Assert.Equal(24, checkedPairs);
    }

    // Products by hand; those of decimals are rounded once.
    [Theory]
    [InlineData(0.01, 6, 3, 0.02)]
    [InlineData(0.1, 3, 1, 0.3)]
    [InlineData(0.3, 10, 3, 1)]
    [InlineData(0.25, 7, 7, 0.25)]
    [InlineData(1, 2, 1, 1)]
    public void A_p_value_is_multiplied_by_the_family_over_the_selected_and_cut_at_one(double p, int experiments, int selected, double adjusted) =>
        Assert.Equal(adjusted, SelectedFamilies.FalseDiscovery(PValue.FromValue(p), experiments, selected).Value, 1e-16);

    [Fact]
    public void Familywise_multiplies_by_the_whole_family()
    {
        Assert.Equal(0.06, SelectedFamilies.Familywise(PValue.FromValue(0.01), 6).Value, 1e-17);
        Assert.Equal(1, SelectedFamilies.Familywise(PValue.FromValue(0.2), 6).Value);
        Assert.Equal(0.2, SelectedFamilies.Familywise(PValue.FromValue(0.2), 1).Value);
    }

    [Theory]
    [InlineData(-700.0)]
    [InlineData(-2000.0)]
    [InlineData(-1e9)]
    public void Below_the_range_of_doubles_the_logarithm_carries_on(double log)
    {
        // ln(p 12/4) = ln p + ln 3.
        PValue adjusted = SelectedFamilies.FalseDiscovery(PValue.FromLog(log), 12, 4);
        Assert.Equal(log + 1.0986122886681098, adjusted.Log, 1e-12 * -log);
        Assert.True(adjusted.Value > 0 || log < -745);
        Assert.True(new SignificanceLevel(0.05).Rejects(adjusted));
    }

    [Theory]
    [InlineData(3, 0)]
    [InlineData(3, 4)]
    [InlineData(0, 1)]
    [InlineData(-1, -1)]
    public void Counts_that_cannot_be_are_refused(int experiments, int selected) =>
        Assert.Throws<ArgumentOutOfRangeException>(() => SelectedFamilies.FalseDiscovery(PValue.FromValue(0.1), experiments, selected));
}
