using Campaigns.App.Wording;
using Campaigns.Catalog.Ledger;

namespace Campaigns.App.Dashboard.Actions;

/// <summary>Where actions get a catalog of their own to work on.</summary>
/// <param name="open">Opens the catalog in the name of who acts; changes of a campaign that others changed after the head given are refused.</param>
/// <param name="actor">Who acts.</param>
/// <param name="clock">Where instants come from.</param>
public sealed class ActionDesk(Func<LedgerHead?, Catalog.Catalog> open, Actor actor, TimeProvider clock)
{
    /// <summary>Who acts.</summary>
    public Actor Actor { get; } = actor;

    /// <summary>Where instants come from.</summary>
    public TimeProvider Clock { get; } = clock;

    /// <summary>Opens the catalog.</summary>
    /// <param name="seen">The head of the ledger that the user has seen; null to take any.</param>
    public Catalog.Catalog Open(LedgerHead? seen) => open(seen);

    /// <summary>Who the record will name, in a sentence.</summary>
    internal string Signature => $"The record names as who did it: {LedgerText.Who(Actor)}.";
}
