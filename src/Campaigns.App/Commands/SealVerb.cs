using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Plans;
using Campaigns.Domain;

namespace Campaigns.App.Commands;

/// <summary>seal: fix the plan.</summary>
internal sealed class SealVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();

    public override Command Build() => new("seal", Describe("Fix the plan: level, correction and families stay as they are from here on.", "seal PRIMERS"))
    {
        _code, SharedOptions.Seen,
    };

    public override int Run(Session session)
    {
        string code = session.Get(_code);
        using Catalog.Catalog catalog = session.OpenCatalog();
        StoredCampaign stored = new CampaignStore(catalog).Seal(code);
        Campaign campaign = stored.Campaign;
        session.Say($"Sealed {code}: {CampaignText.Goal(campaign)}. Plan digest (SHA-256): {campaign.PlanDigest}");
        CampaignRules.SayNotes(session.Host, campaign, campaign.IsExploratory ? [] : new PlanStore(catalog).Read(stored.Id));
        session.Say(LedgerText.HeadLine(new LedgerReader(catalog).Head));
        session.PrintForScripts(new RowTable(
            [new Column("campaign", null), new Column("sealed_at", null), new Column("plan_digest", null)],
            [[Cell.Text(code), Cell.Text(Words.Instant(campaign.SealedAt!.Value)), Cell.Text(campaign.PlanDigest)]]));
        return ExitCode.Done;
    }
}
