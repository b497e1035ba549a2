using Campaigns.App.Dashboard.Model;

namespace Campaigns.App.Dashboard.Actions;

/// <summary>Something that can be done to the open campaign: one class in one file, and one line in <see cref="ActionList"/>. It knows no terminal, and keeps nothing between two calls.</summary>
internal abstract class DashboardAction
{
    /// <summary>The key that begins it on every page.</summary>
    public abstract char Key { get; }

    /// <summary>Its name, in a few words.</summary>
    public abstract string Name { get; }

    /// <summary>What it does, in a sentence.</summary>
    public abstract string Does { get; }

    /// <summary>Whether it changes the catalog, and so needs the right to.</summary>
    public virtual bool Changes => true;

    /// <summary>What it asks for, filled in as far as what is selected and marked tells.</summary>
    /// <param name="model">What the dashboard shows.</param>
    /// <param name="desk">Where the catalog is opened.</param>
    public abstract IReadOnlyList<ActionField> Fields(DashboardModel model, ActionDesk desk);

    /// <summary>Finds out what carrying it out would do, inside a transaction that is taken back.</summary>
    /// <param name="work">What it works with.</param>
    /// <remarks>What it throws is what carrying it out would throw.</remarks>
    public abstract Preview Rehearse(ActionWork work);

    /// <summary>Does it: all of it or nothing.</summary>
    /// <param name="work">What it works with.</param>
    /// <returns>What was done, in sentences.</returns>
    public abstract IReadOnlyList<string> CarryOut(ActionWork work);
}
