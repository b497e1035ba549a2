using System.CommandLine;
using Campaigns.Catalog.Loading;
using Campaigns.Catalog.Plans;
using Campaigns.Domain;
using Campaigns.Statistics.Corrections;
using Campaigns.Statistics.GroupTests;
using Campaigns.Statistics.Online;
using Campaigns.Statistics.Probability;

namespace Campaigns.App.Commands;

/// <summary>start: open a campaign.</summary>
internal sealed class StartVerb : Verb
{
    private readonly Argument<string> _code = new("CODE") { Description = "A short name: letters, digits, hyphen, underscore, point." };
    private readonly Option<string> _title = new("--title") { Description = "One line for people.", HelpName = "TEXT", DefaultValueFactory = _ => "" };
    private readonly Option<string> _purpose = new("--purpose") { Description = "Why the campaign is run.", HelpName = "TEXT", DefaultValueFactory = _ => "" };
    private readonly Option<string?> _errorRate = TypedOptions.Word(
        "--error-rate", "What is held at the level: the risk of any false survivor, or the share of false ones (the default).", "familywise|false-discovery", [.. ErrorRateWords.All]);
    private readonly Option<double> _level = TypedOptions.Level("The level, between 0 and 1.");
    private readonly Option<string?> _correction = TypedOptions.Word(
        "--correction", "The correction, or the online procedure that decides experiments as they arrive (else holm for familywise, bh for false discovery).", "KEY",
        [.. CorrectionRegistry.All.Select(c => c.Key), .. StreamOptions.Keys]);
    private readonly StreamOptions _online = new();
    private readonly Option<string?> _test = TypedOptions.Word(
        "--test", "The test of experiments whose plan names none (else f).", "KEY", [.. GroupTestRegistry.All.Select(t => t.Key)]);
    private readonly Option<string?> _followUp = TypedOptions.Word(
        "--follow-up", "The comparisons of experiments whose plan names none (else none).", "KEY", [.. FollowUpKeys.All]);

    public override Command Build() => _online.AddTo(new("start", Describe("Open a campaign, with its error rate, level and correction.",
        "start PRIMERS --title \"Primer screen\" --error-rate false-discovery --level 0.05 --correction bh"))
    {
        _code, _title, _purpose, _errorRate, _level, _correction, _test, _followUp,
    });

    public override int Run(Session session)
    {
        string code = session.Get(_code);
        CampaignRules.CheckCode(code);
        CampaignRules.CheckLength("--title", session.Get(_title), CampaignFile.LongestTitle);
        CampaignRules.CheckLength("--purpose", session.Get(_purpose), CampaignFile.LongestPurpose);
        ErrorRate rate = ErrorRateWords.Parse(session.Get(_errorRate) ?? "false-discovery")!.Value;
        string correction = session.Get(_correction) ?? CampaignRules.UsualCorrection(rate);
        OnlineOptions? online = _online.Typed(session, OnlineRegistry.Find(correction), new SignificanceLevel(session.Get(_level)));
        using Catalog.Catalog catalog = session.OpenOrCreateCatalog();
        Campaign campaign = new CampaignStore(catalog).Open(new Campaign
        {
            Code = code,
            Title = session.Get(_title),
            Purpose = session.Get(_purpose),
            ErrorRate = rate,
            Level = new SignificanceLevel(session.Get(_level)),
            Correction = correction,
            Online = online,
            DefaultTest = session.Get(_test) ?? "f",
            DefaultFollowUp = session.Get(_followUp) ?? "none",
            OpenedAt = session.Host.Clock.GetUtcNow(),
        }).Campaign;
        session.Say($"Opened campaign {campaign.Code}: {CampaignText.Goal(campaign)}. Next: 'campaigns plan {campaign.Code} FILE'.");
        CampaignRules.WarnOfMismatch(session.Host, campaign);
        session.PrintForScripts(CampaignText.Row(campaign));
        return ExitCode.Done;
    }
}
