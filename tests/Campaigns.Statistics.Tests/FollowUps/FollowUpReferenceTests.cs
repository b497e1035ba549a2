using Campaigns.Statistics.FollowUps;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.GroupTests;

namespace Campaigns.Statistics.Tests.FollowUps;

/// <summary>Every pair of 200 random experiments and of the published examples against pairs.csv, dunnett.csv and their like: differences in exact rational arithmetic, tails by another implementation of the quadrature (p to about 1e-14, checked in quadruple precision).</summary>
public sealed class FollowUpReferenceTests(ITestOutputHelper output)
{
    [Theory]
    [InlineData("experiments_data.csv", "pairs.csv", 4766)]
    [InlineData("worked_examples_data.csv", "worked_examples_pairs.csv", null)]
    public void All_pairs_agree_with_the_reference(string data, string table, int? count)
    {
        IReadOnlyList<ReferenceRow> truths = ReferenceTable.Read("experiment/" + table).Rows;
        Assert.Equal(count ?? truths.Count, truths.Count);
        var worst = new SortedDictionary<string, double>();
        ILookup<string, (string, string)> values = Values(data);
        foreach (IGrouping<string, ReferenceRow> experiment in truths.GroupBy(r => r.Text("experiment")))
        {
            GroupEstimates estimates = TypedSample.OfDoubles(values[experiment.Key]).Estimates()!;
            ReferenceRow[] rows = [.. experiment];
            IReadOnlyList<GroupComparison> tukey = Lines("tukey-kramer"), games = Lines("games-howell"), holm = Lines("holm-pairs"), scheffe = Lines("scheffe");
            for (int i = 0; i < rows.Length; i++)
            {
                ReferenceRow row = rows[i];
                Check(row, tukey[i].Difference, "diff", 1e-13);
                Check(row, Math.Abs(tukey[i].Statistic!.Value), "q", 1e-13);
                CheckP(row, tukey[i], "tukey_p");
                Check(row, tukey[i].Lower!.Value, "tukey_lo95", 1e-13, row.Number("tukey_hi95") - row.Number("tukey_lo95"));
                Check(row, tukey[i].Upper!.Value, "tukey_hi95", 1e-13, row.Number("tukey_hi95") - row.Number("tukey_lo95"));
                Check(row, holm[i].Statistic!.Value, "t_pooled", 1e-13);
                CheckP(row, holm[i], "p_holm");
                CheckP(row, scheffe[i], "p_scheffe");
                Assert.Equal(row.Has("gh_p"), games[i].P is not null);
                if (row.Has("gh_p"))
                {
                    Check(row, Math.Abs(games[i].Statistic!.Value), "gh_q", 1e-13);
                    Check(row, games[i].DegreesOfFreedom!.Value, "gh_df", 1e-13);
                    CheckP(row, games[i], "gh_p");
                }
            }

            IReadOnlyList<GroupComparison> Lines(string key)
            {
                IReadOnlyList<GroupComparison> lines = FollowUpRegistry.Find(key)!.Compare(estimates, null, 0.95);
                Assert.Equal(rows.Length, lines.Count);
                return lines;
            }
        }

        output.WriteLine(string.Join(", ", worst.Select(w => FormattableString.Invariant($"{w.Key} {w.Value:E1}"))));

        void Check(ReferenceRow row, double ours, string column, double tolerance, double scale = 0)
        {
            double truth = row.Number(column);
            double error = Math.Abs(ours - truth) / Math.Max(scale, Math.Abs(truth));
            error = ours == truth ? 0 : error;
            Assert.True(error <= tolerance, FormattableString.Invariant($"{row.Text("experiment")} {row.Text("group_a")} {row.Text("group_b")}: {column} {ours:R} instead of {truth:R}, off by {error:E1}"));
            worst[column] = Math.Max(worst.GetValueOrDefault(column), error);
        }

        // A relative error e of the statistic moves ln p by up to df e, and 1e-16 of |ln p| cannot be had: down to 1e-300 that stays below 1e-11.
        void CheckP(ReferenceRow row, GroupComparison line, string column)
        {
            if (row.Number(column) > 1e-300)
            {
                Check(row, line.P!.Value.Value, column, 1e-11);
            }
            else
            {
                Assert.True(line.P!.Value.Log < -690 && double.IsFinite(line.P.Value.Log));
            }
        }
    }

    [Theory]
    [InlineData("experiments_data.csv", "dunnett.csv")]
    [InlineData("worked_examples_data.csv", "worked_examples_dunnett.csv")]
    public void Comparisons_with_a_control_agree_with_the_reference(string data, string table)
    {
        double worst = 0;
        ILookup<string, (string, string)> values = Values(data);
        foreach (IGrouping<string, ReferenceRow> experiment in ReferenceTable.Read("experiment/" + table).Rows.GroupBy(r => r.Text("experiment")))
        {
            IReadOnlyList<GroupComparison> lines = FollowUpRegistry.Find("dunnett")!.Compare(TypedSample.OfDoubles(values[experiment.Key]).Estimates()!, 0, 0.95);
            Assert.Equal(experiment.Count(), lines.Count);
            foreach ((ReferenceRow row, GroupComparison line) in experiment.Zip(lines))
            {
                string what = $"{row.Text("experiment")} {row.Text("group")}";
                double width = row.Number("hi95") - row.Number("lo95");
                Relative.AssertNear(row.Number("t"), line.Statistic!.Value, 1e-13, what + " t");
                Relative.AssertNear(row.Number("dunnett_p"), line.P!.Value.Value, 1e-11, what + " p");
                Assert.Equal(row.Number("lo95"), line.Lower!.Value, 1e-13 * Math.Max(width, Math.Abs(row.Number("lo95"))));
                Assert.Equal(row.Number("hi95"), line.Upper!.Value, 1e-13 * Math.Max(width, Math.Abs(row.Number("hi95"))));
                worst = Math.Max(worst, Relative.Error(line.P.Value.Value, row.Number("dunnett_p")));
            }
        }

        output.WriteLine(FormattableString.Invariant($"largest relative error of p: {worst:E1}"));
    }

    /// <summary>multcomp's own figures, whose multivariate t integral is a Monte Carlo one: p within 1e-4, the critical value within 2e-3.</summary>
    [Fact]
    public void Dunnett_agrees_with_the_package_multcomp_of_R_to_its_accuracy()
    {
        ILookup<string, (string, string)> values = Values("worked_examples_data.csv");
        foreach (IGrouping<string, ReferenceRow> experiment in ReferenceTable.Read("experiment/worked_examples_dunnett_r.csv").Rows.GroupBy(r => r.Text("experiment")))
        {
            IReadOnlyList<GroupComparison> lines = FollowUpRegistry.Find("dunnett")!.Compare(TypedSample.OfText(values[experiment.Key]).Estimates()!, 0, 0.95);
            foreach ((ReferenceRow row, GroupComparison line) in experiment.Zip(lines))
            {
                Assert.Equal(row.Number("dunnett_p"), line.P!.Value.Value, 1e-4);
                double critical = (line.Upper!.Value - line.Lower!.Value) / 2 * Math.Abs(line.Statistic!.Value / line.Difference);
                Assert.Equal(row.Number("crit95"), critical, 2e-3);
            }
        }
    }

    internal static ILookup<string, (string Group, string Value)> Values(string file) =>
        ReferenceTable.Read("experiment/" + file).Rows.ToLookup(r => r.Text("experiment"), r => (r.Text("group"), r.Text("value")));
}
