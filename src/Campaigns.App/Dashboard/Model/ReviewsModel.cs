using Campaigns.Domain;

namespace Campaigns.App.Dashboard.Model;

/// <summary>What the reviews page knows: which experiment survived in which review, the review that the keys act on, and the two that are compared.</summary>
/// <remarks>Read when it is first asked for, and again after a campaign was opened or loaded again. For one thread.</remarks>
/// <param name="model">The dashboard.</param>
public sealed class ReviewsModel(DashboardModel model)
{
    /// <summary>A comparison of reviews with more experiments than this may take a good part of a second.</summary>
    private const int ManyExperiments = 5_000;

    private const int KeptComparisons = 4;
    private readonly List<((int Earlier, int Later) Pair, ReviewDifferences Found)> _comparisons = [];
    private IReadOnlyList<ReviewRecord> _records = [];
    private IReadOnlyList<ExperimentHistory> _experiments = [];
    private ExperimentHistory[] _changed = [];
    private string _campaign = "";
    private int _edition = -1;
    private int _review;
    private int _row;

    /// <summary>The reviews with what stood behind each, oldest first.</summary>
    public IReadOnlyList<ReviewRecord> Reviews
    {
        get
        {
            Refresh();
            return _records;
        }
    }

    /// <summary>Every experiment through all reviews, in the plan's order; empty before the first review.</summary>
    public IReadOnlyList<ExperimentHistory> Experiments
    {
        get
        {
            Refresh();
            return _experiments;
        }
    }

    /// <summary>How many of them survive in one review and not in another.</summary>
    public int ChangedCount
    {
        get
        {
            Refresh();
            return _changed.Length;
        }
    }

    /// <summary>Whether all experiments are shown, and not only those that changed.</summary>
    public bool ShowsAll { get; private set; }

    /// <summary>The rows shown.</summary>
    public IReadOnlyList<ExperimentHistory> Rows => ShowsAll ? Experiments : Changed();

    /// <summary>The selected row, from 0; -1 where no row is shown.</summary>
    public int Row => Rows.Count == 0 ? -1 : Math.Min(_row, Rows.Count - 1);

    /// <summary>The review that the keys act on, from 0; -1 before the first.</summary>
    public int Review => Reviews.Count == 0 ? -1 : _review;

    /// <summary>The review held to be compared with another, from 0; null for the one before.</summary>
    public int? Held { get; private set; }

    /// <summary>The two reviews compared, from 0; null where there is nothing to compare with.</summary>
    public (int Earlier, int Later)? Compared
    {
        get
        {
            int other = Held ?? Review - 1;
            return Review < 0 || other < 0 || other == Review ? null : (Math.Min(other, Review), Math.Max(other, Review));
        }
    }

    /// <summary>Whether what lies between the two must first be computed, and that may take a moment.</summary>
    public bool IsComparisonSlow => Compared is { } pair && Experiments.Count > ManyExperiments && !_comparisons.Exists(c => c.Pair == pair);

    /// <summary>What lies between the two reviews compared; null where there is nothing to compare with.</summary>
    public ReviewDifferences? Comparison()
    {
        if (Compared is not { } pair)
        {
            return null;
        }

        int at = _comparisons.FindIndex(c => c.Pair == pair);
        if (at >= 0)
        {
            return _comparisons[at].Found;
        }

        (ReviewComparison comparison, IReadOnlyDictionary<long, string> codes) = model.Source.Compare(_campaign, _records[pair.Earlier].Head.Number, _records[pair.Later].Head.Number);
        ReviewDifferences found = new(comparison, [.. comparison.Differences.Select(d => (codes[d.Key], d))]);
        if (_comparisons.Count == KeptComparisons)
        {
            _comparisons.RemoveAt(0);
        }

        _comparisons.Add((pair, found));
        return found;
    }

    /// <summary>Selects a row; beyond the ends the nearest.</summary>
    /// <param name="row">Row from 0.</param>
    public void Select(int row) => _row = Math.Clamp(row, 0, Math.Max(0, Rows.Count - 1));

    /// <summary>Goes to a review; beyond the ends the nearest.</summary>
    /// <param name="review">Review from 0.</param>
    public void GoTo(int review) => _review = Math.Clamp(review, 0, Math.Max(0, Reviews.Count - 1));

    /// <summary>Holds the review at hand to compare others with it; again, lets it go.</summary>
    public void Hold() => Held = Review < 0 || Held == Review ? null : Review;

    /// <summary>Lets the review go that is held.</summary>
    /// <returns>Whether one was.</returns>
    public bool LetGo()
    {
        bool held = Held is not null;
        Held = null;
        return held;
    }

    /// <summary>Shows all experiments, or only those that changed. The selected experiment stays selected where it is shown.</summary>
    public void ShowAll()
    {
        string? code = Row < 0 ? null : Rows[Row].Code;
        ShowsAll = !ShowsAll;
        _row = Math.Max(0, Rows.ToList().FindIndex(e => e.Code == code));
    }

    private ExperimentHistory[] Changed()
    {
        Refresh();
        return _changed;
    }

    private void Refresh()
    {
        if (_edition == model.Edition)
        {
            return;
        }

        bool isOther = _campaign != model.Standing.Campaign.Code;
        int before = _records.Count;
        (_edition, _campaign) = (model.Edition, model.Standing.Campaign.Code);
        _comparisons.Clear();
        _records = model.Source.Reviews(_campaign);
        _experiments = _records.Count == 0 ? [] : model.Source.History(_campaign).Experiments;
        _changed = [.. _experiments.Where(e => e.HasChanged)];
        if (isOther)
        {
            (_row, Held) = (0, null);
        }

        // Reviews are only added: the newest is what one wants to see first.
        _review = isOther || _records.Count != before ? Math.Max(0, _records.Count - 1) : _review;
    }
}

/// <summary>What lies between two reviews, with the names of the experiments that were gained and lost.</summary>
/// <param name="Comparison">The comparison.</param>
/// <param name="Differences">Gained and lost experiments with their codes, in the plan's order.</param>
public sealed record ReviewDifferences(ReviewComparison Comparison, IReadOnlyList<(string Experiment, ReviewDifference Difference)> Differences);
