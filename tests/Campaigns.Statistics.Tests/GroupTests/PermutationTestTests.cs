using System.Globalization;
using System.Numerics;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Permutation;
using Campaigns.Statistics.Tests.External;
using Campaigns.Statistics.Tests.Permutation;

namespace Campaigns.Statistics.Tests.GroupTests;

public sealed class PermutationTestTests
{
    private static readonly PermutationTest Permutation = new();

    [Fact]
    public void Published_examples_get_their_exact_counts()
    {
        // Enumerated in Python with whole numbers; NIST/SEMATECH e-Handbook 7.4.3, a course page, Hollander and Wolfe 1973, and made-up layouts with ties.
        int seen = 0;
        foreach (ReferenceRow row in ReferenceTable.Read("experiment/permutation_f.csv").Rows)
        {
            seen++;
            TestOutcome outcome = Sample(row.Text("data")).Test(Permutation);
            if (row.Text("experiment") == "all_equal")
            {
                Assert.Equal(NotTestableReason.ConstantResponse, Assert.IsType<NotTestable>(outcome).Reason);
                continue;
            }

            Tested tested = Assert.IsType<Tested>(outcome);
            Assert.Equal(new Resampling(row.Integer("count_total"), row.Integer("count_ge"), null), tested.Resampling);
            Assert.True(tested.Resampling!.IsExact);
            Assert.Equal(row.Number("p_exact"), tested.P.Value);
        }

        Assert.Equal(7, seen);
    }

    [Fact]
    public void Statistic_and_table_are_those_of_the_F_test()
    {
        foreach (ReferenceRow row in ReferenceTable.Read("experiment/permutation_f.csv").Rows.Where(r => r.Has("p_f_test")))
        {
            TypedSample sample = Sample(row.Text("data"));
            Tested f = Assert.IsType<Tested>(sample.Test(new FTest()));
            Tested permutation = Assert.IsType<Tested>(sample.Test(Permutation));
            Assert.Equal(f.Statistic, permutation.Statistic);
            Assert.Equal(f.Variation, permutation.Variation);
            Assert.Equal((f.GroupCount, f.ObservationCount), (permutation.GroupCount, permutation.ObservationCount));
            Assert.Null(permutation.Df1);
            Assert.Null(permutation.Df2);
        }
    }

    [Fact]
    public void Tiny_layouts_agree_with_brute_force()
    {
        var random = new Random(2);
        int[][] designs = [[1, 2], [2, 2], [1, 1, 2], [1, 4], [3, 3], [2, 2, 2], [1, 2, 3], [1, 1, 1, 3], [2, 2, 3], [1, 3, 3], [2, 2, 2, 1], [4, 4]];
        foreach (int[] sizes in designs)
        {
            int[] labels = [.. sizes.SelectMany((n, g) => Enumerable.Repeat(g, n))];
            for (int i = 0; i < 12; i++)
            {
                // Few values make ties everywhere; wide ones need the exact comparison, and factors of ten the common divisor.
                long spread = (i % 4) switch { 0 => 2, 1 => 4, 2 => 1000, _ => 1L << 40 };
                BigInteger factor = i % 3 == 0 ? 1 : BigInteger.Pow(10, 7 * i);
                BigInteger[] values = [.. labels.Select(_ => (random.NextInt64(spread) * factor) + (i % 2 == 0 ? 0 : random.Next(2)))];
                TestOutcome outcome = new TypedSample(values, 3, [.. labels.Select(l => (ushort)l)], sizes.Length).Test(Permutation);
                if (outcome is Tested tested)
                {
                    (long asExtreme, long all) = BruteForce.Count(values, labels);
                    Assert.Equal(new Resampling(all, asExtreme, null), tested.Resampling);
                }
                else
                {
                    Assert.Single(values.Distinct());
                }
            }
        }
    }

    [Fact]
    public void Two_groups_agree_with_R()
    {
        RProgram.SkipIfAbsent();
        const string Script = """
            for (line in readLines(file("stdin"))) {
              parts <- strsplit(line, ";")[[1]]
              x <- as.numeric(strsplit(parts[1], " ")[[1]]); y <- as.numeric(strsplit(parts[2], " ")[[1]]); z <- c(x, y)
              t <- combn(length(z), length(x), function(i) abs(mean(z[i]) - mean(z[-i])))
              cat(sum(t >= abs(mean(x) - mean(y)) * (1 - 1e-9)), length(t), "\n")
            }
            """;
        var random = new Random(4);
        string[] lines = [.. Enumerable.Range(0, 20).Select(i => string.Join(";", new[] { 3 + (i % 4), 8 }.Select(n => string.Join(" ", Enumerable.Range(0, n).Select(_ => random.Next(5 + (50 * (i % 3))))))))];
        string[] answers = RProgram.Run(Script, string.Join("\n", lines)).Split('\n', StringSplitOptions.RemoveEmptyEntries);
        Assert.Equal(lines.Length, answers.Length);
        for (int i = 0; i < lines.Length; i++)
        {
            long[] counts = [.. answers[i].Split(' ', StringSplitOptions.RemoveEmptyEntries).Select(c => long.Parse(c, CultureInfo.InvariantCulture))];
            Assert.Equal(new Resampling(counts[1], counts[0], null), Assert.IsType<Tested>(Sample(lines[i].Replace(";", "|", StringComparison.Ordinal)).Test(Permutation)).Resampling);
        }
    }

    [Fact]
    public void Random_draws_come_within_four_standard_errors_of_the_exact_p()
    {
        foreach (ReferenceRow row in ReferenceTable.Read("experiment/permutation_f.csv").Rows.Where(r => r.Has("p_f_test")))
        {
            double exact = row.Number("p_exact");
            PermutationScores scores = Scores(row.Text("data"));
            for (ulong seed = 1; seed <= 5; seed++)
            {
                const int Draws = 99_999;
                double p = new Resampling(Draws, RandomArrangements.CountAsExtreme(scores, new RandomDraws(seed, Draws), 1, TestContext.Current.CancellationToken), seed).P.Value;
                Assert.InRange(p, exact - (4 * Math.Sqrt(exact * (1 - exact) / Draws)), exact + (4 * Math.Sqrt(exact * (1 - exact) / Draws)) + (1.0 / Draws));
            }
        }
    }

    [Fact]
    public void Under_exchangeability_p_is_close_to_that_of_the_F_test_where_the_law_is_normal()
    {
        // 5 groups of 20 bell-shaped values: both tests estimate the same tail.
        var random = new Random(8);
        for (int i = 0; i < 5; i++)
        {
            long[] values = [.. Enumerable.Range(0, 100).Select(n => (long)Enumerable.Range(0, 12).Sum(_ => random.Next(1000)) + (n / 20 * 150 * i))];
            var sample = new GroupedSample(values, 2, [.. Enumerable.Range(0, 100).Select(n => (ushort)(n / 20))], 5);
            double f = Assert.IsType<Tested>(new FTest().Test(sample)).P.Value;
            double p = Assert.IsType<Tested>(Permutation.Test(sample, new RandomDraws(1, 9999))).P.Value;
            Assert.InRange(p, (f * 0.8) - 0.002, (f * 1.2) + 0.002);
        }
    }

    [Fact]
    public void The_smallest_p_of_random_draws_is_one_over_draws_plus_one()
    {
        long[] values = [.. Enumerable.Range(0, 40).Select(i => (i / 10 * 1000L) + (i % 10))];
        var sample = new GroupedSample(values, 0, [.. Enumerable.Range(0, 40).Select(i => (ushort)(i / 10))], 4);
        Tested tested = Assert.IsType<Tested>(Permutation.Test(sample, new RandomDraws(3, 999)));
        Assert.Equal(new Resampling(999, 0, 3), tested.Resampling);
        Assert.False(tested.Resampling!.IsExact);
        Assert.Equal(0.001, tested.P.Value);
        Assert.Equal(0.001, PermutationTest.SmallestP([10, 10, 10, 10], 999));
        Assert.Equal(0.5, Assert.IsType<Tested>(Permutation.Test(sample, new RandomDraws(3, 1))).P.Value);
    }

    [Fact]
    public void A_request_without_draws_is_refused()
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => Permutation.Test(new GroupedSample([1L, 2, 3, 4], 0, [0, 0, 1, 1], 2), new RandomDraws(1, 0)));
        Assert.Throws<ArgumentException>(() => Permutation.Test(new GroupedSample([1L, 2], 0, [0, 2], 2)));
    }

    private static PermutationScores Scores(string data)
    {
        (string Group, string Value)[] rows = [.. Rows(data)];
        int decimals = 1;
        long[] values = [.. rows.Select(r => (long)(decimal.Parse(r.Value, CultureInfo.InvariantCulture) * 10))];
        return PermutationScores.Of(new GroupedSample(values, decimals, [.. rows.Select(r => ushort.Parse(r.Group, CultureInfo.InvariantCulture))], 3));
    }

    private static TypedSample Sample(string data) => TypedSample.OfText(Rows(data));

    private static IEnumerable<(string Group, string Value)> Rows(string data) =>
        data.Split('|').SelectMany((group, g) => group.Split(' ', StringSplitOptions.RemoveEmptyEntries).Select(v => (g.ToString(CultureInfo.InvariantCulture), v)));
}
