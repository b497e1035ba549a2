using Campaigns.App.Output;
using Campaigns.Domain;
using Campaigns.Statistics.Online;

namespace Campaigns.App.Wording;

/// <summary>Procedures that decide as experiments arrive, in words.</summary>
internal static class OnlineText
{
    private const int MostNamed = 10;

    /// <summary>What no procedure of this kind can promise.</summary>
    private const string Outside = "The guarantee is of all decisions as they were made: withdrawing a survivor afterwards decides by results, and is outside it.";

    /// <summary>What streams in a row hold together.</summary>
    private const string SeveralStreams = "Each stream's guarantee holds for its own experiments; they do not add up to one for all.";

    /// <summary>What it means that an experiment overlaps.</summary>
    public const string Overlaps = "Overlaps: ran at the same time as another experiment of its stream; what was not known at its start was counted as the worst.";

    /// <summary>The settings of a stream in one phrase, for example "shape jm over 40 experiments, initial wealth 0.025".</summary>
    public static string Of(OnlineSettings settings)
    {
        string horizon = settings.Horizon is { } last ? FormattableString.Invariant($"over {last} experiment{(last == 1 ? "" : "s")}") : "without end";
        return $"shape {settings.Shape} {horizon}{Part("initial wealth", settings.InitialWealth)}{Part("lambda", settings.Lambda)}{Part("tau", settings.Tau)}";

        static string Part(string name, double? value) => value is { } given ? $", {name} {NumberText.RoundTrip(given)}" : "";
    }

    /// <summary>What a campaign says of its online procedure, key by key as in campaign.json.</summary>
    public static IReadOnlyList<(string Key, string Text)> Facts(OnlineOptions? options) =>
    [
        ("horizon", options?.Horizon switch { null => "(nothing)", 0 => "none", var given => FormattableString.Invariant($"{given}") }),
        ("shape", options?.Shape ?? "(nothing)"),
        ("initialWealth", Number(options?.InitialWealth)),
        ("lambda", Number(options?.Lambda)),
        ("tau", Number(options?.Tau)),
    ];

    /// <summary>The lines under tables of a campaign that is judged as its experiments arrive.</summary>
    /// <param name="overview">The campaign in figures.</param>
    /// <param name="procedure">The procedure that it was sealed with.</param>
    /// <param name="steps">How a next step is named; null for commands.</param>
    public static IEnumerable<string> Lines(CampaignOverview overview, OnlineProcedure procedure, StepNames? steps = null)
    {
        Campaign campaign = overview.Campaign;
        yield return FormattableString.Invariant($"{procedure.Name} at {campaign.Level} decides each experiment when it arrives, at the level that it was given before its p-value was seen; {overview.TestedCount} of {overview.FamilySize} have a result. A decision stands, whatever comes after it. Adjusted p: p x {campaign.Level} / level given. The batch view beside it may change with every experiment and decides nothing.");
        if (campaign.Streams.Count <= 1)
        {
            yield return campaign.Streams.Count == 0 ? $"{procedure.Guarantee} {Outside}" : $"Its stream: {Of(campaign.Streams[0].Settings)}. {procedure.Guarantee} {Outside}";
        }
        else
        {
            foreach (StreamHead stream in campaign.Streams)
            {
                yield return $"{Named(stream)}. {stream.Procedure.Guarantee}";
            }

            yield return $"{SeveralStreams} {Outside}";
        }

        if (Awaiting(overview, steps) is { } awaiting)
        {
            yield return awaiting;
        }
    }

    /// <summary>What counts while decided experiments await a new test, in decisions and in reviews; null where none does, or where experiments are not judged as they arrive.</summary>
    /// <param name="overview">The campaign in figures.</param>
    /// <param name="steps">How what tests is named; null for commands.</param>
    public static string? Awaiting(CampaignOverview overview, StepNames? steps = null)
    {
        int count = overview.AwaitingNewTest;
        return count == 0 || OnlineVerdict.ProcedureOf(overview.Campaign) is null ? null
            : $"{Counted.Of(count, "decided experiment")} {Counted.Word(count, "awaits", "await")} a new test: decisions, results and survivors keep {Counted.Word(count, "its decision", "their decisions")}, a review counts only what has a result and is without {Counted.Word(count, "it", "them")} until {(steps ?? StepNames.Commands).Test(overview.Campaign.Code)} tests {Counted.Word(count, "it", "them")}.";
    }

    /// <summary>A stream in a sentence without its full stop.</summary>
    public static string Named(StreamHead stream) =>
        FormattableString.Invariant($"Stream {stream.Number} since {stream.StartedAt:yyyy-MM-dd HH:mm} UTC: {stream.Procedure.Name}, {Of(stream.Settings)}{(stream.Reason is null ? "" : $" (reason: {stream.Reason})")}");

    /// <summary>What a test run decided, in a sentence; empty where it decided nothing.</summary>
    public static string Decided(int decided, int survivors) => decided == 0 ? ""
        : FormattableString.Invariant($" {decided} decided as they arrived: {survivors} survive{(survivors == 1 ? "s" : "")}. The decisions stand.");

    /// <summary>A sentence on experiments that were given nothing; null where there are none.</summary>
    public static string? WithoutLevel(IEnumerable<StreamEntry> entries)
    {
        int count = entries.Count(e => e.Level == 0);
        return count == 0 ? null : FormattableString.Invariant($"{Counted.Of(count, "experiment")} came after the horizon and {Counted.Word(count, "was given the level 0: it", "were given the level 0: they")} cannot survive. 'campaigns restream' starts a new stream for those to come.");
    }

    /// <summary>Whether the decision on an experiment was made on other data than those that stand now.</summary>
    public static bool IsOnOtherData(ExperimentResult result) => result.Entry is { DecidedAt: not null } entry && entry.P != result.P && result.Status != ExperimentStatus.Withdrawn;

    /// <summary>On what the decision on an experiment was made, in a clause.</summary>
    public static string MadeOn(ExperimentResult result) => $"was made on {(result.Entry?.P is { } p ? $"p = {NumberText.P(p)}" : "data that gave no p-value")}";

    /// <summary>A sentence that names experiments whose values were changed after their decision; none where there are none.</summary>
    public static IEnumerable<string> OnOtherData(IEnumerable<ExperimentResult> experiments)
    {
        string[] told = [.. experiments.Where(IsOnOtherData).Select(e => $"{e.Plan.Code} {MadeOn(e)}")];
        if (told.Length > 0)
        {
            string more = told.Length > MostNamed ? FormattableString.Invariant($"; ... and {told.Length - MostNamed} more") : "";
            yield return $"Values were changed after the decision, which stands; adjusted p and survives belong to the p on which it was made, not to the p of the row: {string.Join("; ", told.Take(MostNamed))}{more}.";
        }
    }

    /// <summary>A decision in a sentence; null before the experiment is registered.</summary>
    public static string? Decision(StreamEntry? entry) => entry is null ? null
        : FormattableString.Invariant($"Experiment {entry.Position} of stream {entry.Stream}, at the level {NumberText.RoundTrip(entry.Level)}")
            + (entry.Survives is not { } survives ? ", given before its p-value is seen; not decided yet."
                : FormattableString.Invariant($": {(survives ? "survives" : "does not survive")} by the decision of {entry.DecidedAt:yyyy-MM-dd HH:mm} UTC on {(entry.P is { } p ? $"p = {NumberText.P(p)}" : "data that gave no p-value")}, which stands."))
            + (entry.Overlaps ? " Other experiments ran at the same time: what was not known at its start was counted as the worst." : "");

    private static string Number(double? value) => value is { } given ? NumberText.RoundTrip(given) : "(nothing)";
}
