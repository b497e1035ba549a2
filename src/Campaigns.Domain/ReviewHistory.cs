namespace Campaigns.Domain;

/// <summary>Which experiment survived in which review.</summary>
/// <param name="Reviews">The reviews, oldest first.</param>
/// <param name="Experiments">The experiments, in the plan's order.</param>
public sealed record ReviewHistory(IReadOnlyList<ReviewHead> Reviews, IReadOnlyList<ExperimentHistory> Experiments);

/// <summary>One experiment through all reviews.</summary>
/// <param name="Code">Its code.</param>
/// <param name="Lines">Its line in each review; null where it has none.</param>
public sealed record ExperimentHistory(string Code, IReadOnlyList<ReviewLine?> Lines)
{
    /// <summary>Whether it survives in one review and not in another, in which it may have no line.</summary>
    public bool HasChanged
    {
        get
        {
            int survived = Lines.Count(l => l?.Survives == true);
            return survived > 0 && survived < Lines.Count;
        }
    }
}
