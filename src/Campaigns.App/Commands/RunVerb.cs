using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Amending;
using Campaigns.Catalog.Exporting;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>run: a whole campaign folder; what was done before is not done again.</summary>
internal sealed class RunVerb : Verb
{
    private const int SurvivorsShown = 20;

    private readonly Argument<string> _folder = new("FOLDER") { Description = "A campaign folder: campaign.json, plan.csv (without it the experiments are taken from the data), families.csv where there are several, measurements/*.csv." };

    public override Command Build() => new("run", Describe("Do everything for a campaign folder: open, plan, seal, load, test, review, and print the survivors and the risk.",
        "run campaigns/adhesion-screen"))
    {
        _folder, SharedOptions.DecimalMark, SharedOptions.Separator, SharedOptions.Columns, SharedOptions.Seen,
    };

    public override int Run(Session session)
    {
        string folder = session.Get(_folder);
        CampaignDescription description = ReadDescription(folder);
        string planPath = Path.Combine(folder, "plan.csv");
        string familiesPath = Path.Combine(folder, CampaignExport.FamiliesName);
        using Catalog.Catalog catalog = session.OpenOrCreateCatalog();
        StoredCampaign campaign = session.SayAfter(() => catalog.Change(() => Register(session, catalog, description, Existing(planPath), Existing(familiesPath))));
        SayWhatIsNotDoneAgain(session, folder);
        LoadFiles(session, catalog, campaign, Path.Combine(folder, "measurements"));
        string code = description.Code;
        bool reviewed = session.SayAfter(() => catalog.Change(() =>
        {
            SealExploratory(session, catalog, code);
            TestVerb.Test(session, catalog, code, includeIncomplete: false);
            return ReviewWhereTested(session, catalog, code);
        }));
        if (reviewed)
        {
            PrintSurvivors(session, catalog, code);
        }

        return ExitCode.Done;
    }

    /// <summary>An export tells what was decided in its catalog; a folder that is run begins a record of its own.</summary>
    private static void SayWhatIsNotDoneAgain(Session session, string folder)
    {
        string[] told = [.. new[] { CampaignExport.ExclusionsName, CampaignExport.WithdrawalsName, CampaignExport.AmendmentsName }.Where(name => File.Exists(Path.Combine(folder, name)))];
        if (told.Length > 0)
        {
            session.Host.Notice($"Note: {string.Join(", ", told)} of this folder tell what was decided elsewhere and are not done again; 'campaigns exclude', 'campaigns withdraw' and 'campaigns plan --reason' decide it here.");
        }
    }

    private static CampaignDescription ReadDescription(string folder)
    {
        if (!Directory.Exists(folder))
        {
            throw new RefusedException($"There is no folder '{folder}'.");
        }

        CampaignFileResult file = CampaignFile.Read(Path.Combine(folder, "campaign.json"), Session.KnownKeys);
        return file.Campaign ?? throw new RefusedException(
            $"The file '{Path.Combine(folder, "campaign.json")}' was refused; nothing was changed.", [.. file.Problems.Sentences()]);
    }

    /// <summary>Opens, plans and seals what is not yet; where it is, the folder must say the same.</summary>
    private static StoredCampaign Register(Session session, Catalog.Catalog catalog, CampaignDescription description, string? planPath, string? familiesPath)
    {
        var campaigns = new CampaignStore(catalog);
        StoredCampaign? known = campaigns.Find(description.Code);
        StoredCampaign stored = known ?? campaigns.Open(Describe(description, catalog.Clock.GetUtcNow()));
        if (known is null)
        {
            session.Say($"Opened campaign {description.Code}: {CampaignText.Goal(stored.Campaign)}.");
            CampaignRules.WarnOfMismatch(session.Host, stored.Campaign);
        }
        else
        {
            RefuseOtherDescription(stored.Campaign, description);
        }

        if (planPath is null)
        {
            return familiesPath is null ? stored : throw new RefusedException($"'{familiesPath}' names families, and there is no plan.csv whose experiments they hold; nothing was changed. Add the plan, or take families.csv away.");
        }

        IReadOnlyList<PlannedExperiment> plan = PlanVerb.Read(session, stored.Campaign, planPath);
        IReadOnlyList<Family>? families = familiesPath is null ? null : FamiliesVerb.Read(session, familiesPath);
        if (stored.Campaign.IsSealed)
        {
            string same = SameAs(catalog, stored, plan, planPath);
            RefuseOtherFamilies(stored.Campaign, families, plan);
            session.Say($"The plan of {description.Code} is sealed already, and plan.csv says the same{same}.");
            return stored;
        }

        PlanChange change = new PlanStore(catalog).Register(description.Code, plan);
        session.Say(FormattableString.Invariant($"Registered the plan: {Counted.Of(change.Added, "experiment")} added, {change.Changed} changed, {change.Unchanged} as before."));
        if (families is not null)
        {
            new FamilyStore(catalog).Register(description.Code, families);
        }

        stored = campaigns.Seal(description.Code);
        session.Say($"Sealed it{(stored.Campaign.Families.Count > 0 ? FormattableString.Invariant($", with {stored.Campaign.Families.Count} families") : "")}; plan digest (SHA-256): {stored.Campaign.PlanDigest}");
        CampaignRules.SayNotes(session.Host, stored.Campaign, plan);
        return stored;
    }

    private static string? Existing(string path) => File.Exists(path) ? path : null;

    /// <summary>Without a file of families those that the plan names are meant; a plan that an earlier version sealed as one family stays one.</summary>
    private static void RefuseOtherFamilies(Campaign campaign, IReadOnlyList<Family>? families, IReadOnlyList<PlannedExperiment> plan)
    {
        IReadOnlyList<Family> asked = families ?? (campaign.Families.Count == 0 ? [] : FamilyPlan.NamedIn(plan));
        if (FamilyPlan.Differences(campaign.Families, asked) is { Count: > 0 } differences)
        {
            throw new RefusedException($"The folder's families differ from those of the sealed plan of '{campaign.Code}'; nothing was changed. A sealed plan stays as it is: open a new campaign for other families.", differences);
        }
    }

    private static Campaign Describe(CampaignDescription description, DateTimeOffset now) => new()
    {
        Code = description.Code,
        Title = description.Title,
        Purpose = description.Purpose,
        ErrorRate = description.ErrorRate,
        Level = description.Level,
        Correction = description.Correction,
        Online = description.Online,
        DefaultTest = description.Test,
        DefaultFollowUp = description.FollowUp,
        OpenedAt = now,
    };

    private static void RefuseOtherDescription(Campaign known, CampaignDescription description)
    {
        (string Key, string Stored, string Asked)[] facts =
        [
            ("errorRate", known.ErrorRate.Word(), description.ErrorRate.Word()),
            ("level", known.Level.ToString(), description.Level.ToString()),
            ("correction", known.Correction, description.Correction),
            .. OnlineText.Facts(known.Online).Zip(OnlineText.Facts(description.Online), (a, b) => (a.Key, a.Text, b.Text)),
            ("test", known.DefaultTest, description.Test),
            ("followUp", known.DefaultFollowUp, description.FollowUp),
        ];
        string[] differences = [.. facts.Where(f => f.Stored != f.Asked).Select(f => $"{f.Key}: the catalog holds {f.Stored}, campaign.json says {f.Asked}")];
        if (differences.Length > 0)
        {
            throw new RefusedException($"The campaign '{known.Code}' is in the catalog with another description; nothing was changed. Give campaign.json another code for a new campaign.", differences);
        }
    }

    /// <summary>With which state of the plan a file agrees, in a clause: with the plan that stands, or with the plan as it was sealed, whose amendments then stand.</summary>
    private static string SameAs(Catalog.Catalog catalog, StoredCampaign stored, IReadOnlyList<PlannedExperiment> plan, string planPath)
    {
        IReadOnlyList<string> differences = PlanComparison.Differences(SealedPlan.Standing(catalog, stored.Id), plan);
        if (differences.Count == 0)
        {
            return "";
        }

        return PlanComparison.Differences(SealedPlan.Read(catalog, stored.Id), plan).Count == 0
            ? ", as it was sealed; its amendments stand"
            : throw new RefusedException($"'{planPath}' differs from the sealed plan of '{stored.Campaign.Code}'; nothing was changed. A sealed plan stays as it is: open a new campaign for other experiments, or amend it with 'campaigns plan {stored.Campaign.Code} FILE --reason TEXT'.", differences);
    }

    private static void LoadFiles(Session session, Catalog.Catalog catalog, StoredCampaign campaign, string folder)
    {
        if (!Directory.Exists(folder))
        {
            session.Say("There is no folder 'measurements', so nothing was loaded.");
            return;
        }

        var options = new LoadOptions(SharedOptions.Reading(session, MeasurementFile.ColumnNames));
        int known = 0;
        foreach (string file in Directory.EnumerateFiles(folder, "*.csv").Order(NaturalOrder.Instance))
        {
            known += LoadVerb.LoadUnlessKnown(session, catalog, campaign.Campaign.Code, file, options) ? 0 : 1;
        }

        if (known > 0)
        {
            session.Say(FormattableString.Invariant($"{Counted.Of(known, "file")} had been loaded before and {Counted.Word(known, "was", "were")} not loaded again."));
        }
    }

    /// <summary>Without a plan there is something to seal only when the data have come.</summary>
    private static void SealExploratory(Session session, Catalog.Catalog catalog, string code)
    {
        Campaign campaign = new CampaignStore(catalog).Get(code).Campaign;
        if (!campaign.IsSealed && campaign.IsExploratory)
        {
            new CampaignStore(catalog).Seal(code);
            session.Say($"Sealed level and correction of {code}. It is exploratory: there was no plan, the experiments were taken from the data.");
        }
        else if (!campaign.IsSealed)
        {
            throw new RefusedException($"The campaign '{code}' has neither a plan nor data: put a plan.csv or measurements/*.csv into its folder.");
        }
    }

    private static bool ReviewWhereTested(Session session, Catalog.Catalog catalog, string code)
    {
        if (!new ReviewStore(catalog).CanReview(code))
        {
            session.Say($"Nothing of {code} was tested yet, so there is nothing to review.");
            return false;
        }

        ReviewVerb.Review(session, catalog, code, testedOnly: false);
        return true;
    }

    private static void PrintSurvivors(Session session, Catalog.Catalog catalog, string code)
    {
        bool forPeople = session.Format == RowFormat.Table;
        SurvivorsVerb.Survivors survivors = SurvivorsVerb.Read(catalog, code, forPeople ? SurvivorsShown : int.MaxValue);
        if (!forPeople)
        {
            session.Print(survivors.Rows);
            return;
        }

        session.Host.Out.WriteLine();
        SurvivorsVerb.Print(session, survivors);
        session.Host.Out.WriteLine();
        TextTable.Sentences(session.Host, RiskTable.Sentences(survivors.Overview));
    }
}
