using System.Globalization;
using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Model;

/// <summary>What the user typed to see fewer experiments: words and conditions that must all hold.</summary>
/// <remarks>
/// A word is looked for, without regard to case, in code, title, response and status.
/// A condition is a number's name, one of &lt; &lt;= &gt; &gt;= =, and a number: <c>p&lt;0.01</c>, <c>adjusted&lt;=0.05</c>, <c>n&gt;20</c>, <c>groups=3</c>, <c>statistic&gt;5</c>; or <c>survives:yes</c>, <c>survives:no</c>, <c>survives:open</c>.
/// </remarks>
public sealed class ExperimentFilter
{
    private const string SurvivalWord = "survives:";
    private static readonly string[] Signs = ["<=", ">=", "<", ">", "="];
    private readonly List<Predicate<ExperimentResult>> _conditions = [];
    private readonly List<string> _words = [];

    private ExperimentFilter(string text) => Text = text;

    /// <summary>The text it was made of.</summary>
    public string Text { get; }

    /// <summary>Reads a filter.</summary>
    /// <param name="text">What was typed.</param>
    /// <param name="problem">One sentence on the first word that cannot be read; null where all can.</param>
    /// <returns>The filter; null where there is a problem.</returns>
    public static ExperimentFilter? Read(string text, out string? problem)
    {
        ExperimentFilter filter = new(text);
        foreach (string word in text.Split(' ', StringSplitOptions.RemoveEmptyEntries))
        {
            if (!IsCondition(word))
            {
                filter._words.Add(word.ToLowerInvariant());
            }
            else if (ConditionOf(word, out problem) is { } condition)
            {
                filter._conditions.Add(condition);
            }
            else
            {
                return null;
            }
        }

        problem = null;
        return filter;
    }

    /// <summary>The text in which words are looked for.</summary>
    /// <param name="experiment">The experiment.</param>
    public static string Searchable(ExperimentResult experiment) =>
        string.Join('\n', experiment.Plan.Code, experiment.Plan.Title, experiment.Plan.Response, experiment.Status.Word()).ToLowerInvariant();

    /// <summary>Whether an experiment is shown.</summary>
    /// <param name="experiment">The experiment.</param>
    /// <param name="searchable">Its <see cref="Searchable"/> text.</param>
    public bool Shows(ExperimentResult experiment, string searchable)
    {
        foreach (string word in _words)
        {
            if (!searchable.Contains(word, StringComparison.Ordinal))
            {
                return false;
            }
        }

        foreach (Predicate<ExperimentResult> condition in _conditions)
        {
            if (!condition(experiment))
            {
                return false;
            }
        }

        return true;
    }

    private static bool IsCondition(string word) =>
        word.StartsWith(SurvivalWord, StringComparison.OrdinalIgnoreCase) || word.AsSpan().ContainsAny("<>=");

    private static Predicate<ExperimentResult>? ConditionOf(string word, out string? problem)
    {
        problem = null;
        if (word.StartsWith(SurvivalWord, StringComparison.OrdinalIgnoreCase))
        {
            return Survival(word[SurvivalWord.Length..], out problem);
        }

        string sign = Signs.First(s => word.Contains(s, StringComparison.Ordinal));
        int at = word.IndexOf(sign, StringComparison.Ordinal);
        string name = word[..at].ToLowerInvariant();
        if (ExperimentColumn.All.FirstOrDefault(c => c.Name == name && c.IsRightAligned)?.Number is not { } number)
        {
            problem = "Before " + sign + " write p, adjusted, n, groups or statistic.";
            return null;
        }

        if (!double.TryParse(word[(at + sign.Length)..], NumberStyles.Float, CultureInfo.InvariantCulture, out double bound) || !double.IsFinite(bound))
        {
            problem = "After " + name + sign + " write a number like 0.01.";
            return null;
        }

        // p-values are sorted by their logarithms, and compared as what they are.
        return name is "p" or "adjusted"
            ? e => Compares((name == "p" ? e.P : e.AdjustedP)?.Value, sign, bound)
            : e => Compares(number(e), sign, bound);
    }

    private static Predicate<ExperimentResult>? Survival(string answer, out string? problem)
    {
        problem = null;
        switch (answer.ToLowerInvariant())
        {
            case "yes": return e => e.Survives == true;
            case "no": return e => e.Survives == false;
            case "open": return e => e.Survives is null;
            default:
                problem = "After survives: write yes, no or open.";
                return null;
        }
    }

    private static bool Compares(double? value, string sign, double bound) => value is { } v && sign switch
    {
        "<" => v < bound,
        "<=" => v <= bound,
        ">" => v > bound,
        ">=" => v >= bound,
        _ => v == bound,
    };
}
