namespace Campaigns.Catalog.Ledger;

/// <summary>Who acts: both names go into the ledger.</summary>
/// <param name="Account">The account under which the program runs.</param>
/// <param name="ActingAs">Whom the account names as acting; null where it names nobody.</param>
public sealed record Actor(string Account, string? ActingAs = null)
{
    /// <summary>The account of this process.</summary>
    public static Actor OfProcess { get; } = new(Environment.UserName is { Length: > 0 } name ? name : "unknown");

    /// <summary>The name that a decision carries: the one given, else the account.</summary>
    public string Name => ActingAs ?? Account;
}
