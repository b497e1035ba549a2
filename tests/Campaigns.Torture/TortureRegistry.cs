namespace Campaigns.Torture;

/// <summary>Every torture test, in the order of its number.</summary>
internal static class TortureRegistry
{
    public static IReadOnlyList<Func<TortureTest>> All { get; } =
    [
        () => new Incoming.NumberForms(),
        () => new Incoming.Locales(),
        () => new Outgoing.FamilyBookkeeping(),
        () => new Outgoing.SameEveryTime(),
    ];
}
