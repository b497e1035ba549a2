using System.Globalization;

namespace Campaigns.App.Tests.Commands;

public sealed class BoundVerbTests : IDisposable
{
    private readonly Workplace _place = new();

    public BoundVerbTests() => _place.Run("run", Workplace.Demo).Well();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void The_contract_columns_come_first()
    {
        CsvText csv = Csv("GS-09", "GS-04", "GS-03");
        Assert.Equal(["marked", "real_at_least", "false_at_most", "confidence"], csv.Columns[..4]);
        Assert.Equal(["3", "2", "1", "0.95"], csv.Rows.Single()[..4]);
    }

    [Theory]
    [InlineData("0.05", "simes")]
    [InlineData("0.2", "simes")]
    [InlineData("0.05", "any")]
    public void The_bound_of_a_set_is_that_of_closed_testing_by_definition(string level, string dependence)
    {
        // From the results that the program prints: the largest set of experiments that Simes' test does not reject, and then the largest part of the marked set that lies in no rejected one.
        CsvText results = _place.Run("results", "adhesion-screen", "--format", "csv").Well().Csv;
        double[] p = [.. results.Column("p").Select(t => t.Length == 0 ? 1 : CsvText.Number(t))];
        string[] marked = ["GS-09", "GS-02", "GS-37", "GS-48", "GS-08", "GS-25", "GS-30"];
        double alpha = double.Parse(level, CultureInfo.InvariantCulture) / (dependence == "any" ? Enumerable.Range(1, p.Length).Sum(k => 1.0 / k) : 1);
        double[] inside = [.. marked.Select(m => p[Array.IndexOf(results.Column("experiment"), m)]).Order()];
        double[] descending = [.. p.OrderDescending()];
        int falseAtMost = 0;
        for (int part = 1; part < 1 << marked.Length; part++)
        {
            double[] chosen = [.. inside.Where((_, i) => (part >> i & 1) != 0)];

            // A set is rejected if all larger ones are; of those of one size, the one with the largest other p-values is hardest to reject.
            double[] others = [.. descending];
            foreach (double c in chosen)
            {
                others = [.. others.Take(Array.IndexOf(others, c)), .. others.Skip(Array.IndexOf(others, c) + 1)];
            }

            bool isRejected = Enumerable.Range(0, others.Length + 1).All(more => Simes([.. chosen.Concat(others.Take(more)).Order()]) <= alpha);
            falseAtMost = isRejected ? falseAtMost : Math.Max(falseAtMost, chosen.Length);
        }

        CsvText csv = Csv([.. marked, "--level", level, "--dependence", dependence]);
        Assert.Equal(falseAtMost, csv.Numbers("false_at_most").Single());
        Assert.Equal(7 - falseAtMost, csv.Numbers("real_at_least").Single());
        Assert.Equal(dependence, csv.Column("dependence").Single());
        Assert.Equal("1", csv.Column("untested").Single());

        static double Simes(double[] ascending) => ascending.Select((value, j) => ascending.Length * value / (j + 1)).Min();
    }

    [Fact]
    public void All_survivors_are_those_that_survivors_lists()
    {
        string[] codes = _place.Run("survivors", "adhesion-screen", "--format", "csv").Well().Csv.Column("experiment");
        Assert.Equal(Csv(codes).Rows.Single(), Csv("--all-survivors").Rows.Single());
        Assert.Equal(Csv([.. codes, "GS-03"]).Rows.Single(), Csv("--all-survivors", "GS-03").Rows.Single());
    }

    [Fact]
    public void Each_row_of_the_curve_is_the_bound_of_the_set_that_it_stands_for()
    {
        CsvText curve = Csv("--curve");
        Assert.Equal(["k", "experiment", "p", "real_at_least", "false_at_most"], curve.Columns[..5]);
        Assert.Equal(curve.Numbers("p").Order(), curve.Numbers("p"));
        foreach (int k in (int[])[1, 9, 14, 46])
        {
            CsvText set = Csv(curve.Column("experiment")[..k]);
            Assert.Equal(set.Numbers("real_at_least").Single(), curve.Numbers("real_at_least")[k - 1]);
            Assert.Equal(k, curve.Numbers("real_at_least")[k - 1] + curve.Numbers("false_at_most")[k - 1]);
        }
    }

    [Fact]
    public void People_read_what_the_bound_is_and_is_not()
    {
        string text = _place.Run("bound", "adhesion-screen", "GS-09", "GS-48").Well().Out.ReplaceLineEndings(" ");
        Assert.Contains("marked 2: at least 1 real, at most 1 false (95 % confidence)", text, StringComparison.Ordinal);
        Assert.Contains("Marked without a result, counted as p = 1: GS-48.", text, StringComparison.Ordinal);
        Assert.Contains("may be chosen after looking at everything", text, StringComparison.Ordinal);
        Assert.Contains("over all 48 planned experiments", text, StringComparison.Ordinal);
        Assert.Contains("no estimate", text, StringComparison.Ordinal);
        Assert.Contains("does not mean that nothing is real", text, StringComparison.Ordinal);
        Assert.Contains("Simes' inequality", text, StringComparison.Ordinal);
    }

    [Fact]
    public void Unknown_repeated_and_missing_names_are_answered_in_a_sentence()
    {
        _place.Run("bound", "adhesion-screen", "GS-0l").Refused(3, "has no experiment 'GS-0l'; 'GS-01' may be meant");
        _place.Run("bound", "adhesion-screen", "nothing-like-it").Refused(3, "'campaigns results adhesion-screen' lists those it has");
        _place.Run("bound", "adhesion-screen").Refused(2, "Name the experiments");
        _place.Run("bound", "adhesion-screen", "GS-01", "--curve").Refused(2, "--curve");
        _place.Run("bound", "adhesion-screen", "GS-01", "--level", "1").Refused(2, "between 0 and 1");
        Ran twice = _place.Run("bound", "adhesion-screen", "GS-01", "GS-01", "--format", "csv").Well();
        Assert.Equal("1", twice.Csv.Column("marked").Single());
        Assert.Contains("'GS-01' is named more than once; it counts once.", twice.Error, StringComparison.Ordinal);
    }

    private CsvText Csv(params string[] arguments) => _place.Run(["bound", "adhesion-screen", .. arguments, "--format", "csv"]).Well().Csv;
}
