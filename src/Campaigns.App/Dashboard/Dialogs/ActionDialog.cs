using Campaigns.App.Dashboard.Actions;
using Campaigns.App.Dashboard.Canvas;
using Campaigns.App.Dashboard.Paint;
using Campaigns.App.Dashboard.Screen;
using Terminal.Gui.App;
using Terminal.Gui.Input;
using Terminal.Gui.ViewBase;
using Suggestion = Campaigns.App.Dashboard.Actions.Suggestion;

namespace Campaigns.App.Dashboard.Dialogs;

/// <summary>Shows one action from its form to its end.</summary>
internal sealed class ActionDialog : PopUp
{
    private const int UsualWidth = 100;
    private const int LeastRows = 10;
    private const int MostRows = 26;

    // Shorter than the time that the terminal's guard leaves after a signal.
    private static readonly TimeSpan PatienceAtEnd = TimeSpan.FromSeconds(1);

    private readonly ActionRun _run;
    private readonly TextBox?[] _texts;
    private readonly ScrollPane _scroll;
    private IReadOnlyList<Suggestion> _suggestions = [];
    private ActionStage _shown;
    private int _field;
    private bool _isFilling;

    /// <summary>Makes the dialog; it does not own the action.</summary>
    /// <param name="run">The action, at its form.</param>
    /// <param name="glyphs">The signs.</param>
    /// <param name="theme">How meanings look.</param>
    public ActionDialog(ActionRun run, GlyphSet glyphs, Theme theme)
        : base(glyphs, theme, UsualWidth)
    {
        _run = run;
        _scroll = new ScrollPane(width => ActionStagePainter.PaintSentences(run, width, glyphs));
        _texts = [.. run.Fields.Select((field, i) => field.Words.Count > 0 ? null : TextOf(i, field))];
        _field = Math.Max(0, run.Fields.ToList().FindIndex(f => f.Words.Count == 0 && f.Text.Length == 0));
    }

    /// <inheritdoc/>
    protected override string Heading => _run.Action.Name;

    /// <inheritdoc/>
    protected override IReadOnlyList<(string Key, string Does, Key Pressed)> Keys => _run.Stage switch
    {
        ActionStage.Form => [("Enter", "preview", Key.Enter), .. FieldKeys(), ("Esc", "close", Key.Esc)],
        ActionStage.Rehearsing or ActionStage.Working => [("Esc", "stop", Key.Esc)],
        ActionStage.Preview when _run.HasEffect => [("Enter", "carry it out", Key.Enter), ("Esc", "change something", Key.Esc), ("Up/Down", "scroll", Key.CursorDown)],
        ActionStage.Preview => [("Enter", "close", Key.Enter), ("Esc", "change something", Key.Esc)],
        ActionStage.Done => [("Enter", "close", Key.Enter), ("Up/Down", "scroll", Key.CursorDown)],
        _ => [("Enter", _run.IsOutrun ? "preview again" : "back to the form", Key.Enter), ("Up/Down", "scroll", Key.CursorDown)],
    };

    /// <inheritdoc/>
    protected override int WantedRows(int width) => Math.Clamp(
        _run.Stage switch
        {
            ActionStage.Form => ActionFormPainter.FirstSuggestionRow(_run, _field, width) + Math.Max(1, _suggestions.Count),
            ActionStage.Rehearsing or ActionStage.Working => 0,
            _ => ActionStagePainter.PaintSentences(_run, width, Glyphs).Height,
        },
        LeastRows,
        MostRows);

    /// <inheritdoc/>
    protected override TextCanvas PaintBody(int width, int height) => _run.Stage switch
    {
        ActionStage.Form => ActionFormPainter.Paint(_run, _field, _suggestions, width, height, Glyphs),
        ActionStage.Rehearsing or ActionStage.Working => ActionStagePainter.PaintWork(_run, width, height, Glyphs),
        _ => _scroll.Paint(width, height),
    };

    /// <inheritdoc/>
    protected override void ClickBody(int x, int y)
    {
        if (_run.Stage != ActionStage.Form)
        {
            return;
        }

        int field = y - ActionFormPainter.FirstFieldRow(_run, BodyWidth), suggestion = y - ActionFormPainter.FirstSuggestionRow(_run, _field, BodyWidth);
        if (field >= 0 && field < _run.Fields.Count)
        {
            MoveTo(field);
            if (_run.Fields[field].Words.Count > 0)
            {
                _run.Fields[field].Turn(1);
            }
        }
        else if (suggestion >= 0 && suggestion < _suggestions.Count)
        {
            Fill(_suggestions[suggestion].Text);
        }
    }

    /// <inheritdoc/>
    protected override void Wheel(int lines)
    {
        _scroll.Move(lines);
        Redraw();
    }

    /// <inheritdoc/>
    protected override void OnIsRunningChanged(bool newIsRunning)
    {
        base.OnIsRunningChanged(newIsRunning);
        if (newIsRunning)
        {
            App!.Iteration += OnTurn;
            Show();
        }
        else
        {
            if (App is { } app)
            {
                app.Iteration -= OnTurn;
            }

            _run.StopAndWait(PatienceAtEnd);
        }
    }

    /// <inheritdoc/>
    protected override void Obey(Key key)
    {
        if (key == Key.Esc ? _run.Back() : key == Key.Enter && _run.Next())
        {
            App?.RequestStop(this);
        }
        else if (_run.Stage == ActionStage.Form && key != Key.Enter && key != Key.Esc)
        {
            ObeyInForm(key);
        }
        else if (_run.Stage is ActionStage.Preview or ActionStage.Done or ActionStage.Refused)
        {
            _scroll.Obey(key);
        }

        Show();
    }

    private IEnumerable<(string Key, string Does, Key Pressed)> FieldKeys()
    {
        ActionField field = _run.Fields[_field];
        if (field.Words.Count > 0)
        {
            yield return ("Left/Right", "choose", Key.CursorRight);
        }

        if (_run.Fields.Count > 1 || field.Suggest is not null)
        {
            yield return ("Tab", field.Suggest is not null ? "complete, next field" : "next field", Key.Tab);
        }
    }

    private void ObeyInForm(Key key)
    {
        ActionField field = _run.Fields[_field];
        if (key == Key.Tab && field.Suggest is not null)
        {
            Complete();
        }
        else if (key == Key.Tab || key == Key.CursorDown)
        {
            MoveTo(_field + 1);
        }
        else if (key == Key.Tab.WithShift || key == Key.CursorUp)
        {
            MoveTo(_field - 1);
        }
        else if (field.Words.Count > 0 && (key == Key.CursorRight || key == Key.CursorLeft || key == Key.Space))
        {
            field.Turn(key == Key.CursorLeft ? -1 : 1);
        }
    }

    // What can be completed is; what cannot is listed once, and the next time the key goes on to the next field.
    private void Complete()
    {
        string typed = _run.Fields[_field].Text.Trim();
        bool wasListed = _suggestions.Count > 0;
        _suggestions = _run.Suggest(_field);
        string[] texts = [.. _suggestions.Select(s => s.Text)];
        string common = texts.Length == 0 ? typed : FileNames.CommonStart(texts);
        if (common.Length > typed.Length)
        {
            IReadOnlyList<Suggestion> left = texts.Length > 1 ? _suggestions : [];
            Fill(common);
            _suggestions = left;
        }
        else if (_run.Complaint is null && (wasListed || texts.Length == 0 || (texts.Length == 1 && texts[0] == typed)))
        {
            MoveTo(_field + 1);
        }
    }

    private void Fill(string text)
    {
        if (_texts[_field] is { } box)
        {
            box.Text = text;
            box.InsertionPoint = text.Length;
        }
    }

    private void MoveTo(int field)
    {
        _field = (field + _run.Fields.Count) % _run.Fields.Count;
        _suggestions = [];
        FocusField();
    }

    private void FocusField()
    {
        View taker = _run.Stage == ActionStage.Form && _texts[_field] is { } box ? box : Whole;
        taker.SetFocus();
    }

    private TextBox TextOf(int place, ActionField field)
    {
        TextBox box = new() { Text = field.Text };
        box.X = Pos.Func(_ => Edge + ActionFormPainter.FieldColumn(_run));
        box.Y = Pos.Func(_ => 1 + ActionFormPainter.FirstFieldRow(_run, BodyWidth) + place);
        box.Width = Dim.Func(_ => Math.Max(0, BodyWidth - ActionFormPainter.FieldColumn(_run)));
        box.ValueChanged += (_, e) =>
        {
            _run.Type(place, e.NewValue ?? "");
            _suggestions = [];
            Redraw();
        };
        box.HasFocusChanged += (_, _) =>
        {
            if (box.HasFocus && _field != place)
            {
                _field = place;
                _suggestions = [];
                Redraw();
            }
        };
        Add(box);
        return box;
    }

    private void OnTurn(object? sender, EventArgs<IApplication?> e)
    {
        if (_run.Look())
        {
            Show();
        }
    }

    // Text fields belong to the form alone; what is wrong there is where the cursor goes.
    private void Show()
    {
        if (_run.Stage == ActionStage.Form && _run.Complaint is { } complaint && complaint.Field != _field)
        {
            _field = complaint.Field;
            _isFilling = false;
        }

        bool isForm = _run.Stage == ActionStage.Form;
        if (_shown != _run.Stage || isForm != _isFilling)
        {
            (_shown, _isFilling) = (_run.Stage, isForm);
            _scroll.ToTop();
            foreach (TextBox? box in _texts)
            {
                box?.Visible = isForm;
            }

            FocusField();
        }

        Redraw();
    }
}
