using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Online;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.Online;

public sealed class OnlineConformanceTests
{
    public static TheoryData<string> Keys => [.. OnlineRegistry.All.Select(p => p.Key)];

    [Fact]
    public void Every_procedure_is_registered_once()
    {
        IEnumerable<Type> written = typeof(OnlineProcedure).Assembly.GetTypes().Where(t => t.IsSubclassOf(typeof(OnlineProcedure)));
        Assert.Equal(written.OrderBy(t => t.Name, StringComparer.Ordinal), OnlineRegistry.All.Select(p => p.GetType()).OrderBy(t => t.Name, StringComparer.Ordinal));
    }

    [Theory]
    [InlineData("online")]
    [InlineData("shape")]
    public void Keys_and_their_order_are_the_frozen_ones(string kind)
    {
        IEnumerable<string> frozen = File.ReadLines(Path.Combine(ReferenceTable.Folder(), "frozen-keys.txt"))
            .Where(l => l.StartsWith(kind + " ", StringComparison.Ordinal))
            .Select(l => l[(kind.Length + 1)..].Trim());
        Assert.Equal(frozen, kind == "online" ? OnlineRegistry.All.Select(p => p.Key) : SpendingShape.All.Select(s => s.Key));
    }

    [Fact]
    public void No_key_names_both_a_batch_correction_and_an_online_procedure() =>
        Assert.Distinct([.. CorrectionRegistry.All.Select(c => c.Key), .. OnlineRegistry.All.Select(p => p.Key)]);

    [Theory]
    [MemberData(nameof(Keys))]
    public void Every_procedure_says_what_it_holds_and_where_it_was_published(string key)
    {
        OnlineProcedure procedure = OnlineRegistry.Find(key)!;
        Assert.True(procedure.GetType().IsSealed);
        Assert.NotEmpty(procedure.Name);
        Assert.EndsWith(".", procedure.Guarantee, StringComparison.Ordinal);
        Assert.Matches(@"\((19|20)\d\d\), ", procedure.Source);
        Assert.NotEqual(ErrorRate.PerTest, procedure.Controls);
        Assert.NotNull(SpendingShape.Find(procedure.DefaultShape));
        Assert.Contains(procedure.ValidUnder switch
        {
            Dependence.Any => "whatever the dependence",
            Dependence.PositiveRegression => "independent or positively dependent",
            Dependence.Independent => "independent of each other and of all others",
            _ => "uniformly conservative",
        }, procedure.Guarantee, StringComparison.Ordinal);
    }

    // The table of guarantees as the publications state them.
    [Theory]
    [InlineData("alpha-spending", ErrorRate.Familywise, Dependence.Any)]
    [InlineData("online-fallback", ErrorRate.Familywise, Dependence.Any)]
    [InlineData("addis-spending", ErrorRate.Familywise, Dependence.IndependentConservative)]
    [InlineData("lond", ErrorRate.FalseDiscovery, Dependence.PositiveRegression)]
    [InlineData("lond-any", ErrorRate.FalseDiscovery, Dependence.Any)]
    [InlineData("lord", ErrorRate.FalseDiscovery, Dependence.Independent)]
    [InlineData("saffron", ErrorRate.FalseDiscovery, Dependence.Independent)]
    [InlineData("addis", ErrorRate.FalseDiscovery, Dependence.IndependentConservative)]
    public void Each_holds_its_published_error_rate_under_its_published_condition(string key, ErrorRate rate, Dependence dependence)
    {
        OnlineProcedure procedure = OnlineRegistry.Find(key)!;
        Assert.Equal((rate, dependence), (procedure.Controls, procedure.ValidUnder));
    }

    [Theory]
    [MemberData(nameof(Keys))]
    public void Every_procedure_has_rows_in_both_tables_of_streams(string key)
    {
        Assert.Contains(ReferenceTable.Read("campaign/online_traces.csv").Rows, r => r.Text("method") == key);
        Assert.Contains(ReferenceTable.Read("campaign/online_overlap.csv").Rows, r => r.Text("method") == key);
    }

    [Fact]
    public void Every_shape_says_its_formula_and_source()
    {
        Assert.All(SpendingShape.All, s => Assert.Matches(@"\((17|19|20)\d\d\), ", s.Source));
        Assert.All(SpendingShape.All, s => Assert.NotEmpty(s.Formula));
        Assert.Null(SpendingShape.Find("JM"));
    }
}
