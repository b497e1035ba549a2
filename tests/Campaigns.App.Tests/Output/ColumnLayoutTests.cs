using Campaigns.App.Output;

namespace Campaigns.App.Tests.Output;

public sealed class ColumnLayoutTests
{
    private static readonly Column[] Columns =
    [
        new("experiment", "experiment"), new("group", "group", CutLast: true), new("lower", "lower", true, 1, NotWithout: "upper"), new("upper", "upper", true, 1),
        new("p", "p", true), new("unit", "unit", GivesWay: 2),
    ];

    private static readonly string[][] Rows = [["morley", "experiment number 1", "-118.28", "-12.220", "0.0116", "kilometres a second"]];

    [Fact]
    public void An_interval_is_shown_with_both_ends_or_not_at_all() => Assert.All(Enumerable.Range(1, 120), width =>
    {
        ColumnLayout layout = ColumnLayout.Of(Columns, Rows, width);
        Assert.Equal(layout.Shown.Contains(2), layout.Shown.Contains(3));
        Assert.Equal(layout.LeftOut.Contains("lower"), layout.LeftOut.Contains("upper"));
        Assert.Equal(Columns.Length, layout.Shown.Count + layout.LeftOut.Count);
    });

    [Fact]
    public void A_name_is_whole_while_there_is_a_column_that_gives_way_and_cut_before_one_of_weight_goes() => Assert.All(Enumerable.Range(1, 120), width =>
    {
        ColumnLayout layout = ColumnLayout.Of(Columns, Rows, width);
        int at = layout.Shown.ToList().IndexOf(1);
        if (layout.LeftOut.Count < 3)
        {
            Assert.Equal("experiment number 1".Length, layout.Widths[at]);
        }

        // experiment 10, a cut name 8, p 6, two gaps of 2.
        Assert.Equal(width >= 28, layout.Shown.Contains(4));
    });
}
