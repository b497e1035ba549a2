using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Measurements;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.Probability;
using Microsoft.Extensions.Time.Testing;

namespace Campaigns.Catalog.Tests;

/// <summary>A new catalog in a folder of its own, with the steps of a campaign's life in short form.</summary>
internal sealed class TestCatalog : IDisposable
{
    public const string Code = "C";

    private int _files;

    public TestCatalog() => Catalog = Catalog.OpenOrCreate(Folder["campaigns.db"], Clock);

    public TestFolder Folder { get; } = new();

    public FakeTimeProvider Clock { get; } = new(new DateTimeOffset(2026, 12, 1, 8, 0, 0, TimeSpan.Zero));

    public Catalog Catalog { get; }

    public CampaignStore Campaigns => new(Catalog);

    public CampaignStanding Standing => new StandingReader(Catalog).Read(Code);

    public string Dump => Raw.Dump(Catalog.Connection);

    public static PlannedExperiment Experiment(string code, int? replicates = null, params string[] groups) => new()
    {
        Code = code,
        Groups = groups,
        Test = "f",
        FollowUp = "none",
        Replicates = replicates,
    };

    /// <summary>Rows of a file: values of one group of one experiment, parted by blanks.</summary>
    public static string Rows(string experiment, string group, string values) =>
        string.Concat(values.Split(' ').Select(v => $"{experiment},{group},{v}\n"));

    public StoredCampaign Start(string correction = "bh", double level = 0.05) => Campaigns.Open(new Campaign
    {
        Code = Code,
        ErrorRate = ErrorRate.FalseDiscovery,
        Level = new SignificanceLevel(level),
        Correction = correction,
        OpenedAt = Clock.GetUtcNow(),
    });

    public PlanChange Plan(params PlannedExperiment[] experiments) => new PlanStore(Catalog).Register(Code, experiments);

    /// <summary>Opens, plans and seals.</summary>
    public void Seal(params PlannedExperiment[] experiments)
    {
        Start();
        Plan(experiments);
        Campaigns.Seal(Code);
    }

    public string Write(string text, string? name = null)
    {
        string path = Folder[name ?? FormattableString.Invariant($"data-{++_files}.csv")];
        File.WriteAllText(path, text);
        return path;
    }

    /// <summary>Loads rows under the header "experiment,group,value".</summary>
    public LoadSummary Load(string rows, string? amend = null) => LoadFile(Write("experiment,group,value\n" + rows), amend);

    public LoadSummary LoadFile(string path, string? amend = null) =>
        new MeasurementLoader(Catalog).Load(Code, path, new LoadOptions(DelimitedFileOptions.Default, amend), _ => { }, default);

    /// <summary>Loads rows that must be refused, and asserts that no row of any table changed.</summary>
    public RefusedException Refused(string rows, string? amend = null)
    {
        string before = Dump;
        RefusedException refused = Assert.Throws<RefusedException>(() => Load(rows, amend));
        Assert.Equal(before, Dump);
        return refused;
    }

    public TestRunSummary Test(bool includeIncomplete = false) => new TestRunner(Catalog).Run(Code, includeIncomplete, _ => { }, default);

    public ReviewTaken Review(bool testedOnly = false) => new ReviewStore(Catalog).Take(Code, testedOnly);

    public ExperimentResult Result(string experiment) => Standing.Experiments.Single(e => e.Plan.Code == experiment);

    /// <summary>What was packed for an experiment, one entry a load, as text: decimals, mantissas, groups, run order, specimens and blocks.</summary>
    public List<string> Packed(string experiment, bool withLines = false)
    {
        using SqliteStatement select = Catalog.Prepare(
            "SELECT m.packed FROM experiments e JOIN measurements m ON m.experiment_id = e.id WHERE e.code = ?1 ORDER BY m.load_id");
        select.Bind(1, experiment);
        var packed = new List<string>();
        while (select.Read())
        {
            var values = new ObservationColumns();
            PackedMeasurements.Read(select.Blob(0), values);
            packed.Add(string.Join(' ', Enumerable.Range(0, values.Count).Select(i => FormattableString.Invariant(
                $"{values.Text(i)}/{values.Groups[i]}/{values.Orders[i]}/{Name(values.SpecimenNames, values.Specimens[i])}/{Name(values.BlockNames, values.Blocks[i])}{(withLines ? $"@{values.Lines[i]}" : "")}"))));
        }

        return packed;
    }

    public void Dispose()
    {
        Catalog.Dispose();
        Folder.Dispose();
    }

    private static string Name(Utf8Interner names, int number) => number < 0 ? "-" : names.Text(number);
}
