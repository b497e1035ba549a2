using Campaigns.Domain;

namespace Campaigns.Catalog.Loading;

/// <summary>The keys of procedures that a plan or a campaign may name.</summary>
/// <param name="Tests">Omnibus tests.</param>
/// <param name="FollowUps">Follow-up procedures.</param>
/// <param name="Corrections">Corrections; a plan names none.</param>
public sealed record KnownKeys(IReadOnlyCollection<string> Tests, IReadOnlyCollection<string> FollowUps, IReadOnlyCollection<string> Corrections)
{
    /// <summary>The sentence for a key that is not among the known ones.</summary>
    internal static string Unknown(string key, string kind, IReadOnlyCollection<string> known)
    {
        string near = Nearest.Of(key, known) is string nearest ? $" (did you mean {nearest}?)" : "";
        return $"{ShownText.Quote(key)} is no {kind}{near}: use one of {string.Join(", ", known)}.";
    }
}
