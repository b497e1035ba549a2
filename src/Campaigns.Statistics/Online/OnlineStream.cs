using System.Collections;
using System.Diagnostics.CodeAnalysis;
using Campaigns.Statistics.Probability;

namespace Campaigns.Statistics.Online;

/// <summary>Experiments that arrive one after another: each gets its level when it starts, from what is known then, and is decided for good when its p-value is known.</summary>
/// <remarks>
/// Experiments may overlap. Then a level is fixed at the start, a rejection counts from when it is known, and one that still runs counts as if its p-value were the worst
/// (T. Zrnic, A. Ramdas and M. I. Jordan (2021), Journal of Machine Learning Research 22(33):1-39).
/// </remarks>
[SuppressMessage("Naming", "CA1711", Justification = "A stream of hypotheses is the field's word.")]
public sealed class OnlineStream
{
    private readonly LevelRule _rule;
    private readonly List<double> _levels = [];
    private readonly BitArray _finished = new(16);

    internal OnlineStream(OnlineSettings settings, LevelRule rule)
    {
        Settings = settings;
        _rule = rule;
    }

    /// <summary>The settings, fixed for the life of the stream.</summary>
    public OnlineSettings Settings { get; }

    /// <summary>How many experiments have started.</summary>
    public int Started => _levels.Count;

    /// <summary>How many of them have been decided.</summary>
    public int Finished { get; private set; }

    /// <summary>How many of these were rejected.</summary>
    public int Rejections { get; private set; }

    /// <summary>The next experiment starts.</summary>
    /// <returns>Its position and its level, from what is known now; neither changes afterwards.</returns>
    public OnlineLevel Register()
    {
        int position = Started + 1;
        double level = _rule.Next(position);
        Start(position, level);
        return new OnlineLevel(position, level);
    }

    /// <summary>The p-value of a started experiment becomes known: it is decided.</summary>
    /// <param name="position">Its position.</param>
    /// <param name="p">Its p-value.</param>
    /// <returns>Whether it is rejected, at the level given at its start.</returns>
    /// <exception cref="ArgumentException">No experiment has started at that position, or it was decided before.</exception>
    public bool Report(int position, PValue p)
    {
        if (!HasStarted(position) || _finished[position - 1])
        {
            throw new ArgumentException(
                HasStarted(position)
                    ? FormattableString.Invariant($"The experiment at position {position} was decided before; a decision stands.")
                    : FormattableString.Invariant($"No experiment has started at position {position}; {Started} have."),
                nameof(position));
        }

        bool rejected = new OnlineLevel(position, _levels[position - 1]).Rejects(p);
        _finished[position - 1] = true;
        Finished++;
        Rejections += rejected ? 1 : 0;
        _rule.Finished(position, p, rejected, Started);
        return rejected;
    }

    /// <summary>The level that was given at a position.</summary>
    /// <param name="position">That of a started experiment.</param>
    /// <exception cref="ArgumentException">None has started there.</exception>
    public double LevelOf(int position) => HasStarted(position)
        ? _levels[position - 1]
        : throw new ArgumentException(FormattableString.Invariant($"No experiment has started at position {position}; {Started} have."), nameof(position));

    /// <summary>Does again what happened, at the levels that were given then.</summary>
    internal void Replay(OnlineEvent happened)
    {
        if (happened.P is { } p)
        {
            Report(happened.Position, p);
            return;
        }

        if (happened.Position != Started + 1 || !(happened.Level >= 0 && happened.Level < 1))
        {
            throw new ArgumentException(
                FormattableString.Invariant($"After {Started} experiments the next starts at position {Started + 1} with a level in [0, 1), not at {happened.Position} with {happened.Level:R}."),
                nameof(happened));
        }

        Start(happened.Position, happened.Level);
    }

    private bool HasStarted(int position) => position >= 1 && position <= Started;

    private void Start(int position, double level)
    {
        _levels.Add(level);
        if (_finished.Length < position)
        {
            _finished.Length = 2 * position;
        }

        _rule.Started(position, level);
    }
}
