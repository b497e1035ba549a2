using System.Globalization;
using System.Numerics;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.TrueNulls;

namespace Campaigns.Statistics.Tests.TrueNulls;

public sealed class TrueNullShareTests(ITestOutputHelper output)
{
    private const int Seed = 20260503;

    private static readonly ILookup<string, PValue> Vectors =
        ReferenceTable.Read("campaign/pvectors.csv").Rows.ToLookup(r => r.Text("set"), r => PValue.FromValue(r.Number("p")));

    [Fact]
    public void The_three_estimates_are_those_of_the_exact_table_capped_at_one()
    {
        foreach (ReferenceRow row in ReferenceTable.Read("campaign/storey_pi0.csv").Rows)
        {
            PValue[] p = [.. Vectors[row.Text("set")]];
            Close(row.Number("pi0_lambda0.5"), TrueNullShare.Estimate(p));
            TrueNullShare bootstrap = TrueNullShare.EstimateByBootstrap(p);
            Close(row.Number("pi0_boot"), bootstrap);
            Assert.Equal(row.Number("boot_lambda"), bootstrap.Lambda);
            Close(row.Number("pi0_smoother_uncapped"), TrueNullShare.EstimateBySmoother(p));
        }
    }

    [Fact]
    public void The_smoother_is_the_smoothing_spline_of_R_as_near_as_that_comes_to_three_degrees_of_freedom()
    {
        RProgram.SkipIfAbsent();
        const string Script = """
            lines <- readLines(file("stdin")); lam <- (1:19) / 20
            for (l in lines) { p <- as.numeric(strsplit(l, " ", fixed = TRUE)[[1]])
              f <- smooth.spline(lam, sapply(lam, function(x) mean(p > x) / (1 - x)), df = 3); cat(sprintf("%.17g\n", predict(f, 0.95)$y)) }
            """;
        var random = new Random(Seed);
        double[][] vectors = [.. Enumerable.Range(0, 50).Select(_ => Mixture(random, random.Next(50, 500)))];
        string[] lines = RProgram.Run(Script, string.Join('\n', vectors.Select(v => string.Join(' ', v.Select(x => x.ToString("R", CultureInfo.InvariantCulture)))))).Split('\n', StringSplitOptions.RemoveEmptyEntries);
        Assert.Equal(vectors.Length, lines.Length);
        double largest = 0;
        foreach ((double[] vector, string line) in vectors.Zip(lines))
        {
            double theirs = double.Parse(line, CultureInfo.InvariantCulture);
            largest = Math.Max(largest, Math.Abs(TrueNullShare.EstimateBySmoother([.. vector.Select(PValue.FromValue)]).Share!.Value - Math.Min(1, theirs)));
        }

        output.WriteLine(FormattableString.Invariant($"seed {Seed}; largest difference from R: {largest:g3}"));
        Assert.InRange(largest, 0, 2e-4);
    }

    [Fact]
    public void The_bootstrap_without_draws_is_where_the_published_one_goes_with_many()
    {
        // Storey (2002), section 9: draw p-values with replacement, estimate at each lambda, take the lambda of least mean squared distance from the least original estimate.
        var random = new Random(Seed + 1);
        double[] vector = Mixture(random, 200);
        const int Draws = 4000;
        double[] original = Estimates(vector);
        double[] errors = new double[19];
        for (int draw = 0; draw < Draws; draw++)
        {
            double[] drawn = Estimates([.. vector.Select(_ => vector[random.Next(vector.Length)])]);
            for (int k = 0; k < 19; k++)
            {
                errors[k] += (drawn[k] - original.Min()) * (drawn[k] - original.Min()) / Draws;
            }
        }

        TrueNullShare share = TrueNullShare.EstimateByBootstrap([.. vector.Select(PValue.FromValue)]);
        int chosen = (int)Math.Round(share.Lambda!.Value * 20) - 1;
        Assert.InRange(errors[chosen], errors.Min(), errors.Min() * 1.15);
        Assert.True(errors.Max() > 2 * errors.Min(), "The choice matters in this vector.");
        Assert.Equal(Math.Min(1, original[chosen]), share.Share!.Value, 1e-14);
    }

    [Fact]
    public void The_least_error_is_found_in_exact_fractions_with_ties_to_the_smallest_lambda()
    {
        var random = new Random(Seed + 2);
        for (int trial = 0; trial < 2000; trial++)
        {
            double[] vector = [.. Enumerable.Range(0, random.Next(1, 25)).Select(_ => random.Next(3) == 0 ? random.NextDouble() : random.Next(21) / 20.0)];
            int m = vector.Length;
            BigInteger[] above = [.. Enumerable.Range(1, 19).Select(k => (BigInteger)vector.Count(p => p > k / 20.0))];

            // All on the common denominator m^3 (19!)^2, up to one factor: the estimate at k is 20 W / (m (20 - k)).
            BigInteger common = Enumerable.Range(1, 19).Aggregate(BigInteger.One, (a, b) => a * b);
            BigInteger[] estimates = [.. above.Select((w, k) => w * common / (19 - k))];
            BigInteger[] errors = [.. above.Select((w, k) => (w * (m - w) * BigInteger.Pow(common / (19 - k), 2)) + (m * BigInteger.Pow(estimates[k] - estimates.Min(), 2)))];
            Assert.Equal((Array.IndexOf(errors, errors.Min()) + 1) / 20.0, TrueNullShare.EstimateByBootstrap([.. vector.Select(PValue.FromValue)]).Lambda);
        }
    }

    [Fact]
    public void Counts_go_by_twentieths_as_they_are_read_not_by_multiples_of_a_rounded_one()
    {
        // 3 * 0.05 is above 0.15 in doubles. A p-value at lambda is not above it: at 0.15 half of these are counted.
        PValue[] p = [.. new[] { 0.15, 0.15, 0.16, 0.9 }.Select(PValue.FromValue)];
        Assert.Equal(2 / (4 * 0.85), TrueNullShare.Estimate(p, 0.15).Share!.Value, 1e-15);
        for (int k = 1; k <= 19; k++)
        {
            PValue[] at = [.. Enumerable.Repeat(PValue.FromValue(k / 20.0), 7), PValue.One];
            Assert.Equal(Math.Min(1, 1 / (8 * (1 - (k / 20.0)))), TrueNullShare.Estimate(at, k / 20.0).Share!.Value, 1e-15);

            // All between: the sum over the spline's weights sees each count.
            double expected = Spline([.. at.Select(x => x.Value)]);
            Assert.Equal(Math.Min(1, expected), TrueNullShare.EstimateBySmoother(at).Share ?? expected, 1e-13);
        }
    }

    [Fact]
    public void Where_no_p_value_is_large_or_there_is_none_the_reason_is_told()
    {
        PValue[] small = [.. Enumerable.Repeat(PValue.FromValue(0.01), 30)];
        foreach (TrueNullShare share in (TrueNullShare[])[TrueNullShare.Estimate(small), TrueNullShare.EstimateByBootstrap(small), TrueNullShare.EstimateBySmoother(small)])
        {
            Assert.Null(share.Share);
            Assert.Contains("cannot be estimated", share.Reason, StringComparison.Ordinal);
            Assert.Null(QValues.Of(small, share));
        }

        Assert.Contains("no p-value lies above 0.5", TrueNullShare.Estimate(small).Reason, StringComparison.Ordinal);
        foreach (TrueNullShare share in (TrueNullShare[])[TrueNullShare.Estimate([]), TrueNullShare.EstimateByBootstrap([]), TrueNullShare.EstimateBySmoother([])])
        {
            Assert.Null(share.Share);
            Assert.Null(share.Lambda);
            Assert.Contains("there is no p-value", share.Reason, StringComparison.Ordinal);
        }
    }

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(-0.5)]
    [InlineData(double.NaN)]
    public void A_lambda_outside_0_to_1_is_refused(double lambda) =>
        Assert.Throws<ArgumentOutOfRangeException>(() => TrueNullShare.Estimate([PValue.One], lambda));

    private static void Close(double uncapped, TrueNullShare share)
    {
        if (uncapped <= 0)
        {
            Assert.Null(share.Share);
            Assert.NotNull(share.Reason);
            return;
        }

        Assert.Null(share.Reason);
        Assert.Equal(1, share.Share!.Value / Math.Min(1, uncapped), 1e-14);
    }

    private static double[] Mixture(Random random, int count) =>
        [.. Enumerable.Range(0, count).Select(_ => random.Next(4) == 0 ? Math.Pow(random.NextDouble(), 8) : random.NextDouble())];

    private static double[] Estimates(double[] vector) =>
        [.. Enumerable.Range(1, 19).Select(k => vector.Count(p => p > k / 20.0) / (vector.Length * (1 - (k / 20.0))))];

    private static double Spline(double[] vector) =>
        ReferenceTable.Read("campaign/storey_smoother_constants.csv").Rows.Zip(Estimates(vector), (row, estimate) => row.Number("c_k") * estimate).Sum();
}
