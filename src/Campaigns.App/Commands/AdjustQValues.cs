using Campaigns.App.Wording;
using Campaigns.Statistics.Probability;
using Campaigns.Statistics.TrueNulls;

namespace Campaigns.App.Commands;

/// <summary>Q-values beside adjusted p-values, with what is said about them.</summary>
internal sealed class AdjustQValues
{
    /// <summary>The name of their column.</summary>
    public const string Column = "q_value";

    private readonly PValue[]? _values;

    /// <param name="p">The p-values of the file.</param>
    public AdjustQValues(PValue[] p)
    {
        TrueNullShare share = TrueNullShare.Estimate(p);
        _values = QValues.Of(p, share);
        Sentences =
        [
            TrueNullText.Share(share, [TrueNullShare.EstimateByBootstrap(p), TrueNullShare.EstimateBySmoother(p)], p.Length) is { } known
                ? $"{Column}: Storey's q-value with {known}."
                : $"{Column}: not estimable. {share.Reason}",
            "A q-value estimates the false discovery rate among this row and all with smaller p; it holds no error rate, leaves untested rows out, and is not valid for strongly dependent p-values. The chosen correction alone decides.",
            .. TrueNullText.Few(p.Length) is { } few ? [few] : (string[])[],
        ];
    }

    /// <summary>Sentences for people.</summary>
    public IReadOnlyList<string> Sentences { get; }

    /// <summary>The q-value of a p-value, by its place; null where none can be estimated.</summary>
    public PValue? At(int place) => _values?[place];
}
