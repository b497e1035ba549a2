using Campaigns.Statistics.Corrections;

namespace Campaigns.Statistics.Online;

/// <summary>A procedure that decides on each experiment as it arrives, from earlier ones alone, and never takes a decision back: one sealed class in one file, and one line in <see cref="OnlineRegistry"/>.</summary>
public abstract class OnlineProcedure : ErrorProcedure
{
    /// <summary>The key of the shape that is used where none is named.</summary>
    public abstract string DefaultShape { get; }

    /// <summary>Whether the procedure starts with a wealth that rejections add to.</summary>
    public virtual bool TakesWealth => false;

    /// <summary>The usual lambda; null where the procedure takes none.</summary>
    public virtual double? DefaultLambda => null;

    /// <summary>The usual tau; null where the procedure takes none.</summary>
    public virtual double? DefaultTau => null;

    /// <summary>Whether lambda may be 0; where it caps the level, nothing could survive then.</summary>
    public virtual bool LambdaMayBeZero => false;

    /// <summary>Starts a stream.</summary>
    /// <param name="settings">Made for this procedure.</param>
    public OnlineStream Start(OnlineSettings settings)
    {
        SpendingShape shape = SpendingShape.Find(settings.Shape) ?? throw new ArgumentException($"No shape '{settings.Shape}'.", nameof(settings));
        return new OnlineStream(settings, Rule(settings, new SpendingTable(shape, settings.Horizon)));
    }

    /// <summary>Goes on with a stream that was kept: what happened happens again in order, at the levels that were given then.</summary>
    /// <param name="settings">Those with which it started.</param>
    /// <param name="happened">Starts and reports in the order in which they happened.</param>
    /// <exception cref="ArgumentException">They cannot have happened in that order.</exception>
    /// <remarks>Constant work for each event, except where experiments overlap: no level is computed again.</remarks>
    public OnlineStream Resume(OnlineSettings settings, IEnumerable<OnlineEvent> happened)
    {
        OnlineStream stream = Start(settings);
        foreach (OnlineEvent one in happened)
        {
            stream.Replay(one);
        }

        return stream;
    }

    private protected abstract LevelRule Rule(OnlineSettings settings, SpendingTable table);
}
