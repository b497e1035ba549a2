using System.Globalization;
using Campaigns.Catalog.Ledger;

namespace Campaigns.App.Wording;

/// <summary>The ledger in words: a sentence for every action, and the head that is worth keeping.</summary>
internal static class LedgerText
{
    /// <summary>What a listing needs to be read; no sign in it stands without these.</summary>
    public static IReadOnlyList<string> Legend { get; } =
    [
        "Entries stand in the order of their numbers, which is the order in which things were done; the time is that of the computer's clock, in UTC, and may have been set wrong. The account is the one under which the program ran; the name before it was given with --as and is nobody's signature. Under an entry: what had which value before, and after \"->\" which it has since; (none) is no value.",
    ];

    /// <summary>What cannot be seen without a head from outside.</summary>
    public const string NotSeenWithoutHead =
        "Without a head from outside it cannot be seen whether the end of the record was cut off, or the whole file was replaced by an older copy: hold it against a head that was printed earlier, with --head SEQUENCE:HASH.";

    /// <summary>The line that reports, exports and 'show' carry.</summary>
    /// <param name="head">The head of the ledger as it was when the data were read.</param>
    public static string HeadLine(LedgerHead head)
    {
        ArgumentNullException.ThrowIfNull(head);
        return head.Sequence == 0
            ? "Record: the ledger has no entry yet."
            : $"Record: whoever keeps the head at the end of this line can prove later, with 'campaigns ledger verify --head', that the record was only continued since. This is what stood in the catalog at ledger head {head}";
    }

    /// <summary>When, and who: "2026-12-01 08:00:00 UTC, Ada (account lab)".</summary>
    public static string Who(LedgerEntry entry) =>
        $"{entry.At.UtcDateTime.ToString("yyyy-MM-dd HH:mm:ss", CultureInfo.InvariantCulture)} UTC, {Who(entry.By)}";

    /// <summary>Who acts: "Ada (account lab)".</summary>
    public static string Who(Actor actor) => actor.ActingAs is { } name ? $"{name} (account {actor.Account})" : actor.Account;

    /// <summary>An entry as one sentence: number, when, who, what, and why where a reason is due.</summary>
    public static string Sentence(LedgerEntry entry)
    {
        ArgumentNullException.ThrowIfNull(entry);
        string reason = entry.Reason is { } why ? $" Reason: {why.TrimEnd('.')}." : "";
        return FormattableString.Invariant($"{entry.Sequence}. {Who(entry)}: {Deed(entry)}.{reason}");
    }

    /// <summary>What an entry says was done, without a full stop: "sealed the plan of PRIMERS".</summary>
    public static string Deed(LedgerEntry entry)
    {
        ArgumentNullException.ThrowIfNull(entry);
        string of = entry.Campaign ?? "the catalog";
        string subject = entry.Subject is { } text ? $" ({text})" : "";
        return entry.Action switch
        {
            LedgerAction.Start => $"opened campaign {of}",
            LedgerAction.Plan => $"registered or changed planned experiments of {of}{subject}",
            LedgerAction.Families => $"registered families of {of}{subject}",
            LedgerAction.Seal => $"sealed the plan of {of}",
            LedgerAction.Amend => $"amended the sealed plan of {of}{subject}",
            LedgerAction.Load => $"loaded measurements into {of}{subject}",
            LedgerAction.Register => $"gave levels to arriving experiments of {of}{subject}",
            LedgerAction.Restream => $"started a new stream of arriving experiments in {of}{subject}",
            LedgerAction.Test => $"ran the planned tests of {of}{subject}",
            LedgerAction.Review => $"applied the correction to the family of {of} and stored it{subject}",
            LedgerAction.Exclude => $"left an observation of {of} out of the analysis{subject}",
            LedgerAction.Include => $"took an observation of {of} in again{subject}",
            LedgerAction.Withdraw => $"withdrew an experiment of {of}{subject}",
            LedgerAction.Restore => $"took a withdrawn experiment of {of} in again{subject}",
            LedgerAction.Upgrade => "brought the catalog to a newer schema",
            _ => $"did something in {of} that this version has no words for, '{entry.Action}'{subject}",
        };
    }

    /// <summary>The same in fewer words, for a list: what was done first, then to what, the campaign last.</summary>
    public static string ShortDeed(LedgerEntry entry)
    {
        ArgumentNullException.ThrowIfNull(entry);
        string of = entry.Campaign ?? "the catalog";
        string behind = entry.Subject is { } text ? $" ({text})" : "";
        return entry.Action switch
        {
            LedgerAction.Plan => $"planned experiments of {of}{behind}",
            LedgerAction.Families => $"families of {of}{behind}",
            LedgerAction.Amend => $"amended the plan of {of}{behind}",
            LedgerAction.Load when entry.Subject is { } file => $"loaded {file} into {of}",
            LedgerAction.Register => $"gave levels in {of}{behind}",
            LedgerAction.Restream => $"new stream in {of}{behind}",
            LedgerAction.Test => $"tested {of}{behind}",
            LedgerAction.Review => $"took a review of {of}{behind}",
            LedgerAction.Exclude when entry.Subject is { } one => $"left out value {one}, {of}",
            LedgerAction.Include when entry.Subject is { } one => $"took in value {one} again, {of}",
            LedgerAction.Withdraw when entry.Subject is { } one => $"withdrew {one}, {of}",
            LedgerAction.Restore when entry.Subject is { } one => $"took in {one} again, {of}",
            _ => Deed(entry),
        };
    }

    /// <summary>A value before and after, in words.</summary>
    public static string Change(LedgerChange change)
    {
        ArgumentNullException.ThrowIfNull(change);
        return change.What == LedgerChange.Clock
            ? $"the computer's clock had gone back: the entry before was written at {change.Before}, this one at {change.After}"
            : $"{change.What}: {Value(change.Before)} -> {Value(change.After)}";
    }

    /// <summary>All changes of an entry in one cell, for scripts: they are parted by semicolons.</summary>
    public static string Changes(LedgerEntry entry)
    {
        ArgumentNullException.ThrowIfNull(entry);
        return string.Join("; ", entry.Changes.Select(c => $"{c.What}: {Value(c.Before)} -> {Value(c.After)}"));
    }

    private static string Value(string? value) => value switch { null => "(none)", "" => "(empty)", _ => value };
}
