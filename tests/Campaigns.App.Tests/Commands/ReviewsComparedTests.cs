namespace Campaigns.App.Tests.Commands;

/// <summary>reviews --compare where decisions about other experiments, not results, made the difference: they are named.</summary>
public sealed class ReviewsComparedTests : IDisposable
{
    private readonly Workplace _place = new() { Width = 1000 };

    public void Dispose() => _place.Dispose();

    [Fact]
    public void A_gate_that_a_withdrawal_opened_and_an_amendment_closed_names_what_did_it()
    {
        // The gate of extra waits for all of secondary, of which S3 has no data.
        string folder = ThreeFamilies.Folder(_place, 0.8);
        _place.Write("F/plan.csv", ThreeFamilies.Plan.TrimEnd() + "\nS3,Never done,a|b|c,holm-pairs,1,secondary,\n");
        _place.Run("run", folder).Well();
        Assert.Equal("false", _place.Run("families", "F", "--format", "csv").Well().Csv.Value("extra", "open"));
        _place.Run("withdraw", "F", "S3", "P3", "--reason", "panels were lost").Well();
        _place.Run("review", "F").Well();
        Ran compared = _place.Run("reviews", "F", "--compare", "1", "2", "--format", "csv").Well();
        Assert.Equal(("gained", "family-opened", "S3 withdrawal"), (compared.Csv.Value("X1", "change"), compared.Csv.Value("X1", "reason"), compared.Csv.Value("X1", "family_events")));
        Assert.Equal("the gate of its family opened: in family secondary S3 withdrawn (panels were lost)", compared.Csv.Value("X1", "because"));
        string table = _place.Run("reviews", "F", "--compare", "1", "2").Well().Out;
        Assert.Contains("Hypotheses counted: family primary from 3 to 2, family secondary from 3 to 2.", table, StringComparison.Ordinal);
        Assert.Contains("Decided between the two: 1 withdrawn in family primary; 1 withdrawn in family secondary.", table, StringComparison.Ordinal);

        _place.Run("plan", "F", _place.Write("more.csv", "experiment,groups,weight,family\nS4,a|b|c,1,secondary\n"), "--reason", "a further resin").Well();
        _place.Run("review", "F").Well();
        compared = _place.Run("reviews", "F", "--compare", "2", "3", "--format", "csv").Well();
        Assert.Equal(("lost", "family-closed", "S4 amended-in"), (compared.Csv.Value("X1", "change"), compared.Csv.Value("X1", "reason"), compared.Csv.Value("X1", "family_events")));
        Assert.Contains("in family secondary S4 added by an amendment of the plan (a further resin)", compared.Csv.Value("X1", "because"), StringComparison.Ordinal);
        Assert.Contains("The plan was amended between the two: plan version 0, as it was sealed, at the earlier review, plan version 1 at the later one.", _place.Run("reviews", "F", "--compare", "2", "3").Well().Out, StringComparison.Ordinal);
    }

    [Fact]
    public void A_gate_that_results_opened_says_in_which_family_they_came()
    {
        string folder = ThreeFamilies.Folder(_place, 0.05);
        _place.Run("run", folder).Well();
        IEnumerable<string> rows = "abc".SelectMany(g => Enumerable.Range(0, 40).Select(i => FormattableString.Invariant($"S2,{g},{(g == 'c' ? 9 : 1)}.{i % 7}\n")));
        _place.Run("load", "F", _place.Write("more.csv", "experiment,group,value\n" + string.Concat(rows)), "--amend", "a second plate").Well();
        _place.Run("test", "F").Well();
        _place.Run("review", "F").Well();
        CsvText compared = _place.Run("reviews", "F", "--compare", "1", "2", "--format", "csv").Well().Csv;
        Assert.Equal("the gate of its family opened: in family secondary 1 result new, changed or gone, S2 values added after its test (a second plate)", compared.Value("X1", "because"));
    }

    [Fact]
    public void A_family_that_shrank_names_who_left_it()
    {
        // E1 survives alone and not in a family of 41.
        string[] many = [.. Enumerable.Range(3, 40).Select(i => FormattableString.Invariant($"E{i}"))];
        const string Measured = "experiment,group,value\nE1,a,1.0\nE1,a,1.3\nE1,a,0.7\nE1,b,1.6\nE1,b,1.9\nE1,b,1.8\n";
        _place.Run("run", _place.Campaign("C", "experiment\nE1\n" + string.Join('\n', many) + "\n", Measured, correction: "bonferroni")).Well();
        _place.Run(["withdraw", "C", .. many, "--reason", "no time"]).Well();
        _place.Run("review", "C").Well();
        CsvText compared = _place.Run("reviews", "C", "--compare", "1", "2", "--format", "csv").Well().Csv;
        Assert.Equal("its family shrank from 41 to 1 hypotheses (E3 withdrawn (no time), E4 withdrawn (no time), E5 withdrawn (no time) and 37 more)", compared.Value("E1", "because"));
    }

    [Fact]
    public void An_amendment_that_changed_no_line_is_told_with_the_versions_of_the_plan()
    {
        _place.Run("run", _place.Campaign("C", "experiment,title\nE1,one\nE2,two\n", Workplace.TwoExperiments)).Well();
        _place.Run("plan", "C", _place.Write("again.csv", "experiment,title\nE1,first\nE2,two\n"), "--reason", "a clearer title").Well();
        _place.Run("review", "C").Well();
        string said = _place.Run("reviews", "C", "--compare", "1", "2").Well().Out;
        Assert.DoesNotContain("Nothing changed", said, StringComparison.Ordinal);
        Assert.Contains("Between review 1 and review 2 the plan was amended, from plan version 0, as it was sealed, to plan version 1; that changed no line", said, StringComparison.Ordinal);
    }

    [Fact]
    public void Families_tell_who_left_them_and_how_the_plan_was_amended()
    {
        _place.Run("run", ThreeFamilies.Folder(_place, 0.8)).Well();
        _place.Run("withdraw", "F", "P3", "--reason", "never made").Well();
        _place.Run("plan", "F", _place.Write("more.csv", "experiment,groups,weight,family\nS4,a|b|c,1,secondary\n"), "--reason", "a further resin").Well();
        string said = _place.Run("families", "F").Well().Out;
        Assert.Contains("Planned leaves out 1 experiment that left its family, withdrawn before any data.", said, StringComparison.Ordinal);
        Assert.Contains("Withdrawn before any data: 1", said, StringComparison.Ordinal);
        Assert.Contains("The sealed plan was amended", said, StringComparison.Ordinal);
        Assert.Equal("2", _place.Run("families", "F", "--format", "csv").Well().Csv.Value("primary", "planned"));
    }
}
