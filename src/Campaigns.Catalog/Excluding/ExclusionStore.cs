using Campaigns.Catalog.Ledger;
using Campaigns.Catalog.Measurements;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Providers;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.Catalog.Excluding;

/// <summary>Which observation is meant.</summary>
/// <param name="Line">Its line in the file that brought it, from 1.</param>
/// <param name="File">Name of that file; null where only one file brought values of the experiment on that line.</param>
public sealed record ObservationPlace(long Line, string? File);

/// <summary>Leaves observations out of the analysis, with a reason and a name; the values stay in the catalog.</summary>
/// <param name="catalog">The open catalog.</param>
public sealed class ExclusionStore(Catalog catalog)
{
    /// <summary>Leaves an observation out, or takes it in again; both are recorded and neither is ever removed.</summary>
    /// <param name="code">The campaign.</param>
    /// <param name="experiment">The experiment.</param>
    /// <param name="place">The observation.</param>
    /// <param name="exclude">Whether it is left out; false takes it in again.</param>
    /// <param name="reason">Why.</param>
    /// <param name="name">Who says so.</param>
    /// <exception cref="RefusedException">There is no such campaign, experiment or observation, or it is as asked for already; nothing was changed.</exception>
    public ExcludedObservation Decide(string code, string experiment, ObservationPlace place, bool exclude, string reason, string name)
    {
        ArgumentNullException.ThrowIfNull(place);
        return catalog.Change(() =>
        {
            StoredCampaign stored = new CampaignStore(catalog).Get(code);
            long experimentId = IdOf(stored, experiment);
            Found found = Find(experimentId, experiment, place);
            bool isOut = new StandingExclusions(catalog, stored.Id).Of(experimentId).Contains(new StandingExclusions.Place(found.LoadId, place.Line));
            if (isOut == exclude)
            {
                throw new RefusedException(FormattableString.Invariant(
                    $"The value on line {place.Line} of '{found.File}' {(exclude ? "is excluded already" : "is not excluded, so there is nothing to take back")}; nothing was changed."));
            }

            var decision = new ExcludedObservation(experiment, found.File, place.Line, found.Group, found.Value, exclude, reason, name, Instants.FromMicroseconds(catalog.Now));
            long id = Insert(experimentId, found.LoadId, decision);
            catalog.Record(new LedgerAct(exclude ? LedgerAction.Exclude : LedgerAction.Include, code)
            {
                Subject = FormattableString.Invariant($"{experiment}: line {place.Line} of {found.File}"),
                Reason = reason,
                Changes = [new LedgerChange($"{experiment}: value {found.Value} of {found.Group}", exclude ? "counted" : "left out", exclude ? "left out" : "counted")],
                Evidence = [EvidenceRegistry.Exclusion.Of(id)],
            });
            return decision;
        });
    }

    /// <summary>Every decision about observations of a campaign, by experiment, oldest first.</summary>
    /// <param name="code">The campaign.</param>
    public IReadOnlyList<ExcludedObservation> All(string code)
    {
        var standing = new StandingExclusions(catalog, new CampaignStore(catalog).Get(code).Id);
        return [.. standing.Ids.Order().SelectMany(standing.Decisions)];
    }

    /// <summary>How many observations are left out as things stand: of each the latest decision counts.</summary>
    /// <param name="decisions">Decisions, oldest first.</param>
    public static int Standing(IReadOnlyList<ExcludedObservation> decisions) =>
        decisions.GroupBy(d => (d.Experiment, d.File, d.Line)).Count(d => d.Last().IsExcluded);

    private long IdOf(StoredCampaign stored, string experiment)
    {
        using SqliteStatement select = catalog.Prepare("SELECT id FROM experiments WHERE campaign_id = ?1 AND code = ?2");
        if (select.Bind(1, stored.Id).Bind(2, experiment).Read())
        {
            return select.Integer(0);
        }

        string hint = Nearest.Of(experiment, new PlanStore(catalog).Codes(stored.Id).Values) is { } near
            ? $"'{near}' may be meant"
            : $"'campaigns results {stored.Campaign.Code}' lists those it has";
        throw new RefusedException($"The campaign '{stored.Campaign.Code}' has no experiment '{experiment}'; {hint}.");
    }

    private Found Find(long experimentId, string experiment, ObservationPlace place)
    {
        using SqliteStatement select = catalog.Prepare(
            """
            SELECT l.id, l.file_name, m.packed, e.group_set_id, e.campaign_id FROM measurements m
            JOIN loads l ON l.id = m.load_id JOIN experiments e ON e.id = m.experiment_id WHERE m.experiment_id = ?1 ORDER BY l.id
            """);
        select.Bind(1, experimentId);
        var values = new ObservationColumns();
        var found = new List<Found>();
        var files = new List<string>();
        while (select.Read())
        {
            string file = select.Text(1);
            files.Add(file);
            if (place.File is not null && place.File != file)
            {
                continue;
            }

            values.Clear();
            PackedMeasurements.Read(select.Blob(2), values);
            int at = values.Lines.IndexOf(place.Line);
            if (at >= 0)
            {
                using var sets = new GroupSets(catalog, select.Integer(4));
                found.Add(new Found(select.Integer(0), file, sets.Labels(select.NullableInteger(3))[values.Groups[at]], values.Text(at)));
            }
        }

        return found.Count switch
        {
            1 => found[0],
            0 => throw new RefusedException(FormattableString.Invariant(
                $"No value of experiment '{experiment}' stands on line {place.Line}{(place.File is null ? "" : $" of '{place.File}'")}; its values came from {(files.Count == 0 ? "no file yet" : string.Join(", ", files.Distinct()))}. 'campaigns export' lists every value with its file and line.")),
            _ => throw new RefusedException(FormattableString.Invariant(
                $"Line {place.Line} holds a value of experiment '{experiment}' in several files ({string.Join(", ", found.Select(f => f.File))}); name one with --file.")),
        };
    }

    private long Insert(long experimentId, long loadId, ExcludedObservation decision)
    {
        using SqliteStatement next = catalog.Prepare("SELECT coalesce(max(id), 0) + 1 FROM exclusions");
        next.Read();
        long id = next.Integer(0);
        next.Reset();
        using SqliteStatement insert = catalog.Prepare(
            """
            INSERT INTO exclusions (id, experiment_id, load_id, line, is_excluded, group_label, value, reason, named_by, made_at, program_version)
            VALUES (?1, ?2, ?3, ?4, ?5, ?6, ?7, ?8, ?9, ?10, ?11)
            """);
        insert.Bind(1, id).Bind(2, experimentId).Bind(3, loadId).Bind(4, decision.Line).Bind(5, decision.IsExcluded ? 1L : 0L)
            .Bind(6, decision.Group).Bind(7, decision.Value).Bind(8, decision.Reason).Bind(9, decision.NamedBy)
            .Bind(10, catalog.Now).Bind(11, ProgramVersion.Current).Run();
        return id;
    }

    private sealed record Found(long LoadId, string File, string Group, string Value);
}
