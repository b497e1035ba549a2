using Campaigns.App.Dashboard.Model;
using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Tests.Dashboard;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;

namespace Campaigns.App.Tests.Commands;

/// <summary>A campaign of several families, from the command line to every output.</summary>
public sealed class FamilyCampaignTests : IDisposable
{
    private readonly Workplace _place = new();

    public void Dispose() => _place.Dispose();

    [Theory]
    [InlineData("open", 2.0)]
    [InlineData("closed", 0.2)]
    public void Every_table_tells_the_families_and_their_gates(string state, double shiftOfLast)
    {
        string run = _place.Run("run", Folder(shiftOfLast)).Well().Out;
        Golden.Match($"families-{state}-run", run);
        foreach (string verb in (string[])["families", "results", "survivors", "comparisons", "corrections", "risk", "show"])
        {
            Golden.Match($"families-{state}-{verb}", _place.Run(verb, "F").Well().Out);
        }

        Golden.Match($"families-{state}-experiment", _place.Run("show", "F", "X1").Well().Out);
    }

    [Fact]
    public void Scripts_read_families_levels_and_gates()
    {
        _place.Run("run", Folder(0.2)).Well();
        CsvText families = _place.Run("families", "F", "--format", "csv").Well().Csv;
        Assert.Equal(["family", "correction", "level", "opens_after", "opens_when", "planned", "tested", "survivors", "open"], families.Columns);
        Assert.Equal(["primary", "holm", "0.03", "", "", "3", "2", "1", "true"], families.Rows[0]);
        Assert.Equal(["secondary", "weighted-holm", "0.02", "primary", "any", "2", "2", "1", "true"], families.Rows[1]);
        Assert.Equal(["extra", "hommel", "0.02", "secondary", "all", "2", "2", "0", "false"], families.Rows[2]);
        CsvText results = _place.Run("results", "F", "--format", "csv").Well().Csv;
        Assert.Equal(["family", "family_size", "family_tested", "level"], results.Columns[^8..^4]);
        Assert.Equal(["primary", "3", "2", "0.03"], results.Rows[2][^8..^4]);
        Assert.Equal(("extra", "2", "2", "0.02", "1", "false"), (results.Value("X1", "family"), results.Value("X1", "family_size"), results.Value("X1", "family_tested"), results.Value("X1", "level"), results.Value("X1", "adjusted_p"), results.Value("X1", "survives")));

        // Weighted Holm by hand: S1 weighs 3 of 4, so that its p counts 4/3 times, that of S2 once.
        Assert.Equal(CsvText.Number(results.Value("S1", "p")) * 4 / 3, CsvText.Number(results.Value("S1", "adjusted_p")), 1e-12);
        Assert.Equal(CsvText.Number(results.Value("S2", "p")), CsvText.Number(results.Value("S2", "adjusted_p")), 1e-12);
        Assert.Equal(CsvText.Number(results.Value("P1", "p")) * 3, CsvText.Number(results.Value("P1", "adjusted_p")), 1e-12);
        Assert.Equal(["3"], _place.Run("list", "--format", "csv").Well().Csv.Column("families"));
        Assert.Equal(["3"], _place.Run("show", "F", "--format", "csv").Well().Csv.Column("families"));
        Assert.Equal(["primary", "secondary"], _place.Run("survivors", "F", "--format", "csv").Well().Csv.Column("family"));
    }

    [Fact]
    public void An_export_runs_to_the_same_results_and_the_folder_runs_twice()
    {
        _place.Run("run", Folder(2)).Well();
        Assert.Contains("Nothing changed since review 1", _place.Run("run", Folder(2)).Well().Out.ReplaceLineEndings(" "), StringComparison.Ordinal);
        string results = _place.Run("results", "F", "--format", "csv").Well().Out;
        string digest = _place.Run("show", "F", "--format", "csv").Well().Csv.Column("plan_digest")[0];
        Assert.Contains("families.csv", _place.Run("export", "F", "--out", _place.At("out")).Well().Out, StringComparison.Ordinal);
        _place.Variables["CAMPAIGNS_CATALOG"] = _place.At("again.db");
        _place.Run("run", _place.At("out")).Well();
        Assert.Equal(results, _place.Run("results", "F", "--format", "csv").Well().Out);
        Assert.Equal([digest], _place.Run("show", "F", "--format", "csv").Well().Csv.Column("plan_digest"));
        _place.Write("out/families.csv", ThreeFamilies.Families.Replace("0.03", "0.02", StringComparison.Ordinal));
        _place.Run("run", _place.At("out")).Refused(3, "The folder's families differ", "family primary: correction '', level '0.03' against correction '', level '0.02'");
        File.Delete(_place.At("out", "families.csv"));
        _place.Run("run", _place.At("out")).Refused(3, "family primary");
    }

    [Fact]
    public void Families_are_registered_listed_and_refused_step_by_step()
    {
        string plan = _place.Write("plan.csv", ThreeFamilies.Plan), families = _place.Write("families.csv", ThreeFamilies.Families);
        _place.Run("start", "F", "--error-rate", "familywise").Well();
        Assert.Equal([""], _place.Run("families", "F", "--format", "csv").Well().Csv.Column("family"));
        _place.Run("families", "F", families).Well();
        Assert.Contains("The family 'primary' has no experiment in the plan", _place.Run("families", "F").Well().Out.ReplaceLineEndings(" "), StringComparison.Ordinal);
        _place.Run("plan", "F", plan).Well();
        Assert.Equal(["0.03", "0.02", "0.02"], _place.Run("families", "F", "--format", "csv").Well().Csv.Column("level"));
        _place.Run("families", "F", _place.Write("circle.csv", "family,opens_after\na,b\nb,a\n")).Refused(3, "circle.csv' were refused; nothing was changed. Problems: 2.", "line 2, column opens_after");
        _place.Run("families", "F", _place.Write("much.csv", "family,level\nprimary,0.03\nsecondary,0.03\nextra,0.03\n")).Well();
        _place.Run("seal", "F").Refused(3, "ask for 0.09 together, more than the campaign's level 0.05");
        _place.Run("families", "F", families).Well();
        _place.Run("seal", "F").Well();
        _place.Run("families", "F", families).Refused(3, "is sealed since");
        _place.Run("families", "G").Refused(3, "no campaign 'G'");
        _place.Run("families", "G", families).Refused(3, "no campaign 'G'");
    }

    [Fact]
    public void The_dashboard_tells_families_and_draws_no_boundary_for_all_of_them()
    {
        _place.Run("run", Folder(0.2)).Well();
        using var catalog = Campaigns.Catalog.Catalog.Open(_place.Catalog, _place.Clock);
        CampaignStanding standing = new StandingReader(catalog).Read("F");
        var heading = new CampaignHeading(standing, CorrectionRegistry.Find("holm"));
        Assert.Equal(["familywise error rate", "level 0.05", "Holm, Weighted Holm and Hommel, in 3 families"], heading.Held);
        Assert.Equal("3 families, 1 closed", heading.Family);
        Assert.Contains("Over all families together", heading.Meaning, StringComparison.Ordinal);
        var ranking = new Ranking(standing, CorrectionRegistry.Find("holm"));
        Assert.False(ranking.HasBoundary);
        Assert.StartsWith("Each family has a boundary of its own", RankingPlot.BoundaryText(ranking), StringComparison.Ordinal);
    }

    [Fact]
    public void Families_need_a_plan()
    {
        string folder = _place.Campaign("C", null, Workplace.TwoExperiments);
        _place.Write("C/families.csv", "family\na\n");
        _place.Run("run", folder).Refused(3, "there is no plan.csv");
        _place.Write("C/plan.csv", "experiment,family\nE1,a\nE2,\n");
        _place.Run("run", folder).Refused(3, "'E2' names no family");
        Assert.Empty(_place.Run("list", "--format", "csv").Well().Csv.Rows);
    }

    [Fact]
    public void Families_that_only_the_plan_names_get_the_campaigns_correction_and_rate()
    {
        string run = _place.Run("run", _place.Campaign("C", "experiment,groups,family\nE1,a|b,a\nE2,a|b,b\n", Workplace.TwoExperiments)).Well().Out.ReplaceLineEndings(" ");
        Assert.Contains("with 2 families", run, StringComparison.Ordinal);
        Assert.Contains("rates held in families do not bound the share of false ones among all their survivors together", run, StringComparison.Ordinal);
        Assert.Equal(["bh,0.05", "bh,0.05"], _place.Run("families", "C", "--format", "csv").Well().Csv.Rows.Select(r => $"{r[1]},{r[2]}"));
        Assert.Contains("sealed already", _place.Run("run", _place.At("C")).Well().Out, StringComparison.Ordinal);
    }

    [Fact]
    public void Shared_controls_are_warned_of_at_the_seal_in_the_review_and_below_every_table()
    {
        string folder = _place.Campaign("C", "experiment,shared_control\nE1,reference A\nE2,reference A\n", Workplace.TwoExperiments, correction: "bky");
        const string warning = "Warning: 2 experiments share a control, batch or instrument";
        Ran run = _place.Run("run", folder).Well();
        Assert.Equal(3, run.Error.ReplaceLineEndings(" ").Split(warning).Length);
        Assert.Contains(warning, run.Out, StringComparison.Ordinal);
        Assert.Contains(warning, _place.Run("results", "C").Well().Out, StringComparison.Ordinal);
        string other = _place.Campaign("D", "experiment,shared_control\nE1,reference A\nE2,reference A\n", Workplace.TwoExperiments, correction: "by");
        Ran quiet = _place.Run("run", other).Well();
        Assert.DoesNotContain("Warning", quiet.Out + quiet.Error, StringComparison.Ordinal);
    }

    [Fact]
    public void An_interim_review_is_marked_wherever_reviews_are_told()
    {
        _place.Run("run", Folder(2)).Well();
        Assert.Contains("Interim: only tested experiments were counted.", _place.Run("review", "F", "--family", "tested").Well().Out.ReplaceLineEndings(" "), StringComparison.Ordinal);
        foreach (string[] arguments in (string[][])[["results", "F"], ["survivors", "F"], ["corrections", "F"], ["show", "F"], ["show", "F", "X1"]])
        {
            Assert.Contains("(interim: tested experiments only) counted 6 of 7 hypotheses", _place.Run(arguments).Well().Out.ReplaceLineEndings(" "), StringComparison.Ordinal);
        }

        Assert.Equal(["true"], _place.Run("list", "--format", "csv").Well().Csv.Column("review_interim"));
        Assert.Equal(["true"], _place.Run("show", "F", "--format", "csv").Well().Csv.Column("review_interim"));
    }

    private string Folder(double shiftOfLast) => ThreeFamilies.Folder(_place, shiftOfLast);
}
