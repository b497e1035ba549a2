using Campaigns.Statistics.TrueNulls;

namespace Campaigns.App.Wording;

/// <summary>The estimated share of true nulls in words, the same on paper and on screen.</summary>
internal static class TrueNullText
{
    /// <summary>What every estimate of it supposes, and what it is not.</summary>
    public const string Supposes = "Supposes that true nulls spread p evenly, as independent tests do; an estimate, no bound.";

    /// <summary>The same where there is little room.</summary>
    public const string SupposesBriefly = "An estimate, for independent tests.";

    /// <summary>For example "Storey's estimate of their share (2002), 0.873 (lambda 0.5)"; null without an estimate.</summary>
    /// <param name="share">The estimate that counts.</param>
    public static string? Alone(TrueNullShare share) => share.Share is { } known ? FormattableString.Invariant($"Storey's estimate of their share (2002), {known:0.###} ({share.Method})") : null;

    /// <summary>For example "Storey's estimate of their share (2002), 0.873 (lambda 0.5); others: 0.9 (bootstrap choice of lambda)"; null without an estimate.</summary>
    /// <param name="share">The estimate that counts.</param>
    /// <param name="others">Estimates by other methods.</param>
    public static string? Brief(TrueNullShare share, IEnumerable<TrueNullShare> others) => Alone(share) is { } alone
        ? $"{alone}; others: {string.Join(", ", others.Select(Other))}"
        : null;

    /// <summary>For example "an estimated share of true nulls of 0.873 (lambda 0.5) among the 40 tested; other estimates: ..."; null without an estimate.</summary>
    /// <param name="share">The estimate that counts.</param>
    /// <param name="others">Estimates by other methods.</param>
    /// <param name="tested">P-values behind them.</param>
    public static string? Share(TrueNullShare share, IEnumerable<TrueNullShare> others, int tested) => share.Share is { } known
        ? FormattableString.Invariant($"an estimated share of true nulls of {known:0.###} ({share.Method}) among the {tested} tested; other estimates: {string.Join(", ", others.Select(Other))}")
        : null;

    /// <summary>A caution where p-values are few; null where they are not.</summary>
    /// <param name="tested">P-values behind the estimate.</param>
    public static string? Few(int tested) => tested is > 0 and < TrueNullShare.FewPValues
        ? FormattableString.Invariant($"{tested} p-values are few for an estimate of the share of true nulls; {TrueNullShare.FewPValues} or more would be better.")
        : null;

    private static string Other(TrueNullShare share) =>
        share.Share is { } known ? FormattableString.Invariant($"{known:0.###} ({share.Method})") : $"none ({share.Method})";
}
