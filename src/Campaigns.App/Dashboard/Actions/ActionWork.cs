using Campaigns.App.Wording;
using Campaigns.Catalog;

namespace Campaigns.App.Dashboard.Actions;

/// <summary>What an action works with, on a thread of its own.</summary>
/// <param name="Catalog">The catalog, opened for this piece of work.</param>
/// <param name="Campaign">Code of the open campaign.</param>
/// <param name="Values">What was typed.</param>
/// <param name="Cancel">Somebody asks to stop.</param>
internal sealed record ActionWork(Catalog.Catalog Catalog, string Campaign, ActionValues Values, CancellationToken Cancel)
{
    /// <summary>Told now and then how far the work is.</summary>
    public required Action<WorkProgress> Report { get; init; }

    /// <summary>How sentences name what can be done next: the dialog says it to who has the keys at hand.</summary>
    public StepNames Steps => StepNames.Keys(Campaign);

    /// <summary>What the preview expected to be done; 0 where it did not count.</summary>
    public long Expected { get; init; }
}

/// <summary>What an action would do.</summary>
/// <param name="Sentences">In words.</param>
/// <param name="HasEffect">Whether carrying it out would change anything.</param>
internal sealed record Preview(IReadOnlyList<string> Sentences, bool HasEffect = true)
{
    /// <summary>Whether the ledger will hold it; what changes no catalog it does not.</summary>
    public bool IsRecorded { get; init; } = true;

    /// <summary>Units of work that carrying it out will take; 0 where they were not counted.</summary>
    public long Expected { get; init; }
}
