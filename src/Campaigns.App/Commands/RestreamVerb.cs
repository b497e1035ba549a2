using System.CommandLine;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Streams;
using Campaigns.Domain;
using Campaigns.Statistics.Online;

namespace Campaigns.App.Commands;

/// <summary>restream: start a new stream for the experiments to come.</summary>
internal sealed class RestreamVerb : Verb
{
    private readonly Argument<string> _code = SharedOptions.Code();
    private readonly Option<string?> _correction = TypedOptions.Word("--correction", "The online procedure of the new stream.", "KEY", StreamOptions.Keys);
    private readonly Option<string> _reason = TypedOptions.NotBlank(new Option<string>("--reason") { Description = "Why; recorded and shown wherever the campaign is.", HelpName = "TEXT", Required = true });
    private readonly StreamOptions _online = new();

    public RestreamVerb() => _correction.Required = true;

    public override Command Build() => _online.AddTo(new("restream", Describe("Start a new stream, with other settings, for the experiments that have no level yet. Earlier decisions stand; each stream's guarantee is its own, and they do not add up.",
        "restream PRIMERS --correction saffron --horizon 40 --reason \"twenty experiments more than planned\""))
    {
        _code, _correction, _reason, SharedOptions.Seen,
    });

    public override int Run(Session session)
    {
        string code = session.Get(_code);
        OnlineProcedure procedure = OnlineRegistry.Find(session.Get(_correction)!)!;
        using Catalog.Catalog catalog = session.OpenCatalog();
        Campaign campaign = new CampaignStore(catalog).Get(code).Campaign;
        OnlineOptions? options = _online.Typed(session, procedure, campaign.Level);
        StreamHead stream = new StreamStore(catalog).Restart(code, procedure, options, session.Get(_reason).Trim());
        session.Say($"Started a new stream of {code}. {OnlineText.Named(stream)}. Earlier decisions stand. {procedure.Guarantee} Each stream's guarantee holds for its own experiments; they do not add up to one for all.");
        session.PrintForScripts(new RowTable(
            [
                new Column("campaign", null), new Column("stream", null, true), new Column("correction", null), new Column("level", null, true), new Column("horizon", null, true), new Column("shape", null),
                new Column("initial_wealth", null, true), new Column("lambda", null, true), new Column("tau", null, true), new Column("started_at", null), new Column("reason", null),
            ],
            [
                [
                    Cell.Text(code), Cell.Whole(stream.Number), Cell.Text(procedure.Key), Cell.Setting(campaign.Level.Value), Cell.Whole(stream.Settings.Horizon), Cell.Text(stream.Settings.Shape),
                    Cell.Number(stream.Settings.InitialWealth), Cell.Number(stream.Settings.Lambda), Cell.Number(stream.Settings.Tau), Cell.Text(Words.Instant(stream.StartedAt)), Cell.Text(stream.Reason),
                ],
            ]));
        return ExitCode.Done;
    }
}
