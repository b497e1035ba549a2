using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>families: register the families of a campaign before the seal, or list them.</summary>
internal sealed class FamiliesVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Argument<string?> _file = new("FILE") { Description = "A file of families, before the seal: family, and where wanted correction, level, opens_after, opens_when. Without it the families are listed.", Arity = ArgumentArity.ZeroOrOne };

    public override Command Build() => new("families", Describe("The families of a campaign, which are corrected each on its own: register them from a file before the seal, or list them with their levels and gates.",
        "families PRIMERS families.csv"))
    {
        _code, _file, SharedOptions.DecimalMark, SharedOptions.Separator, SharedOptions.Columns, SharedOptions.Seen,
    };

    public override int Run(Session session)
    {
        string code = session.Get(_code);
        using Catalog.Catalog catalog = session.OpenCatalog();
        if (session.Typed.GetValue(_file) is { } path)
        {
            new CampaignStore(catalog).Get(code);
            IReadOnlyList<Family> families = Read(session, path);
            new FamilyStore(catalog).Register(code, families);
            session.Say(FormattableString.Invariant($"Registered {families.Count} {(families.Count == 1 ? "family" : "families")} of {code}. Next: 'campaigns seal {code}', once the plan names them."));
        }

        session.Print(catalog.Snapshot(() => List(catalog, new CampaignStore(catalog).Get(code))));
        return ExitCode.Done;
    }

    /// <summary>Reads a file of families whole.</summary>
    /// <exception cref="RefusedException">The file has problems.</exception>
    public static IReadOnlyList<Family> Read(Session session, string path)
    {
        FamilyFileResult file = FamilyFile.Read(path, SharedOptions.Reading(session, FamilyFile.ColumnNames), Session.KnownKeys);
        if (!file.Problems.IsEmpty)
        {
            throw new RefusedException(
                FormattableString.Invariant($"The families '{path}' were refused; nothing was changed. Problems: {file.Problems.Count}."),
                [.. file.Problems.Sentences()]);
        }

        Notices.IgnoredColumns(session.Host, path, file.IgnoredColumns);
        return file.Families;
    }

    private static RowTable List(Catalog.Catalog catalog, StoredCampaign stored)
    {
        Campaign campaign = stored.Campaign;
        if (campaign.IsSealed || campaign.IsExploratory)
        {
            CampaignOverview overview = new OverviewReader(catalog).Read(stored);
            return FamilyTable.Of(campaign, overview.Families) with
            {
                Above = [$"{campaign.Code}: {CampaignText.Goal(campaign)}"],
                Below = [.. CampaignText.Procedure(overview), .. FamilyText.WithoutLeavers(overview), .. CampaignText.Deviations(overview)],
            };
        }

        IReadOnlyList<PlannedExperiment> plan = new PlanStore(catalog).Read(stored.Id);
        return Open(campaign with { Families = campaign.Families.Count > 0 ? campaign.Families : FamilyPlan.NamedIn(plan) }, plan);
    }

    /// <summary>Families of an open plan, with the levels that a seal would give them, or with what stands in its way.</summary>
    private static RowTable Open(Campaign campaign, IReadOnlyList<PlannedExperiment> plan)
    {
        string[] above = [$"{campaign.Code}: the plan is open"];
        try
        {
            FamilyPlan.Check(campaign, campaign.Families, plan);
        }
        catch (RefusedException refused)
        {
            return FamilyTable.AsNamed(campaign, campaign.Families, plan) with
            {
                Above = above,
                Below = ["The plan cannot be sealed so:", .. refused.Details.Count > 0 ? refused.Details : [refused.Message]],
            };
        }

        Campaign asSealed = campaign with { SealedAt = campaign.OpenedAt };
        var tally = new FamilyTally(asSealed);
        foreach (PlannedExperiment experiment in plan)
        {
            tally.Add(experiment.Family, experiment.Weight, experiment.SharedControl, null);
        }

        CampaignVerdict verdict = FamilyVerdict.Judge(asSealed, tally.Members(testedOnly: false));
        return FamilyTable.Of(asSealed, verdict.Families) with { Above = above, Below = [.. FamilyText.Warnings(asSealed, verdict.Families)] };
    }
}
