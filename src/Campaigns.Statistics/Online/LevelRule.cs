using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Online;

/// <summary>The state that one procedure keeps of one stream, and the level that follows from it.</summary>
/// <remarks>Experiments start in the order of their positions and finish in any order. Nothing but what has finished is known when a level is fixed.</remarks>
internal abstract class LevelRule
{
    /// <summary>The level of the next experiment to start, from what is known now.</summary>
    /// <param name="position">Its position, one more than have started.</param>
    /// <returns>In [0, 1).</returns>
    public abstract double Next(int position);

    /// <summary>An experiment has started at a level.</summary>
    public virtual void Started(int position, double level)
    {
    }

    /// <summary>The p-value of an experiment that had started becomes known.</summary>
    /// <param name="position">Its position.</param>
    /// <param name="p">Its p-value.</param>
    /// <param name="rejected">Whether it is at most the experiment's level.</param>
    /// <param name="started">How many experiments have started by now: the last of them is the time at which this becomes known.</param>
    public virtual void Finished(int position, PValue p, bool rejected, int started)
    {
    }
}
