using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.TrueNulls;

namespace Campaigns.Statistics.Tests.TrueNulls;

public sealed class QValuesTests
{
    [Fact]
    public void Q_values_are_those_of_the_exact_table_where_the_share_can_be_estimated()
    {
        int compared = 0;
        foreach (IGrouping<string, ReferenceRow> set in ReferenceTable.Read("campaign/storey_q.csv").Rows.GroupBy(r => r.Text("set")))
        {
            PValue[] p = [.. set.Select(r => PValue.FromValue(r.Number("p")))];
            foreach ((string column, TrueNullShare share) in new[] { ("q_lambda0.5", TrueNullShare.Estimate(p)), ("q_boot", TrueNullShare.EstimateByBootstrap(p)), ("q_smoother", TrueNullShare.EstimateBySmoother(p)) })
            {
                if (QValues.Of(p, share) is not { } q)
                {
                    Assert.All(set, row => Assert.Equal(0, row.Number(column)));
                    continue;
                }

                foreach ((ReferenceRow row, PValue value) in set.Zip(q))
                {
                    double expected = row.Number(column);
                    Assert.InRange(value.Value, (expected * (1 - 1e-14)) - double.Epsilon, (expected * (1 + 1e-14)) + double.Epsilon);
                    compared++;
                }
            }
        }

        Assert.InRange(compared, 3000, 4000);
    }

    [Fact]
    public void Below_the_range_of_doubles_the_logarithm_is_right_and_only_zero_is_zero()
    {
        PValue[] p = [PValue.FromLog(-5000), PValue.FromValue(0.6), PValue.FromValue(0), PValue.FromLog(-4000)];
        PValue[] q = QValues.Of(p, TrueNullShare.Estimate(p))!;

        // One of four lies above 1/2: a share of 1/2.
        Assert.Equal(-5000 + Math.Log(0.5 * 4 / 2), q[0].Log, 1e-11);
        Assert.Equal(-4000 + Math.Log(0.5 * 4 / 3), q[3].Log, 1e-11);
        Assert.Equal(double.NegativeInfinity, q[2].Log);
        Assert.Equal(0.3, q[1].Value, 1e-16);
    }
}
