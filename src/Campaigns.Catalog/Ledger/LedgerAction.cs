namespace Campaigns.Catalog.Ledger;

/// <summary>The words of the actions in the ledger; once written, a word never changes.</summary>
public static class LedgerAction
{
    /// <summary>A campaign was opened.</summary>
    public const string Start = "start";

    /// <summary>Experiments were registered or changed before the seal.</summary>
    public const string Plan = "plan";

    /// <summary>Families were registered before the seal.</summary>
    public const string Families = "families";

    /// <summary>The plan was fixed.</summary>
    public const string Seal = "seal";

    /// <summary>A sealed plan was amended.</summary>
    public const string Amend = "amend";

    /// <summary>A file of measurements was loaded.</summary>
    public const string Load = "load";

    /// <summary>Experiments were given their levels.</summary>
    public const string Register = "register";

    /// <summary>A new stream was started.</summary>
    public const string Restream = "restream";

    /// <summary>Tests were run.</summary>
    public const string Test = "test";

    /// <summary>A review was taken.</summary>
    public const string Review = "review";

    /// <summary>An observation was left out.</summary>
    public const string Exclude = "exclude";

    /// <summary>An observation was taken in again.</summary>
    public const string Include = "include";

    /// <summary>An experiment was withdrawn.</summary>
    public const string Withdraw = "withdraw";

    /// <summary>A withdrawn experiment was taken in again.</summary>
    public const string Restore = "restore";

    /// <summary>The catalog was brought to a newer schema.</summary>
    public const string Upgrade = "upgrade";

    /// <summary>Every word.</summary>
    public static IReadOnlyList<string> All { get; } =
        [Start, Plan, Families, Seal, Amend, Load, Register, Restream, Test, Review, Exclude, Include, Withdraw, Restore, Upgrade];
}
