using System.Globalization;
using Campaigns.App.Commands;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Wording;
using Campaigns.Catalog.Excluding;
using Campaigns.Catalog.Plans;
using Campaigns.Catalog.Results;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Actions;

/// <summary>Leaves an observation out of the analysis, or takes it in again.</summary>
internal sealed class ExcludeAction : DashboardAction
{
    private const string Experiment = "experiment";
    private const string Line = "line";
    private const string Decision = "decision";
    private const string Reason = "reason";
    private const string Out = "leave out";
    private const string In = "take in again";
    private const string Of = " of ";

    /// <inheritdoc/>
    public override char Key => 'x';

    /// <inheritdoc/>
    public override string Name => "exclude an observation";

    /// <inheritdoc/>
    public override string Does => "Leaves one observation out of the analysis with a reason, or takes it in again. The value is kept, results with and without it are shown.";

    /// <inheritdoc/>
    public override IReadOnlyList<ActionField> Fields(DashboardModel model, ActionDesk desk)
    {
        string campaign = model.Standing.Campaign.Code;
        return
        [
            new(Experiment, "Its code.", model.Selected?.Plan.Code ?? "")
            {
                IfEmpty = "Which experiment? Type its code.",
                Suggest = values => CodeList.StartingWith(values[Experiment], model.Standing.Experiments.Select(e => (e.Plan.Code, e.Plan.Title))),
            },
            new(Line, "Line of the observation in the file that brought it, for example 41, or 41 of week-01.csv where several files hold one. Tab lists them.", "")
            {
                IfEmpty = "Which observation? Type its line in its file; Tab lists them.",
                Suggest = values => Observations(desk, campaign, values),
            },
            new(Decision, "Leave it out, or take in again what was left out; both are recorded.", Out) { Words = [Out, In] },
            new(Reason, "Why; recorded, and shown wherever the experiment is.", "") { IfEmpty = "Why? A reason is recorded with every such decision." },
        ];
    }

    /// <inheritdoc/>
    public override Preview Rehearse(ActionWork work)
    {
        CampaignStore campaigns = new(work.Catalog);
        CampaignOverview before = new OverviewReader(work.Catalog).Read(campaigns.Get(work.Campaign));
        ExcludedObservation decision = Decide(work);
        CampaignOverview after = new OverviewReader(work.Catalog).Read(campaigns.Get(work.Campaign));
        return new Preview([ExclusionText.Foreseen(decision), .. DecisionPreview.Of(before, after, before.TestedCount > 0)]);
    }

    /// <inheritdoc/>
    public override IReadOnlyList<string> CarryOut(ActionWork work)
    {
        List<string> sentences = [ExclusionText.Recorded(Decide(work)), "The page Experiments shows the test with and without what is left out."];
        if (ExclusionText.Next(new CampaignStore(work.Catalog).Get(work.Campaign).Campaign, work.Steps) is { } next)
        {
            sentences.Add(next);
        }

        return sentences;
    }

    private static ExcludedObservation Decide(ActionWork work) =>
        new ExclusionStore(work.Catalog).Decide(work.Campaign, work.Values[Experiment], Place(work.Values[Line]), exclude: work.Values[Decision] == Out, work.Values[Reason], work.Catalog.Actor.Name);

    /// <summary>Reads "41" or "41 of week-01.csv".</summary>
    private static ObservationPlace Place(string typed)
    {
        int of = typed.IndexOf(Of, StringComparison.Ordinal);
        string line = of < 0 ? typed : typed[..of];
        return int.TryParse(line.Trim(), NumberStyles.None, CultureInfo.InvariantCulture, out int number) && number > 0
            ? new ObservationPlace(number, of < 0 ? null : typed[(of + Of.Length)..].Trim())
            : throw new UsageException($"The line is a whole number from 1, for example 41, or 41 of week-01.csv, not '{typed}'.");
    }

    private static IReadOnlyList<Suggestion> Observations(ActionDesk desk, string campaign, ActionValues values)
    {
        using Catalog.Catalog catalog = desk.Open(null);
        return
        [
            .. new ObservationReader(catalog).Read(campaign, values[Experiment])
                .Select(o => (Text: FormattableString.Invariant($"{o.Line}{Of}{o.File}"), Seen: o))
                .Where(o => o.Text.StartsWith(values[Line], StringComparison.Ordinal))
                .Select(o => new Suggestion(o.Text, $"{o.Text}: {o.Seen.Group}, {o.Seen.Value}{(o.Seen.IsExcluded ? " (left out)" : "")}")),
        ];
    }
}
