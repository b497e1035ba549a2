using Campaigns.App.Commands;
using Campaigns.App.Dashboard.Model;
using Campaigns.App.Output;
using Campaigns.App.Wording;
using Campaigns.Catalog;
using Campaigns.Catalog.Ledger;

namespace Campaigns.App.Dashboard.Actions;

/// <summary>How far an action is.</summary>
internal enum ActionStage
{
    /// <summary>The fields are filled in.</summary>
    Form,

    /// <summary>What would happen is being found out.</summary>
    Rehearsing,

    /// <summary>What would happen is shown.</summary>
    Preview,

    /// <summary>It is carried out.</summary>
    Working,

    /// <summary>What was done is shown.</summary>
    Done,

    /// <summary>It was refused, or stopped; nothing was changed.</summary>
    Refused,
}

/// <summary>One action from its form to its end: asked, previewed, carried out on a thread of its own, told. It knows no terminal.</summary>
/// <remarks>For one thread, which calls <see cref="Look"/> now and then.</remarks>
internal sealed class ActionRun : IDisposable
{
    /// <summary>For so long a preview stands before Enter counts: a key pressed twice by mistake must not carry out what nobody has read.</summary>
    public static readonly TimeSpan ReadingTime = TimeSpan.FromMilliseconds(300);

    private readonly DashboardModel _model;
    private readonly ActionDesk _desk;
    private readonly string _campaign;
    private SideJob<Finding>? _work;
    private WorkProgress? _progress;
    private LedgerHead? _seen;
    private Preview? _preview;
    private long _began;
    private bool _isOutrun;

    /// <summary>Begins with the form.</summary>
    /// <param name="action">The action.</param>
    /// <param name="model">What the dashboard shows.</param>
    /// <param name="desk">Where the catalog is opened.</param>
    public ActionRun(DashboardAction action, DashboardModel model, ActionDesk desk)
    {
        (Action, _model, _desk, _campaign) = (action, model, desk, model.Standing.Campaign.Code);
        Fields = action.Fields(model, desk);
    }

    /// <summary>The action.</summary>
    public DashboardAction Action { get; }

    /// <summary>What it asks for.</summary>
    public IReadOnlyList<ActionField> Fields { get; }

    /// <summary>How far it is.</summary>
    public ActionStage Stage { get; private set; }

    /// <summary>What is wrong with the form: the field, and a sentence; null where nothing is known to be.</summary>
    public (int Field, string Sentence)? Complaint { get; private set; }

    /// <summary>What would happen, what was done, or why it was refused; empty before the first preview.</summary>
    public IReadOnlyList<string> Sentences { get; private set; } = [];

    /// <summary>Whether the preview that is shown would change anything.</summary>
    public bool HasEffect => _preview?.HasEffect == true;

    /// <summary>Whether it was refused because somebody else changed the campaign after the preview.</summary>
    public bool IsOutrun => Stage == ActionStage.Refused && _isOutrun;

    /// <summary>Whether it was asked to stop and has not yet.</summary>
    public bool IsStopping => _work?.IsStopping == true;

    /// <summary>Share of the work that is done, from 0 to 1; null where that is not known.</summary>
    public double? Share => _progress is { Total: > 0 } p ? Math.Clamp((double)p.Done / p.Total, 0, 1) : null;

    /// <summary>How far the work is, in words.</summary>
    public string Progress
    {
        get
        {
            TimeSpan elapsed = _desk.Clock.GetElapsedTime(_began);
            return IsStopping ? "stopping; nothing half done is kept"
                : _progress is { } p ? ProgressLine.Describe(p, elapsed)
                : FormattableString.Invariant($"at work for {elapsed.TotalSeconds:0} s");
        }
    }

    private ActionValues Values => new(Fields.Select(f => KeyValuePair.Create(f.Name, f.Text)));

    /// <summary>Texts that would fit a field.</summary>
    /// <param name="field">Its place, from 0.</param>
    public IReadOnlyList<Suggestion> Suggest(int field)
    {
        try
        {
            return Fields[field].Suggest?.Invoke(Values) ?? [];
        }
        catch (Exception thrown) when (thrown is not OutOfMemoryException)
        {
            Complaint = (field, Fault.Of(thrown).Sentence);
            return [];
        }
    }

    /// <summary>Takes a text that was typed into a field.</summary>
    /// <param name="field">Its place, from 0.</param>
    /// <param name="text">The text.</param>
    public void Type(int field, string text)
    {
        Fields[field].Text = text.IsNormalized() ? text : text.Normalize();
        Complaint = null;
    }

    /// <summary>One step on: from the form to the preview, from there to carrying out; back to the form after a refusal.</summary>
    /// <returns>Whether there is nothing left to do.</returns>
    public bool Next()
    {
        switch (Stage)
        {
            case ActionStage.Form:
                Complaint = FirstComplaint();
                if (Complaint is null)
                {
                    Rehearse();
                }

                return false;
            case ActionStage.Preview when !HasEffect:
            case ActionStage.Done:
                return true;
            case ActionStage.Preview:
                if (_desk.Clock.GetElapsedTime(_began) >= ReadingTime)
                {
                    CarryOut();
                }

                return false;
            case ActionStage.Refused when _isOutrun:
                Rehearse();
                return false;
            case ActionStage.Refused:
                Stage = ActionStage.Form;
                return false;
            default:
                return false;
        }
    }

    /// <summary>One step back: what is under way is stopped, a preview or a refusal gives way to the form.</summary>
    /// <returns>Whether there is nothing to go back to.</returns>
    public bool Back()
    {
        switch (Stage)
        {
            case ActionStage.Rehearsing or ActionStage.Working:
                _work?.Stop();
                return false;
            case ActionStage.Preview or ActionStage.Refused:
                Stage = ActionStage.Form;
                return false;
            default:
                return true;
        }
    }

    /// <summary>Takes what the other thread has so far.</summary>
    /// <returns>Whether something that is shown may have changed.</returns>
    public bool Look()
    {
        if (_work is null)
        {
            return false;
        }

        _progress = _work.Progress ?? _progress;
        if (_work.IsOver)
        {
            (Finding? result, Exception? thrown) = (_work.Result, _work.Thrown);
            _work.Dispose();
            _work = null;
            Take(result, thrown);
        }

        return true;
    }

    /// <summary>Stops what is under way and waits a while for its end.</summary>
    /// <param name="patience">How long.</param>
    public void StopAndWait(TimeSpan patience) => _work?.StopAndWait(patience);

    /// <inheritdoc/>
    public void Dispose()
    {
        _work?.Dispose();
        _work = null;
    }

    private (int Field, string Sentence)? FirstComplaint()
    {
        for (int i = 0; i < Fields.Count; i++)
        {
            string text = Fields[i].Text.Trim();
            if ((text.Length == 0 ? Fields[i].IfEmpty : Commands.Complaint.Unwritable(text)) is { } sentence)
            {
                return (i, sentence);
            }
        }

        return null;
    }

    private void Rehearse()
    {
        ActionValues values = Values;
        Begin(ActionStage.Rehearsing, (report, cancel) =>
        {
            using Catalog.Catalog catalog = _desk.Open(null);
            catalog.StopOn(cancel);
            (Preview preview, LedgerHead seen) = catalog.Rehearse(() =>
            {
                if (Action.Changes)
                {
                    catalog.DemandWritable();
                }

                return Action.Rehearse(new ActionWork(catalog, _campaign, values, cancel) { Report = report });
            });
            return new Finding(preview, seen, []);
        });
    }

    private void CarryOut()
    {
        ActionValues values = Values;
        LedgerHead? seen = _seen;
        long expected = _preview!.Expected;
        Begin(ActionStage.Working, (report, cancel) =>
        {
            using Catalog.Catalog catalog = _desk.Open(seen);
            catalog.StopOn(cancel);
            return new Finding(null, null, Action.CarryOut(new ActionWork(catalog, _campaign, values, cancel) { Report = report, Expected = expected }));
        });
    }

    private void Begin(ActionStage stage, Func<Action<WorkProgress>, CancellationToken, Finding> work)
    {
        (Stage, _progress, _isOutrun, _began) = (stage, null, false, _desk.Clock.GetTimestamp());
        _work = new SideJob<Finding>(work);
    }

    private void Take(Finding? finding, Exception? thrown)
    {
        bool wasWorking = Stage == ActionStage.Working;
        _began = _desk.Clock.GetTimestamp();
        if (thrown is not null)
        {
            Refuse(thrown, wasWorking);
        }
        else if (wasWorking)
        {
            Stage = ActionStage.Done;
            Sentences = [.. finding!.Done, .. ShowChange()];
        }
        else
        {
            (Stage, _preview, _seen) = (ActionStage.Preview, finding!.Preview, finding.Seen);
            Sentences = _preview is { HasEffect: true, IsRecorded: true } ? [.. _preview!.Sentences, _desk.Signature] : _preview!.Sentences;
        }
    }

    private void Refuse(Exception thrown, bool wasWorking)
    {
        var fault = Fault.Of(thrown);
        Stage = ActionStage.Refused;
        _isOutrun = false;
        if (thrown is ChangedSinceException outrun)
        {
            _isOutrun = true;
            Sentences = ["Somebody changed this campaign after the preview, so that it may not hold any more; nothing was changed now. What was done since:", .. outrun.Since.Select(LedgerText.Sentence), .. ShowChange()];
        }
        else if (fault.Code == ExitCode.Stopped)
        {
            Sentences = [wasWorking ? "Stopped: nothing was changed." : "The preview was stopped."];
        }
        else
        {
            Sentences = [fault.Sentence, .. fault.Details];
        }
    }

    /// <summary>Loads the campaign again, so that the pages behind show what stands now; a sentence where that cannot be done.</summary>
    private IEnumerable<string> ShowChange()
    {
        try
        {
            _model.Reload();
            return [];
        }
        catch (CatalogException error)
        {
            return [$"The pages still show what stood before: {error.Message} F5 loads them again."];
        }
    }

    /// <summary>What the other thread found out or did.</summary>
    private sealed record Finding(Preview? Preview, LedgerHead? Seen, IReadOnlyList<string> Done);
}
