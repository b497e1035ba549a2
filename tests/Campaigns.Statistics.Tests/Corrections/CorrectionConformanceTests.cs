using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.Corrections;

public sealed class CorrectionConformanceTests
{
    private static readonly ReferenceTable Exact = ReferenceTable.Read("campaign/adjust_exact.csv");
    private static readonly ReferenceTable Weighted = ReferenceTable.Read("campaign/adjust_weighted.csv");

    public static TheoryData<string> Keys => [.. CorrectionRegistry.All.Select(c => c.Key)];

    [Fact]
    public void Every_correction_is_registered_once()
    {
        IEnumerable<Type> written = typeof(Correction).Assembly.GetTypes().Where(t => t.IsSubclassOf(typeof(Correction)) && !t.IsAbstract);
        Assert.Equal(written.OrderBy(t => t.Name, StringComparer.Ordinal), CorrectionRegistry.All.Select(c => c.GetType()).OrderBy(t => t.Name, StringComparer.Ordinal));
    }

    [Fact]
    public void Keys_and_their_order_are_the_frozen_ones()
    {
        IEnumerable<string> frozen = File.ReadLines(Path.Combine(ReferenceTable.Folder(), "frozen-keys.txt"))
            .Where(l => l.StartsWith("correction ", StringComparison.Ordinal))
            .Select(l => l["correction ".Length..].Trim());
        Assert.Equal(frozen, CorrectionRegistry.All.Select(c => c.Key));
        Assert.Distinct(CorrectionRegistry.All.Select(c => c.Key));
    }

    [Fact]
    public void An_unknown_key_finds_nothing()
    {
        Assert.Null(CorrectionRegistry.Find("Holm"));
        Assert.Equal("Holm", CorrectionRegistry.Find("holm")!.Name);
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void Every_correction_says_what_it_holds_and_where_it_was_published(string key)
    {
        Correction correction = CorrectionRegistry.Find(key)!;
        Assert.True(correction.GetType().IsSealed);
        Assert.NotEmpty(correction.Name);
        Assert.EndsWith(".", correction.Guarantee, StringComparison.Ordinal);
        Assert.Matches(@"\((19|20)\d\d\), ", correction.Source);
        Assert.True(Enum.IsDefined(correction.Controls));
        Assert.True(Enum.IsDefined(correction.ValidUnder));
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void Every_correction_has_a_column_in_an_exact_table(string key)
    {
        string column = key == "none" ? "p" : key.Replace('-', '_');
        ReferenceTable table = CorrectionRegistry.Find(key)!.NeedsWeights ? Weighted : Exact;
        Assert.All(table.Rows, row => Assert.InRange(row.Number(column), 0, 1));
    }

    [Fact]
    public void Callers_without_weights_see_every_correction_that_needs_none()
    {
        Assert.Equal(CorrectionRegistry.All.Where(c => c is not WeightedCorrection), CorrectionRegistry.FromPAlone);
        Assert.Equal(3, CorrectionRegistry.All.Count - CorrectionRegistry.FromPAlone.Count);
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void An_error_rate_over_the_family_is_never_held_below_the_global_test(string key)
    {
        // Five equal p-values of 0.01. Familywise procedures without an assumption on dependence that look at the smallest p alone must give m p; Hommel's for any dependence
        // (1 + 1/2 + ... + 1/5) p. Any other gives at least p, save those that estimate the true nulls: those may go below it.
        Correction correction = CorrectionRegistry.Find(key)!;
        double[] equal = [.. Enumerable.Repeat(0.01, 5)];
        double adjusted = Families.Adjust(key, equal, 5)[0];
        bool anyDependence = correction.ValidUnder == Dependence.Any && correction.Controls == ErrorRate.Familywise;
        Assert.InRange(adjusted, key == "hommel-any" ? 0.01 * 137 / 60 : anyDependence ? 0.05 : correction.MayGoBelowP ? 0.001 : 0.01, 0.05);
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void A_family_of_one_is_its_own_p_value(string key)
    {
        // The adaptive ones pay for their estimate: q/(1 + q) = 0.03 at q = 3/97; and one hypothesis, none of it above 1/2, counts as (0 + 1)/(1 - 1/2) = 2 true nulls.
        double expected = key == "bky" ? 3.0 / 97 : key == "storey" ? 0.06 : 0.03;
        Assert.Equal([expected], Families.Adjust(key, [0.03], 1), (a, b) => Families.UlpsApart(a, b) <= 2);
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void An_empty_family_gives_nothing(string key)
    {
        Assert.Empty(Families.Adjust(key, [], 0));
        Assert.Empty(CorrectionRegistry.Find(key)!.Adjust(RankedFamily.Of(ReadOnlySpan<PValue>.Empty, 3)));
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void A_million_planned_hypotheses_need_no_memory_of_their_own(string key)
    {
        var family = RankedFamily.Of([0.5, 1e-9, 1e-8], 1000000);
        double[] adjusted = new double[3];
        Correction correction = CorrectionRegistry.Find(key)!;
        correction.Adjust(family, adjusted);
        long before = GC.GetAllocatedBytesForCurrentThread();
        correction.Adjust(family, adjusted);
        Assert.InRange(GC.GetAllocatedBytesForCurrentThread() - before, 0, 10000);
        Assert.InRange(adjusted[1], 1e-9, 1e-9 * 1e6 * 14.4);
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void Memory_of_another_length_is_refused(string key) =>
        Assert.Throws<ArgumentException>(() => CorrectionRegistry.Find(key)!.Adjust(RankedFamily.Of([0.1, 0.2], 2), new double[3]));
}
