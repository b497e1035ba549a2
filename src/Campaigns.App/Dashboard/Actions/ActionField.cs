namespace Campaigns.App.Dashboard.Actions;

/// <summary>A text that would fit a field, and how it is shown among others.</summary>
/// <param name="Text">What goes into the field.</param>
/// <param name="Shown">What is shown; the text, with more about it.</param>
internal sealed record Suggestion(string Text, string Shown);

/// <summary>Something that an action asks for: a text, or one of a few words.</summary>
/// <param name="name">Its name, in a word or two.</param>
/// <param name="hint">What it means, in a sentence.</param>
/// <param name="text">What it holds at first.</param>
internal sealed class ActionField(string name, string hint, string text)
{
    /// <summary>Its name.</summary>
    public string Name { get; } = name;

    /// <summary>What it means.</summary>
    public string Hint { get; } = hint;

    /// <summary>What it holds.</summary>
    public string Text { get; set; } = text;

    /// <summary>The words that it may hold; empty where any text may stand.</summary>
    public IReadOnlyList<string> Words { get; init; } = [];

    /// <summary>What to say where it is left empty; null where it may be.</summary>
    public string? IfEmpty { get; init; }

    /// <summary>Texts that would fit what was typed so far; null where nothing can be known.</summary>
    public Func<ActionValues, IReadOnlyList<Suggestion>>? Suggest { get; init; }

    /// <summary>Goes on to the next word, or the one before.</summary>
    /// <param name="step">1 or -1.</param>
    public void Turn(int step)
    {
        int now = Words.ToList().IndexOf(Text);
        Text = Words[(now + step + Words.Count) % Words.Count];
    }
}

/// <summary>What was typed into the fields of an action, by their names.</summary>
/// <param name="values">Name and text.</param>
internal sealed class ActionValues(IEnumerable<KeyValuePair<string, string>> values)
{
    private readonly Dictionary<string, string> _values = new(values);

    /// <summary>The text of a field, without blanks at its ends.</summary>
    /// <param name="name">The field's name.</param>
    public string this[string name] => _values[name].Trim();

    /// <summary>The text of a field; null where it is empty.</summary>
    /// <param name="name">The field's name.</param>
    public string? Given(string name) => this[name] is { Length: > 0 } text ? text : null;
}
