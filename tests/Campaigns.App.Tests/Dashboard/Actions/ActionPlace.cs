using System.Security.Cryptography;
using Campaigns.App.Dashboard;
using Campaigns.App.Dashboard.Actions;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Tests.Commands;
using Campaigns.Catalog.Ledger;
using Campaigns.Statistics.Corrections;

namespace Campaigns.App.Tests.Dashboard.Actions;

/// <summary>A real catalog in a folder of its own, the dashboard's model of it, and a desk for actions on it.</summary>
internal sealed class ActionPlace : IDisposable
{
    public const string Code = "mini";

    private const string Plan = """
        experiment,title,groups,replicates
        E1,Gloss,a|b,3
        E2,Adhesion,a|b,2
        E3,Haze,a|b,2
        E4,Flow,a|b,2

        """;

    private readonly Catalog.Catalog _catalog;

    /// <summary>A sealed campaign of four experiments; E1 and E2 have their data and, where asked, tests and a review.</summary>
    public ActionPlace(bool isTested = true)
    {
        string folder = Place.Campaign(Code, Plan, null);
        Place.Run("start", Code, "--title", "Invented", "--error-rate", "false-discovery", "--level", "0.05", "--correction", "bh").Well();
        Place.Run("plan", Code, Path.Combine(folder, "plan.csv")).Well();
        Place.Run("seal", Code).Well();
        Place.Run("load", Code, Place.Write("week-01.csv", Workplace.TwoExperiments)).Well();
        if (isTested)
        {
            Place.Run("test", Code).Well();
            Place.Run("review", Code).Well();
        }

        _catalog = Catalog.Catalog.Open(Place.Catalog, Place.Clock);
        Source = new CatalogSource(_catalog);
        Model = new DashboardModel(Source, Code, CorrectionRegistry.Find);
        Desk = new ActionDesk(Open, new Actor(Workplace.Account, "Ada"), Place.Clock);
    }

    public Workplace Place { get; } = new();

    public IDashboardSource Source { get; }

    public DashboardModel Model { get; }

    public ActionDesk Desk { get; }

    /// <summary>Called before the catalog is opened for an action.</summary>
    public Action OnOpen { get; set; } = () => { };

    public string Digest => DigestOf(Place.Catalog);

    public string Head
    {
        get
        {
            using var catalog = Catalog.Catalog.Open(Place.Catalog, Place.Clock);
            return new LedgerReader(catalog).Head.ToString();
        }
    }

    public ActionRun Begin(char key, params (string Name, string Text)[] values)
    {
        ActionRun run = new(ActionList.Of(key)!, Model, Desk);
        foreach ((string name, string text) in values)
        {
            run.Type(run.Fields.ToList().FindIndex(f => f.Name == name), text);
        }

        return run;
    }

    /// <summary>Presses Enter, and waits until the other thread has done its part.</summary>
    public ActionRun Enter(ActionRun run)
    {
        Place.Clock.Advance(ActionRun.ReadingTime);
        run.Next();
        return Await(run);
    }

    public static ActionRun Await(ActionRun run)
    {
        for (long end = Environment.TickCount64 + 30_000; run.Stage is ActionStage.Rehearsing or ActionStage.Working; run.Look())
        {
            Assert.True(Environment.TickCount64 < end, "The work did not end in 30 s.");
            Thread.Sleep(1);
        }

        return run;
    }

    /// <summary>A copy of the catalog as it is now, for a command that is to do the same.</summary>
    public string Copy()
    {
        string copy = Place.At("copy.db");
        File.Copy(Place.Catalog, copy, overwrite: true);
        return copy;
    }

    public void Dispose()
    {
        _catalog.Dispose();
        Place.Dispose();
    }

    public static string DigestOf(string file) => Convert.ToHexString(SHA256.HashData(File.ReadAllBytes(file)));

    private Catalog.Catalog Open(LedgerHead? seen)
    {
        OnOpen();
        return Catalog.Catalog.Open(Place.Catalog, Place.Clock, Desk.Actor, seen);
    }
}
