using Campaigns.App.Wording;
using Campaigns.Catalog.Ledger;

namespace Campaigns.App.Dashboard.Model;

/// <summary>What the user typed to see fewer entries of the ledger: words and conditions that must all hold.</summary>
/// <remarks>
/// A word is looked for, without regard to case, in the entry's sentence, in its changes, and in the word of its action.
/// <c>action:exclude</c> and <c>by:ada</c> look there alone; <c>experiment:E12</c> takes what touched that experiment of the open campaign, whether or not the entry names it.
/// </remarks>
public sealed class LedgerSearch
{
    private const string ActionWord = "action:", ByWord = "by:", ExperimentWord = "experiment:";
    private readonly List<string> _words = [];
    private readonly List<string> _actions = [];
    private readonly List<string> _people = [];

    private LedgerSearch()
    {
    }

    /// <summary>Code of the experiment asked for; null for none.</summary>
    public string? Experiment { get; private set; }

    /// <summary>Reads what was typed; everything can be read.</summary>
    /// <param name="text">What was typed.</param>
    public static LedgerSearch Read(string text)
    {
        ArgumentNullException.ThrowIfNull(text);
        LedgerSearch search = new();
        foreach (string word in text.Split(' ', StringSplitOptions.RemoveEmptyEntries))
        {
            if (After(word, ActionWord) is { } action)
            {
                search._actions.Add(action.ToLowerInvariant());
            }
            else if (After(word, ByWord) is { } name)
            {
                search._people.Add(name);
            }
            else if (After(word, ExperimentWord) is { } code)
            {
                search.Experiment = code.Length == 0 ? search.Experiment : code;
            }
            else
            {
                search._words.Add(word.ToLowerInvariant());
            }
        }

        return search;
    }

    /// <summary>The text in which words are looked for.</summary>
    /// <param name="entry">The entry.</param>
    public static string Searchable(LedgerEntry entry)
    {
        ArgumentNullException.ThrowIfNull(entry);
        return string.Join('\n', [entry.Action, LedgerText.Sentence(entry), .. entry.Changes.Select(LedgerText.Change)]).ToLowerInvariant();
    }

    /// <summary>Whether an entry is shown, as far as its own words go.</summary>
    /// <param name="entry">The entry.</param>
    /// <param name="searchable">Its <see cref="Searchable"/> text; asked for only where there are words.</param>
    public bool Shows(LedgerEntry entry, Func<string> searchable)
    {
        ArgumentNullException.ThrowIfNull(entry);
        ArgumentNullException.ThrowIfNull(searchable);
        return _actions.TrueForAll(a => entry.Action.StartsWith(a, StringComparison.Ordinal))
            && _people.TrueForAll(name => Has(entry.By.Account, name) || (entry.By.ActingAs is { } other && Has(other, name)))
            && (_words.Count == 0 || (searchable() is var text && _words.TrueForAll(w => text.Contains(w, StringComparison.Ordinal))));
    }

    private static bool Has(string text, string part) => text.Contains(part, StringComparison.OrdinalIgnoreCase);

    private static string? After(string word, string name) => word.StartsWith(name, StringComparison.OrdinalIgnoreCase) ? word[name.Length..] : null;
}
