namespace Campaigns.App.Tests.Commands;

public sealed class ReviewsVerbTests : IDisposable
{
    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Fact]
    public void Reviews_are_listed_with_what_stood_behind_them()
    {
        Twice();
        CsvText reviews = _place.Run("reviews", "C", "--format", "csv").Well().Csv;
        Assert.Equal(
            ["review", "taken_at", "plan_version", "files", "rows", "correction", "level", "family_size", "tested", "survivors", "interim", "program_version", "ledger_sequence"], reviews.Columns);
        Assert.Equal(["1", "2026-03-02T09:30:00Z", "0", "1", "10", "bh", "0.05", "3", "2", "1", "false"], reviews.Rows[0][..11]);
        Assert.Equal(["2", "2026-03-09T09:30:00Z", "0", "2", "14", "bh", "0.05", "3", "3", "2", "false"], reviews.Rows[1][..11]);
        string table = _place.Run("reviews", "C").Well().Out;
        Assert.Contains("C: 2 reviews, each as it was on its day", table, StringComparison.Ordinal);
        Assert.Contains("0 as it was sealed", table, StringComparison.Ordinal);
        Assert.Equal(["", ""], _place.Run("reviews", "C", "--families", "--format", "csv").Well().Csv.Column("family"));
    }

    [Fact]
    public void A_review_gives_back_every_line_as_it_was_stored()
    {
        Twice();
        CsvText lines = _place.Run("reviews", "C", "--lines", "1", "--format", "csv").Well().Csv;
        Assert.Equal(["experiment", "p", "adjusted_p", "survives", "family", "level"], lines.Columns);
        Assert.Equal(["E1", "E2"], lines.Column("experiment"));
        Assert.Equal(["true", "false"], lines.Column("survives"));

        // Benjamini and Hochberg in a family of three: the smaller p-value times 3.
        Assert.Equal(3 * CsvText.Number(lines.Value("E1", "p")), CsvText.Number(lines.Value("E1", "adjusted_p")), 1e-15);
        Assert.Contains("Review 1 of 2026-03-02 09:30 UTC: 1 of 2 tested experiments survive, in a family of 3.", _place.Run("reviews", "C", "--lines", "1").Well().Out, StringComparison.Ordinal);
        Assert.Contains("Review 1 of 2026-03-02 09:30 UTC: Benjamini-Hochberg at 0.05 over 3 hypotheses.", _place.Run("reviews", "C", "--lines", "1").Well().Out, StringComparison.Ordinal);
    }

    [Fact]
    public void What_came_between_two_reviews_is_told_with_its_reason()
    {
        Twice();
        Ran ran = _place.Run("reviews", "C", "--compare", "1", "2", "--format", "csv").Well();
        Assert.Equal(
            ["experiment", "change", "p_before", "p_after", "adjusted_p_before", "adjusted_p_after", "reason", "events", "family", "family_size_before", "family_size_after", "because", "family_events"], ran.Csv.Columns);
        Assert.Equal(["E3", "gained", "", "first-tested", "first tested since the earlier review"], [ran.Csv.Value("E3", "experiment"), ran.Csv.Value("E3", "change"), ran.Csv.Value("E3", "p_before"), ran.Csv.Value("E3", "reason"), ran.Csv.Value("E3", "because")]);
        Assert.Equal("Between review 1 and review 2: 1 gained, 0 lost, 1 survive in both.\n", ran.Error);
        string table = _place.Run("reviews", "C", "--compare", "1", "2").Well().Out;
        Assert.Contains("with the same verdict and another adjusted p-value: 1.", table.ReplaceLineEndings(" "), StringComparison.Ordinal);
        Assert.Contains("Level and correction are those of the sealed plan in both: Benjamini-Hochberg at 0.05.", table, StringComparison.Ordinal);

        Assert.Contains("Nothing changed between review 2 and review 2", _place.Run("reviews", "C", "--compare", "2", "2").Well().Out, StringComparison.Ordinal);
    }

    [Fact]
    public void Values_that_came_by_an_amendment_are_named_with_the_reason_given()
    {
        Twice();
        _place.Run("load", "C", _place.Write("late.csv", "experiment,group,value\n" + string.Concat(Enumerable.Range(0, 8).Select(i => $"E2,a,5.{i}\nE2,b,9.{i}\n"))), "--amend", "a second plate").Well();
        _place.Run("test", "C").Well();
        _place.Run("review", "C").Well();
        CsvText compared = _place.Run("reviews", "C", "--compare", "2", "3", "--format", "csv").Well().Csv;
        string change = Assert.Single(compared.Column("change"));
        Assert.Equal(("gained", "own-p", "added-values"), (change, compared.Column("reason")[0], compared.Column("events")[0]));
        Assert.Contains("values added after its test (a second plate)", compared.Column("because")[0], StringComparison.Ordinal);
    }

    [Fact]
    public void History_has_a_column_a_review_for_people_and_a_row_each_for_scripts()
    {
        Twice();
        string table = _place.Run("history", "C").Well().Out;
        Assert.Contains("experiment  review 1  review 2", table, StringComparison.Ordinal);
        Assert.Contains("E1          survives  survives", table, StringComparison.Ordinal);
        Assert.Contains("E2          no        no", table, StringComparison.Ordinal);
        Assert.Contains("E3          -         survives", table, StringComparison.Ordinal);
        Assert.Contains("survives, no: what the review found on its day; -: no line in that review", table, StringComparison.Ordinal);

        CsvText history = _place.Run("history", "C", "--format", "csv").Well().Csv;
        Assert.Equal(["experiment", "review", "taken_at", "p", "adjusted_p", "survives"], history.Columns);
        Assert.Equal(["E1", "E1", "E2", "E2", "E3", "E3"], history.Column("experiment"));
        Assert.Equal(["true", "true", "false", "false", "", "true"], history.Column("survives"));
        Assert.Equal(["E3", "E3"], _place.Run("history", "C", "--changed", "--format", "csv").Well().Csv.Column("experiment"));
    }

    [Fact]
    public void A_review_taken_twice_changes_nothing()
    {
        Twice();
        byte[] before = File.ReadAllBytes(_place.Catalog);
        Assert.Contains("Nothing changed since review 2 of C", _place.Run("review", "C").Well().Out, StringComparison.Ordinal);
        Assert.Equal(before, File.ReadAllBytes(_place.Catalog));
    }

    [Fact]
    public void Questions_that_cannot_be_answered_are_refused_in_a_sentence()
    {
        Twice();
        _place.Run("reviews", "C", "--lines", "3").Refused(3, "no review 3", "reviews 1 to 2");
        _place.Run("reviews", "C", "--compare", "2", "1").Refused(2, "--compare 1 2");
        _place.Run("reviews", "C", "--compare", "1", "x").Refused(2, "not 'x'");
        _place.Run("reviews", "C", "--compare", "1").Refused(2, "--compare");
        _place.Run("reviews", "C", "--compare", "1", "2", "--families").Refused(2, "one at a time");
        _place.Run("reviews", "D").Refused(3, "There is no campaign 'D'");
        _place.Run("start", "D").Well();
        Assert.Contains("No review was taken yet", _place.Run("reviews", "D").Well().Out, StringComparison.Ordinal);
        _place.Run("history", "D").Refused(3, "no review yet");
    }

    /// <summary>Three planned experiments, two with data at the first review, all at the second a week later.</summary>
    private void Twice()
    {
        _place.Run("run", _place.Campaign("C", "experiment\nE1\nE2\nE3\n", Workplace.TwoExperiments)).Well();
        _place.Clock.Advance(TimeSpan.FromDays(7));
        _place.Run("load", "C", _place.Write("week-02.csv", "experiment,group,value\nE3,a,1.0\nE3,a,1.1\nE3,b,4.0\nE3,b,4.1\n")).Well();
        _place.Run("test", "C").Well();
        _place.Run("review", "C").Well();
    }
}
