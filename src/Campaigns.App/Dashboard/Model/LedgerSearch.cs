using System.Globalization;
using Campaigns.App.Wording;
using Campaigns.Catalog.Ledger;

namespace Campaigns.App.Dashboard.Model;

/// <summary>What the user typed to see fewer entries of the ledger: words and conditions that must all hold.</summary>
/// <remarks>
/// A word is looked for, without regard to case, in what was done and its action's word, campaign, subject, reason, changes, names, number and time; one of twelve signs and more also at the beginning of the hash.
/// <c>action:exclude</c> and <c>by:ada</c> look there alone; <c>experiment:E12</c> takes what touched that experiment of the open campaign, whether or not the entry names it; a head as it was printed takes its entry.
/// Nothing is put together or kept for an entry: a hundred thousand of them are searched between two strokes of a key.
/// </remarks>
public sealed class LedgerSearch
{
    private const string ActionWord = "action:", ByWord = "by:", ExperimentWord = "experiment:";
    private const int LongEnoughForHash = 12;
    private readonly List<string> _words = [];
    private readonly List<string> _actions = [];
    private readonly List<string> _people = [];
    private readonly List<LedgerHead> _heads = [];
    private readonly Dictionary<string, string> _deeds = [];

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
                search._actions.Add(action);
            }
            else if (After(word, ByWord) is { } name)
            {
                search._people.Add(name);
            }
            else if (After(word, ExperimentWord) is { } code)
            {
                search.Experiment = code.Length == 0 ? search.Experiment : code;
            }
            else if (LedgerHead.TryParse(word, out LedgerHead head))
            {
                search._heads.Add(head);
            }
            else
            {
                search._words.Add(word);
            }
        }

        return search;
    }

    /// <summary>Whether an entry is shown, as far as its own words go.</summary>
    /// <param name="entry">The entry.</param>
    public bool Shows(LedgerEntry entry)
    {
        ArgumentNullException.ThrowIfNull(entry);
        return All(_actions, entry, static (e, action) => e.Action.StartsWith(action, StringComparison.OrdinalIgnoreCase))
            && All(_people, entry, static (e, name) => Has(e.By.Account, name) || Has(e.By.ActingAs, name))
            && All(_heads, entry, static (e, head) => e.Sequence == head.Sequence && e.Hash == head.Hash)
            && All(_words, entry, Holds);
    }

    private static bool All<T>(List<T> conditions, LedgerEntry entry, Func<LedgerEntry, T, bool> holds)
    {
        foreach (T condition in conditions)
        {
            if (!holds(entry, condition))
            {
                return false;
            }
        }

        return true;
    }

    private bool Holds(LedgerEntry entry, string word)
    {
        if (Has(entry.Action, word) || Has(entry.Campaign, word) || Has(entry.Subject, word) || Has(entry.Reason, word) || Has(entry.By.Account, word) || Has(entry.By.ActingAs, word) || Has(Deed(entry), word))
        {
            return true;
        }

        foreach (LedgerChange change in entry.Changes)
        {
            if (Has(change.What, word) || Has(change.Before, word) || Has(change.After, word))
            {
                return true;
            }
        }

        Span<char> text = stackalloc char[32];
        return (entry.Sequence.TryFormat(text, out int length, default, CultureInfo.InvariantCulture) && ((ReadOnlySpan<char>)text[..length]).Contains(word, StringComparison.Ordinal))
            || (entry.At.UtcDateTime.TryFormat(text, out length, "yyyy-MM-dd HH:mm:ss", CultureInfo.InvariantCulture) && ((ReadOnlySpan<char>)text[..length]).Contains(word, StringComparison.Ordinal))
            || (word.Length >= LongEnoughForHash && entry.Hash.StartsWith(word, StringComparison.OrdinalIgnoreCase));
    }

    /// <summary>What such an action is called, without what it was done to.</summary>
    private string Deed(LedgerEntry entry)
    {
        if (!_deeds.TryGetValue(entry.Action, out string? deed))
        {
            _deeds[entry.Action] = deed = LedgerText.Deed(entry with { Campaign = "", Subject = null });
        }

        return deed;
    }

    private static bool Has(string? text, string part) => text is not null && text.Contains(part, StringComparison.OrdinalIgnoreCase);

    private static string? After(string word, string name) => word.StartsWith(name, StringComparison.OrdinalIgnoreCase) ? word[name.Length..] : null;
}
