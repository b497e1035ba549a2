using Campaigns.Catalog;
using Campaigns.Catalog.Ledger;

namespace Campaigns.App.Dashboard.Model;

/// <summary>Whether what the dashboard shows is the catalog as it stands: others may have changed it since it was read, or hold it locked when more is to be read.</summary>
/// <remarks>For the thread of its source.</remarks>
/// <param name="source">Where everything comes from.</param>
public sealed class CatalogWatch(IDashboardSource source)
{
    private LedgerHead _read = LedgerHead.Empty;

    /// <summary>What is wrong and what to do, in one sentence; null where nothing is.</summary>
    public string? Sentence { get; private set; }

    /// <summary>Whether something could not be read; nothing more is then read until somebody asks for it, because each attempt waits for the lock.</summary>
    public bool HasFailed { get; private set; }

    /// <summary>Notes where the ledger ends; called just before everything is read anew.</summary>
    /// <exception cref="CatalogException">The catalog cannot be read.</exception>
    public void Begin()
    {
        _read = source.Head();
        (Sentence, HasFailed) = (null, false);
    }

    /// <summary>Looks whether others changed the catalog since it was read.</summary>
    public void Look()
    {
        try
        {
            LedgerHead now = source.Head();
            (Sentence, HasFailed) = (now == _read ? null : FormattableString.Invariant($"F5 reads anew: the catalog was changed since (ledger entry {now.Sequence})."), false);
        }
        catch (CatalogException error)
        {
            Fail(error);
        }
    }

    /// <summary>Notes that something could not be read.</summary>
    /// <param name="error">Why.</param>
    public void Fail(CatalogException error)
    {
        ArgumentNullException.ThrowIfNull(error);
        (Sentence, HasFailed) = ("F5 tries again. " + error.Message, true);
    }
}
