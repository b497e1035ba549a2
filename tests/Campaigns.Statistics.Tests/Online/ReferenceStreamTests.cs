using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.External;

namespace Campaigns.Statistics.Tests.Online;

/// <summary>Shapes and streams against 60-digit arithmetic written from the publications' definitions (campaign/generate/06_online.py).</summary>
public sealed class ReferenceStreamTests
{
    private static readonly SignificanceLevel Level = new(0.05);

    [Fact]
    public void Shares_of_every_shape_are_those_of_the_table()
    {
        (string Column, string Shape, int? Horizon)[] columns =
        [
            .. from shape in SpendingShape.All where shape.SumOfAll is not null select (shape.Key, shape.Key, (int?)null),
            .. from shape in SpendingShape.All select (shape.Key + "/20", shape.Key, (int?)20),
        ];
        foreach (ReferenceRow row in ReferenceTable.Read("campaign/online_gamma.csv").Rows)
        {
            foreach ((string column, string shape, int? horizon) in columns)
            {
                AssertNear(row.Number(column), SpendingShape.Find(shape)!.Share(row.Integer("j"), horizon), 2e-15, column + " " + row.Text("j"));
            }
        }
    }

    [Fact]
    public void Every_level_and_decision_of_the_published_stream_is_met()
    {
        foreach (IGrouping<string, ReferenceRow> rows in Streams("campaign/online_traces.csv", false))
        {
            OnlineStream stream = Start(rows.First());
            foreach (ReferenceRow row in rows)
            {
                OnlineLevel given = stream.Register();
                Assert.Equal(row.Integer("t"), given.Position);
                AssertNear(row.Number("alpha_t"), given.Level, 1e-15, rows.Key + " " + row.Text("t"));
                Assert.Equal(row.Integer("reject") == 1, stream.Report(given.Position, PValue.FromValue(row.Number("p"))));
            }
        }
    }

    [Fact]
    public void Every_level_and_decision_of_overlapping_streams_is_met()
    {
        foreach (IGrouping<string, ReferenceRow> rows in Streams("campaign/online_overlap.csv", true))
        {
            OnlineStream stream = Start(rows.First());
            foreach (ReferenceRow row in rows)
            {
                if (row.Text("event") == "start")
                {
                    OnlineLevel given = stream.Register();
                    Assert.Equal(row.Integer("t"), given.Position);
                    AssertNear(row.Number("alpha_t"), given.Level, 1e-15, rows.Key + " " + row.Text("t"));
                }
                else
                {
                    Assert.Equal(row.Integer("reject") == 1, stream.Report(row.Integer("t"), PValue.FromValue(row.Number("p"))));
                }
            }

            Assert.Equal((40, 40), (stream.Started, stream.Finished));
            Assert.Equal(rows.Count(r => r.Text("reject") == "1"), stream.Rejections);
        }
    }

    // Rejections of the stream of 20 as worked out step by step with the publications' formulas.
    [Theory]
    [InlineData("alpha-spending", "p1.6", null, "2 5 11 17")]
    [InlineData("alpha-spending", "uniform", 20, "2 5 8 11 13 17 20")]
    [InlineData("lond", null, null, "2 5 11 17 20")]
    [InlineData("lord", null, null, "5 11 17 20")]
    [InlineData("lord", null, 20, "2 5 8 11 13 17 18 20")]
    [InlineData("saffron", null, null, "2 5 8 11 13 17 18 20")]
    [InlineData("addis", null, null, "2 5 8 11 13 17 18 20")]
    [InlineData("addis-spending", null, null, "2 5 11 17 20")]
    public void The_defaults_reject_what_they_should(string key, string? shape, int? horizon, string rejected)
    {
        OnlineProcedure procedure = OnlineRegistry.Find(key)!;
        OnlineStream stream = procedure.Start(OnlineSettings.For(procedure, Level, horizon, shape));
        double[] p = [.. ReferenceTable.Read("campaign/online_traces.csv").Rows.Take(20).Select(r => r.Number("p"))];
        Assert.Equal(rejected, string.Join(' ', Enumerable.Range(1, 20).Where(t => stream.Report(stream.Register().Position, PValue.FromValue(p[t - 1])))));
    }

    private static IEnumerable<IGrouping<string, ReferenceRow>> Streams(string table, bool schedules) =>
        ReferenceTable.Read(table).Rows.GroupBy(r => string.Join(
            ' ', r.Text("method"), r.Text("shape"), r.Text("horizon"), r.Text("initial_wealth"), r.Text("lambda"), r.Text("tau"), schedules ? r.Text("schedule") : ""));

    private static OnlineStream Start(ReferenceRow row)
    {
        OnlineProcedure procedure = OnlineRegistry.Find(row.Text("method"))!;
        double? Number(string column) => row.Has(column) ? row.Number(column) : null;
        return procedure.Start(OnlineSettings.For(
            procedure, Level, row.Has("horizon") ? row.Integer("horizon") : null, row.Text("shape"), Number("initial_wealth"), Number("lambda"), Number("tau")));
    }

    private static void AssertNear(double expected, double actual, double relative, string what) =>
        Assert.True(Math.Abs(expected - actual) <= relative * expected, FormattableString.Invariant($"{what}: {actual:R} instead of {expected:R}"));
}
