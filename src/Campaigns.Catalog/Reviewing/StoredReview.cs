using Campaigns.Catalog.Results;
using Campaigns.Domain;
using Campaigns.Statistics.Probability;

namespace Campaigns.Catalog.Reviewing;

/// <summary>A review as the catalog holds it.</summary>
/// <param name="Id">Key within the catalog.</param>
/// <param name="Head">The review without its lines.</param>
/// <param name="LastTestRunId">The latest test run that it saw.</param>
/// <param name="Position">How far the record had come.</param>
/// <param name="Packed">Its lines, as they are stored.</param>
internal sealed record StoredReview(long Id, ReviewHead Head, long LastTestRunId, RecordPosition Position, byte[] Packed)
{
    private (FamilyColumns Columns, PValue[] Adjusted)? _lines;

    /// <summary>Experiments and p-values of its lines, and the adjusted p-values beside them.</summary>
    public (FamilyColumns Columns, PValue[] Adjusted) Lines => _lines ??= PackedReviewLines.Unpack(Packed);
}
