using System.Globalization;

namespace Campaigns.Catalog.Loading;

/// <summary>All problems of a file: the first hundred are kept, all are counted.</summary>
public sealed class ImportProblems
{
    /// <summary>How many problems are kept.</summary>
    public const int MostKept = 100;

    private readonly List<ImportProblem> _kept = [];

    /// <summary>How many problems there were, the ones not kept among them.</summary>
    public long Count { get; private set; }

    /// <summary>Whether there was none.</summary>
    public bool IsEmpty => Count == 0;

    /// <summary>The first hundred, in the order in which they were met.</summary>
    public IReadOnlyList<ImportProblem> Kept => _kept;

    /// <summary>Adds a problem.</summary>
    /// <param name="problem">The problem; kept if there is room, counted in any case.</param>
    public void Add(ImportProblem problem)
    {
        ArgumentNullException.ThrowIfNull(problem);
        Count++;
        if (_kept.Count < MostKept)
        {
            _kept.Add(problem);
        }
    }

    /// <summary>Adds the problems of another file.</summary>
    /// <param name="other">The other's problems; those that it did not keep are counted.</param>
    public void AddAll(ImportProblems other)
    {
        ArgumentNullException.ThrowIfNull(other);
        foreach (ImportProblem problem in other.Kept.ToArray())
        {
            Add(problem);
        }

        Count += other.Count - other.Kept.Count;
    }

    /// <summary>One sentence a problem, and a last one for those that were not kept.</summary>
    public IEnumerable<string> Sentences()
    {
        foreach (ImportProblem problem in _kept)
        {
            yield return problem.ToString();
        }

        if (Count > _kept.Count)
        {
            yield return string.Create(CultureInfo.InvariantCulture, $"... and {Count - _kept.Count} more problems, {Count} in all.");
        }
    }
}
